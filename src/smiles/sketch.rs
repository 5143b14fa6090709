//! Flattens the tree of a SMILES text into atoms and bonds.
//!
//! Ring numbers are joined here, and nothing else is decided: hydrogens are still atoms where
//! they were written as atoms, and a bond without symbol is still without order. The order in
//! which the ligands of an atom were written is kept, for `@`.

use super::error::{ReadError, ReadErrorKind};
use super::syntax::{AtomText, BondSymbol, BranchedAtom, Chain, RingBond, SmilesText, Spanned, Symbol};

/// Atoms and bonds as they were written.
pub(super) struct Sketch {
    pub(super) atoms: Vec<SketchAtom>,
    pub(super) bonds: Vec<SketchBond>,
}

pub(super) struct SketchAtom {
    pub(super) text: AtomText,
    /// Ligands in the order of writing.
    pub(super) around: Vec<Slot>,
}

/// The place of a ligand.
#[derive(Clone, Copy)]
pub(super) enum Slot {
    /// A bond, by its index in the sketch.
    Bond(usize),
    /// The hydrogens in the atom's own brackets.
    BracketHydrogen,
}

/// A bond from the atom written first to the other.
pub(super) struct SketchBond {
    pub(super) from: usize,
    pub(super) to: usize,
    pub(super) symbol: Option<Spanned<BondSymbol>>,
}

impl SketchBond {
    /// The end that is not `atom`.
    pub(super) fn other(&self, atom: usize) -> usize {
        if self.from == atom { self.to } else { self.from }
    }
}

impl Sketch {
    /// Whether an atom is a hydrogen written as an atom.
    pub(super) fn is_hydrogen(&self, atom: usize) -> bool {
        self.atoms[atom].text.symbol == Symbol::Hydrogen
    }

    /// Bonds of an atom, in the order of writing.
    pub(super) fn bonds_of(&self, atom: usize) -> impl Iterator<Item = &SketchBond> {
        self.atoms[atom].around.iter().filter_map(|slot| match slot {
            Slot::Bond(bond) => Some(&self.bonds[*bond]),
            Slot::BracketHydrogen => None,
        })
    }
}

/// Flattens a tree.
///
/// # Errors
/// * a ring number is left open, bonds an atom to itself or to a neighbour, or is written with
///   two bond symbols that disagree
pub(super) fn flatten(tree: SmilesText) -> Result<Sketch, ReadError> {
    let mut drawing = Drawing {
        sketch: Sketch { atoms: Vec::new(), bonds: Vec::new() },
        open: std::iter::repeat_with(|| None).take(100).collect(),
    };
    drawing.chain(tree.chain, None)?;
    let first_open = drawing.open.iter().flatten().min_by_key(|ring| ring.number.span.start);
    match first_open {
        None => Ok(drawing.sketch),
        Some(ring) => {
            let kind = ReadErrorKind::OpenRing { number: ring.number.value };
            Err(ReadError { kind, span: ring.number.span.clone() })
        }
    }
}

/// A ring number that was written once.
struct OpenRing {
    atom: usize,
    /// Where its bond belongs among the ligands of the atom.
    place: usize,
    bond: Option<Spanned<BondSymbol>>,
    number: Spanned<u8>,
}

struct Drawing {
    sketch: Sketch,
    /// Open rings by number.
    open: Vec<Option<OpenRing>>,
}

/// Stands among ligands until the ring is closed.
const PENDING: Slot = Slot::Bond(usize::MAX);

impl Drawing {
    fn chain(&mut self, chain: Chain, mut before: Option<usize>) -> Result<(), ReadError> {
        for atom in chain.atoms {
            before = Some(self.branched_atom(atom, before)?);
        }
        Ok(())
    }

    fn branched_atom(&mut self, node: BranchedAtom, before: Option<usize>) -> Result<usize, ReadError> {
        let atom = self.sketch.atoms.len();
        let has_hydrogen = node.atom.bracket.as_ref().is_some_and(|b| b.n_hydrogens > 0);
        self.sketch.atoms.push(SketchAtom { text: node.atom, around: Vec::new() });
        if let Some(before) = before {
            let bond = self.bond(before, atom, node.bond);
            self.sketch.atoms[before].around.push(Slot::Bond(bond));
            self.sketch.atoms[atom].around.push(Slot::Bond(bond));
        }
        if has_hydrogen {
            self.sketch.atoms[atom].around.push(Slot::BracketHydrogen);
        }
        for ring_bond in node.ring_bonds {
            self.ring_bond(ring_bond, atom)?;
        }
        for branch in node.branches {
            self.chain(branch, Some(atom))?;
        }
        Ok(atom)
    }

    fn bond(&mut self, from: usize, to: usize, symbol: Option<Spanned<BondSymbol>>) -> usize {
        self.sketch.bonds.push(SketchBond { from, to, symbol });
        self.sketch.bonds.len() - 1
    }

    fn ring_bond(&mut self, node: RingBond, atom: usize) -> Result<(), ReadError> {
        let number = node.number.value;
        match self.open[usize::from(number)].take() {
            None => {
                let around = &mut self.sketch.atoms[atom].around;
                let ring = OpenRing { atom, place: around.len(), bond: node.bond, number: node.number };
                around.push(PENDING);
                self.open[usize::from(number)] = Some(ring);
                Ok(())
            }
            Some(ring) => self.close(ring, node, atom),
        }
    }

    fn close(&mut self, ring: OpenRing, node: RingBond, atom: usize) -> Result<(), ReadError> {
        let number = node.number.value;
        if ring.atom == atom {
            return Err(ReadError { kind: ReadErrorKind::RingToItself { number }, span: node.number.span });
        }
        if self.are_bonded(ring.atom, atom) {
            return Err(ReadError { kind: ReadErrorKind::BondedTwice { number }, span: node.number.span });
        }
        let symbol = agreed(ring.bond, node.bond, number)?;
        let bond = self.bond(ring.atom, atom, symbol);
        self.sketch.atoms[ring.atom].around[ring.place] = Slot::Bond(bond);
        self.sketch.atoms[atom].around.push(Slot::Bond(bond));
        Ok(())
    }

    fn are_bonded(&self, a: usize, b: usize) -> bool {
        self.sketch.atoms[a].around.iter().any(|slot| match *slot {
            Slot::Bond(bond) => self.sketch.bonds.get(bond).is_some_and(|bond| bond.other(a) == b),
            Slot::BracketHydrogen => false,
        })
    }
}

/// The symbol of a ring bond as read from the atom that opened it.
fn agreed(
    opened: Option<Spanned<BondSymbol>>,
    closed: Option<Spanned<BondSymbol>>,
    number: u8,
) -> Result<Option<Spanned<BondSymbol>>, ReadError> {
    let turned = closed.map(|bond| Spanned { value: bond.value.reversed(), span: bond.span });
    match (opened, turned) {
        (Some(a), Some(b)) if a.value != b.value => {
            let (opened, closed) = (a.value.character(), b.value.reversed().character());
            Err(ReadError { kind: ReadErrorKind::RingBondsDisagree { number, opened, closed }, span: b.span })
        }
        (opened, turned) => Ok(opened.or(turned)),
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn a_ring_bond_stands_where_its_number_was_opened() {
        let sketch = flatten(super::super::parse("C1(F)CC1").unwrap()).unwrap();
        let ends: Vec<usize> = sketch.bonds_of(0).map(|bond| bond.other(0)).collect();
        assert_eq!(ends, [3, 1, 2]);
    }

    #[test]
    fn a_mark_at_the_closing_number_is_turned_around() {
        let sketch = flatten(super::super::parse("C1CC/1").unwrap()).unwrap();
        let ring = sketch.bonds.iter().find(|b| b.symbol.is_some()).unwrap();
        assert_eq!((ring.from, ring.to), (0, 2));
        assert_eq!(ring.symbol.as_ref().unwrap().value, BondSymbol::Down);
    }
}
