//! Makes a molecule of a drawing: implied hydrogens, valence, aromatic bonds, configuration.
//!
//! Written hydrogens are folded into counts, a nitro group drawn with two double bonds is given
//! its charges, and aromatic six-rings are perceived, so that the usual ways of drawing one
//! compound give one molecule.

use petgraph::algo::maximum_matching;
use petgraph::graph::{NodeIndex, UnGraph};

use super::draft::{DraftAtom, SmilesText, parse};
use super::error::{Kind, ReadError};
use crate::molecule::rings::smallest_ring_through_bond;
use crate::molecule::{Atom, BondOrder, Element, Geometry, Identity, Ligand, Molecule, aromatic};

/// Reads a compound.
///
/// # Errors
/// * the text is no SMILES of the subset, or no molecule: the first thing wrong, with its place
///
/// # Source
/// OpenSMILES specification 1.0, as far as the subset goes.
///
/// # Example
/// ```
/// let tce = haloshed::smiles::read("ClC=C(Cl)Cl")?;
/// assert_eq!(tce.formula().to_string(), "C2HCl3");
/// let wrong = haloshed::smiles::read("ClC(Cl)(Cl)(Cl)Cl").unwrap_err();
/// assert_eq!((wrong.to_string().as_str(), wrong.span), ("carbon has 5 bonds", 2..3));
/// # Ok::<(), haloshed::smiles::ReadError>(())
/// ```
pub fn read(text: &str) -> Result<Molecule, ReadError> {
    let draft = parse(text)?;
    let mut reading = Reading::new(&draft)?;
    reading.settle_aromatic_bonds();
    reading.split_nitro_groups();
    reading.fill_hydrogens();
    reading.check_aromatic()?;
    reading.check_valences()?;
    reading.set_handedness()?;
    reading.set_geometry()?;
    let mut molecule = reading.molecule;
    aromatic::perceive(&mut molecule);
    molecule.keep_real_units(Identity::Full);
    Ok(molecule)
}

struct Reading<'a> {
    draft: &'a SmilesText,
    molecule: Molecule,
    /// Atom of the molecule for each drawn atom; none for hydrogens.
    place: Vec<Option<usize>>,
    /// Drawn atom for each atom of the molecule.
    drawn: Vec<usize>,
    /// Hydrogens drawn as atoms on each atom of the molecule.
    n_drawn_hydrogens: Vec<u8>,
}

impl<'a> Reading<'a> {
    fn new(draft: &'a SmilesText) -> Result<Reading<'a>, ReadError> {
        let mut reading = Reading {
            draft,
            molecule: Molecule::new(),
            place: Vec::new(),
            drawn: Vec::new(),
            n_drawn_hydrogens: Vec::new(),
        };
        for (index, atom) in draft.atoms.iter().enumerate() {
            reading.add_atom(index, atom)?;
        }
        for bond in &draft.bonds {
            match (reading.place[bond.from], reading.place[bond.to]) {
                (Some(a), Some(b)) => {
                    let both = draft.atoms[bond.from].text.is_aromatic && draft.atoms[bond.to].text.is_aromatic;
                    let implied = if both { BondOrder::Aromatic } else { BondOrder::Single };
                    reading.molecule.add_bond(a, b, bond.order().unwrap_or(implied));
                }
                (Some(a), None) | (None, Some(a)) => reading.n_drawn_hydrogens[a] += 1,
                (None, None) => return Err(ReadError::new(Kind::HydrogenBonds { n: 1 }, bond.span.clone())),
            }
        }
        Ok(reading)
    }

    fn add_atom(&mut self, index: usize, atom: &DraftAtom) -> Result<(), ReadError> {
        let Some(element) = atom.text.element else {
            let is_plain = atom.text.bracket.as_ref().is_some_and(|b| b.n_hydrogens == 0 && b.charge == 0);
            if atom.bonds.len() != 1 || !is_plain {
                return Err(ReadError::new(Kind::HydrogenBonds { n: atom.bonds.len() }, atom.span.clone()));
            }
            self.place.push(None);
            return Ok(());
        };
        let (charge, n_hydrogens) = atom.text.bracket.as_ref().map_or((0, 0), |b| (b.charge, b.n_hydrogens));
        let made = Atom { element, charge, n_hydrogens, is_aromatic: atom.text.is_aromatic };
        self.place.push(Some(self.molecule.add_atom(made)));
        self.drawn.push(index);
        self.n_drawn_hydrogens.push(0);
        Ok(())
    }

    /// Bonds between aromatic atoms of two rings are single.
    fn settle_aromatic_bonds(&mut self) {
        let adjacency = self.molecule.adjacency();
        for bond in 0..self.molecule.n_bonds() {
            let (a, b, order) = self.molecule.bond(bond);
            if order == BondOrder::Aromatic && smallest_ring_through_bond(&adjacency, a, b).is_none() {
                self.molecule.set_order(bond, BondOrder::Single);
            }
        }
    }

    /// Gives N(=O)=O its charges: one compound, one drawing.
    fn split_nitro_groups(&mut self) {
        for atom in 0..self.molecule.n_atoms() {
            let a = self.molecule.atom(atom);
            if a.element != Element::N || a.charge != 0 || self.molecule.valence_used(atom) != 5 {
                continue;
            }
            let oxygens: Vec<(usize, usize)> = self
                .molecule
                .neighbours(atom)
                .filter(|&(n, order, _)| order == BondOrder::Double && self.is_bare_oxygen(n))
                .map(|(n, _, bond)| (n, bond))
                .collect();
            if oxygens.len() == 2 {
                let (oxygen, bond) = oxygens[0];
                self.molecule.set_order(bond, BondOrder::Single);
                self.molecule.atom_mut(oxygen).charge = -1;
                self.molecule.atom_mut(atom).charge = 1;
            }
        }
    }

    fn is_bare_oxygen(&self, atom: usize) -> bool {
        let a = self.molecule.atom(atom);
        a.element == Element::O && a.charge == 0 && self.molecule.degree(atom) == 1
    }

    fn fill_hydrogens(&mut self) {
        for atom in 0..self.molecule.n_atoms() {
            let drawn = self.n_drawn_hydrogens[atom];
            self.molecule.atom_mut(atom).n_hydrogens += drawn;
            if self.draft.atoms[self.drawn[atom]].text.bracket.is_none() {
                let implied = self.implied_hydrogens(atom);
                self.molecule.atom_mut(atom).n_hydrogens += implied;
            }
        }
    }

    /// Hydrogens that fill an atom of the organic subset up to its next valence.
    fn implied_hydrogens(&self, atom: usize) -> u8 {
        let a = self.molecule.atom(atom);
        let used = self.molecule.valence_used(atom);
        if a.is_aromatic && matches!(a.element, Element::N | Element::P | Element::O | Element::S) {
            return 0;
        }
        let next = valences(a.element, a.charge).iter().find(|&&v| u32::from(v) >= used);
        next.map_or(0, |&v| v - used as u8)
    }

    fn check_valences(&self) -> Result<(), ReadError> {
        for atom in 0..self.molecule.n_atoms() {
            let a = self.molecule.atom(atom);
            let used = self.molecule.valence_used(atom);
            let allowed = valences(a.element, a.charge);
            if allowed.iter().any(|&v| u32::from(v) == used) || self.molecule.is_carbene(atom) {
                continue;
            }
            let most = allowed.last().copied().unwrap_or(0);
            let kind = if used > u32::from(most) {
                Kind::Valence { element: a.element, bonds: used }
            } else {
                Kind::Radical { element: a.element, bonds: used }
            };
            return Err(ReadError::new(kind, self.draft.atoms[self.drawn[atom]].span.clone()));
        }
        Ok(())
    }

    /// Whether the lower-case atoms can be given alternating bonds.
    fn check_aromatic(&self) -> Result<(), ReadError> {
        let mut rings: UnGraph<usize, ()> = UnGraph::default();
        let mut node = vec![None; self.molecule.n_atoms()];
        for atom in 0..self.molecule.n_atoms() {
            if !self.molecule.atom(atom).is_aromatic {
                continue;
            }
            let in_ring = self.molecule.neighbours(atom).filter(|n| n.1 == BondOrder::Aromatic).count();
            if in_ring < 2 {
                return Err(self.not_aromatic(atom));
            }
            if self.molecule.takes_ring_double_bond(atom) {
                node[atom] = Some(rings.add_node(atom));
            }
        }
        for (a, b, order) in self.molecule.bonds() {
            let ends: (Option<NodeIndex>, Option<NodeIndex>) = (node[a], node[b]);
            match (order, ends) {
                (BondOrder::Aromatic, (Some(x), Some(y))) => {
                    rings.add_edge(x, y, ());
                }
                (BondOrder::Aromatic, _)
                    if !self.molecule.atom(a).is_aromatic || !self.molecule.atom(b).is_aromatic =>
                {
                    return Err(self.not_aromatic(a));
                }
                _ => {}
            }
        }
        let matching = maximum_matching(&rings);
        match rings.node_indices().find(|&n| matching.mate(n).is_none()) {
            Some(left) => Err(self.not_aromatic(rings[left])),
            None => Ok(()),
        }
    }

    fn not_aromatic(&self, atom: usize) -> ReadError {
        ReadError::new(Kind::NotAromatic, self.draft.atoms[self.drawn[atom]].span.clone())
    }

    fn set_handedness(&mut self) -> Result<(), ReadError> {
        for (atom, &drawn) in self.drawn.iter().enumerate() {
            let text = &self.draft.atoms[drawn];
            let Some(handedness) = text.text.bracket.as_ref().and_then(|b| b.handedness) else { continue };
            let mut order: Vec<Ligand> = text.bonds.iter().map(|&bond| self.ligand(drawn, bond)).collect();
            let n = text.text.bracket.as_ref().map_or(0, |b| usize::from(b.n_hydrogens));
            order.splice(text.n_before_hydrogen..text.n_before_hydrogen, std::iter::repeat_n(Ligand::Hydrogen, n));
            if order.len() != 4 {
                return Err(ReadError::new(Kind::NotTetrahedral { n_ligands: order.len() }, text.span.clone()));
            }
            if order.iter().filter(|&&l| l == Ligand::Hydrogen).count() < 2 {
                self.molecule.set_handedness_in(atom, &order, handedness);
            }
        }
        Ok(())
    }

    /// The ligand that a drawn bond leads to from a drawn atom.
    fn ligand(&self, from: usize, bond: usize) -> Ligand {
        let bond = &self.draft.bonds[bond];
        let other = if bond.from == from { bond.to } else { bond.from };
        self.place[other].map_or(Ligand::Hydrogen, Ligand::Neighbour)
    }

    fn set_geometry(&mut self) -> Result<(), ReadError> {
        for bond in 0..self.molecule.n_bonds() {
            let (a, b, order) = self.molecule.bond(bond);
            if order != BondOrder::Double {
                continue;
            }
            let (Some((at_a, above_a)), Some((at_b, above_b))) = (self.marked_ligand(a), self.marked_ligand(b)) else {
                continue;
            };
            self.check_marks(a)?;
            self.check_marks(b)?;
            let geometry = if above_a == above_b { Geometry::Cis } else { Geometry::Trans };
            self.molecule.set_geometry_between(bond, at_a, at_b, geometry);
        }
        Ok(())
    }

    /// The first ligand of a double bond's end with a direction, and whether it lies above.
    fn marked_ligand(&self, atom: usize) -> Option<(Ligand, bool)> {
        let drawn = self.drawn[atom];
        let mut bonds = self.draft.atoms[drawn].bonds.iter();
        bonds.find_map(|&bond| Some((self.ligand(drawn, bond), self.draft.bonds[bond].lies_above(drawn)?)))
    }

    /// Refuses two ligands of one end on the same side. Asked only where both ends are marked:
    /// marks that serve the next double bonds alone may agree, as in `C=C(/C=C/Cl)/C=C/Cl`.
    fn check_marks(&self, atom: usize) -> Result<(), ReadError> {
        let drawn = self.drawn[atom];
        let mut known = None;
        for &bond in &self.draft.atoms[drawn].bonds {
            let Some(above) = self.draft.bonds[bond].lies_above(drawn) else { continue };
            if known == Some(above) {
                return Err(ReadError::new(Kind::ContradictoryMarks, self.draft.bonds[bond].span.clone()));
            }
            known = Some(above);
        }
        Ok(())
    }
}

/// Valences an atom may have, ascending; empty for a charge it does not carry.
fn valences(element: Element, charge: i8) -> &'static [u8] {
    match (element, charge) {
        (Element::C | Element::Si, 0) | (Element::N | Element::P, 1) | (Element::B, -1) => &[4],
        (Element::C, 1 | -1) | (Element::N | Element::B, 0) | (Element::O, 1) => &[3],
        (Element::O, 0) | (Element::N, -1) => &[2],
        (Element::S, 0) => &[2, 4, 6],
        (Element::P, 0) | (Element::S, 1) => &[3, 5],
        (Element::O | Element::S, -1) | (Element::F | Element::Cl | Element::Br | Element::I, 0) => &[1],
        _ => &[],
    }
}
