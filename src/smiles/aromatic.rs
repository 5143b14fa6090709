//! Aromatic bonds of a molecule that was read in lower case.
//!
//! A bond without symbol between two lower-case atoms is aromatic if it lies in a ring of
//! such bonds, else single. An aromatic molecule is sound if its atoms that need a double
//! bond can be paired off along aromatic bonds: if it has a Kekulé form. None is chosen.
//!
//! A bond that joins two benzene rings inside another ring (dibenzofuran, fluorenone) is
//! single, as it is when the compound is written with alternating bonds.
//!
//! # Source
//! Kekulé forms as perfect matchings: OpenSMILES 1.0, section 3.5; the matching is petgraph's.

use petgraph::algo::{bridges::bridges, maximum_matching};
use petgraph::graph::{NodeIndex, UnGraph};

use crate::molecule::rings::{Adjacency, six_rings};
use crate::molecule::{BondOrder, Element, Molecule};

/// Makes aromatic bonds single that lie in no ring of aromatic bonds.
pub(super) fn release_bridges(molecule: &mut Molecule) {
    let mut graph = UnGraph::<(), usize>::default();
    for _ in 0..molecule.n_atoms() {
        graph.add_node(());
    }
    for (bond, (a, b, order)) in molecule.bonds().enumerate() {
        if order == BondOrder::Aromatic {
            graph.add_edge(NodeIndex::new(a), NodeIndex::new(b), bond);
        }
    }
    for edge in bridges(&graph) {
        molecule.set_order(*edge.weight(), BondOrder::Single);
    }
}

/// An aromatic atom without a ring of aromatic bonds, if there is one.
pub(super) fn stranded_atom(molecule: &Molecule) -> Option<usize> {
    (0..molecule.n_atoms()).find(|&atom| molecule.atom(atom).is_aromatic && !has_aromatic_bond(molecule, atom))
}

fn has_aromatic_bond(molecule: &Molecule, atom: usize) -> bool {
    molecule.neighbours(atom).any(|(_, order, _)| order == BondOrder::Aromatic)
}

/// An atom that is left without its double bond in the fullest pairing, if there is one.
pub(super) fn unpaired_atom(molecule: &Molecule) -> Option<usize> {
    unpaired_besides(molecule, None)
}

/// A ring nitrogen that would make a Kekulé form possible if it bore a hydrogen.
pub(super) fn nitrogen_without_hydrogen(molecule: &Molecule) -> Option<usize> {
    let is_bare_nitrogen = |&atom: &usize| {
        let a = molecule.atom(atom);
        a.is_aromatic && a.element == Element::N && a.charge == 0 && molecule.takes_ring_double_bond(atom)
    };
    let bare = (0..molecule.n_atoms()).filter(is_bare_nitrogen).take(MOST_NITROGENS_TRIED);
    bare.into_iter().find(|&atom| unpaired_besides(molecule, Some(atom)).is_none())
}

/// Nitrogens looked at for a hint; a compound with more of them gets a plainer one.
const MOST_NITROGENS_TRIED: usize = 16;

fn unpaired_besides(molecule: &Molecule, left_out: Option<usize>) -> Option<usize> {
    let mut graph = UnGraph::<usize, ()>::default();
    let needs_partner = |atom: usize| {
        Some(atom) != left_out && has_aromatic_bond(molecule, atom) && molecule.takes_ring_double_bond(atom)
    };
    let node: Vec<Option<NodeIndex>> =
        (0..molecule.n_atoms()).map(|atom| needs_partner(atom).then(|| graph.add_node(atom))).collect();
    for (a, b, order) in molecule.bonds() {
        if let (BondOrder::Aromatic, Some(a), Some(b)) = (order, node[a], node[b]) {
            graph.add_edge(a, b, ());
        }
    }
    let matching = maximum_matching(&graph);
    graph.node_indices().find(|&n| !matching.contains_node(n)).map(|n| graph[n])
}

/// Makes aromatic bonds single that join benzene rings from outside, if that leaves every
/// other atom its double bond; an atom that has lost its last aromatic bond is aromatic no more.
pub(super) fn release_links(molecule: &mut Molecule) {
    let links = links(molecule);
    if links.is_empty() {
        return;
    }
    let mut released = molecule.clone();
    for &bond in &links {
        released.set_order(bond, BondOrder::Single);
    }
    release_bridges(&mut released);
    for atom in 0..released.n_atoms() {
        if !has_aromatic_bond(&released, atom) {
            released.atom_mut(atom).is_aromatic = false;
        }
    }
    let valences_kept = (0..molecule.n_atoms()).all(|a| molecule.valence_used(a) == released.valence_used(a));
    if valences_kept && unpaired_atom(&released).is_none() {
        *molecule = released;
    }
}

/// Aromatic bonds in no aromatic six-ring of carbons whose two ends are each in one.
fn links(molecule: &Molecule) -> Vec<usize> {
    let is_carbon = |atom: usize| molecule.atom(atom).element == Element::C;
    let adjacency: Adjacency = (0..molecule.n_atoms())
        .map(|a| {
            let aromatic = molecule.neighbours(a).filter(|&(_, order, _)| order == BondOrder::Aromatic);
            aromatic.map(|(n, _, _)| n).filter(|&n| is_carbon(a) && is_carbon(n)).collect()
        })
        .collect();
    let mut in_ring = vec![false; molecule.n_atoms()];
    let mut bond_in_ring = vec![false; molecule.n_bonds()];
    for ring in six_rings(&adjacency) {
        for i in 0..6 {
            in_ring[ring[i]] = true;
            if let Some(bond) = molecule.bond_between(ring[i], ring[(i + 1) % 6]) {
                bond_in_ring[bond] = true;
            }
        }
    }
    let is_link = |&(bond, (a, b, order)): &(usize, (usize, usize, BondOrder))| {
        order == BondOrder::Aromatic && in_ring[a] && in_ring[b] && !bond_in_ring[bond]
    };
    molecule.bonds().enumerate().filter(is_link).map(|(bond, _)| bond).collect()
}
