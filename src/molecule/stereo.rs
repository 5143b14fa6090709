//! Stereo-units: where a configuration can be, which are real, and the isomers of a molecule.
//!
//! A *candidate* is a place whose ligands are not plainly alike: a tetrahedral atom with four
//! single-bonded ligands, no two of them hydrogens or halogens of one kind; or a C=C in no ring
//! of fewer than eight atoms, not cumulated, with the same said of each end. Whether two
//! branches are alike is not asked of a candidate. It is asked once for all by the canonical
//! form: units are *idle* when every setting of them gives one compound, and those are
//! forgotten. Units that a relabelling could exchange are forgotten together or not at all: of
//! the three centres of cis,cis,trans-1,3,5-trimethylcyclohexane each of two can be reversed and
//! give the same compound again, but not both, so all three are kept.

use std::collections::BTreeMap;

use super::canonical::{Code, canonical_code};
use super::element::Element;
use super::graph::{BondOrder, Geometry, Handedness, Molecule};
use super::rings::{Adjacency, smallest_ring_through_bond};

/// Smallest ring in which a double bond may have either geometry.
pub const SMALLEST_RING_WITH_GEOMETRY: usize = 8;

/// Most units whose settings are tried together before they are kept untried.
const MOST_IDLE_UNITS: usize = 8;

/// How much configuration tells compounds apart.
#[derive(Debug, Clone, Copy, PartialEq, Eq, PartialOrd, Ord, Hash, Default)]
pub enum Identity {
    /// Connectivity alone.
    Constitutional,
    /// Connectivity and E/Z.
    #[default]
    Geometric,
    /// Connectivity, E/Z and tetrahedral configuration.
    Full,
}

/// A place that can carry configuration.
#[derive(Debug, Clone, Copy, PartialEq, Eq, PartialOrd, Ord, Hash)]
pub enum Unit {
    /// A tetrahedral atom, by index.
    Centre(usize),
    /// A double bond, by index.
    DoubleBond(usize),
}

impl Unit {
    /// Whether compounds that differ in this unit alone are told apart.
    pub fn is_told_by(self, identity: Identity) -> bool {
        match self {
            Unit::Centre(_) => identity == Identity::Full,
            Unit::DoubleBond(_) => identity >= Identity::Geometric,
        }
    }
}

impl Molecule {
    /// Neighbour lists, for ring questions.
    pub fn adjacency(&self) -> Adjacency {
        (0..self.n_atoms()).map(|a| self.neighbours(a).map(|(n, _, _)| n).collect()).collect()
    }

    /// Every place that may carry configuration, centres first.
    pub fn candidate_units(&self) -> Vec<Unit> {
        let adjacency = self.adjacency();
        let centres = (0..self.n_atoms()).filter(|&a| self.is_candidate_centre(a)).map(Unit::Centre);
        let bonds = (0..self.n_bonds()).filter(|&b| self.is_candidate_bond(b, &adjacency)).map(Unit::DoubleBond);
        centres.chain(bonds).collect()
    }

    fn is_candidate_centre(&self, atom: usize) -> bool {
        let a = self.atom(atom);
        let tetrahedral = match a.element {
            Element::C | Element::Si => a.charge == 0,
            Element::N | Element::P => a.charge == 1,
            Element::B => a.charge == -1,
            _ => false,
        };
        tetrahedral
            && self.degree(atom) + usize::from(a.n_hydrogens) == 4
            && self.neighbours(atom).all(|(_, order, _)| order == BondOrder::Single)
            && !self.has_twin_ligands(atom, None)
    }

    fn is_candidate_bond(&self, bond: usize, adjacency: &Adjacency) -> bool {
        let (a, b, order) = self.bond(bond);
        order == BondOrder::Double
            && [(a, b), (b, a)].into_iter().all(|(end, other)| {
                self.atom(end).element == Element::C
                    && self.degree(end) + usize::from(self.atom(end).n_hydrogens) == 3
                    && !self.has_twin_ligands(end, Some(other))
            })
            && smallest_ring_through_bond(adjacency, a, b).is_none_or(|n| n >= SMALLEST_RING_WITH_GEOMETRY)
    }

    /// Whether two ligands of an atom, `besides` left out, are hydrogens or one kind of halogen.
    fn has_twin_ligands(&self, atom: usize, besides: Option<usize>) -> bool {
        let mut seen = [0u8; 4];
        for (n, _, _) in self.neighbours(atom) {
            if Some(n) != besides
                && let Some(halogen) = self.leaving_halogen(n)
            {
                seen[halogen as usize] += 1;
            }
        }
        self.atom(atom).n_hydrogens > 1 || seen.iter().any(|&n| n > 1)
    }

    /// Whether a unit carries a setting.
    pub fn is_given(&self, unit: Unit) -> bool {
        match unit {
            Unit::Centre(atom) => self.handedness(atom).is_some(),
            Unit::DoubleBond(bond) => self.geometry(bond).is_some(),
        }
    }

    /// Gives a unit the first of its two settings, or the second: which is which means nothing
    /// but that they differ.
    pub fn set_unit(&mut self, unit: Unit, first: bool) {
        match unit {
            Unit::Centre(atom) => {
                let value = if first { Handedness::Anticlockwise } else { Handedness::Clockwise };
                self.set_handedness(atom, Some(value));
            }
            Unit::DoubleBond(bond) => {
                self.set_geometry(bond, Some(if first { Geometry::Cis } else { Geometry::Trans }));
            }
        }
    }

    fn clear_unit(&mut self, unit: Unit) {
        match unit {
            Unit::Centre(atom) => self.set_handedness(atom, None),
            Unit::DoubleBond(bond) => self.set_geometry(bond, None),
        }
    }

    fn reverse_unit(&mut self, unit: Unit) {
        match unit {
            Unit::Centre(atom) => {
                let reversed = self.handedness(atom).map(Handedness::reversed);
                self.set_handedness(atom, reversed);
            }
            Unit::DoubleBond(bond) => {
                let reversed = self.geometry(bond).map(Geometry::reversed);
                self.set_geometry(bond, reversed);
            }
        }
    }

    /// Forgets configuration where there can be none, where the identity does not ask for it,
    /// and where reversing it changes nothing.
    pub fn keep_real_units(&mut self, identity: Identity) {
        let candidates = self.candidate_units();
        self.clear_all_but(&candidates, identity);
        // A unit may be idle only once another is forgotten, where some were left open.
        while self.drop_idle_units(&candidates) {}
    }

    /// Forgets configuration at all units but these, and where the identity does not tell it.
    pub fn clear_all_but(&mut self, candidates: &[Unit], identity: Identity) {
        for atom in 0..self.n_atoms() {
            if identity < Identity::Full || !candidates.contains(&Unit::Centre(atom)) {
                self.set_handedness(atom, None);
            }
        }
        for bond in 0..self.n_bonds() {
            if identity < Identity::Geometric || !candidates.contains(&Unit::DoubleBond(bond)) {
                self.set_geometry(bond, None);
            }
        }
    }

    /// Forgets the given units that tell nothing, a class of alike ones at a time. Says whether
    /// there were any.
    fn drop_idle_units(&mut self, candidates: &[Unit]) -> bool {
        let given: Vec<Unit> = candidates.iter().copied().filter(|&u| self.is_given(u)).collect();
        if given.is_empty() {
            return false;
        }
        let classes = super::canonical::refined_classes(self);
        let code = canonical_code(self);
        let mut alike: BTreeMap<(usize, usize), Vec<Unit>> = BTreeMap::new();
        for unit in given.into_iter().filter(|&u| !self.is_plainly_real(u, &classes)) {
            if self.settings_agree(&[unit], &code) {
                alike.entry(self.class_of(unit, &classes)).or_default().push(unit);
            }
        }
        let mut idle: Vec<Unit> = Vec::new();
        for class in alike.into_values() {
            let both = [idle.as_slice(), &class].concat();
            if both.len() <= MOST_IDLE_UNITS && self.settings_agree(&both, &code) {
                idle = both;
            }
        }
        for &unit in &idle {
            self.clear_unit(unit);
        }
        !idle.is_empty()
    }

    fn class_of(&self, unit: Unit, classes: &[usize]) -> (usize, usize) {
        match unit {
            Unit::Centre(atom) => (classes[atom], usize::MAX),
            Unit::DoubleBond(bond) => {
                let (a, b, _) = self.bond(bond);
                (classes[a].min(classes[b]), classes[a].max(classes[b]))
            }
        }
    }

    /// Whether all settings of these units, the others kept, give the compound with this code.
    fn settings_agree(&self, units: &[Unit], code: &Code) -> bool {
        (1..1u32 << units.len()).all(|mask| {
            let mut other = self.clone();
            for (_, &unit) in units.iter().enumerate().filter(|(i, _)| mask >> i & 1 == 1) {
                other.reverse_unit(unit);
            }
            canonical_code(&other) == *code
        })
    }

    /// Whether the ligands of a unit differ already without looking at configuration.
    fn is_plainly_real(&self, unit: Unit, classes: &[usize]) -> bool {
        let differ = |atom: usize, besides: Option<usize>| {
            let mut around: Vec<usize> =
                self.neighbours(atom).filter(|&(n, _, _)| Some(n) != besides).map(|(n, _, _)| classes[n]).collect();
            let n = around.len();
            around.sort_unstable();
            around.dedup();
            around.len() == n
        };
        match unit {
            Unit::Centre(atom) => differ(atom, None),
            Unit::DoubleBond(bond) => {
                let (a, b, _) = self.bond(bond);
                differ(a, Some(b)) && differ(b, Some(a))
            }
        }
    }

    /// The fully specified isomers that a molecule stands for at a depth of identity, in the
    /// order of their canonical codes; one if nothing was left open.
    ///
    /// # Errors
    /// * more than `most` settings would have to be looked at: their number
    pub fn isomers(&self, identity: Identity, most: usize) -> Result<Vec<Molecule>, usize> {
        let mut plain = self.clone();
        plain.keep_real_units(identity);
        let open: Vec<Unit> = plain
            .candidate_units()
            .into_iter()
            .filter(|&u| !plain.is_given(u))
            .filter(|u| match u {
                Unit::Centre(_) => identity == Identity::Full,
                Unit::DoubleBond(_) => identity >= Identity::Geometric,
            })
            .collect();
        let n_settings = 1usize.checked_shl(open.len() as u32).unwrap_or(usize::MAX);
        if open.len() >= 24 || n_settings > most {
            return Err(n_settings);
        }
        let mut found = BTreeMap::new();
        for mask in 0..n_settings {
            let mut isomer = plain.clone();
            for (i, &unit) in open.iter().enumerate() {
                isomer.set_unit(unit, mask >> i & 1 == 0);
            }
            found.entry(canonical_code(&isomer)).or_insert(isomer);
        }
        let mut isomers: Vec<Molecule> = found.into_values().collect();
        for isomer in &mut isomers {
            isomer.keep_real_units(identity);
        }
        Ok(isomers)
    }
}
