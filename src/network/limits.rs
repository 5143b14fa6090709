//! How far an enumeration may go, and how it ended.

use std::fmt;
use std::time::Duration;

/// Bounds on an enumeration. Reaching one ends it with a correct part of the network.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub struct Limits {
    /// Most compounds that are stored.
    pub max_compounds: usize,
    /// Last generation that is listed; its compounds are not expanded.
    pub max_generation: Option<u32>,
    /// Longest time that expansion may take.
    pub time: Option<Duration>,
}

impl Default for Limits {
    fn default() -> Limits {
        Limits { max_compounds: 100_000, max_generation: None, time: None }
    }
}

/// A bound that was reached.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
#[allow(missing_docs)]
pub enum Limit {
    Compounds(usize),
    Generation(u32),
    Time(Duration),
}

/// How an enumeration ended.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum Outcome {
    /// Everything reachable is there.
    Complete,
    /// A limit was reached; compounds from `first_unexpanded` on have no steps listed.
    Cut {
        /// The limit.
        limit: Limit,
        /// Index of the first compound that was not expanded.
        first_unexpanded: usize,
    },
}

impl fmt::Display for Limit {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        match self {
            Limit::Compounds(n) => write!(f, "the limit of {n} compounds"),
            Limit::Generation(n) => write!(f, "the limit of generation {n}"),
            Limit::Time(time) => write!(f, "the time limit of {} s", time.as_secs_f64()),
        }
    }
}
