//! Rules: what they say, how they are read, and what they do to a molecule.
//!
//! Read [`rule`] first: the checked rule. Text comes in by [`parse`], which makes a tree
//! ([`syntax`]) line by line; [`check`] makes rules of the tree or says what is wrong
//! ([`error`]); [`library`] keeps the rules at hand and answers to their names. [`mod@apply`] is
//! the general engine, the measure for the fast one in `frame`.

pub mod apply;
mod balance;
mod change;
pub mod check;
mod edits;
pub mod error;
pub mod fraction;
pub mod library;
pub mod limits;
mod lines;
mod matching;
mod outcome;
pub mod parse;
mod pattern;
mod rest;
pub mod rule;
pub mod syntax;
mod words;

pub use apply::{Product, apply};
pub use fraction::Fraction;
pub use library::{RuleSet, Selection};
pub use rule::{Case, Edit, Rule};
