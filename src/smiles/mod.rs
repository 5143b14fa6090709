//! SMILES: text to molecule and back.
//!
//! A subset that follows OpenSMILES where it overlaps; `grammar/smiles.abnf` says what is read.
//! Text is cut into tokens ([`syntax`]), the tokens become a drawing ([`draft`]), the drawing a
//! molecule with its hydrogens and configuration (`read`); [`error`] says what can be wrong and
//! where. `write` goes the other way and is canonical.
//!
//! # Example
//! ```
//! let cis = haloshed::smiles::read(r"Cl/C=C\Cl")?;
//! assert_eq!(haloshed::smiles::write(&cis), r"Cl/C=C\Cl");
//! # Ok::<(), haloshed::smiles::ReadError>(())
//! ```

pub mod draft;
pub mod error;
mod marks;
mod read;
pub mod syntax;
mod write;

pub use draft::parse;
pub use error::ReadError;
pub use read::read;
pub use write::write;
