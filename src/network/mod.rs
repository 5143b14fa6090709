//! The network: everything that some parents can turn into, and every step between.
//!
//! Parents and rules go in, a [`Network`] comes out. Read [`limits`], then [`store`] (what a
//! network is), [`enumerate`](mod@enumerate) (how it is made; [`states`] and [`outside`] help),
//! and [`graph`] (petgraph's traits over it).

pub mod enumerate;
pub mod graph;
pub mod limits;
mod outside;
pub mod states;
pub mod store;

pub use enumerate::{EnumerateError, enumerate};
pub use limits::{Limit, Limits, Outcome};
pub use store::{CompoundId, Network, Step};
