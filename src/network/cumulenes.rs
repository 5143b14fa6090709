//! Compounds whose cumulenes hide isomers that the network does not tell apart.
//!
//! A cumulene with an even number of double bonds and two different ligands at each end is
//! axially chiral; with an odd number above one it has two geometries. Neither is enumerated.

use super::store::{CompoundId, Network};
use crate::frame::{Decoration, Frame};
use crate::molecule::{BondOrder, Identity};

impl Network {
    /// Number of compounds that stand for several isomers at this depth of identity because
    /// cumulene configuration is not told apart.
    pub fn n_with_hidden_cumulene_isomers(&self) -> usize {
        let hides = |compound: &CompoundId| {
            let (prepared, _) = self.state(*compound);
            hides_isomers(&prepared.frame, &self.decoration(*compound), self.identity())
        };
        if self.identity() == Identity::Constitutional {
            return 0;
        }
        (0..self.n_compounds() as CompoundId).filter(hides).count()
    }
}

fn hides_isomers(frame: &Frame, state: &Decoration, identity: Identity) -> bool {
    (0..frame.sites().len()).filter(|&site| state.n_pi_bonds(frame, site) == 1).any(|start| {
        let (n_bonds, end) = walk(frame, state, start);
        let matters = match n_bonds {
            0 | 1 => false,
            n if n % 2 == 0 => identity == Identity::Full,
            _ => true,
        };
        matters && state.has_distinct_ligands(frame, start) && state.has_distinct_ligands(frame, end)
    })
}

/// Number of double bonds of the cumulene that starts at a site, and its other end.
fn walk(frame: &Frame, state: &Decoration, start: usize) -> (usize, usize) {
    let (mut before, mut here, mut n_bonds) = (start, start, 0);
    while n_bonds < frame.sites().len() {
        let onward = frame.site_neighbours(here).iter();
        let Some(&(next, _)) = onward.clone().find(|&&(n, b)| n != before && state.orders[b] == BondOrder::Double)
        else {
            break;
        };
        (before, here) = (here, next);
        n_bonds += 1;
    }
    (n_bonds, here)
}
