//! Which of two ligands ranks higher, by atomic numbers alone.
//!
//! Each ligand is unfolded into a tree of atoms, the *hierarchical digraph*: a multiple bond
//! duplicates its atoms, and so does an atom that a ring leads back to; a duplicate has no
//! ligands of its own. Two trees are compared sphere by sphere, higher-ranking branches first.
//! Ligands that this does not tell apart are left undecided: isotopes and configuration are not
//! asked. Used to name E and Z, never to decide what is one compound.
//!
//! Invariant: the branches of every tree are sorted by rank, highest first, so that the order
//! of atoms in the molecule does not show.
//!
//! # Source
//! IUPAC Recommendations 2013, P-92.2 (Cahn, Ingold, Prelog), rule 1a.

use std::cmp::Ordering;

use super::graph::{BondOrder, Ligand, Molecule};

/// An atom, a duplicate or a hydrogen, with the branches that lead on from it.
struct Tree {
    atomic_number: u8,
    branches: Vec<Tree>,
}

/// Which of two ligands of `centre` ranks higher; equal if rule 1a does not tell.
///
/// # Cost
/// Of the order of the number of paths from the centre: for molecules that are read by people.
pub fn compare(molecule: &Molecule, centre: usize, a: Ligand, b: Ligand) -> Ordering {
    let tree = |ligand: Ligand| match ligand {
        Ligand::Neighbour(atom) => unfold(molecule, atom, &mut vec![centre]),
        Ligand::Hydrogen => leaf(1),
    };
    compare_trees(&tree(a), &tree(b))
}

fn leaf(atomic_number: u8) -> Tree {
    Tree { atomic_number, branches: Vec::new() }
}

/// The tree of an atom that is reached along `path`.
fn unfold(molecule: &Molecule, atom: usize, path: &mut Vec<usize>) -> Tree {
    let from = path.last().copied();
    path.push(atom);
    let mut branches: Vec<Tree> = (0..molecule.atom(atom).n_hydrogens).map(|_| leaf(1)).collect();
    for (n, order, _) in molecule.neighbours(atom) {
        let n_duplicates = match order {
            BondOrder::Single | BondOrder::Aromatic => 0,
            BondOrder::Double => 1,
            BondOrder::Triple => 2,
        };
        let atomic_number = molecule.atom(n).element.atomic_number();
        branches.extend((0..n_duplicates).map(|_| leaf(atomic_number)));
        if path.contains(&n) {
            // The way back is no branch; an atom met again in a ring is a duplicate.
            branches.extend((from != Some(n)).then(|| leaf(atomic_number)));
        } else {
            branches.push(unfold(molecule, n, path));
        }
    }
    path.pop();
    branches.sort_by(|a, b| compare_trees(b, a));
    Tree { atomic_number: molecule.atom(atom).element.atomic_number(), branches }
}

/// Compares root with root, then sphere with sphere: in each the set of branches of every atom
/// of the sphere before, in its order.
fn compare_trees(a: &Tree, b: &Tree) -> Ordering {
    let (mut left, mut right) = (vec![a], vec![b]);
    let mut order = a.atomic_number.cmp(&b.atomic_number);
    while order == Ordering::Equal && !(left.is_empty() && right.is_empty()) {
        order = sets(&left).cmp(&sets(&right));
        left = left.into_iter().flat_map(|tree| &tree.branches).collect();
        right = right.into_iter().flat_map(|tree| &tree.branches).collect();
    }
    order
}

/// The atomic numbers on each atom of a sphere. A set that ends early is the lower one, as if
/// filled up with phantom atoms of number zero.
fn sets(sphere: &[&Tree]) -> Vec<Vec<u8>> {
    sphere.iter().map(|tree| tree.branches.iter().map(|branch| branch.atomic_number).collect()).collect()
}
