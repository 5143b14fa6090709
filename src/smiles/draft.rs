//! The drawing: atoms, bonds and ligand orders as written, before any chemistry.
//!
//! Hydrogens written as atoms are still atoms here. Every bond remembers which atom was written
//! first, because `/` and `\` are told from there.

use std::ops::Range;

use super::error::{Kind, ReadError};
use super::syntax::{AtomText, BondText, TokenKind, tokens};
use crate::molecule::BondOrder;

/// A drawing.
#[derive(Debug, Clone, Default)]
pub struct SmilesText {
    /// Atoms in the order written.
    pub atoms: Vec<DraftAtom>,
    /// Bonds in the order closed.
    pub bonds: Vec<DraftBond>,
}

/// An atom of a drawing.
#[derive(Debug, Clone)]
pub struct DraftAtom {
    /// As written.
    pub text: AtomText,
    /// Where.
    pub span: Range<usize>,
    /// Its bonds in the order in which `@` counts them, by index; the bracket's hydrogen stands
    /// after `n_before_hydrogen` of them.
    pub bonds: Vec<usize>,
    /// 1 if an atom was written before this one, else 0.
    pub n_before_hydrogen: usize,
}

/// A bond of a drawing.
#[derive(Debug, Clone)]
pub struct DraftBond {
    /// The atom from which a direction is told.
    pub from: usize,
    /// The other atom.
    pub to: usize,
    /// As written, if it was.
    pub text: Option<BondText>,
    /// Where, or where its second atom or ring number stands.
    pub span: Range<usize>,
}

impl DraftBond {
    /// The order written; none if it is left to the atoms.
    pub fn order(&self) -> Option<BondOrder> {
        match self.text {
            Some(BondText::Order(order)) => Some(order),
            Some(BondText::Up | BondText::Down) => Some(BondOrder::Single),
            None => None,
        }
    }

    /// Whether the ligand `of` an atom lies above it, if a direction was written.
    pub fn lies_above(&self, of: usize) -> Option<bool> {
        let up = match self.text {
            Some(BondText::Up) => true,
            Some(BondText::Down) => false,
            _ => return None,
        };
        Some(up == (self.from == of))
    }
}

/// A ring number waiting for its second end.
struct OpenRing {
    number: u32,
    atom: usize,
    slot: usize,
    text: Option<BondText>,
    span: Range<usize>,
}

#[derive(Default)]
struct Drawing {
    text: SmilesText,
    previous: Option<usize>,
    branches: Vec<(Option<usize>, Range<usize>)>,
    rings: Vec<OpenRing>,
    pending: Option<(BondText, Range<usize>)>,
    is_branch_fresh: bool,
}

/// A slot of a ligand order whose ring is not closed yet.
const WAITING: usize = usize::MAX;

/// Reads a SMILES as a drawing: syntax, branches and rings, nothing of valence.
///
/// # Errors
/// * whatever is wrong first, with its place
pub fn parse(text: &str) -> Result<SmilesText, ReadError> {
    let mut drawing = Drawing::default();
    for token in tokens(text)? {
        let span = token.span;
        match token.kind {
            TokenKind::Atom(atom) => drawing.add_atom(atom, span)?,
            TokenKind::Bond(bond) => drawing.add_bond(bond, span)?,
            TokenKind::Ring(number) => drawing.add_ring(number, span)?,
            TokenKind::BranchStart => drawing.start_branch(span)?,
            TokenKind::BranchEnd => drawing.end_branch(span)?,
        }
    }
    drawing.finish()
}

impl Drawing {
    fn add_atom(&mut self, text: AtomText, span: Range<usize>) -> Result<(), ReadError> {
        let index = self.text.atoms.len();
        let n_before_hydrogen = usize::from(self.previous.is_some());
        self.text.atoms.push(DraftAtom { text, span: span.clone(), bonds: Vec::new(), n_before_hydrogen });
        if let Some(previous) = self.previous {
            let (text, at) = self.pending.take().map_or((None, span), |(bond, at)| (Some(bond), at));
            self.join(previous, index, text, at, None)?;
        }
        self.previous = Some(index);
        self.is_branch_fresh = false;
        Ok(())
    }

    fn add_bond(&mut self, bond: BondText, span: Range<usize>) -> Result<(), ReadError> {
        if self.previous.is_none() {
            return Err(ReadError::new(Kind::NothingBefore, span));
        }
        if let Some((_, at)) = &self.pending {
            return Err(ReadError::new(Kind::NothingAfterBond, at.clone()));
        }
        self.pending = Some((bond, span));
        Ok(())
    }

    fn add_ring(&mut self, number: u32, span: Range<usize>) -> Result<(), ReadError> {
        let Some(atom) = self.previous else { return Err(ReadError::new(Kind::NothingBefore, span)) };
        if self.is_branch_fresh {
            return Err(ReadError::new(
                Kind::Unexpected { found: "a ring number at the start of a branch".into() },
                span,
            ));
        }
        let text = self.pending.take().map(|(bond, _)| bond);
        let Some(at) = self.rings.iter().position(|ring| ring.number == number) else {
            let slot = self.text.atoms[atom].bonds.len();
            self.text.atoms[atom].bonds.push(WAITING);
            self.rings.push(OpenRing { number, atom, slot, text, span });
            return Ok(());
        };
        let ring = self.rings.remove(at);
        if ring.atom == atom {
            return Err(ReadError::new(Kind::RingToItself { number }, span));
        }
        self.close_ring(&ring, atom, text, span)
    }

    fn close_ring(
        &mut self,
        ring: &OpenRing,
        atom: usize,
        text: Option<BondText>,
        span: Range<usize>,
    ) -> Result<(), ReadError> {
        // Seen from the closing atom a direction is turned round.
        let turned = text.map(|t| match t {
            BondText::Up => BondText::Down,
            BondText::Down => BondText::Up,
            BondText::Order(order) => BondText::Order(order),
        });
        let both = match (ring.text, turned) {
            (Some(a), Some(b)) if a != b => {
                return Err(ReadError::new(Kind::RingBondsDiffer { number: ring.number }, span));
            }
            (a, b) => a.or(b),
        };
        self.join(ring.atom, atom, both, span, Some(ring.slot))
    }

    fn join(
        &mut self,
        from: usize,
        to: usize,
        text: Option<BondText>,
        span: Range<usize>,
        slot: Option<usize>,
    ) -> Result<(), ReadError> {
        let is_there = |bond: &DraftBond| [bond.from, bond.to] == [from, to] || [bond.to, bond.from] == [from, to];
        if self.text.bonds.iter().any(is_there) {
            return Err(ReadError::new(Kind::BondedTwice, span));
        }
        let index = self.text.bonds.len();
        self.text.bonds.push(DraftBond { from, to, text, span });
        match slot {
            Some(slot) => self.text.atoms[from].bonds[slot] = index,
            None => self.text.atoms[from].bonds.push(index),
        }
        self.text.atoms[to].bonds.push(index);
        Ok(())
    }

    fn start_branch(&mut self, span: Range<usize>) -> Result<(), ReadError> {
        if let Some((_, at)) = &self.pending {
            return Err(ReadError::new(Kind::NothingAfterBond, at.clone()));
        }
        if self.previous.is_none() || self.is_branch_fresh {
            return Err(ReadError::new(Kind::NothingBefore, span));
        }
        self.branches.push((self.previous, span));
        self.is_branch_fresh = true;
        Ok(())
    }

    fn end_branch(&mut self, span: Range<usize>) -> Result<(), ReadError> {
        if let Some((_, at)) = &self.pending {
            return Err(ReadError::new(Kind::NothingAfterBond, at.clone()));
        }
        let Some((start, opened)) = self.branches.pop() else { return Err(ReadError::new(Kind::NoBranch, span)) };
        if self.is_branch_fresh {
            return Err(ReadError::new(Kind::EmptyBranch, opened.start..span.end));
        }
        self.previous = start;
        Ok(())
    }

    fn finish(self) -> Result<SmilesText, ReadError> {
        if let Some((_, at)) = self.pending {
            return Err(ReadError::new(Kind::NothingAfterBond, at));
        }
        if let Some((_, opened)) = self.branches.into_iter().next() {
            return Err(ReadError::new(Kind::OpenBranch, opened));
        }
        if let Some(ring) = self.rings.into_iter().next() {
            return Err(ReadError::new(Kind::OpenRing { number: ring.number }, ring.span));
        }
        Ok(self.text)
    }
}
