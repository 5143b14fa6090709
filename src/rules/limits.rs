//! Ring limits: what a step may not make in a small ring.
//!
//! * no triple bond, and no C=C=C, in a ring of fewer than eight atoms;
//! * no double bond at a bridgehead of a bridged system whose rings through the two
//!   bridgeheads are all smaller than eight (Bredt's rule).
//!
//! A limit is asked of the bonds that a step makes, never of what was there before.

use crate::molecule::rings::{
    Adjacency, is_strained_bridgehead, smallest_ring_through_bend, smallest_ring_through_bond,
};
use crate::molecule::{BondOrder, Molecule};

/// Smallest ring that may hold a triple bond, a C=C=C, or a bridgehead double bond.
pub const SMALLEST_RING_OF_STRAINED_BONDS: usize = 8;

/// Whether the bonds of a product that a step made, by index, keep the limits.
pub fn keeps_ring_limits(product: &Molecule, made: &[usize]) -> bool {
    let adjacency = product.adjacency();
    made.iter().all(|&bond| {
        let (a, b, order) = product.bond(bond);
        match order {
            BondOrder::Triple => !is_in_small_ring(&adjacency, a, b),
            BondOrder::Double => {
                !is_in_small_cumulene(product, &adjacency, a, b)
                    && !is_strained_bridgehead(&adjacency, a, b, SMALLEST_RING_OF_STRAINED_BONDS)
                    && !is_strained_bridgehead(&adjacency, b, a, SMALLEST_RING_OF_STRAINED_BONDS)
            }
            BondOrder::Single | BondOrder::Aromatic => true,
        }
    })
}

fn is_small(ring: Option<usize>) -> bool {
    ring.is_some_and(|size| size < SMALLEST_RING_OF_STRAINED_BONDS)
}

fn is_in_small_ring(adjacency: &Adjacency, a: usize, b: usize) -> bool {
    is_small(smallest_ring_through_bond(adjacency, a, b))
}

/// Whether the double bond is half of a C=C=C whose three atoms share a small ring.
fn is_in_small_cumulene(product: &Molecule, adjacency: &Adjacency, a: usize, b: usize) -> bool {
    [(a, b), (b, a)].into_iter().any(|(middle, end)| {
        let others = product.neighbours(middle).filter(|&(n, order, _)| n != end && order == BondOrder::Double);
        others.map(|(n, _, _)| n).any(|n| is_small(smallest_ring_through_bend(adjacency, n, middle, end)))
    })
}
