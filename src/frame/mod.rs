//! Frame and state: the skeleton once, each compound as a small decoration of it.
//!
//! Read [`skeleton`] (what a frame is), [`decoration`] (what a compound adds to it),
//! [`packing`] (the decoration as a few words: a state), [`automorphism`] (the skeleton's
//! symmetry) and [`canonical`] (the one state that stands for a compound). Then what rules do
//! to states: [`place`] (where a case can act), [`compile`] (all such places), [`ring_limits`], [`aromatic`], and [`expand`],
//! the hot loop.

pub mod aromatic;
pub mod automorphism;
pub mod canonical;
pub mod compile;
pub mod decoration;
pub mod expand;
pub mod packing;
pub mod place;
pub mod ring_limits;
pub mod skeleton;

pub use canonical::Canonicaliser;
pub use decoration::Decoration;
pub use expand::{Prepared, Workspace};
pub use packing::{Layout, TooLarge};
pub use skeleton::Frame;
