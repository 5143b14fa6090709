//! SMILES: a compound as one line of text, in and out.
//!
//! Text comes in and is parsed into a tree that keeps the byte range of every node
//! ([`syntax`], [`parse`](mod@parse); the language is `grammar/smiles.abnf`). The tree is
//! flattened into atoms and bonds, ring numbers joined (`sketch`). Then the chemistry is added:
//! aromatic bonds (`aromatic`), implied hydrogens and valences (`valence`), configuration
//! (`configure`); [`build`] runs these in order. [`write`](mod@write) goes back, with the
//! direction marks of double bonds worked out in `marks`. What can be wrong with a text is in
//! [`error`].
//!
//! # Source
//! OpenSMILES specification, version 1.0 (2016-05-15), of which this is a subset: no isotopes,
//! one component, eleven elements, `@` and `@@` at atoms with four ligands only.
//!
//! # Example
//! ```
//! let cis = haloshed::smiles::read(r"Cl/C=C\Cl")?;
//! assert_eq!(haloshed::smiles::write(&cis), r"Cl/C=C\Cl");
//! # Ok::<(), haloshed::smiles::ReadError>(())
//! ```

mod aromatic;
pub mod build;
mod configure;
pub mod error;
mod marks;
pub mod parse;
mod sketch;
pub mod syntax;
mod valence;
pub mod write;

pub use build::read;
pub use error::{ReadError, ReadErrorKind};
pub use parse::parse;
pub use syntax::SmilesText;
pub use write::write;
