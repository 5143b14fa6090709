//! Aromatic six-rings of a state: the frame's counterpart of [`molecule::aromatic`].
//!
//! The bonds of a ring that has become aromatic get an order of their own, so that Kekulé forms
//! are one state.
//!
//! [`molecule::aromatic`]: crate::molecule::aromatic

use super::decoration::Decoration;
use super::skeleton::Frame;
use crate::molecule::BondOrder;
use crate::molecule::aromatic::alternates;

/// Marks the aromatic six-rings of a state; tells whether any bond was marked.
pub fn make_aromatic(frame: &Frame, state: &mut Decoration) -> bool {
    let mut any = false;
    let mut changed = !frame.six_rings().is_empty();
    while changed {
        changed = false;
        for ring in frame.six_rings() {
            let orders = ring.map(|bond| state.orders[bond]);
            if alternates(orders) && orders.iter().any(|&o| o != BondOrder::Aromatic) {
                for &bond in ring {
                    state.orders[bond] = BondOrder::Aromatic;
                    state.trans[bond] = false;
                }
                changed = true;
                any = true;
            }
        }
    }
    any
}
