//! Molecules: what a compound is made of, and when two of them are one.
//!
//! Read [`element`], then [`graph`] (atoms, bonds, configuration), then what is asked of a
//! graph: [`rings`], [`aromatic`], [`stereo`], [`canonical`], [`formula`]. Nothing here knows
//! a rule or a notation.

pub mod aromatic;
pub mod canonical;
pub mod condensed;
pub mod element;
pub mod formula;
pub mod graph;
pub mod priority;
pub mod rings;
pub mod stereo;

pub use element::{Element, Halogen};
pub use formula::Formula;
pub use graph::{Atom, BondOrder, Geometry, Handedness, Ligand, Molecule};
pub use stereo::{Identity, Unit};
