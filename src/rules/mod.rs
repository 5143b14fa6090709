//! Rules: what they say, how they are read, and what they do to a molecule.
//!
//! Read [`rule`] first: the checked rule.

pub mod rule;

pub use rule::{Case, Edit, Rule};
