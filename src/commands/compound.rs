//! The compound of the command line.

use haloshed::molecule::Molecule;
use haloshed::smiles;

use super::failure::Failure;
use super::report::{Excerpt, Report};

/// Reads a compound as it was typed.
pub(crate) fn read_compound(text: &str) -> Result<Molecule, Failure> {
    let text = text.trim();
    smiles::read(text).map_err(|error| {
        Failure::from(Report {
            message: error.to_string(),
            excerpt: (!text.is_empty()).then(|| Excerpt {
                origin: "compound".to_owned(),
                text: text.to_owned(),
                span: error.span.clone(),
                label: error.label().to_owned(),
            }),
            help: error.hint(),
        })
    })
}
