//! Thermochemistry: from measured rows to the potential of a step.
//!
//! Read [`data`] (rows and combined values), [`features`] (the groups), [`symmetry`],
//! [`estimate`] (groups of a compound), [`fit`](mod@fit) and [`refit`](mod@refit) (rows to group
//! values), [`scheme`] (the tables as fitted); then [`matching`] (which compounds were measured),
//! [`energies`](mod@energies) (a whole network), [`nodes`] (one compound, taken apart), [`parts`] (what has no value), [`conditions`] and
//! [`potential`](mod@potential).

pub mod conditions;
pub mod constants;
pub mod data;
pub mod energies;
pub mod estimate;
pub mod features;
pub mod fit;
pub mod matching;
pub mod nodes;
pub mod parts;
pub mod potential;
pub mod refit;
pub mod scheme;
pub mod symmetry;

pub use conditions::{ConditionError, Conditions};
pub use energies::{Energies, energies};
pub use nodes::{Node, Origin};
pub use potential::{Missing, Potential, StepOrigin, Volts, potential};
pub use refit::{Refitted, Sources, refit};
pub use scheme::{Scheme, shipped};
