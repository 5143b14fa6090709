//! The additive scheme as fitted: group values, their covariance, and what was measured.
//!
//! The tables in `data/fitted/` are written by [`refit`](mod@super::refit) and embedded. They are
//! read once; covariances only when an uncertainty is first asked for.

use std::sync::OnceLock;

use super::data::{Quantity, Species, Value, species};
use super::features::N_FEATURES;

/// Group values and the like, one entry a quantity in the order of [`Quantity::ALL`].
#[derive(Debug)]
pub struct Scheme {
    /// Value of each group.
    pub values: [Vec<f64>; 3],
    /// Model error by quantity and [`Class`](super::fit::Class).
    pub model_sd: [[f64; 3]; 3],
    /// Measured compounds, by canonical SMILES.
    pub measured: Vec<Measured>,
    /// Ions, water and small molecules.
    pub species: Vec<Species>,
    /// What is granted where nothing is fitted.
    pub allowances: Allowances,
    covariance: [OnceLock<Vec<f32>>; 3],
}

/// Uncertainties that no fit gives, from `data/allowances.csv`; the reasons stand there.
#[derive(Debug, Clone, Copy)]
pub struct Allowances {
    /// Standard uncertainty of each halogen that comes or goes beside a fixed atom, kJ/mol.
    pub halogen_beside_fixed_sd_kj_per_mol: f64,
    /// Share of the variance of a compound's own deviation that its neighbour in a step has too.
    pub shared_deviation: f64,
}

/// What was measured of one compound.
#[derive(Debug, Clone)]
pub struct Measured {
    /// Canonical SMILES.
    pub smiles: String,
    /// Number of carbons.
    pub n_carbons: usize,
    /// Combined values, by [`Quantity`].
    pub values: [Option<Value>; 3],
    /// Sources by quantity, short.
    pub sources: [String; 3],
}

const GROUPS: &str = include_str!("../../data/fitted/groups.csv");
const MODEL_ERROR: &str = include_str!("../../data/fitted/model_error.csv");
const MEASURED: &str = include_str!("../../data/fitted/measured.csv");
const ALLOWANCES: &str = include_str!("../../data/allowances.csv");
const SPECIES: &str = include_str!("../../data/species.csv");
const COVARIANCE: [&str; 3] = [
    include_str!("../../data/fitted/covariance_enthalpy.csv"),
    include_str!("../../data/fitted/covariance_entropy.csv"),
    include_str!("../../data/fitted/covariance_solubility.csv"),
];

/// The shipped scheme.
///
/// # Panics
/// Never: a test reads the embedded tables.
pub fn shipped() -> &'static Scheme {
    static SCHEME: OnceLock<Scheme> = OnceLock::new();
    SCHEME.get_or_init(|| load().expect("the embedded tables are read by a test"))
}

fn load() -> Result<Scheme, csv::Error> {
    let mut values = [Vec::new(), Vec::new(), Vec::new()];
    for record in csv::Reader::from_reader(GROUPS.as_bytes()).into_deserialize() {
        let (_, _, h, s, k): (String, String, GroupCell, GroupCell, GroupCell) = record?;
        for (list, cell) in values.iter_mut().zip([h, s, k]) {
            list.push(cell.0);
        }
    }
    let mut model_sd = [[0.0; 3]; 3];
    for (row, record) in csv::Reader::from_reader(MODEL_ERROR.as_bytes()).into_deserialize().enumerate() {
        let (_, none, no_fluorine, fluorine): (String, f64, f64, f64) = record?;
        model_sd[row.min(2)] = [none, no_fluorine, fluorine];
    }
    let measured: Result<Vec<MeasuredRow>, csv::Error> =
        csv::Reader::from_reader(MEASURED.as_bytes()).into_deserialize().collect();
    let measured = measured?.into_iter().map(Measured::from).collect();
    let covariance = [OnceLock::new(), OnceLock::new(), OnceLock::new()];
    Ok(Scheme { values, model_sd, measured, species: species(SPECIES)?, allowances: allowances()?, covariance })
}

/// A name that is missing leaves its widest allowance.
fn allowances() -> Result<Allowances, csv::Error> {
    let mut found = Allowances { halogen_beside_fixed_sd_kj_per_mol: f64::INFINITY, shared_deviation: 0.0 };
    for record in csv::Reader::from_reader(ALLOWANCES.as_bytes()).into_deserialize() {
        let (name, value, _, _): (String, f64, String, String) = record?;
        match name.as_str() {
            "halogen beside a fixed atom" => found.halogen_beside_fixed_sd_kj_per_mol = value,
            "shared deviation" => found.shared_deviation = value,
            _ => {}
        }
    }
    Ok(found)
}

/// A cell that holds a plain number.
#[derive(serde::Deserialize)]
#[serde(transparent)]
struct GroupCell(f64);

#[derive(serde::Deserialize)]
struct MeasuredRow {
    smiles: String,
    n_carbons: usize,
    enthalpy: Option<f64>,
    enthalpy_sd: Option<f64>,
    enthalpy_source: String,
    entropy: Option<f64>,
    entropy_sd: Option<f64>,
    entropy_source: String,
    solubility: Option<f64>,
    solubility_sd: Option<f64>,
    solubility_source: String,
}

impl From<MeasuredRow> for Measured {
    fn from(row: MeasuredRow) -> Measured {
        let value = |mean: Option<f64>, sd: Option<f64>| Some(Value { mean: mean?, sd: sd? });
        Measured {
            values: [
                value(row.enthalpy, row.enthalpy_sd),
                value(row.entropy, row.entropy_sd),
                value(row.solubility, row.solubility_sd),
            ],
            sources: [row.enthalpy_source, row.entropy_source, row.solubility_source],
            smiles: row.smiles,
            n_carbons: row.n_carbons,
        }
    }
}

impl Scheme {
    /// Variance of a sum of groups, from the covariance of their values.
    pub fn variance(&self, quantity: Quantity, groups: &[(usize, f64)]) -> f64 {
        let triangle = self.covariance[quantity as usize].get_or_init(|| triangle(COVARIANCE[quantity as usize]));
        let at = |i: usize, j: usize| {
            let (low, high) = if i < j { (i, j) } else { (j, i) };
            f64::from(triangle[high * (high + 1) / 2 + low])
        };
        let sum: f64 = groups
            .iter()
            .enumerate()
            .map(|(n, &(i, x))| {
                let off: f64 = groups[..n].iter().map(|&(j, y)| y * at(i, j)).sum();
                x * (x * at(i, i) + 2.0 * off)
            })
            .sum();
        sum.max(0.0)
    }

    /// An ion, water or small molecule, by its short name.
    pub fn species(&self, name: &str) -> Option<&Species> {
        self.species.iter().find(|s| s.species == name)
    }
}

/// The lower triangle of a covariance, row after row; numbers that are missing are zero.
fn triangle(text: &str) -> Vec<f32> {
    let mut all: Vec<f32> =
        text.lines().flat_map(|line| line.split(',')).filter_map(|cell| cell.parse().ok()).collect();
    all.resize(N_FEATURES * (N_FEATURES + 1) / 2, 0.0);
    all
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn every_allowance_is_given() {
        let found = shipped().allowances;
        assert!(found.halogen_beside_fixed_sd_kj_per_mol.is_finite() && found.shared_deviation > 0.0);
        assert!(found.shared_deviation < 1.0);
    }
}
