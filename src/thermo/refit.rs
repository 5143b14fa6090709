//! Makes the fitted tables from the measured rows.

use std::collections::BTreeMap;
use std::fmt::Write;

use super::data::{Quantity, Row, Value, combine, group, rows};
use super::estimate::{Estimator, symmetry_entropy};
use super::features::{self, FrameFacts};
use super::fit::{Class, Fit, Observation, fit};
use crate::frame::{Canonicaliser, Decoration, Frame, Layout};
use crate::molecule::{Element, Halogen, Identity, Molecule};
use crate::smiles;

/// The texts of `data/` that a fit reads.
#[derive(Debug, Clone, Copy)]
pub struct Sources<'a> {
    /// `data/gas.csv`.
    pub gas: &'a str,
    /// `data/henry.csv`.
    pub henry: &'a str,
    /// `data/priors.csv`.
    pub priors: &'a str,
}

/// The texts of `data/fitted/`, by file name, and how good the fit is.
#[derive(Debug, Clone)]
pub struct Refitted {
    /// File names and contents.
    pub files: Vec<(String, String)>,
    /// Deviations of left-out rows by class, a line each.
    pub report: String,
}

/// Why a fit can't be made.
#[derive(Debug, thiserror::Error)]
#[allow(missing_docs)]
pub enum RefitError {
    #[error(transparent)]
    Csv(#[from] csv::Error),
    #[error("no prior width for the family `{family}` in data/priors.csv")]
    NoPrior { family: String },
    #[error("{quantity:?}: {why}")]
    Fit { quantity: Quantity, why: String },
}

/// A measured compound made ready for the fit.
struct Compound {
    molecule: Molecule,
    frame: Frame,
    state: Decoration,
    groups: Vec<(usize, f64)>,
}

/// Fits the scheme to the rows.
///
/// # Errors
/// * a file that can't be read: `Csv`
/// * a family of groups without prior widths: `NoPrior`
/// * a fit that has no solution: `Fit`
pub fn refit(sources: Sources<'_>) -> Result<Refitted, RefitError> {
    let all = rows(sources.gas, sources.henry)?;
    let keyed: Vec<(Option<String>, &Row)> = all.iter().map(|row| (canonical(&row.smiles), row)).collect();
    let mut compounds: BTreeMap<String, Compound> = BTreeMap::new();
    for key in keyed.iter().filter_map(|(key, row)| key.clone().filter(|_| row.set_aside.is_empty())) {
        if let (false, Ok(molecule)) = (compounds.contains_key(&key), smiles::read(&key)) {
            compounds.insert(key, Compound::of(molecule));
        }
    }
    let mut measured: BTreeMap<String, [Option<(Value, String)>; 3]> = BTreeMap::new();
    let mut fits = Vec::new();
    let mut report = String::new();
    for quantity in Quantity::ALL {
        let of_quantity: Vec<Row> = all.iter().filter(|row| row.quantity == quantity).cloned().collect();
        let groups = group(&of_quantity, |row| canonical(&row.smiles));
        let mut observations = Vec::new();
        for (key, rows) in groups {
            let (Some(value), Some(compound)) = (combined(&rows), compounds.get(&key)) else { continue };
            let standing: Vec<&Row> = rows.into_iter().filter(|row| row.fit_only.is_empty()).collect();
            observations.extend(compound.observation(&key, quantity, value, !standing.is_empty()));
            let Some(value) = combined(&standing) else { continue };
            let sources: Vec<&str> = standing.iter().map(|row| short_source(&row.source)).collect();
            measured.entry(key).or_default()[quantity as usize] = Some((value, distinct(&sources)));
        }
        let priors = prior_widths(sources.priors, quantity)?;
        let fitted = fit(&observations, &priors).map_err(|why| RefitError::Fit { quantity, why })?;
        describe(&mut report, quantity, &observations, &fitted);
        fits.push((observations, fitted));
    }
    let mut files = vec![
        ("groups.csv".to_owned(), groups_table(&fits)),
        ("model_error.csv".to_owned(), model_error_table(&fits)),
        ("measured.csv".to_owned(), measured_table(&measured, &compounds)),
    ];
    for (quantity, (_, fitted)) in Quantity::ALL.iter().zip(&fits) {
        let name = format!("covariance_{}.csv", format!("{quantity:?}").to_lowercase());
        files.push((name, covariance_table(fitted)));
    }
    Ok(Refitted { files, report })
}

/// One value of a compound's rows.
fn combined(rows: &[&Row]) -> Option<Value> {
    let values: Vec<Value> = rows.iter().map(|row| Value { mean: row.value, sd: row.sd }).collect();
    combine(&values)
}

/// Canonical text of a row's structure, if it is a compound.
fn canonical(text: &str) -> Option<String> {
    smiles::read(text).ok().map(|molecule| smiles::write(&molecule))
}

fn short_source(source: &str) -> &str {
    source.split([',', '(', ':']).next().unwrap_or(source).trim()
}

fn distinct(sources: &[&str]) -> String {
    let mut all: Vec<&str> = sources.to_vec();
    all.sort_unstable();
    all.dedup();
    all.join("; ")
}

impl Compound {
    fn of(molecule: Molecule) -> Compound {
        let frame = Frame::of(&molecule);
        let state = frame.decompose(&molecule);
        let is_told = molecule.isomers(Identity::Geometric, 64).is_ok_and(|isomers| isomers.len() == 1);
        let groups = Estimator::new(&frame, &FrameFacts::of(&frame), is_told).groups(&state);
        Compound { molecule, frame, state, groups }
    }

    /// What the fit sees: entropies with the symmetry put back. None for structures with fixed
    /// atoms, whose groups the scheme does not know.
    fn observation(&self, key: &str, quantity: Quantity, value: Value, is_measured: bool) -> Option<Observation> {
        if self.frame.sites().len() != self.frame.skeleton().n_atoms() {
            return None;
        }
        let mut value = value;
        if quantity == Quantity::Entropy {
            let layout = Layout::new(&self.frame, &Halogen::ALL, Identity::Geometric).ok()?;
            let canonicaliser = Canonicaliser::new(&self.frame, &layout);
            let (mut row, mut candidates) = (vec![0; layout.n_words()], vec![0; layout.n_words()]);
            layout.pack(&self.state, &mut row);
            layout.candidates(&self.frame, &self.state, &mut candidates);
            value.mean += symmetry_entropy(&self.frame, &self.state, &canonicaliser.stabiliser(&row, &candidates));
        }
        Some(Observation {
            smiles: key.to_owned(),
            groups: self.groups.clone(),
            value,
            class: Class::of(self.molecule.halogens()),
            is_measured,
        })
    }
}

fn prior_widths(text: &str, quantity: Quantity) -> Result<Vec<f64>, RefitError> {
    let mut widths: BTreeMap<String, [f64; 3]> = BTreeMap::new();
    for record in csv::Reader::from_reader(text.as_bytes()).into_deserialize() {
        let (family, h, s, k, _): (String, f64, f64, f64, String) = record?;
        widths.insert(family, [h, s, k]);
    }
    let of = |family: &str| {
        let found = widths.get(family).ok_or_else(|| RefitError::NoPrior { family: family.to_owned() })?;
        Ok(found[quantity as usize])
    };
    features::families().into_iter().map(of).collect()
}

/// Deviations of left-out measurements by class of compound.
fn describe(report: &mut String, quantity: Quantity, observations: &[Observation], fit: &Fit) {
    const CLASSES: [&str; 5] = ["no halogen", "chlorine only", "bromine only", "fluorine only", "mixed or iodine"];
    for (class, name) in CLASSES.iter().enumerate() {
        let is_member = |i: &usize| observations[*i].is_measured && class_of(&observations[*i].smiles) == class;
        let members: Vec<usize> = (0..observations.len()).filter(is_member).collect();
        if members.is_empty() {
            continue;
        }
        let mut errors: Vec<f64> = members.iter().map(|&i| fit.left_out[i].abs()).collect();
        errors.sort_by(f64::total_cmp);
        let rms = (errors.iter().map(|e| e * e).sum::<f64>() / errors.len() as f64).sqrt();
        let within = |k: f64| {
            let n = members.iter().filter(|&&i| fit.left_out[i].abs() < k * fit.left_out_sd[i]).count();
            100.0 * n as f64 / members.len() as f64
        };
        let _ = writeln!(
            report,
            "{quantity:?} ({}), {name}: {} compounds, left out: median {:.2}, RMS {:.2}; within one sd {:.0} %, two {:.0} %",
            quantity.unit(),
            members.len(),
            errors[errors.len() / 2],
            rms,
            within(1.0),
            within(2.0)
        );
    }
}

fn class_of(text: &str) -> usize {
    let Ok(molecule) = smiles::read(text) else { return 4 };
    match molecule.halogens().map(|n| n > 0) {
        [false, false, false, false] => 0,
        [false, true, false, false] => 1,
        [false, false, true, false] => 2,
        [true, false, false, false] => 3,
        _ => 4,
    }
}

fn groups_table(fits: &[(Vec<Observation>, Fit)]) -> String {
    let mut text = "group,family,enthalpy_kj_per_mol,entropy_j_per_mol_k,log10_solubility\n".to_owned();
    for (index, (name, family)) in features::names().iter().zip(features::families()).enumerate() {
        let value = |q: usize| fits.get(q).map_or(0.0, |(_, fit)| fit.values[index]);
        let _ = writeln!(text, "\"{name}\",\"{family}\",{:.3},{:.3},{:.4}", value(0), value(1), value(2));
    }
    text
}

fn model_error_table(fits: &[(Vec<Observation>, Fit)]) -> String {
    let mut text = "quantity,no_halogen,halogens_without_fluorine,fluorine\n".to_owned();
    for (quantity, (_, fit)) in Quantity::ALL.iter().zip(fits) {
        let _ = writeln!(text, "{quantity:?},{:.3},{:.3},{:.3}", fit.model_sd[0], fit.model_sd[1], fit.model_sd[2]);
    }
    text
}

fn measured_table(
    measured: &BTreeMap<String, [Option<(Value, String)>; 3]>,
    compounds: &BTreeMap<String, Compound>,
) -> String {
    let mut text = "smiles,n_carbons".to_owned();
    for quantity in ["enthalpy", "entropy", "solubility"] {
        let _ = write!(text, ",{quantity},{quantity}_sd,{quantity}_source");
    }
    text.push('\n');
    for (key, values) in measured {
        let n_carbons = compounds.get(key).map_or(0, |c| c.molecule.formula().count(Element::C));
        let _ = write!(text, "{key},{n_carbons}");
        for value in values {
            match value {
                Some((v, sources)) => drop(write!(text, ",{:.3},{:.3},\"{sources}\"", v.mean, v.sd)),
                None => text.push_str(",,,"),
            }
        }
        text.push('\n');
    }
    text
}

/// The lower triangle, three significant digits.
fn covariance_table(fit: &Fit) -> String {
    let mut text = String::new();
    for i in 0..features::N_FEATURES {
        let row: Vec<String> = (0..=i).map(|j| format!("{:.2e}", fit.covariance[(i, j)])).collect();
        text.push_str(&row.join(","));
        text.push('\n');
    }
    text
}
