//! One way in which a rule's case can act on a frame: its carbons laid on sites.
//!
//! A place says what must be true of a state, and what the case changes there, in terms of the
//! frame alone. Hydrogens are not edited: they fill what the other edits leave, and a rule whose
//! hydrogens did not balance would not have passed its check.

use super::decoration::Decoration;
use super::skeleton::Frame;
use crate::molecule::BondOrder;

/// What a pattern carbon must be.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum Kind {
    /// A carbon site: neither aromatic nor a carbene.
    Site,
    /// A carbon site without multiple bonds.
    Saturated,
    /// A carbon site with just one double bond to carbon.
    Vinyl,
    /// An aromatic carbon.
    Aryl,
    /// A carbene.
    Carbene,
}

/// What becomes of a pattern carbon's lone pair.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
#[allow(missing_docs)]
pub enum LonePair {
    Unchanged,
    Made,
    Ended,
}

/// A pattern carbon on a site.
#[derive(Debug, Clone)]
pub struct SiteDemand {
    /// The site.
    pub site: usize,
    /// What it must be.
    pub kind: Kind,
    /// Halogens cut from it.
    pub n_cut: u8,
    /// Fewest hydrogens it must have.
    pub least_hydrogens: u8,
    /// What becomes of its lone pair.
    pub lone_pair: LonePair,
    /// Whether its bonds, hydrogens or lone pair change, so that configuration there is lost.
    pub is_touched: bool,
}

/// A pattern bond on an open bond.
#[derive(Debug, Clone)]
pub struct BondDemand {
    /// The open bond.
    pub bond: usize,
    /// Orders it may have, by [`BondOrder`].
    pub allowed: [bool; 4],
    /// Change of its order.
    pub change: i8,
}

/// Conditions on the whole molecule.
#[derive(Debug, Clone, Copy, Default, PartialEq, Eq)]
pub struct MoleculeDemand {
    /// The molecule must hold no halogen at all.
    pub no_halogen: bool,
    /// The case names a carbene, so it may act on a molecule that holds one.
    pub names_carbene: bool,
}

/// A case laid on a frame.
#[derive(Debug, Clone)]
pub struct Place {
    /// Number of the case among those the frame was compiled for.
    pub case: usize,
    /// Pattern carbons.
    pub sites: Vec<SiteDemand>,
    /// Pattern bonds.
    pub bonds: Vec<BondDemand>,
    /// Conditions on the molecule.
    pub molecule: MoleculeDemand,
    /// Whether ring limits are asked of raised bonds.
    pub ring_limits: bool,
    /// Centres whose configuration is lost: the touched sites.
    pub open_centres: Vec<usize>,
    /// Open bonds whose geometry is lost: those at a touched site.
    pub open_geometries: Vec<usize>,
}

impl Place {
    /// Fills in which configuration is lost.
    pub fn find_open_units(&mut self, frame: &Frame) {
        self.open_centres = self.sites.iter().filter(|s| s.is_touched).map(|s| s.site).collect();
        self.open_geometries = (0..frame.open_bonds().len())
            .filter(|&bond| {
                let (a, b) = frame.open_bonds()[bond];
                self.open_centres.contains(&a) || self.open_centres.contains(&b)
            })
            .collect();
    }

    /// Whether a state meets every demand but those on which halogens are cut.
    pub fn fits(&self, frame: &Frame, state: &Decoration, is_transient: bool) -> bool {
        is_transient == self.molecule.names_carbene
            && self.bonds.iter().all(|b| b.allowed[state.orders[b.bond] as usize])
            && self.sites.iter().all(|s| {
                state.n_halogens(s.site) >= s.n_cut
                    && kind_fits(frame, state, s.site, s.kind)
                    && (s.least_hydrogens == 0 || state.n_hydrogens(frame, s.site) >= s.least_hydrogens)
            })
    }

    /// Makes the edits but the cutting of halogens.
    pub fn edit_bonds_and_lone_pairs(&self, state: &mut Decoration) {
        for b in &self.bonds {
            state.orders[b.bond] = shifted(state.orders[b.bond], b.change);
        }
        for s in &self.sites {
            match s.lone_pair {
                LonePair::Unchanged => {}
                LonePair::Made => state.carbenes[s.site] = true,
                LonePair::Ended => state.carbenes[s.site] = false,
            }
        }
    }
}

fn kind_fits(frame: &Frame, state: &Decoration, site: usize, kind: Kind) -> bool {
    match kind {
        Kind::Carbene => state.carbenes[site],
        Kind::Aryl => state.is_aromatic(frame, site),
        _ if state.carbenes[site] || state.is_aromatic(frame, site) => false,
        Kind::Site => true,
        Kind::Saturated => state.n_pi_bonds(frame, site) == 0 && !has_fixed_multiple_bond(frame, site),
        Kind::Vinyl => state.n_pi_bonds(frame, site) == 1,
    }
}

/// Whether a site has a double bond to a fixed carbon (as in a ketene).
fn has_fixed_multiple_bond(frame: &Frame, site: usize) -> bool {
    usize::from(frame.fixed_valence(site)) > frame.fixed_neighbours(site).count()
}

fn shifted(order: BondOrder, change: i8) -> BondOrder {
    match (order, change) {
        (BondOrder::Single, 1) | (BondOrder::Triple, -1) => BondOrder::Double,
        (BondOrder::Double, 1) | (BondOrder::Single, 2) => BondOrder::Triple,
        (BondOrder::Double, -1) | (BondOrder::Triple, -2) => BondOrder::Single,
        _ => order,
    }
}
