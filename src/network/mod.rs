//! The network: everything that some parents can turn into, and every step between.
//!
//! Parents and rules go in, a [`Network`] comes out. Read [`limits`], then [`store`] (what a
//! network is), [`enumerate`](mod@enumerate) (how it is made; [`states`] and `outside` help),
//! [`half_reaction`] (what a step takes up and gives off) and [`graph`] (petgraph's traits).

mod cumulenes;
pub mod enumerate;
pub mod graph;
pub mod half_reaction;
pub mod limits;
mod outside;
pub mod states;
pub mod store;

pub use enumerate::{EnumerateError, enumerate};
pub use half_reaction::HalfReaction;
pub use limits::{Limit, Limits, Outcome};
pub use store::{CompoundId, Network, Step};
