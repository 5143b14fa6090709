//! What a match does to the reactants, in terms of their atoms and bonds.
//!
//! The *reactants* are one molecule, or two copies side by side in one graph. A [`Change`] is
//! the sum of a case's edits at a match; matches with one change cut the same bonds and touch
//! the same atoms, so they are one way for the reaction to go. So are two changes that differ
//! by which copy is called the first.

use std::collections::{BTreeMap, BTreeSet};

use super::matching::{Match, matches};
use super::rule::{AtomRef, Case, Edit, Partner};
use crate::molecule::{BondOrder, Element, Molecule};

/// The sum of edits at one match.
#[derive(Debug, Clone, PartialEq, Eq, PartialOrd, Ord, Default)]
pub(super) struct Change {
    /// Halogens that leave, by atom index.
    pub(super) released: BTreeSet<usize>,
    /// Net hydrogens gained, by atom index.
    pub(super) hydrogens: BTreeMap<usize, i32>,
    /// Net change of order, by bond index.
    pub(super) orders: BTreeMap<usize, i32>,
    /// Net charge gained, by atom index.
    pub(super) charges: BTreeMap<usize, i32>,
    /// Bonds made, lower index first. New atoms count on from the reactants' last.
    pub(super) joins: BTreeSet<(usize, usize, BondOrder)>,
    /// Elements of the new atoms.
    pub(super) new_atoms: Vec<Element>,
    /// Hydrogens taken, by atom index: so many of the C–H bonds there are cut.
    pub(super) hydrogens_taken: BTreeMap<usize, u32>,
}

/// The molecule once, or twice side by side in one graph, configuration and all.
pub(super) fn reactants(molecule: &Molecule, copies: u8) -> Molecule {
    let mut all = molecule.clone();
    for _ in 1..copies {
        all.append(molecule);
    }
    all
}

/// Every different change that a case can make to `copies` of a molecule, in a fixed order.
pub(super) fn changes(case: &Case, molecule: &Molecule, copies: u8) -> BTreeSet<Change> {
    let found = matches(case, molecule);
    let sizes = (molecule.n_atoms(), molecule.n_bonds());
    let n_atoms = sizes.0 * usize::from(copies);
    let mut changes = BTreeSet::new();
    for first in &found {
        if copies == 1 {
            changes.insert(change(case, molecule, first, first, n_atoms));
            continue;
        }
        for second in &found {
            let one = change(case, molecule, first, second, n_atoms);
            let other = with_copies_swapped(&one, sizes);
            changes.insert(one.min(other));
        }
    }
    changes
}

fn change(case: &Case, molecule: &Molecule, first: &Match, second: &Match, n_atoms: usize) -> Change {
    let new_places = places_of_new_atoms(case, first, n_atoms);
    let sight = Sight { case, molecule, first, second, new_places };
    let mut change = Change::default();
    change.new_atoms.clone_from(&case.new_atoms);
    for (new, &place) in sight.new_places.iter().enumerate() {
        change.new_atoms[place - n_atoms] = case.new_atoms[new];
    }
    for &edit in &case.edits {
        sight.add(edit, &mut change);
    }
    change.hydrogens.retain(|_, n| *n != 0);
    change.orders.retain(|_, n| *n != 0);
    change.charges.retain(|_, n| *n != 0);
    change
}

/// Indices of the new atoms: ordered by what they are joined to, so that two matches which
/// only swap new atoms of one kind come to one change.
fn places_of_new_atoms(case: &Case, first: &Match, n_atoms: usize) -> Vec<usize> {
    let joined = |new: usize| {
        let mut around: Vec<(usize, BondOrder)> = Vec::new();
        for edit in &case.edits {
            match *edit {
                Edit::Join(AtomRef::New(n), AtomRef::Found { atom, partner: Partner::First }, order)
                | Edit::Join(AtomRef::Found { atom, partner: Partner::First }, AtomRef::New(n), order)
                    if n == new =>
                {
                    around.push((first.atoms[atom], order));
                }
                _ => {}
            }
        }
        around.sort_unstable();
        around
    };
    let mut sorted: Vec<usize> = (0..case.new_atoms.len()).collect();
    sorted.sort_by_key(|&new| (case.new_atoms[new], joined(new), new));
    let mut places = vec![0; sorted.len()];
    for (place, &new) in sorted.iter().enumerate() {
        places[new] = n_atoms + place;
    }
    places
}

/// Where the names of a case are in the reactants.
struct Sight<'a> {
    case: &'a Case,
    molecule: &'a Molecule,
    first: &'a Match,
    second: &'a Match,
    new_places: Vec<usize>,
}

impl Sight<'_> {
    /// The match in a copy, and how far its atoms and its bonds are moved.
    fn copy(&self, partner: Partner) -> (&Match, usize, usize) {
        match partner {
            Partner::First => (self.first, 0, 0),
            Partner::Second => (self.second, self.molecule.n_atoms(), self.molecule.n_bonds()),
        }
    }

    fn atom(&self, atom: AtomRef) -> usize {
        match atom {
            AtomRef::Found { atom, partner } => {
                let (found, moved, _) = self.copy(partner);
                found.atoms[atom] + moved
            }
            AtomRef::New(new) => self.new_places[new],
        }
    }

    fn bond(&self, bond: usize, partner: Partner) -> usize {
        let (found, _, moved) = self.copy(partner);
        let pattern = &self.case.bonds[bond];
        let index = self.molecule.bond_between(found.atoms[pattern.a], found.atoms[pattern.b]);
        index.expect("a match has the bonds of its pattern") + moved
    }

    fn add(&self, edit: Edit, change: &mut Change) {
        match edit {
            Edit::Release { halogen, partner } => {
                let (found, moved, _) = self.copy(partner);
                change.released.insert(found.halogens[halogen] + moved);
            }
            Edit::AddHydrogen(a) => *change.hydrogens.entry(self.atom(a)).or_default() += 1,
            Edit::TakeHydrogen(a) => {
                *change.hydrogens.entry(self.atom(a)).or_default() -= 1;
                *change.hydrogens_taken.entry(self.atom(a)).or_default() += 1;
            }
            Edit::Raise { bond, partner } => *change.orders.entry(self.bond(bond, partner)).or_default() += 1,
            Edit::Lower { bond, partner } => *change.orders.entry(self.bond(bond, partner)).or_default() -= 1,
            Edit::Join(a, b, order) => {
                let (a, b) = (self.atom(a), self.atom(b));
                change.joins.insert((a.min(b), a.max(b), order));
            }
            Edit::Charge(a, by) => *change.charges.entry(self.atom(a)).or_default() += i32::from(by),
            // A carbene shows in the bonds and hydrogens of its atom.
            Edit::MakeCarbene(_) | Edit::CloseCarbene(_) => {}
        }
    }
}

/// The same change with the two copies called the other way round.
fn with_copies_swapped(change: &Change, (n_atoms, n_bonds): (usize, usize)) -> Change {
    let swap = |index: usize, n: usize| match index {
        i if i < n => i + n,
        i if i < 2 * n => i - n,
        i => i,
    };
    let atom = |a: usize| swap(a, n_atoms);
    let joined = |&(a, b, order): &(usize, usize, BondOrder)| (atom(a).min(atom(b)), atom(a).max(atom(b)), order);
    Change {
        released: change.released.iter().map(|&a| atom(a)).collect(),
        hydrogens: change.hydrogens.iter().map(|(&a, &n)| (atom(a), n)).collect(),
        orders: change.orders.iter().map(|(&b, &n)| (swap(b, n_bonds), n)).collect(),
        charges: change.charges.iter().map(|(&a, &n)| (atom(a), n)).collect(),
        joins: change.joins.iter().map(joined).collect(),
        new_atoms: change.new_atoms.clone(),
        hydrogens_taken: change.hydrogens_taken.iter().map(|(&a, &n)| (atom(a), n)).collect(),
    }
}

impl Change {
    /// Number of sets of C–H bonds that the change can cut: one way each.
    pub(super) fn n_ways(&self, reactants: &Molecule) -> u64 {
        let choose = |(&atom, &taken): (&usize, &u32)| {
            let there = u64::from(reactants.atom(atom).n_hydrogens);
            (0..u64::from(taken)).fold(1, |ways, i| ways * there.saturating_sub(i) / (i + 1))
        };
        self.hydrogens_taken.iter().map(choose).product()
    }

    /// The reactants' atoms whose bonds or hydrogens change.
    pub(super) fn touched(&self, reactants: &Molecule) -> BTreeSet<usize> {
        let carriers = self.released.iter().flat_map(|&x| reactants.neighbours(x).map(|(n, _, _)| n));
        let ends = self.orders.keys().flat_map(|&bond| {
            let (a, b, _) = reactants.bond(bond);
            [a, b]
        });
        let joined = self.joins.iter().flat_map(|&(a, b, _)| [a, b]).filter(|&a| a < reactants.n_atoms());
        let hydrogens = self.hydrogens.keys().chain(self.hydrogens_taken.keys()).copied();
        carriers.chain(ends).chain(joined).chain(hydrogens).collect()
    }
}
