//! Writes canonical SMILES.
//!
//! Atoms are taken in canonical order: the text begins at the first that ends a chain, goes to lighter branches
//! before heavier ones, and so is the same for every numbering of one compound. Configuration
//! that is not real is left out.

use std::fmt::Write;

use super::marks::Marks;
use crate::molecule::canonical::canonical_order;
use crate::molecule::{Atom, BondOrder, Element, Handedness, Identity, Ligand, Molecule};

/// The canonical SMILES of a molecule.
///
/// Reading it gives the same compound, and every atom order of a molecule gives the same text.
///
/// # Example
/// ```
/// let (a, b) = (haloshed::smiles::read("ClC=C(Cl)Cl")?, haloshed::smiles::read("C(Cl)(Cl)=CCl")?);
/// assert_eq!(haloshed::smiles::write(&a), haloshed::smiles::write(&b));
/// # Ok::<(), haloshed::smiles::ReadError>(())
/// ```
pub fn write(molecule: &Molecule) -> String {
    let mut pruned = molecule.clone();
    pruned.keep_real_units(Identity::Full);
    if pruned.n_atoms() == 0 {
        return String::new();
    }
    let order = canonical_order(&pruned);
    let ordered = pruned.relabelled(&order);
    let tree = Tree::of(&ordered);
    let mut text = String::new();
    match Marks::of(&ordered, &tree.position) {
        Ok(marks) => Writer { molecule: &ordered, tree: &tree, marks: &marks }.atom(tree.start, &mut text),
        Err(conflict) => {
            // A ring of conjugated double bonds with hydrogens only: draw one of them.
            let (end, other, _) = ordered.bond(conflict.bond);
            return write_with_drawn_hydrogen(&ordered, end, other);
        }
    }
    text
}

/// The text of a molecule in which the hydrogen at a double bond's end is drawn as an atom, so
/// that it can carry a mark. Boron with no bonds to spare stands in for it while writing.
fn write_with_drawn_hydrogen(molecule: &Molecule, end: usize, other: usize) -> String {
    let bond = molecule.bond_between(end, other).expect("ends of a double bond");
    let mut drawn = molecule.clone();
    drawn.atom_mut(end).n_hydrogens = 0;
    let stand_in =
        drawn.add_atom(Atom { element: Element::B, charge: STAND_IN_CHARGE, n_hydrogens: 0, is_aromatic: false });
    drawn.add_bond(end, stand_in, BondOrder::Single);
    let tree = Tree::of(&drawn);
    let mut text = String::new();
    // The drawn hydrogen serves this double bond alone, so the marks can be met.
    let mut free = drawn.clone();
    free.set_geometry(bond, molecule.geometry(bond));
    if let Ok(marks) = Marks::of(&free, &tree.position) {
        Writer { molecule: &free, tree: &tree, marks: &marks }.atom(tree.start, &mut text);
    }
    text
}

/// A charge that no atom of a compound has: it marks the stand-in of a drawn hydrogen.
const STAND_IN_CHARGE: i8 = i8::MIN;

/// The order in which atoms are written: branches, and rings by the bonds that close them.
struct Tree {
    /// The atom written first: the first in canonical order that ends a chain.
    start: usize,
    children: Vec<Vec<usize>>,
    parent: Vec<Option<usize>>,
    /// By atom: ring bonds that open there, then those that close there, as (bond, number).
    opening: Vec<Vec<(usize, u32)>>,
    closing: Vec<Vec<(usize, u32)>>,
    /// Place of each atom in the text.
    position: Vec<usize>,
}

impl Tree {
    fn of(molecule: &Molecule) -> Tree {
        let n = molecule.n_atoms();
        let mut tree = Tree {
            start: 0,
            children: vec![Vec::new(); n],
            parent: vec![None; n],
            opening: vec![Vec::new(); n],
            closing: vec![Vec::new(); n],
            position: vec![usize::MAX; n],
        };
        let mut is_seen = vec![false; n];
        tree.start = (0..n).find(|&atom| molecule.degree(atom) <= 1).unwrap_or(0);
        tree.grow(molecule, tree.start, &mut is_seen);
        tree.sort_branches(tree.start);
        let mut next = 0;
        tree.place(tree.start, &mut next);
        tree.number_rings(molecule);
        tree
    }

    fn grow(&mut self, molecule: &Molecule, atom: usize, is_seen: &mut [bool]) {
        is_seen[atom] = true;
        let mut around: Vec<usize> = molecule.neighbours(atom).map(|(n, _, _)| n).collect();
        around.sort_unstable();
        for n in around {
            if !is_seen[n] {
                self.parent[n] = Some(atom);
                self.children[atom].push(n);
                self.grow(molecule, n, is_seen);
            }
        }
    }

    /// Puts lighter branches first; gives the size of the branch.
    fn sort_branches(&mut self, atom: usize) -> usize {
        let mut sized: Vec<(usize, usize)> =
            self.children[atom].clone().into_iter().map(|child| (self.sort_branches(child), child)).collect();
        sized.sort_unstable();
        self.children[atom] = sized.iter().map(|&(_, child)| child).collect();
        1 + sized.iter().map(|&(size, _)| size).sum::<usize>()
    }

    fn place(&mut self, atom: usize, next: &mut usize) {
        self.position[atom] = *next;
        *next += 1;
        for child in self.children[atom].clone() {
            self.place(child, next);
        }
    }

    /// Gives each ring bond the smallest number that is free where it opens.
    fn number_rings(&mut self, molecule: &Molecule) {
        let mut rings: Vec<(usize, usize, usize)> = Vec::new();
        for (bond, (a, b, _)) in molecule.bonds().enumerate() {
            if self.parent[a] != Some(b) && self.parent[b] != Some(a) {
                let (first, last) = if self.position[a] < self.position[b] { (a, b) } else { (b, a) };
                rings.push((first, last, bond));
            }
        }
        rings.sort_by_key(|&(first, last, _)| (self.position[first], self.position[last]));
        let mut busy: Vec<(u32, usize)> = Vec::new();
        for (first, last, bond) in rings {
            busy.retain(|&(_, until)| until >= self.position[first]);
            let most = busy.len() as u32 + 1;
            let number = (1..=most).find(|n| busy.iter().all(|(taken, _)| taken != n)).unwrap_or(most);
            busy.push((number, self.position[last]));
            self.opening[first].push((bond, number));
            self.closing[last].push((bond, number));
        }
    }
}

struct Writer<'a> {
    molecule: &'a Molecule,
    tree: &'a Tree,
    marks: &'a Marks,
}

impl Writer<'_> {
    fn atom(&self, atom: usize, text: &mut String) {
        self.symbol(atom, text);
        for &(_, number) in &self.tree.closing[atom] {
            ring_number(number, text);
        }
        for &(bond, number) in &self.tree.opening[atom] {
            self.bond(bond, text);
            ring_number(number, text);
        }
        let children = &self.tree.children[atom];
        for (i, &child) in children.iter().enumerate() {
            let is_branch = i + 1 < children.len();
            if is_branch {
                text.push('(');
            }
            self.bond(self.molecule.bond_between(atom, child).expect("children are neighbours"), text);
            self.atom(child, text);
            if is_branch {
                text.push(')');
            }
        }
    }

    fn bond(&self, bond: usize, text: &mut String) {
        let (a, b, order) = self.molecule.bond(bond);
        let both_aromatic = self.molecule.atom(a).is_aromatic && self.molecule.atom(b).is_aromatic;
        match (order, self.marks.written(bond)) {
            (_, Some(true)) => text.push('/'),
            (_, Some(false)) => text.push('\\'),
            (BondOrder::Double, _) => text.push('='),
            (BondOrder::Triple, _) => text.push('#'),
            (BondOrder::Single, _) if both_aromatic => text.push('-'),
            (BondOrder::Single | BondOrder::Aromatic, _) => {}
        }
    }

    fn symbol(&self, atom: usize, text: &mut String) {
        let a = self.molecule.atom(atom);
        if a.charge == STAND_IN_CHARGE {
            text.push_str("[H]");
            return;
        }
        let lower = if a.is_aromatic { a.element.symbol().to_lowercase() } else { a.element.symbol().to_owned() };
        let handedness = self.handedness(atom);
        if handedness.is_none() && self.is_plain(atom) {
            text.push_str(&lower);
            return;
        }
        text.push('[');
        text.push_str(&lower);
        text.push_str(match handedness {
            Some(Handedness::Anticlockwise) => "@",
            Some(Handedness::Clockwise) => "@@",
            None => "",
        });
        match a.n_hydrogens {
            0 => {}
            1 => text.push('H'),
            n => drop(write!(text, "H{n}")),
        }
        match a.charge {
            0 => {}
            1 => text.push('+'),
            -1 => text.push('-'),
            n => drop(write!(text, "{n:+}")),
        }
        text.push(']');
    }

    /// Handedness in the order in which the ligands are written.
    fn handedness(&self, atom: usize) -> Option<Handedness> {
        self.molecule.handedness(atom)?;
        let across = |bond: usize| {
            let (a, b, _) = self.molecule.bond(bond);
            Ligand::Neighbour(if a == atom { b } else { a })
        };
        let mut order: Vec<Ligand> = self.tree.parent[atom].map(Ligand::Neighbour).into_iter().collect();
        order.extend((0..self.molecule.atom(atom).n_hydrogens).map(|_| Ligand::Hydrogen));
        order.extend(self.tree.closing[atom].iter().chain(&self.tree.opening[atom]).map(|&(bond, _)| across(bond)));
        order.extend(self.tree.children[atom].iter().map(|&child| Ligand::Neighbour(child)));
        self.molecule.handedness_in(atom, &order)
    }

    /// Whether the atom may stand without a bracket: its hydrogens are those it would be given.
    fn is_plain(&self, atom: usize) -> bool {
        let a = self.molecule.atom(atom);
        let used = self.molecule.valence_used(atom) - u32::from(a.n_hydrogens);
        let lowest: &[u32] = match a.element {
            Element::C => &[4],
            Element::B | Element::N => &[3],
            Element::P => &[3, 5],
            Element::O => &[2],
            Element::S => &[2, 4, 6],
            Element::F | Element::Cl | Element::Br | Element::I => &[1],
            Element::Si => &[],
        };
        let implied = if a.is_aromatic && a.element != Element::C && a.element != Element::B {
            0
        } else {
            match lowest.iter().find(|&&v| v >= used) {
                Some(v) => v - used,
                None => return false,
            }
        };
        a.charge == 0 && !lowest.is_empty() && implied == u32::from(a.n_hydrogens)
    }
}

fn ring_number(number: u32, text: &mut String) {
    let _ = if number < 10 { write!(text, "{number}") } else { write!(text, "%{number}") };
}
