//! Which of two ligands ranks higher, by atomic numbers alone.
//!
//! The hierarchical digraph of an acyclic molecule is walked sphere by sphere, higher-ranking
//! branches first; a multiple bond duplicates its atoms. Ligands that this does not tell apart
//! are left undecided: isotopes and configuration are not asked. Used to name E and Z, never
//! to decide what is one compound.
//!
//! # Source
//! IUPAC Recommendations 2013, P-92.2 (Cahn, Ingold, Prelog), rule 1a.

use std::cmp::Ordering;

use super::graph::{BondOrder, Ligand, Molecule};

/// A node of the digraph: an atom reached from another, or a duplicate or hydrogen.
#[derive(Debug, Clone, Copy)]
enum Node {
    Atom {
        atom: usize,
        from: usize,
    },
    /// A duplicate of an atom with this atomic number: it has no ligands of its own.
    Leaf(u8),
}

/// Which of two ligands of `centre` ranks higher; equal if rule 1a does not tell.
pub fn compare(molecule: &Molecule, centre: usize, a: Ligand, b: Ligand) -> Ordering {
    let node = |ligand: Ligand| match ligand {
        Ligand::Neighbour(atom) => Node::Atom { atom, from: centre },
        Ligand::Hydrogen => Node::Leaf(1),
    };
    let (mut left, mut right) = (vec![node(a)], vec![node(b)]);
    let first = number(molecule, left[0]).cmp(&number(molecule, right[0]));
    if first != Ordering::Equal {
        return first;
    }
    while !left.is_empty() || !right.is_empty() {
        let (sets_left, sets_right) = (sets(molecule, &left), sets(molecule, &right));
        let numbers = |sets: &[Vec<Node>]| -> Vec<Vec<u8>> {
            sets.iter().map(|set| set.iter().map(|&n| number(molecule, n)).collect()).collect()
        };
        let order = numbers(&sets_left).cmp(&numbers(&sets_right));
        if order != Ordering::Equal {
            return order;
        }
        left = sets_left.into_iter().flatten().filter(|n| matches!(n, Node::Atom { .. })).collect();
        right = sets_right.into_iter().flatten().filter(|n| matches!(n, Node::Atom { .. })).collect();
    }
    Ordering::Equal
}

fn number(molecule: &Molecule, node: Node) -> u8 {
    match node {
        Node::Atom { atom, .. } => molecule.atom(atom).element.atomic_number(),
        Node::Leaf(number) => number,
    }
}

/// The ligands of each node, highest atomic number first.
fn sets(molecule: &Molecule, nodes: &[Node]) -> Vec<Vec<Node>> {
    nodes.iter().map(|&node| set(molecule, node)).collect()
}

fn set(molecule: &Molecule, node: Node) -> Vec<Node> {
    let Node::Atom { atom, from } = node else { return Vec::new() };
    let mut found: Vec<Node> = (0..molecule.atom(atom).n_hydrogens).map(|_| Node::Leaf(1)).collect();
    for (n, order, _) in molecule.neighbours(atom) {
        let n_duplicates = match order {
            BondOrder::Single | BondOrder::Aromatic => 0,
            BondOrder::Double => 1,
            BondOrder::Triple => 2,
        };
        let duplicate = Node::Leaf(molecule.atom(n).element.atomic_number());
        found.extend(std::iter::repeat_n(duplicate, n_duplicates));
        if n != from {
            found.push(Node::Atom { atom: n, from: atom });
        }
    }
    found.sort_by_key(|&n| std::cmp::Reverse(number(molecule, n)));
    found
}
