//! Compounds of environmental interest by name, abbreviation and CAS number, and what is
//! dangerous about some of them.
//!
//! All facts are in `data/`: `compounds.csv`, `ambiguous.csv`, `cautions.csv`. Read [`table`]
//! (the rows), [`folding`] (when two texts are one name), [`cas`] (check digits), [`lookup`]
//! (text to row), [`resolve`](mod@resolve) (text to molecule: a row or a SMILES), [`cautions`](mod@cautions);
//! [`error`] holds the sentences.
//!
//! Invariant: a text has one meaning or is refused with its choices; nothing is guessed.
//!
//! # Example
//! ```
//! use haloshed::catalogue;
//!
//! assert_eq!(catalogue::find("Perchloroethylene")?.name, "tetrachloroethene");
//! assert_eq!(catalogue::find("75-01-4")?.abbreviations[0], "VC");
//! assert!(catalogue::find("DCE").is_err());
//! # Ok::<(), catalogue::LookupError>(())
//! ```

pub mod cas;
pub mod cautions;
pub mod error;
pub mod folding;
pub mod lookup;
pub mod resolve;
pub mod table;

pub use cautions::{Caution, cautions};
pub use error::{LookupError, ResolveError};
pub use lookup::{by_smiles, find};
pub use resolve::{Reading, Resolved, resolve};
pub use table::{Entry, entries};
