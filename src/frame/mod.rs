//! Frame and state: the skeleton once, each compound as a small decoration of it.
//!
//! Read [`skeleton`] (what a frame is), [`decoration`] (what a compound adds to it),
//! [`packing`] (the decoration as a few words: a state), [`automorphism`] (the skeleton's
//! symmetry) and [`canonical`] (the one state that stands for a compound).

pub mod automorphism;
pub mod canonical;
pub mod decoration;
pub mod packing;
pub mod skeleton;

pub use canonical::Canonicaliser;
pub use decoration::Decoration;
pub use packing::{Layout, TooLarge};
pub use skeleton::Frame;
