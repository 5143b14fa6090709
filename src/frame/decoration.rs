//! What a compound adds to its skeleton: halogens, bond orders, carbenes, configuration.
//!
//! A decoration is the unpacked form of a state, by *site* (a plain carbon of the skeleton,
//! in the order of [`Frame::sites`]) and by *open bond* (a bond between two sites, in the
//! order of [`Frame::open_bonds`]). Hydrogens are never stored: they fill what is left of a
//! carbon's four bonds.
//!
//! Invariant: a configuration bit is false where the decoration has no candidate unit.

use super::skeleton::Frame;
use crate::molecule::BondOrder;

/// One decoration of a frame.
#[derive(Debug, Clone, PartialEq, Eq, Hash)]
pub struct Decoration {
    /// Halogens on each site, by [`Halogen`](crate::molecule::Halogen).
    pub halogens: Vec<[u8; 4]>,
    /// Whether each site is a carbene.
    pub carbenes: Vec<bool>,
    /// Order of each open bond.
    pub orders: Vec<BondOrder>,
    /// Geometry at each open bond: true for trans between the reference ligands, which are
    /// at each end the skeleton neighbour with the smallest index, else the heaviest halogen,
    /// else the hydrogen.
    pub trans: Vec<bool>,
    /// Handedness of each centre, in the order of [`Frame::centres`]: true for clockwise in
    /// the order skeleton neighbours by index, halogens by weight, hydrogen.
    pub clockwise: Vec<bool>,
}

impl Decoration {
    /// The barest decoration of a frame: hydrogens only, single bonds only.
    pub fn bare(frame: &Frame) -> Decoration {
        Decoration {
            halogens: vec![[0; 4]; frame.sites().len()],
            carbenes: vec![false; frame.sites().len()],
            orders: vec![BondOrder::Single; frame.open_bonds().len()],
            trans: vec![false; frame.open_bonds().len()],
            clockwise: vec![false; frame.centres().len()],
        }
    }

    /// Number of halogens on a site.
    pub fn n_halogens(&self, site: usize) -> u8 {
        self.halogens[site].iter().sum()
    }

    /// Bonds of a site that go to the skeleton, each counted by its order; aromatic bonds of
    /// one atom count one each and one more together.
    pub fn skeleton_valence(&self, frame: &Frame, site: usize) -> u8 {
        let mut sum = frame.fixed_valence(site);
        let mut n_aromatic = frame.n_fixed_aromatic(site);
        for &(_, bond) in frame.site_neighbours(site) {
            match self.orders[bond] {
                BondOrder::Single => sum += 1,
                BondOrder::Double => sum += 2,
                BondOrder::Triple => sum += 3,
                BondOrder::Aromatic => n_aromatic += 1,
            }
        }
        sum + n_aromatic + u8::from(n_aromatic > 0)
    }

    /// Number of hydrogens on a site.
    pub fn n_hydrogens(&self, frame: &Frame, site: usize) -> u8 {
        let used = self.skeleton_valence(frame, site) + self.n_halogens(site) + 2 * u8::from(self.carbenes[site]);
        4u8.saturating_sub(used)
    }

    /// Whether a site's carbon belongs to an aromatic ring.
    pub fn is_aromatic(&self, frame: &Frame, site: usize) -> bool {
        frame.n_fixed_aromatic(site) > 0
            || frame.site_neighbours(site).iter().any(|&(_, bond)| self.orders[bond] == BondOrder::Aromatic)
    }

    /// Sum of (order - 1) over a site's open double and triple bonds: 0 for sp3, 1 for sp2,
    /// 2 for sp (triple bond or cumulene centre).
    pub fn n_pi_bonds(&self, frame: &Frame, site: usize) -> u8 {
        frame
            .site_neighbours(site)
            .iter()
            .map(|&(_, bond)| match self.orders[bond] {
                BondOrder::Double => 1,
                BondOrder::Triple => 2,
                BondOrder::Single | BondOrder::Aromatic => 0,
            })
            .sum()
    }

    /// Whether the ligands a site holds besides its skeleton neighbours are all different.
    pub fn has_distinct_ligands(&self, frame: &Frame, site: usize) -> bool {
        self.n_hydrogens(frame, site) <= 1 && self.halogens[site].iter().all(|&n| n <= 1)
    }

    /// Whether a centre can carry handedness, whatever its branches are.
    pub fn is_candidate_centre(&self, frame: &Frame, centre: usize) -> bool {
        let Some(site) = frame.site_of_centre(centre) else { return true };
        !self.carbenes[site]
            && !self.is_aromatic(frame, site)
            && self.n_pi_bonds(frame, site) == 0
            && self.has_distinct_ligands(frame, site)
    }

    /// Whether an open bond can carry geometry, whatever its branches are.
    pub fn is_candidate_bond(&self, frame: &Frame, bond: usize) -> bool {
        if self.orders[bond] != BondOrder::Double || !frame.may_have_geometry(bond) {
            return false;
        }
        let (a, b) = frame.open_bonds()[bond];
        [a, b]
            .into_iter()
            .all(|end| self.n_pi_bonds(frame, end) == 1 && !self.carbenes[end] && self.has_distinct_ligands(frame, end))
    }

    /// Makes the bits of all places that are no candidates false.
    pub fn clear_idle_bits(&mut self, frame: &Frame) {
        for centre in 0..self.clockwise.len() {
            self.clockwise[centre] &= self.is_candidate_centre(frame, centre);
        }
        for bond in 0..self.trans.len() {
            self.trans[bond] &= self.is_candidate_bond(frame, bond);
        }
    }

    /// Whether any site is a carbene.
    pub fn is_transient(&self) -> bool {
        self.carbenes.contains(&true)
    }
}
