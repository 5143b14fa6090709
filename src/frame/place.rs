//! One way in which a rule's case can act on a frame: its carbons laid on sites.
//!
//! A place says what must be true of a state, and what the case changes there, in terms of the
//! frame alone. Hydrogens are not edited: they fill what the other edits leave, and a rule whose
//! hydrogens did not balance would not have passed its check.

use super::decoration::Decoration;
use super::skeleton::Frame;
use crate::molecule::{BondOrder, Element, Halogen};
use crate::rules::rule::{AtomKind, CountCondition, Counted, SiteState};

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
    pub kind: AtomKind,
    /// How many ligands of a kind it must have.
    pub conditions: Vec<CountCondition>,
    /// Halogens cut from it.
    pub n_cut: u8,
    /// The ways to cut them, as numbers by [`Halogen`].
    pub selections: Vec<[u8; 4]>,
    /// Hydrogens taken from it: so many C–H bonds are cut.
    pub n_hydrogens_taken: u8,
    /// What becomes of its lone pair.
    pub lone_pair: LonePair,
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

/// A case laid on a frame.
#[derive(Debug, Clone)]
pub struct Place {
    /// Number of the case among those the frame was compiled for.
    pub case: usize,
    /// Pattern carbons.
    pub sites: Vec<SiteDemand>,
    /// Pattern bonds.
    pub bonds: Vec<BondDemand>,
    /// Conditions on the whole molecule.
    pub conditions: Vec<CountCondition>,
    /// Whether the case acts on molecules that hold a carbene, and on no others.
    pub names_carbene: bool,
    /// Whether ring limits are asked of raised bonds.
    pub has_ring_limits: bool,
    /// Sites whose configuration is lost.
    pub open_centres: Vec<usize>,
    /// Open bonds whose geometry is lost: those at a site whose configuration is lost.
    pub open_geometries: Vec<usize>,
}

impl Place {
    /// Whether a state meets every demand.
    pub fn fits(&self, frame: &Frame, state: &Decoration, is_transient: bool) -> bool {
        is_transient == self.names_carbene
            && self.bonds.iter().all(|b| b.allowed[state.orders[b.bond] as usize])
            && self.sites.iter().all(|s| s.fits(frame, state))
            && self.conditions.iter().all(|c| c.amount.holds(count_in_molecule(frame, state, c.counted)))
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

impl SiteDemand {
    fn fits(&self, frame: &Frame, state: &Decoration) -> bool {
        state.n_halogens(self.site) >= self.n_cut
            && is_of_kind(frame, state, self.site, self.kind)
            && (self.n_hydrogens_taken == 0 || state.n_hydrogens(frame, self.site) >= self.n_hydrogens_taken)
            && self.conditions.iter().all(|c| c.amount.holds(count_at_site(frame, state, self.site, c.counted)))
    }
}

fn is_of_kind(frame: &Frame, state: &Decoration, site: usize, kind: AtomKind) -> bool {
    match kind {
        AtomKind::Carbene => state.carbenes[site],
        AtomKind::Aryl => state.is_aromatic(frame, site),
        AtomKind::Site(_) if state.carbenes[site] || state.is_aromatic(frame, site) => false,
        AtomKind::Site(SiteState::Any) => true,
        AtomKind::Site(wanted) => site_state(frame, state, site) == wanted,
    }
}

/// The state of a carbon site, told by its multiple bonds.
fn site_state(frame: &Frame, state: &Decoration, site: usize) -> SiteState {
    let has_triple = frame.site_neighbours(site).iter().any(|&(_, bond)| state.orders[bond] == BondOrder::Triple);
    let fixed_pi = usize::from(frame.fixed_valence(site)).saturating_sub(frame.fixed_neighbours(site).count());
    match (has_triple, usize::from(state.n_pi_bonds(frame, site)) + fixed_pi) {
        (true, _) => SiteState::Acetylenic,
        (false, 0) => SiteState::Saturated,
        (false, 1) => SiteState::Vinyl,
        (false, _) => SiteState::Cumulated,
    }
}

fn count_at_site(frame: &Frame, state: &Decoration, site: usize, counted: Counted) -> u32 {
    match counted {
        Counted::Hydrogens => u32::from(state.n_hydrogens(frame, site)),
        Counted::Halogens => u32::from(state.n_halogens(site)),
        Counted::OneHalogen(halogen) => u32::from(state.halogens[site][halogen as usize]),
        Counted::Carbons => {
            let skeleton = frame.skeleton();
            let around = skeleton.neighbours(frame.sites()[site]);
            around.filter(|&(n, _, _)| skeleton.atom(n).element == Element::C).count() as u32
        }
    }
}

fn count_in_molecule(frame: &Frame, state: &Decoration, counted: Counted) -> u32 {
    let n_sites = frame.sites().len();
    let fixed = frame.skeleton();
    let of = |halogen: Halogen| {
        let held: u32 = state.halogens.iter().map(|here| u32::from(here[halogen as usize])).sum();
        held + fixed.halogens()[halogen as usize]
    };
    match counted {
        Counted::Halogens => Halogen::ALL.into_iter().map(of).sum(),
        Counted::OneHalogen(halogen) => of(halogen),
        Counted::Carbons => fixed.atoms().filter(|a| a.element == Element::C).count() as u32,
        Counted::Hydrogens => {
            let held: u32 = (0..n_sites).map(|site| u32::from(state.n_hydrogens(frame, site))).sum();
            held + fixed.atoms().map(|a| u32::from(a.n_hydrogens)).sum::<u32>()
        }
    }
}

/// A bond order some steps up or down, between single and triple.
fn shifted(order: BondOrder, change: i8) -> BondOrder {
    const LADDER: [BondOrder; 3] = [BondOrder::Single, BondOrder::Double, BondOrder::Triple];
    match LADDER.iter().position(|&o| o == order) {
        Some(at) => LADDER[(at as i8 + change).clamp(0, 2) as usize],
        None => order,
    }
}
