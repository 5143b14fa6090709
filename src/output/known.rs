//! What the catalogue knows of a compound, as records want it.

use crate::catalogue::{by_smiles, cautions};
use crate::molecule::{Identity, Molecule};
use crate::smiles;

use super::assemble::{Entry, Registry};
use super::record::Caution;

/// The shipped catalogue.
pub struct Catalogue;

impl Registry for Catalogue {
    fn entry(&self, text: &str, molecule: &Molecule) -> Entry {
        let dangers = cautions(molecule, text).into_iter();
        let cautions = dangers.map(|c| Caution { text: c.text.clone(), source: c.source.clone() }).collect();
        // A racemate's row serves its enantiomers too: the table seldom tells them apart.
        let row = by_smiles(text).or_else(|| by_smiles(&without_centres(molecule)));
        match row {
            None => Entry { cautions, ..Entry::default() },
            Some(row) => Entry {
                names: std::iter::once(&row.name).chain(&row.synonyms).cloned().collect(),
                abbreviations: row.abbreviations.clone(),
                cas: Some(row.cas.clone()),
                cautions,
            },
        }
    }
}

/// Canonical SMILES without tetrahedral configuration.
fn without_centres(molecule: &Molecule) -> String {
    let mut plain = molecule.clone();
    plain.keep_real_units(Identity::Geometric);
    smiles::write(&plain)
}
