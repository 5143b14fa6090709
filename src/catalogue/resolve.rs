//! From what was typed to a molecule: a CAS number, a known name, or a SMILES.
//!
//! A text that is a SMILES and has the bonds, branches or brackets of one is taken as such, so
//! that `C(F)` is no abbreviation. Otherwise a known name goes first, so `CF` is chloroform;
//! where the text is a SMILES of another compound as well, that reading is handed back too, so
//! that the user can be told.

use super::cas;
use super::error::{LookupError, ResolveError};
use super::lookup::{by_smiles, find};
use super::table::Entry;
use crate::molecule::Molecule;
use crate::smiles;

/// How a text was read.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum Reading {
    /// As a CAS number.
    Cas(&'static Entry),
    /// As a name, synonym or abbreviation.
    Name(&'static Entry),
    /// As a SMILES.
    Smiles,
}

/// A compound as it was given.
#[derive(Debug, Clone)]
pub struct Resolved {
    /// The compound.
    pub molecule: Molecule,
    /// How the text was read.
    pub reading: Reading,
    /// Canonical SMILES of another compound that the text is too, read as a SMILES.
    pub other_reading: Option<String>,
}

impl Resolved {
    /// A sentence for the user where the text has another reading.
    pub fn note(&self, text: &str) -> Option<String> {
        let (Reading::Cas(entry) | Reading::Name(entry)) = self.reading else { return None };
        let other = self.other_reading.as_deref()?;
        let other_name = by_smiles(other).map_or(other, |entry| entry.name.as_str());
        let text = text.trim();
        let way = drawn(text, other).map(|drawn| format!("; write {drawn} for {other_name}")).unwrap_or_default();
        Some(format!("`{text}` is taken as {}, not as the SMILES of {other_name}{way}", entry.name))
    }
}

/// The compound that a text means.
///
/// # Errors
/// * a CAS number is wrong or unknown, an abbreviation ambiguous: `Lookup`
/// * the text is neither a name nor a SMILES: `Lookup` with suggestions where it looks like a
///   name, else `Smiles` with the place
///
/// # Example
/// ```
/// use haloshed::catalogue::{Reading, resolve};
///
/// let parent = resolve("trichloroethylene")?;
/// assert_eq!(parent.molecule.formula().to_string(), "C2HCl3");
/// assert!(matches!(parent.reading, Reading::Name(entry) if entry.cas == "79-01-6"));
/// # Ok::<(), haloshed::catalogue::ResolveError>(())
/// ```
pub fn resolve(text: &str) -> Result<Resolved, ResolveError> {
    let text = text.trim();
    let as_smiles = smiles::read(text);
    let is_drawn = as_smiles.is_ok() && text.contains(|c| c == '-' || SYNTAX.contains(&c));
    let known = if is_drawn { None } else { Some(find(text)) };
    match (known, as_smiles) {
        (Some(Ok(entry)), as_smiles) => {
            let other = as_smiles.ok().map(|other| smiles::write(&other)).filter(|other| *other != entry.smiles);
            let reading = if cas::shaped(text).is_some() { Reading::Cas(entry) } else { Reading::Name(entry) };
            Ok(Resolved { molecule: smiles::read(&entry.smiles)?, reading, other_reading: other })
        }
        (None | Some(Err(LookupError::Unknown { .. })), Ok(molecule)) => {
            Ok(Resolved { molecule, reading: Reading::Smiles, other_reading: None })
        }
        (Some(Err(LookupError::Unknown { nearest, .. })), Err(error)) if !looks_like_a_name(text, &nearest) => {
            Err(error.into())
        }
        (Some(Err(error)), _) => Err(error.into()),
        (None, Err(error)) => Err(error.into()),
    }
}

/// The text with a bond written in it, so that it can only be a SMILES: `CF` as `C-F`.
fn drawn(text: &str, canonical: &str) -> Option<String> {
    let places = text.char_indices().skip(1).map(|(at, _)| at);
    let mut candidates = places.map(|at| format!("{}-{}", &text[..at], &text[at..]));
    candidates.find(|candidate| smiles::read(candidate).is_ok_and(|read| smiles::write(&read) == canonical))
}

/// Characters that a SMILES has between its atoms; a name has few of them.
const SYNTAX: [char; 9] = ['=', '#', '@', '/', '\\', '[', ']', '(', ')'];

/// Whether a text that is no SMILES was rather meant as a name: it has letters that no SMILES
/// has, more of them where it is written like one, or something near it is known.
fn looks_like_a_name(text: &str, nearest: &[&str]) -> bool {
    let n_foreign = n_foreign_letters(text);
    let is_drawn = text.contains(SYNTAX);
    let is_spaced = n_foreign > 0 && text.contains([' ', ',', '\'']);
    n_foreign >= if is_drawn { 4 } else { 2 } || is_spaced || !is_drawn && !nearest.is_empty()
}

/// Number of letters besides the symbols that a SMILES without brackets may hold.
fn n_foreign_letters(text: &str) -> usize {
    let rest = text.replace("Cl", "").replace("Br", "");
    rest.chars().filter(|&c| c.is_alphabetic() && !"BCNOPSFIbcnops".contains(c)).count()
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn names_are_told_from_drawings() {
        for name in ["bis(2-bromoethyl) sulfide", "1,2-dichlorofoo", "perfluorothing", "tetra chloro"] {
            assert!(looks_like_a_name(name, &[]), "{name}");
        }
        for drawing in ["ClC(Cl)(Cl)(Cl)Cl", "CCX", "C=CQ", "[Na+].CC", "C1CC", "CC)C", "C C", "N[Xe]C"] {
            assert!(!looks_like_a_name(drawing, &[]), "{drawing}");
        }
        assert!(looks_like_a_name("PCX", &["PCE"]));
    }
}
