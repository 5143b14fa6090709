//! Random small halogenated molecules, for properties.

use haloshed::molecule::{Atom, BondOrder, Element, Molecule, Unit, aromatic};
use haloshed::molecule::{Geometry, Handedness};
use proptest::collection::vec;
use proptest::prelude::*;

/// How the next atom is put on a growing molecule.
#[derive(Debug, Clone)]
struct Growth {
    element: Element,
    onto: prop::sample::Index,
    order: u32,
}

/// Molecules of up to 14 atoms besides hydrogen, without configuration: chains, branches,
/// rings, multiple bonds, halogens, oxygen and nitrogen.
pub(crate) fn molecules() -> impl Strategy<Value = Molecule> {
    let element = prop_oneof![
        8 => Just(Element::C),
        3 => Just(Element::Cl),
        1 => Just(Element::F),
        1 => Just(Element::Br),
        1 => Just(Element::O),
        1 => Just(Element::N),
    ];
    let order = prop_oneof![4 => Just(1), 3 => Just(2), 1 => Just(3)];
    let growth = (element, any::<prop::sample::Index>(), order).prop_map(|(element, onto, order)| Growth {
        element,
        onto,
        order,
    });
    let ring = (any::<prop::sample::Index>(), any::<prop::sample::Index>(), 1u32..3);
    (vec(growth, 0..13), vec(ring, 0..4)).prop_map(|(growths, rings)| grow(&growths, &rings))
}

/// The same with configuration at random places that may have it, real or not.
pub(crate) fn configured() -> impl Strategy<Value = Molecule> {
    (molecules(), vec(0u8..3, 20)).prop_map(|(mut molecule, choices)| {
        for (unit, choice) in molecule.candidate_units().into_iter().zip(choices) {
            match (unit, choice) {
                (_, 0) => {}
                (Unit::Centre(atom), 1) => molecule.set_handedness(atom, Some(Handedness::Clockwise)),
                (Unit::Centre(atom), _) => molecule.set_handedness(atom, Some(Handedness::Anticlockwise)),
                (Unit::DoubleBond(bond), 1) => molecule.set_geometry(bond, Some(Geometry::Cis)),
                (Unit::DoubleBond(bond), _) => molecule.set_geometry(bond, Some(Geometry::Trans)),
            }
        }
        molecule
    })
}

/// A molecule with its atoms in another order.
pub(crate) fn shuffled(molecule: &Molecule, keys: &[u32]) -> Molecule {
    let mut order: Vec<usize> = (0..molecule.n_atoms()).collect();
    order.sort_by_key(|&atom| (keys[atom % keys.len()], atom));
    molecule.relabelled(&order)
}

fn grow(growths: &[Growth], rings: &[(prop::sample::Index, prop::sample::Index, u32)]) -> Molecule {
    let mut molecule = Molecule::new();
    molecule.add_atom(Atom::neutral(Element::C, 0));
    for growth in growths {
        let room = most(growth.element);
        let open: Vec<usize> = (0..molecule.n_atoms()).filter(|&a| free(&molecule, a) > 0).collect();
        if open.is_empty() {
            break;
        }
        let onto = *growth.onto.get(&open);
        let order = growth.order.min(room).min(free(&molecule, onto));
        let atom = molecule.add_atom(Atom::neutral(growth.element, 0));
        molecule.add_bond(onto, atom, bond_order(order));
    }
    for (from, to, order) in rings {
        let open: Vec<usize> = (0..molecule.n_atoms()).filter(|&a| free(&molecule, a) > 0).collect();
        if open.len() < 2 {
            break;
        }
        let (a, b) = (*from.get(&open), *to.get(&open));
        if a != b && molecule.bond_between(a, b).is_none() {
            molecule.add_bond(a, b, bond_order((*order).min(free(&molecule, a)).min(free(&molecule, b))));
        }
    }
    for atom in 0..molecule.n_atoms() {
        molecule.atom_mut(atom).n_hydrogens = free(&molecule, atom) as u8;
    }
    aromatic::perceive(&mut molecule);
    molecule
}

fn most(element: Element) -> u32 {
    match element {
        Element::C => 4,
        Element::N => 3,
        Element::O => 2,
        _ => 1,
    }
}

fn free(molecule: &Molecule, atom: usize) -> u32 {
    most(molecule.atom(atom).element) - molecule.valence_used(atom)
}

fn bond_order(order: u32) -> BondOrder {
    match order {
        1 => BondOrder::Single,
        2 => BondOrder::Double,
        _ => BondOrder::Triple,
    }
}
