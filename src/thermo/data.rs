//! The measured data: rows as they stand in `data/`, and one combined value for each compound.
//!
//! A combined value is the weighted mean of a compound's rows; its uncertainty is that of the
//! mean, widened by the spread between sources where they disagree more than they say.

use std::collections::BTreeMap;

use serde::Deserialize;

use crate::molecule::Element;

/// A quantity that is measured and fitted.
#[derive(Debug, Clone, Copy, PartialEq, Eq, PartialOrd, Ord, Hash, Deserialize)]
#[serde(rename_all = "lowercase")]
pub enum Quantity {
    /// Gas-phase enthalpy of formation at 298.15 K, kJ/mol.
    Enthalpy,
    /// Gas-phase standard entropy at 298.15 K and 1 bar, J/mol/K.
    Entropy,
    /// Decadic logarithm of the Henry solubility in mol/L/bar at 298.15 K.
    Solubility,
}

impl Quantity {
    /// The three quantities in the order of every table.
    pub const ALL: [Quantity; 3] = [Quantity::Enthalpy, Quantity::Entropy, Quantity::Solubility];

    /// Unit, for people.
    pub fn unit(self) -> &'static str {
        match self {
            Quantity::Enthalpy => "kJ/mol",
            Quantity::Entropy => "J/mol/K",
            Quantity::Solubility => "log10(mol/L/bar)",
        }
    }
}

/// A measured or evaluated value with its source.
#[derive(Debug, Clone, Deserialize)]
pub struct Row {
    /// Structure.
    pub smiles: String,
    /// Name in the source.
    pub name: String,
    /// CAS number in the source, if it has one.
    pub cas: String,
    /// What was measured.
    pub quantity: Quantity,
    /// Its value, in the quantity's unit.
    pub value: f64,
    /// Standard uncertainty.
    pub sd: f64,
    /// Where it stands.
    pub source: String,
    /// Why it is not used; empty if it is.
    pub set_aside: String,
    /// Why it steadies the fit without standing for a measurement; empty if it is one.
    pub fit_only: String,
}

/// An ion or small molecule of a half-reaction.
#[derive(Debug, Clone, Deserialize)]
pub struct Species {
    /// Short name: a halogen's symbol, `water`, or a SMILES.
    pub species: String,
    /// Gibbs energy of formation in water, kJ/mol.
    pub gibbs_kj_per_mol: f64,
    /// Standard uncertainty, kJ/mol.
    pub sd_kj_per_mol: f64,
    /// Where it stands.
    pub source: String,
}

impl Species {
    /// Whether it is a compound a network can hold, and not an ion or water.
    pub fn is_compound(&self) -> bool {
        self.species != "water" && Element::from_symbol(&self.species).is_none_or(|element| element.halogen().is_none())
    }
}

/// A value with its standard uncertainty.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Value {
    /// The value.
    pub mean: f64,
    /// Its standard uncertainty.
    pub sd: f64,
}

/// Rows of `data/gas.csv` and `data/henry.csv`.
///
/// # Errors
/// * a row that is no row: the reader's message
pub fn rows(gas: &str, henry: &str) -> Result<Vec<Row>, csv::Error> {
    let read =
        |text: &str| csv::Reader::from_reader(text.as_bytes()).into_deserialize().collect::<Result<Vec<Row>, _>>();
    let mut all = read(gas)?;
    all.extend(read(henry)?);
    Ok(all)
}

/// Rows of `data/species.csv`.
///
/// # Errors
/// * a row that is no row: the reader's message
pub fn species(text: &str) -> Result<Vec<Species>, csv::Error> {
    csv::Reader::from_reader(text.as_bytes()).into_deserialize().collect()
}

/// One value of several: weighted by 1/sd², widened by the spread (Birge ratio, at least 1).
///
/// # Source
/// R. T. Birge, Phys. Rev. 40, 207 (1932).
pub fn combine(values: &[Value]) -> Option<Value> {
    let weight: f64 = values.iter().map(|v| 1.0 / (v.sd * v.sd)).sum();
    if values.is_empty() || weight <= 0.0 {
        return None;
    }
    let mean = values.iter().map(|v| v.mean / (v.sd * v.sd)).sum::<f64>() / weight;
    let chi2: f64 = values.iter().map(|v| (v.mean - mean) * (v.mean - mean) / (v.sd * v.sd)).sum();
    let birge = if values.len() > 1 { (chi2 / (values.len() - 1) as f64).sqrt().max(1.0) } else { 1.0 };
    Some(Value { mean, sd: birge / weight.sqrt() })
}

/// Groups rows by a key, in order of the key; rows that are set aside are left out.
pub fn group(rows: &[Row], key: impl Fn(&Row) -> Option<String>) -> BTreeMap<String, Vec<&Row>> {
    let mut groups: BTreeMap<String, Vec<&Row>> = BTreeMap::new();
    for row in rows.iter().filter(|row| row.set_aside.is_empty()) {
        if let Some(key) = key(row) {
            groups.entry(key).or_default().push(row);
        }
    }
    groups
}
