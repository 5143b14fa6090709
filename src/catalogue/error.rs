//! What can be wrong with the name of a compound.

use super::table::Entry;
use crate::smiles::ReadError;

/// A text that is not the name of one known compound.
#[derive(Debug, Clone, PartialEq, Eq, thiserror::Error)]
pub enum LookupError {
    /// Nothing was given.
    #[error("the compound is empty")]
    Empty,
    /// The trade uses the text for several compounds.
    #[error("`{text}` is ambiguous: {}", choice_of(.choices))]
    Ambiguous {
        /// As given.
        text: String,
        /// What it may mean, the commonest first.
        choices: Vec<&'static Entry>,
    },
    /// The text is no known name.
    #[error("no compound named `{text}` is known")]
    Unknown {
        /// As given.
        text: String,
        /// At most three known texts that are close, the closest first.
        nearest: Vec<&'static str>,
    },
    /// Digits and hyphens that are no CAS number.
    #[error("`{text}` is not a CAS number")]
    CasShape {
        /// As given.
        text: String,
    },
    /// A CAS number contradicts itself.
    #[error("the CAS number {cas} has the check digit {found}, but its other digits call for {expected}")]
    CheckDigit {
        /// As read.
        cas: String,
        /// The digit that fits the others.
        expected: u32,
        /// The last digit given.
        found: u32,
    },
    /// A CAS number is well formed but not in the table.
    #[error("the CAS number {cas} is not in the table of {n_known} compounds")]
    UnknownCas {
        /// As read.
        cas: String,
        /// Number of rows of the table.
        n_known: usize,
    },
}

impl LookupError {
    /// What to do about it.
    pub fn hint(&self) -> String {
        match self {
            LookupError::Empty => "give a SMILES such as ClC=C(Cl)Cl, a name, or a CAS number".to_owned(),
            LookupError::Ambiguous { .. } => "give one of these, a CAS number or a SMILES".to_owned(),
            LookupError::Unknown { nearest, .. } if nearest.is_empty() => {
                "give a SMILES such as ClC=C(Cl)Cl: any compound can be given so".to_owned()
            }
            LookupError::Unknown { nearest, .. } => {
                let quoted = nearest.iter().map(|text| format!("`{text}`"));
                format!("did you mean {}? any other compound can be given as a SMILES", one_of(quoted))
            }
            LookupError::CasShape { .. } => {
                "a CAS number has two to seven digits, two digits and one, with hyphens between: 79-01-6".to_owned()
            }
            LookupError::CheckDigit { .. } => "look for two digits that changed places".to_owned(),
            LookupError::UnknownCas { .. } => "give the compound as a SMILES".to_owned(),
        }
    }
}

/// A text that is no compound in any way of giving one.
#[derive(Debug, Clone, PartialEq, Eq, thiserror::Error)]
pub enum ResolveError {
    /// It was read as a name or a CAS number.
    #[error(transparent)]
    Lookup(#[from] LookupError),
    /// It was read as a SMILES.
    #[error(transparent)]
    Smiles(#[from] ReadError),
}

impl ResolveError {
    /// What to do about it, where that can be said.
    pub fn hint(&self) -> Option<String> {
        match self {
            ResolveError::Lookup(error) => Some(error.hint()),
            ResolveError::Smiles(error) => error.hint(),
        }
    }
}

/// The choices by abbreviation where there is one, each with its name.
fn choice_of(choices: &[&Entry]) -> String {
    one_of(choices.iter().map(|entry| match entry.abbreviations.first() {
        Some(short) => format!("{short} ({})", entry.name),
        None => entry.name.clone(),
    }))
}

fn one_of(parts: impl Iterator<Item = String>) -> String {
    let parts: Vec<String> = parts.collect();
    match parts.split_last() {
        Some((last, others)) if !others.is_empty() => format!("{} or {last}", others.join(", ")),
        _ => parts.concat(),
    }
}
