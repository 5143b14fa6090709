//! Everything the in-frame cases make of a state, as canonical states.
//!
//! The hot loop of an enumeration. For each place that fits, every distinct choice of halogens
//! to cut is a *match* (with the number of sets of bonds it stands for); a match has one outcome
//! for each setting of the configuration it loses. Equal outcomes of a match are one product,
//! so a product of `n` distinct ones counts 1/n of the match.
//!
//! # Cost
//! A few hundred nanoseconds a product for a chain; see `benches/`. No allocation a state.

use super::aromatic::make_aromatic;
use super::canonical::Canonicaliser;
use super::decoration::Decoration;
use super::packing::{Layout, MOST_WORDS};
use super::place::Place;
use super::ring_limits::RingLimits;
use super::skeleton::Frame;
use crate::molecule::{Halogen, Molecule};

/// Most configuration units that one match can leave open: a compiled case has at most four
/// atoms ([`compile`](super::compile)), each a centre and the end of at most three other bonds.
const MOST_OPEN_UNITS: usize = 16;

/// A frame made ready for a set of cases.
#[derive(Debug, Clone)]
pub struct Prepared {
    /// The frame.
    pub frame: Frame,
    /// How its states are packed.
    pub layout: Layout,
    /// Finds canonical states.
    pub canonicaliser: Canonicaliser,
    limits: RingLimits,
    places: Vec<Place>,
}

/// A product of a state.
#[derive(Debug, Clone, Copy)]
pub struct Product<'a> {
    /// Number of the case that made it.
    pub case: usize,
    /// Its canonical state.
    pub row: &'a [u64],
    /// Sets of bonds that the match stands for.
    pub n_matches: u32,
    /// Distinct products of the match.
    pub n_outcomes: u32,
}

/// Buffers of an expansion, one for each thread.
#[derive(Debug, Clone)]
pub struct Workspace {
    parent: Decoration,
    child: Decoration,
    row: Vec<u64>,
    candidates: Vec<u64>,
    child_row: Vec<u64>,
    child_candidates: Vec<u64>,
    outcomes: Vec<u64>,
    units: Vec<super::packing::Field>,
}

impl Workspace {
    /// Buffers for a frame.
    pub fn new(prepared: &Prepared) -> Workspace {
        let n = prepared.layout.n_words();
        let bare = Decoration::bare(&prepared.frame);
        Workspace {
            parent: bare.clone(),
            child: bare,
            row: vec![0; n],
            candidates: vec![0; n],
            child_row: vec![0; n],
            child_candidates: vec![0; n],
            outcomes: Vec::new(),
            units: Vec::new(),
        }
    }
}

impl Prepared {
    /// Makes a frame ready for the cases laid on it.
    pub fn new(frame: Frame, layout: Layout, places: Vec<Place>) -> Prepared {
        let canonicaliser = Canonicaliser::new(&frame, &layout);
        let limits = RingLimits::of(&frame);
        Prepared { frame, layout, canonicaliser, limits, places }
    }

    /// Whether the skeleton holds a small bridged system, some of whose configurations strain
    /// forbids.
    pub fn has_small_cage(&self) -> bool {
        self.limits.has_small_cage()
    }

    /// The canonical state of a decoration.
    pub fn canonical_row(&self, decoration: &Decoration) -> Vec<u64> {
        let n = self.layout.n_words();
        let (mut row, mut candidates, mut out) = (vec![0; n], vec![0; n], vec![0; n]);
        self.layout.pack(decoration, &mut row);
        self.layout.candidates(&self.frame, decoration, &mut candidates);
        self.canonicaliser.canonical(&row, &candidates, &mut out);
        out
    }

    /// The canonical state of a molecule; none if it holds a halogen that the layout has no
    /// room for.
    ///
    /// # Panics
    /// If the molecule has another skeleton.
    pub fn canonical_row_of(&self, molecule: &Molecule) -> Option<Vec<u64>> {
        let decoration = self.frame.decompose(molecule);
        let strange = |&x: &Halogen| {
            !self.layout.palette().contains(&x) && decoration.halogens.iter().any(|here| here[x as usize] > 0)
        };
        (!Halogen::ALL.iter().any(strange)).then(|| self.canonical_row(&decoration))
    }

    /// Gives `emit` every product of a state, by place, then choice of halogens.
    pub fn expand(&self, row: &[u64], work: &mut Workspace, emit: &mut impl FnMut(Product<'_>)) {
        self.layout.unpack(row, &mut work.parent);
        work.row.copy_from_slice(row);
        self.layout.candidates(&self.frame, &work.parent, &mut work.candidates);
        let is_transient = work.parent.is_transient();
        for place in &self.places {
            if !place.fits(&self.frame, &work.parent, is_transient) {
                continue;
            }
            self.act(place, work, emit);
        }
    }

    fn act(&self, place: &Place, work: &mut Workspace, emit: &mut impl FnMut(Product<'_>)) {
        work.child.clone_from(&work.parent);
        place.edit_bonds_and_lone_pairs(&mut work.child);
        let raised = place.bonds.iter().filter(|b| b.change > 0);
        if place.has_ring_limits && !raised.into_iter().all(|b| self.limits.allow(&work.child, b.bond)) {
            return;
        }
        let is_newly_aromatic =
            place.bonds.iter().any(|b| b.change != 0) && make_aromatic(&self.frame, &mut work.child);
        self.cut(place, 0, 1, is_newly_aromatic, work, emit);
    }

    /// Cuts halogens from the place's sites from `next` on, in every distinct way.
    fn cut(
        &self,
        place: &Place,
        next: usize,
        n_matches: u32,
        is_newly_aromatic: bool,
        work: &mut Workspace,
        emit: &mut impl FnMut(Product<'_>),
    ) {
        let Some(demand) = place.sites.get(next) else {
            self.finish(place, n_matches, is_newly_aromatic, work, emit);
            return;
        };
        let ways = n_matches * self.hydrogen_choices(place, next, work);
        let site = demand.site;
        let here = work.child.halogens[site];
        for cut in &demand.selections {
            if (0..4).any(|x| cut[x] > here[x]) {
                continue;
            }
            let picks: u32 = (0..4).map(|x| choose(u32::from(here[x]), u32::from(cut[x]))).product();
            for x in 0..4 {
                work.child.halogens[site][x] = here[x] - cut[x];
            }
            self.cut(place, next + 1, ways * picks, is_newly_aromatic, work, emit);
        }
        work.child.halogens[site] = here;
    }

    /// Ways to choose the hydrogens that a demand takes away: each C–H bond is one.
    fn hydrogen_choices(&self, place: &Place, demand: usize, work: &Workspace) -> u32 {
        let s = &place.sites[demand];
        let n = if s.n_hydrogens_taken == 0 { 0 } else { work.parent.n_hydrogens(&self.frame, s.site) };
        choose(u32::from(n), u32::from(s.n_hydrogens_taken))
    }

    /// Packs the child, settles its configuration in every way, and emits the distinct products.
    fn finish(
        &self,
        place: &Place,
        n_matches: u32,
        is_newly_aromatic: bool,
        work: &mut Workspace,
        emit: &mut impl FnMut(Product<'_>),
    ) {
        work.child_row.copy_from_slice(&work.row);
        for s in &place.sites {
            self.layout.pack_site(&work.child, s.site, &mut work.child_row);
        }
        for b in &place.bonds {
            self.layout.pack_order(&work.child, b.bond, &mut work.child_row);
        }
        work.child_candidates.copy_from_slice(&work.candidates);
        if is_newly_aromatic {
            self.repack_all(work);
        }
        self.find_open_units(place, work);
        self.collect_outcomes(work);
        let n = self.layout.n_words();
        let n_outcomes = (work.outcomes.len() / n) as u32;
        for row in work.outcomes.chunks_exact(n) {
            emit(Product { case: place.case, row, n_matches, n_outcomes });
        }
    }

    /// After a ring became aromatic: packs every order, and drops units that are gone.
    fn repack_all(&self, work: &mut Workspace) {
        for bond in 0..self.frame.open_bonds().len() {
            self.layout.pack_order(&work.child, bond, &mut work.child_row);
        }
        self.layout.candidates(&self.frame, &work.child, &mut work.child_candidates);
        for field in self.layout.trans.iter().chain(&self.layout.clockwise) {
            if field.get(&work.child_candidates) == 0 {
                field.set(&mut work.child_row, 0);
            }
        }
    }

    /// Clears the configuration that the place loses and lists the units left open.
    fn find_open_units(&self, place: &Place, work: &mut Workspace) {
        work.units.clear();
        if !self.layout.trans.is_empty() {
            for &bond in &place.open_geometries {
                let is_open = work.child.is_candidate_bond(&self.frame, bond);
                open_unit(self.layout.trans[bond], is_open, work);
            }
        }
        if !self.layout.clockwise.is_empty() {
            for &centre in &place.open_centres {
                let is_open = work.child.is_candidate_centre(&self.frame, centre);
                open_unit(self.layout.clockwise[centre], is_open, work);
            }
        }
    }

    /// Canonical states of all settings of the open units, each distinct one once.
    fn collect_outcomes(&self, work: &mut Workspace) {
        let n = self.layout.n_words();
        work.outcomes.clear();
        let n_open = work.units.len().min(MOST_OPEN_UNITS);
        for setting in 0..1u32 << n_open {
            for (i, unit) in work.units[..n_open].iter().enumerate() {
                unit.set(&mut work.child_row, u64::from(setting >> i & 1));
            }
            let mut out = [0; MOST_WORDS];
            self.canonicaliser.canonical(&work.child_row, &work.child_candidates, &mut out[..n]);
            if !work.outcomes.chunks_exact(n).any(|known| known == &out[..n]) {
                work.outcomes.extend_from_slice(&out[..n]);
            }
        }
    }
}

/// Number of ways to choose `k` of `n` (at most four of four here).
fn choose(n: u32, k: u32) -> u32 {
    (0..k).fold(1, |product, i| product * (n - i) / (i + 1))
}

fn open_unit(field: super::packing::Field, is_open: bool, work: &mut Workspace) {
    field.set(&mut work.child_row, 0);
    field.set(&mut work.child_candidates, u64::from(is_open));
    if is_open {
        work.units.push(field);
    }
}
