//! The molecular graph: atoms with their hydrogens, bonds, and what configuration is given.
//!
//! A *ligand* of an atom is a neighbour or a hydrogen. Configuration is kept relative to a
//! fixed order of ligands: neighbours by ascending atom index, hydrogens last. So nothing
//! needs renumbering when a table is read, and [`Molecule::relabelled`] alone does the signs.
//!
//! Invariant: bonds are simple (no loops, no double entries), and configuration is only set
//! where [`stereo`](super::stereo) allows a unit.

use petgraph::graph::{EdgeIndex, NodeIndex, UnGraph};
use petgraph::visit::EdgeRef;

use super::element::{Element, Halogen};

/// An atom and the hydrogens on it.
#[derive(Debug, Clone, Copy, PartialEq, Eq, PartialOrd, Ord, Hash)]
pub struct Atom {
    /// What it is.
    pub element: Element,
    /// Formal charge in elementary charges.
    pub charge: i8,
    /// Number of hydrogens bonded to it, implied ones included.
    pub n_hydrogens: u8,
    /// Whether it belongs to an aromatic ring.
    pub is_aromatic: bool,
}

/// Order of a bond. Orders sort single, double, triple, aromatic.
#[derive(Debug, Clone, Copy, PartialEq, Eq, PartialOrd, Ord, Hash)]
#[allow(missing_docs)]
pub enum BondOrder {
    Single,
    Double,
    Triple,
    Aromatic,
}

/// A ligand of a stereocentre.
#[derive(Debug, Clone, Copy, PartialEq, Eq, PartialOrd, Ord, Hash)]
pub enum Ligand {
    /// The neighbour with this atom index.
    Neighbour(usize),
    /// The centre's hydrogen.
    Hydrogen,
}

/// Sense in which the last three of four ligands run, seen from the first.
#[derive(Debug, Clone, Copy, PartialEq, Eq, PartialOrd, Ord, Hash)]
#[allow(missing_docs)]
pub enum Handedness {
    Anticlockwise,
    Clockwise,
}

impl Handedness {
    /// The mirror image.
    #[must_use]
    pub fn reversed(self) -> Handedness {
        match self {
            Handedness::Anticlockwise => Handedness::Clockwise,
            Handedness::Clockwise => Handedness::Anticlockwise,
        }
    }
}

/// Whether two ligands stand on the same side of a double bond.
#[derive(Debug, Clone, Copy, PartialEq, Eq, PartialOrd, Ord, Hash)]
#[allow(missing_docs)]
pub enum Geometry {
    Cis,
    Trans,
}

impl Geometry {
    /// The other geometry.
    #[must_use]
    pub fn reversed(self) -> Geometry {
        match self {
            Geometry::Cis => Geometry::Trans,
            Geometry::Trans => Geometry::Cis,
        }
    }
}

/// A molecular graph with implied hydrogens and optional configuration.
///
/// # Example
/// ```
/// use haloshed::molecule::{Atom, BondOrder, Element, Molecule};
///
/// let mut vinyl_chloride = Molecule::new();
/// let a = vinyl_chloride.add_atom(Atom::neutral(Element::C, 2));
/// let b = vinyl_chloride.add_atom(Atom::neutral(Element::C, 1));
/// let x = vinyl_chloride.add_atom(Atom::neutral(Element::Cl, 0));
/// vinyl_chloride.add_bond(a, b, BondOrder::Double);
/// vinyl_chloride.add_bond(b, x, BondOrder::Single);
/// assert_eq!(vinyl_chloride.formula().to_string(), "C2H3Cl");
/// ```
#[derive(Debug, Clone, Default)]
pub struct Molecule {
    graph: UnGraph<Atom, BondOrder>,
    handedness: Vec<Option<Handedness>>,
    geometry: Vec<Option<Geometry>>,
}

impl Atom {
    /// An uncharged, non-aromatic atom with `n_hydrogens` hydrogens.
    pub fn neutral(element: Element, n_hydrogens: u8) -> Atom {
        Atom { element, charge: 0, n_hydrogens, is_aromatic: false }
    }
}

impl Molecule {
    /// A molecule without atoms.
    pub fn new() -> Molecule {
        Molecule::default()
    }

    /// Adds an atom and gives its index: 0, 1, 2 and so on.
    pub fn add_atom(&mut self, atom: Atom) -> usize {
        self.handedness.push(None);
        self.graph.add_node(atom).index()
    }

    /// Adds a bond and gives its index.
    ///
    /// # Panics
    /// If an atom does not exist, both ends are one atom, or the bond exists already.
    pub fn add_bond(&mut self, a: usize, b: usize, order: BondOrder) -> usize {
        assert!(a != b && self.bond_between(a, b).is_none(), "bonds are simple");
        self.geometry.push(None);
        self.graph.add_edge(NodeIndex::new(a), NodeIndex::new(b), order).index()
    }

    /// Number of atoms, hydrogens not counted.
    pub fn n_atoms(&self) -> usize {
        self.graph.node_count()
    }

    /// Number of bonds, those to hydrogen not counted.
    pub fn n_bonds(&self) -> usize {
        self.graph.edge_count()
    }

    /// The atom with this index.
    pub fn atom(&self, index: usize) -> Atom {
        self.graph[NodeIndex::new(index)]
    }

    /// The atom with this index, to change.
    pub fn atom_mut(&mut self, index: usize) -> &mut Atom {
        &mut self.graph[NodeIndex::new(index)]
    }

    /// Atoms by index.
    pub fn atoms(&self) -> impl ExactSizeIterator<Item = Atom> + '_ {
        self.graph.node_weights().copied().collect::<Vec<_>>().into_iter()
    }

    /// Both ends and the order of the bond with this index.
    ///
    /// # Panics
    /// If there is no such bond.
    pub fn bond(&self, index: usize) -> (usize, usize, BondOrder) {
        let edge = EdgeIndex::new(index);
        let (a, b) = self.graph.edge_endpoints(edge).expect("bond index comes from this molecule");
        (a.index(), b.index(), self.graph[edge])
    }

    /// Every bond as (end, end, order), by bond index.
    pub fn bonds(&self) -> impl Iterator<Item = (usize, usize, BondOrder)> + '_ {
        (0..self.n_bonds()).map(|index| self.bond(index))
    }

    /// Index of the bond between two atoms, if there is one.
    pub fn bond_between(&self, a: usize, b: usize) -> Option<usize> {
        self.graph.find_edge(NodeIndex::new(a), NodeIndex::new(b)).map(EdgeIndex::index)
    }

    /// Changes a bond's order.
    pub fn set_order(&mut self, bond: usize, order: BondOrder) {
        self.graph[EdgeIndex::new(bond)] = order;
    }

    /// Neighbours of an atom as (atom index, order, bond index), in no fixed order.
    pub fn neighbours(&self, atom: usize) -> impl Iterator<Item = (usize, BondOrder, usize)> + '_ {
        self.graph.edges(NodeIndex::new(atom)).map(move |e| {
            let other = if e.source().index() == atom { e.target() } else { e.source() };
            (other.index(), *e.weight(), e.id().index())
        })
    }

    /// Number of neighbours, hydrogens not counted.
    pub fn degree(&self, atom: usize) -> usize {
        self.graph.edges(NodeIndex::new(atom)).count()
    }

    /// Ligands in the order that [`Molecule::handedness`] refers to.
    pub fn ligands(&self, atom: usize) -> Vec<Ligand> {
        let mut around: Vec<usize> = self.neighbours(atom).map(|(n, _, _)| n).collect();
        around.sort_unstable();
        let hydrogens = usize::from(self.atom(atom).n_hydrogens);
        around.into_iter().map(Ligand::Neighbour).chain(std::iter::repeat_n(Ligand::Hydrogen, hydrogens)).collect()
    }

    /// Handedness of a centre, in the order of [`Molecule::ligands`]; none if not given.
    pub fn handedness(&self, atom: usize) -> Option<Handedness> {
        self.handedness[atom]
    }

    /// Sets or clears the handedness of a centre, in the order of [`Molecule::ligands`].
    pub fn set_handedness(&mut self, atom: usize, handedness: Option<Handedness>) {
        self.handedness[atom] = handedness;
    }

    /// Handedness of a centre in an order of its ligands that the caller chose.
    pub fn handedness_in(&self, atom: usize, order: &[Ligand]) -> Option<Handedness> {
        let sorted = self.handedness[atom]?;
        Some(if is_odd(order) { sorted.reversed() } else { sorted })
    }

    /// Sets handedness from an order of ligands that the caller chose.
    pub fn set_handedness_in(&mut self, atom: usize, order: &[Ligand], handedness: Handedness) {
        let sorted = if is_odd(order) { handedness.reversed() } else { handedness };
        self.handedness[atom] = Some(sorted);
    }

    /// The ligand of a double bond's end that geometry refers to: the neighbour with the
    /// smallest index that is not the other end, else the hydrogen; none if the end is bare.
    pub fn reference_ligand(&self, end: usize, other_end: usize) -> Option<Ligand> {
        self.ligands(end).into_iter().find(|&l| l != Ligand::Neighbour(other_end))
    }

    /// Geometry of a double bond, between the reference ligands of its ends; none if not given.
    pub fn geometry(&self, bond: usize) -> Option<Geometry> {
        self.geometry[bond]
    }

    /// Sets or clears the geometry of a double bond, between the reference ligands.
    pub fn set_geometry(&mut self, bond: usize, geometry: Option<Geometry>) {
        self.geometry[bond] = geometry;
    }

    /// Geometry between a ligand `at_a` of the bond's first end and `at_b` of its second.
    pub fn geometry_between(&self, bond: usize, at_a: Ligand, at_b: Ligand) -> Option<Geometry> {
        let geometry = self.geometry[bond]?;
        Some(if self.is_off_reference(bond, at_a, at_b) { geometry.reversed() } else { geometry })
    }

    /// Sets the geometry from two ligands that the caller chose, one of each end.
    pub fn set_geometry_between(&mut self, bond: usize, at_a: Ligand, at_b: Ligand, geometry: Geometry) {
        let off = self.is_off_reference(bond, at_a, at_b);
        self.geometry[bond] = Some(if off { geometry.reversed() } else { geometry });
    }

    fn is_off_reference(&self, bond: usize, at_a: Ligand, at_b: Ligand) -> bool {
        let (a, b, _) = self.bond(bond);
        (self.reference_ligand(a, b) != Some(at_a)) != (self.reference_ligand(b, a) != Some(at_b))
    }

    /// The same molecule with atom `order[i]` at index `i`.
    ///
    /// # Panics
    /// If `order` is not a permutation of the atom indices.
    #[must_use]
    pub fn relabelled(&self, order: &[usize]) -> Molecule {
        let mut place = vec![usize::MAX; self.n_atoms()];
        let mut out = Molecule::new();
        for (new, &old) in order.iter().enumerate() {
            place[old] = new;
            out.add_atom(self.atom(old));
        }
        assert!(order.len() == self.n_atoms() && !place.contains(&usize::MAX), "a permutation");
        for (a, b, bond_order) in self.bonds() {
            out.add_bond(place[a], place[b], bond_order);
        }
        out.copy_configuration(self, &place);
        out
    }

    /// Adds the atoms and bonds of another molecule behind this one's, configuration and all;
    /// nothing joins the two.
    pub fn append(&mut self, other: &Molecule) {
        let n = self.n_atoms();
        for atom in other.atoms() {
            self.add_atom(atom);
        }
        for (a, b, order) in other.bonds() {
            self.add_bond(n + a, n + b, order);
        }
        let place: Vec<usize> = (n..n + other.n_atoms()).collect();
        self.copy_configuration(other, &place);
    }

    /// Takes configuration over from a molecule whose atom `i` is this one's `place[i]`.
    fn copy_configuration(&mut self, from: &Molecule, place: &[usize]) {
        let moved = |ligand: Ligand| match ligand {
            Ligand::Neighbour(n) => Ligand::Neighbour(place[n]),
            Ligand::Hydrogen => Ligand::Hydrogen,
        };
        for atom in 0..from.n_atoms() {
            if let Some(handedness) = from.handedness(atom) {
                let order: Vec<Ligand> = from.ligands(atom).into_iter().map(moved).collect();
                self.set_handedness_in(place[atom], &order, handedness);
            }
        }
        for bond in 0..from.n_bonds() {
            let Some(geometry) = from.geometry(bond) else { continue };
            let (a, b, _) = from.bond(bond);
            let (Some(at_a), Some(at_b)) = (from.reference_ligand(a, b), from.reference_ligand(b, a)) else { continue };
            if let Some(same) = self.bond_between(place[a], place[b]) {
                self.set_geometry_between(same, moved(at_a), moved(at_b), geometry);
            }
        }
    }

    /// The molecule with every given handedness reversed.
    #[must_use]
    pub fn mirror_image(&self) -> Molecule {
        let mut image = self.clone();
        for handedness in image.handedness.iter_mut().flatten() {
            *handedness = handedness.reversed();
        }
        image
    }

    /// Forgets every tetrahedral configuration.
    pub fn clear_handedness(&mut self) {
        self.handedness.fill(None);
    }

    /// Forgets every E/Z geometry.
    pub fn clear_geometry(&mut self) {
        self.geometry.fill(None);
    }

    /// Halogens in the whole molecule, by [`Halogen`].
    pub fn halogens(&self) -> [u32; 4] {
        let mut counts = [0; 4];
        for atom in self.graph.node_weights() {
            if let Some(halogen) = atom.element.halogen() {
                counts[halogen as usize] += 1;
            }
        }
        counts
    }

    /// The halogen that an atom is, if it may leave: uncharged, bare, and singly bonded once.
    pub fn leaving_halogen(&self, atom: usize) -> Option<Halogen> {
        let a = self.atom(atom);
        let single = self.degree(atom) == 1 && self.neighbours(atom).all(|(_, order, _)| order == BondOrder::Single);
        (single && a.charge == 0 && a.n_hydrogens == 0).then(|| a.element.halogen()).flatten()
    }

    /// Valence that an atom uses, hydrogens included; aromatic bonds of one atom count one
    /// each and one more together.
    pub fn valence_used(&self, atom: usize) -> u32 {
        let mut sum = u32::from(self.atom(atom).n_hydrogens);
        let mut n_aromatic = 0;
        for (_, order, _) in self.neighbours(atom) {
            match order {
                BondOrder::Single => sum += 1,
                BondOrder::Double => sum += 2,
                BondOrder::Triple => sum += 3,
                BondOrder::Aromatic => n_aromatic += 1,
            }
        }
        sum + n_aromatic + u32::from(n_aromatic > 0 && self.takes_ring_double_bond(atom))
    }

    /// Whether an aromatic atom has a double bond in each Kekulé form (carbon always; nitrogen
    /// and its kin with two ligands; oxygen and its kin never; a lone pair of an anion takes its place).
    pub(crate) fn takes_ring_double_bond(&self, atom: usize) -> bool {
        let a = self.atom(atom);
        let n_ligands = self.degree(atom) + usize::from(a.n_hydrogens);
        let exocyclic_double = self.neighbours(atom).any(|(_, order, _)| order == BondOrder::Double);
        match a.element {
            Element::C => !exocyclic_double && a.charge == 0,
            Element::N | Element::P => n_ligands == 2 && a.charge == 0 || a.charge == 1,
            Element::O | Element::S => a.charge == 1,
            _ => false,
        }
    }

    /// Whether an atom is a carbene: an uncharged carbon with two bonds and a lone pair.
    pub fn is_carbene(&self, atom: usize) -> bool {
        let a = self.atom(atom);
        a.element == Element::C && a.charge == 0 && !a.is_aromatic && self.valence_used(atom) == 2
    }

    /// Whether the atom is a carbon whose multiple bonds, if any, all go to carbon, aromatic
    /// ones included, and which bears no charge: a place that may hold halogens.
    pub fn is_plain_carbon(&self, atom: usize) -> bool {
        let a = self.atom(atom);
        a.element == Element::C
            && a.charge == 0
            && self.neighbours(atom).all(|(n, order, _)| {
                matches!(order, BondOrder::Single | BondOrder::Aromatic) || self.atom(n).element == Element::C
            })
    }

    /// Whether the atom is a carbon site: a plain carbon, neither aromatic nor a carbene.
    pub fn is_carbon_site(&self, atom: usize) -> bool {
        self.is_plain_carbon(atom) && !self.atom(atom).is_aromatic && !self.is_carbene(atom)
    }

    /// The graph underneath, for petgraph's algorithms.
    pub fn graph(&self) -> &UnGraph<Atom, BondOrder> {
        &self.graph
    }
}

/// Whether an arrangement is an odd permutation of its sorted self.
pub(crate) fn is_odd<T: Ord>(arrangement: &[T]) -> bool {
    let mut inversions = 0;
    for (i, a) in arrangement.iter().enumerate() {
        inversions += arrangement[i + 1..].iter().filter(|b| *b < a).count();
    }
    inversions % 2 == 1
}
