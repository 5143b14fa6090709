//! Perception of aromatic six-rings.
//!
//! A ring of six carbons that holds three alternating C=C is aromatic. A bond that is
//! aromatic already counts as either order, and marking goes on until nothing changes; so
//! every Kekulé form of a fused system ends at one picture, whatever form it began with.
//! Other rings are never made aromatic here; they are if they were read in lower case.

use super::element::Element;
use super::graph::{BondOrder, Molecule};
use super::rings::{Adjacency, six_rings};

/// Marks the aromatic six-rings of a molecule, atoms and bonds.
pub fn perceive(molecule: &mut Molecule) {
    if !molecule.bonds().any(|(_, _, order)| order == BondOrder::Double) {
        return;
    }
    let rings: Vec<[usize; 6]> = six_rings(&carbon_adjacency(molecule));
    let mut changed = !rings.is_empty();
    while changed {
        changed = false;
        for ring in &rings {
            let bonds = ring_bonds(molecule, ring);
            let orders = bonds.map(|bond| molecule.bond(bond).2);
            if alternates(orders) && orders.iter().any(|&o| o != BondOrder::Aromatic) {
                mark(molecule, ring, bonds);
                changed = true;
            }
        }
    }
}

/// Whether six bond orders in ring order alternate, an aromatic bond counting as either.
pub fn alternates(orders: [BondOrder; 6]) -> bool {
    let fits = |index: usize, offset: usize| match orders[index] {
        BondOrder::Aromatic => true,
        BondOrder::Double => index % 2 == offset,
        BondOrder::Single => index % 2 != offset,
        BondOrder::Triple => false,
    };
    [0, 1].into_iter().any(|offset| (0..6).all(|index| fits(index, offset)))
}

fn carbon_adjacency(molecule: &Molecule) -> Adjacency {
    (0..molecule.n_atoms())
        .map(|atom| {
            if molecule.atom(atom).element != Element::C {
                return Vec::new();
            }
            molecule.neighbours(atom).map(|(n, _, _)| n).filter(|&n| molecule.atom(n).element == Element::C).collect()
        })
        .collect()
}

fn ring_bonds(molecule: &Molecule, ring: &[usize; 6]) -> [usize; 6] {
    std::array::from_fn(|i| molecule.bond_between(ring[i], ring[(i + 1) % 6]).expect("ring atoms are bonded"))
}

fn mark(molecule: &mut Molecule, ring: &[usize; 6], bonds: [usize; 6]) {
    for bond in bonds {
        molecule.set_order(bond, BondOrder::Aromatic);
        molecule.set_geometry(bond, None);
    }
    for &atom in ring {
        molecule.atom_mut(atom).is_aromatic = true;
        molecule.set_handedness(atom, None);
    }
}
