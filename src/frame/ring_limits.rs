//! Which multiple bonds a frame's rings allow.
//!
//! No triple bond and no cumulated C=C=C in a ring of fewer than eight atoms; no double bond at
//! a bridgehead of a bridged system whose rings through both bridgeheads are all smaller than
//! eight (Bredt's rule). A limit is asked of what a step makes, never of what was there before:
//! so only bonds that a step raised are looked at.

use super::decoration::Decoration;
use super::skeleton::Frame;
use crate::molecule::BondOrder;
use crate::molecule::rings::{is_strained_bridgehead, smallest_ring_through_bend, smallest_ring_through_bond};

/// Smallest ring that holds a triple bond, a cumulene, or a bridgehead double bond.
pub const SMALLEST_STRAINED_RING: usize = 8;

/// The ring facts of a frame's open bonds.
#[derive(Debug, Clone)]
pub struct RingLimits {
    /// By open bond: whether it may be triple.
    may_be_triple: Vec<bool>,
    /// By open bond: whether it may be double as far as Bredt's rule goes.
    may_be_double: Vec<bool>,
    /// By open bond: the bonds beside it that may not be double together with it.
    not_cumulated: Vec<Vec<usize>>,
}

impl RingLimits {
    /// The ring facts of a frame.
    pub fn of(frame: &Frame) -> RingLimits {
        let adjacency = frame.skeleton().adjacency();
        let is_small = |size: Option<usize>| size.is_some_and(|n| n < SMALLEST_STRAINED_RING);
        let mut limits = RingLimits { may_be_triple: Vec::new(), may_be_double: Vec::new(), not_cumulated: Vec::new() };
        for &(a, b) in frame.open_bonds() {
            let (at_a, at_b) = (frame.sites()[a], frame.sites()[b]);
            let ring = smallest_ring_through_bond(&adjacency, at_a, at_b);
            limits.may_be_triple.push(!is_small(ring));
            let strained = |x, y| is_strained_bridgehead(&adjacency, x, y, SMALLEST_STRAINED_RING);
            limits.may_be_double.push(ring.is_none() || !(strained(at_a, at_b) || strained(at_b, at_a)));
            let beside = [(a, b), (b, a)].into_iter().flat_map(|(middle, other)| {
                let ends = frame.site_neighbours(middle).iter().filter(move |&&(n, _)| n != other);
                let adjacency = &adjacency;
                ends.filter(move |&&(n, _)| {
                    let [n, middle, other] = [n, middle, other].map(|s| frame.sites()[s]);
                    is_small(smallest_ring_through_bend(adjacency, n, middle, other))
                })
                .map(|&(_, bond)| bond)
            });
            limits.not_cumulated.push(beside.collect());
        }
        limits
    }

    /// Whether some bond falls under Bredt's rule: the skeleton holds a small bridged system.
    pub fn has_small_cage(&self) -> bool {
        self.may_be_double.contains(&false)
    }

    /// Whether a bond that was just raised may have the order it now has.
    pub fn allow(&self, decoration: &Decoration, raised: usize) -> bool {
        match decoration.orders[raised] {
            BondOrder::Single | BondOrder::Aromatic => true,
            BondOrder::Double => {
                let beside = &self.not_cumulated[raised];
                self.may_be_double[raised] && beside.iter().all(|&b| decoration.orders[b] != BondOrder::Double)
            }
            BondOrder::Triple => self.may_be_triple[raised],
        }
    }
}
