//! The compound of the command line: a SMILES, a name, an abbreviation or a CAS number.

use haloshed::catalogue::{ResolveError, resolve};
use haloshed::molecule::Molecule;

use super::failure::Failure;
use super::report::{Excerpt, Report, note};

/// Reads a compound as it was typed; a text with two readings is taken with a note.
pub(crate) fn read_compound(text: &str) -> Result<Molecule, Failure> {
    let text = text.trim();
    let resolved = resolve(text).map_err(|error| Failure::from(report(text, &error)))?;
    if let Some(other) = resolved.note(text) {
        note(&other);
    }
    Ok(resolved.molecule)
}

fn report(text: &str, error: &ResolveError) -> Report {
    let excerpt = match error {
        ResolveError::Smiles(wrong) if !text.is_empty() => Some(Excerpt {
            origin: "compound".to_owned(),
            text: text.to_owned(),
            span: wrong.span.clone(),
            label: wrong.label().to_owned(),
        }),
        _ => None,
    };
    Report { message: error.to_string(), excerpt, help: error.hint() }
}
