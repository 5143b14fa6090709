//! The products of one change: the graph it makes, and every configuration that can arise.

use std::collections::{BTreeMap, BTreeSet};

use super::change::Change;
use super::error::ApplyError;
use super::limits::keeps_ring_limits;
use super::rule::{Case, Configuration, RingLimits};
use crate::molecule::aromatic::perceive;
use crate::molecule::canonical::{Code, canonical_code};
use crate::molecule::{BondOrder, Identity, Ligand, Molecule, Unit};

/// Most stereo-units that one step may leave open.
pub(super) const MOST_OPEN_UNITS: usize = 16;

/// The different products of a change, every candidate unit set, by canonical code; none if a
/// ring limit or an existing bond forbids it.
pub(super) fn outcomes(
    reactants: &Molecule,
    change: &Change,
    case: &Case,
    identity: Identity,
) -> Result<BTreeMap<Code, Molecule>, ApplyError> {
    let Some(mut edited) = Edited::of(reactants, change) else { return Ok(BTreeMap::new()) };
    if case.ring_limits == RingLimits::Kept && !keeps_ring_limits(&edited.product, &edited.made) {
        return Ok(BTreeMap::new());
    }
    edited.keep_untouched(reactants, change);
    if case.configuration == Configuration::Retained {
        edited.retain(reactants, change);
    }
    perceive(&mut edited.product);
    settings(&edited.product, identity)
}

/// Every way of setting the open candidates, each compound once.
fn settings(product: &Molecule, identity: Identity) -> Result<BTreeMap<Code, Molecule>, ApplyError> {
    let mut plain = product.clone();
    let candidates = plain.candidate_units();
    plain.clear_all_but(&candidates, identity);
    let open: Vec<Unit> =
        candidates.into_iter().filter(|unit| unit.is_told_by(identity) && !plain.is_given(*unit)).collect();
    if open.len() > MOST_OPEN_UNITS {
        return Err(ApplyError::TooManyOutcomes { n_units: open.len(), most: MOST_OPEN_UNITS });
    }
    let mut found = BTreeMap::new();
    for mask in 0..1u32 << open.len() {
        let mut isomer = plain.clone();
        for (i, &unit) in open.iter().enumerate() {
            isomer.set_unit(unit, mask >> i & 1 == 0);
        }
        found.entry(canonical_code(&isomer)).or_insert(isomer);
    }
    Ok(found)
}

/// A product in the making.
struct Edited {
    product: Molecule,
    /// Index in the product of each of the reactants' atoms, if it is still there.
    place: Vec<Option<usize>>,
    /// Bonds of the product that the change made or whose order it changed.
    made: Vec<usize>,
}

impl Edited {
    /// The graph that a change makes, without configuration; none if it would join atoms that
    /// are bonded already.
    fn of(reactants: &Molecule, change: &Change) -> Option<Edited> {
        let mut product = Molecule::new();
        let mut place = vec![None; reactants.n_atoms()];
        for (index, slot) in place.iter_mut().enumerate().filter(|(i, _)| !change.released.contains(i)) {
            *slot = Some(product.add_atom(reactants.atom(index)));
        }
        let new_places: Vec<usize> = change
            .new_atoms
            .iter()
            .map(|&element| product.add_atom(crate::molecule::Atom::neutral(element, 0)))
            .collect();
        let mut edited = Edited { product, place, made: Vec::new() };
        let at = |place: &[Option<usize>], index: usize| match index.checked_sub(place.len()) {
            None => place[index],
            Some(new) => new_places.get(new).copied(),
        };
        edited.keep_bonds(reactants, change);
        for &(a, b, order) in &change.joins {
            let (a, b) = (at(&edited.place, a)?, at(&edited.place, b)?);
            if edited.product.bond_between(a, b).is_some() {
                return None;
            }
            edited.made.push(edited.product.add_bond(a, b, order));
        }
        for (&index, &n) in &change.hydrogens {
            let atom = edited.product.atom_mut(at(&edited.place, index)?);
            atom.n_hydrogens = u8::try_from(i32::from(atom.n_hydrogens) + n).ok()?;
        }
        for (&index, &by) in &change.charges {
            let atom = edited.product.atom_mut(at(&edited.place, index)?);
            atom.charge = i8::try_from(i32::from(atom.charge) + by).ok()?;
        }
        Some(edited)
    }

    /// Takes the bonds over whose ends are still there, with their new orders.
    fn keep_bonds(&mut self, reactants: &Molecule, change: &Change) {
        for (index, (a, b, order)) in reactants.bonds().enumerate() {
            let (Some(a), Some(b)) = (self.place[a], self.place[b]) else { continue };
            match change.orders.get(&index) {
                None => {
                    self.product.add_bond(a, b, order);
                }
                Some(&by) => {
                    let bond = self.product.add_bond(a, b, raised(order, by));
                    self.made.push(bond);
                }
            }
        }
    }

    fn moved(&self, ligand: Ligand) -> Option<Ligand> {
        match ligand {
            Ligand::Neighbour(n) => self.place[n].map(Ligand::Neighbour),
            Ligand::Hydrogen => Some(Ligand::Hydrogen),
        }
    }

    /// Takes over the configuration of every unit that the change does not touch.
    fn keep_untouched(&mut self, reactants: &Molecule, change: &Change) {
        let touched = change.touched(reactants);
        for atom in (0..reactants.n_atoms()).filter(|atom| !touched.contains(atom)) {
            self.keep_centre(reactants, atom, &[]);
        }
        for bond in 0..reactants.n_bonds() {
            let (a, b, _) = reactants.bond(bond);
            if !touched.contains(&a) && !touched.contains(&b) {
                self.keep_double_bond(reactants, bond, &[]);
            }
        }
    }

    /// Takes over the configuration of units at touched atoms that lose one ligand and gain
    /// one, the newcomer in the place of the one that left.
    fn retain(&mut self, reactants: &Molecule, change: &Change) {
        let touched = change.touched(reactants);
        let swaps: Vec<Swap> = touched.iter().filter_map(|&atom| self.swap_at(reactants, change, atom)).collect();
        let is_swap = |atom: usize| swaps.iter().any(|swap| swap.at == atom);
        for swap in &swaps {
            self.keep_centre(reactants, swap.at, &swaps);
        }
        for bond in (0..reactants.n_bonds()).filter(|bond| !change.orders.contains_key(bond)) {
            let (a, b, _) = reactants.bond(bond);
            let is_kept = |atom: usize| is_swap(atom) || !touched.contains(&atom);
            if is_kept(a) && is_kept(b) && (is_swap(a) || is_swap(b)) {
                self.keep_double_bond(reactants, bond, &swaps);
            }
        }
    }

    /// The ligand that leaves an atom and the one that comes, if it is one each.
    fn swap_at(&self, reactants: &Molecule, change: &Change, atom: usize) -> Option<Swap> {
        let place = self.place[atom]?;
        let before = reactants.ligands(atom);
        let after = self.product.ligands(place);
        let stays = |&l: &Ligand| matches!(l, Ligand::Neighbour(n) if !change.released.contains(&n));
        let kept: BTreeSet<usize> = before
            .iter()
            .filter(|l| stays(l))
            .filter_map(|&l| match self.moved(l) {
                Some(Ligand::Neighbour(n)) => Some(n),
                _ => None,
            })
            .collect();
        let hydrogens_before = before.iter().filter(|&&l| l == Ligand::Hydrogen).count();
        let hydrogens_after = after.iter().filter(|&&l| l == Ligand::Hydrogen).count();
        let mut left: Vec<Ligand> = before
            .iter()
            .copied()
            .filter(|&l| matches!(l, Ligand::Neighbour(n) if change.released.contains(&n)))
            .collect();
        let mut come: Vec<Ligand> =
            after.iter().copied().filter(|&l| matches!(l, Ligand::Neighbour(n) if !kept.contains(&n))).collect();
        left.extend(std::iter::repeat_n(Ligand::Hydrogen, hydrogens_before.saturating_sub(hydrogens_after)));
        come.extend(std::iter::repeat_n(Ligand::Hydrogen, hydrogens_after.saturating_sub(hydrogens_before)));
        match (&left[..], &come[..]) {
            (&[left], &[come]) => Some(Swap { at: atom, left, come }),
            _ => None,
        }
    }

    /// Ligands of one of the reactants' atoms as ligands in the product, in the same order.
    fn ligands_moved(&self, ligands: &[Ligand], at: usize, swaps: &[Swap]) -> Option<Vec<Ligand>> {
        let swap = swaps.iter().find(|swap| swap.at == at);
        let moved = |&ligand: &Ligand| match swap {
            Some(swap) if swap.left == ligand => Some(swap.come),
            _ => self.moved(ligand),
        };
        ligands.iter().map(moved).collect()
    }

    fn keep_centre(&mut self, reactants: &Molecule, atom: usize, swaps: &[Swap]) {
        let (Some(handedness), Some(place)) = (reactants.handedness(atom), self.place[atom]) else { return };
        if let Some(order) = self.ligands_moved(&reactants.ligands(atom), atom, swaps) {
            self.product.set_handedness_in(place, &order, handedness);
        }
    }

    fn keep_double_bond(&mut self, reactants: &Molecule, bond: usize, swaps: &[Swap]) {
        let (a, b, _) = reactants.bond(bond);
        let Some(geometry) = reactants.geometry(bond) else { return };
        let (Some(place_a), Some(place_b)) = (self.place[a], self.place[b]) else { return };
        let Some(kept) = self.product.bond_between(place_a, place_b) else { return };
        let at_a = reactants.reference_ligand(a, b).and_then(|l| self.ligands_moved(&[l], a, swaps));
        let at_b = reactants.reference_ligand(b, a).and_then(|l| self.ligands_moved(&[l], b, swaps));
        if let (Some(at_a), Some(at_b)) = (at_a, at_b) {
            // Bonds are added with their ends in the reactants' order, so the ends agree.
            self.product.set_geometry_between(kept, at_a[0], at_b[0], geometry);
        }
    }
}

/// One ligand that leaves an atom of the reactants, and the product's that takes its place.
struct Swap {
    at: usize,
    left: Ligand,
    come: Ligand,
}

fn raised(order: BondOrder, by: i32) -> BondOrder {
    let number = match order {
        BondOrder::Single | BondOrder::Aromatic => 1,
        BondOrder::Double => 2,
        BondOrder::Triple => 3,
    };
    match number + by {
        ..=1 => BondOrder::Single,
        2 => BondOrder::Double,
        3.. => BondOrder::Triple,
    }
}
