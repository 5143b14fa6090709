//! The tree of a SMILES text, every node with the byte range it was read from.
//!
//! Node and production of `grammar/smiles.abnf` have the same name. A tree is well formed as
//! text; whether it is a molecule is asked later.

use std::ops::Range;

use crate::molecule::{Element, Handedness};

/// A piece of text: what it says, and its bytes.
#[derive(Debug, Clone, PartialEq, Eq)]
pub struct Spanned<T> {
    /// What it says.
    pub value: T,
    /// Where it stands.
    pub span: Range<usize>,
}

/// A whole SMILES text.
#[derive(Debug, Clone, PartialEq, Eq)]
pub struct SmilesText {
    /// Its main chain.
    pub chain: Chain,
}

/// Atoms one after the other.
#[derive(Debug, Clone, PartialEq, Eq)]
pub struct Chain {
    /// At least one; the bond of each leads to the one before it.
    pub atoms: Vec<BranchedAtom>,
}

/// An atom with what hangs on it.
#[derive(Debug, Clone, PartialEq, Eq)]
pub struct BranchedAtom {
    /// Bond symbol before the atom, if one was written.
    pub bond: Option<Spanned<BondSymbol>>,
    /// The atom.
    pub atom: AtomText,
    /// Its ring numbers.
    pub ring_bonds: Vec<RingBond>,
    /// Its branches. The bond symbol of a branch is that of its first atom.
    pub branches: Vec<Chain>,
}

/// A ring number after an atom, with its bond symbol.
#[derive(Debug, Clone, PartialEq, Eq)]
pub struct RingBond {
    /// Bond symbol before the number, if one was written.
    pub bond: Option<Spanned<BondSymbol>>,
    /// The number, 0 to 99.
    pub number: Spanned<u8>,
}

/// A bond symbol.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum BondSymbol {
    /// `-`
    Single,
    /// `=`
    Double,
    /// `#`
    Triple,
    /// `:`
    Aromatic,
    /// `/`: the atom after it stands above the atom before it.
    Up,
    /// `\`: the atom after it stands below the atom before it.
    Down,
}

impl BondSymbol {
    /// The character.
    pub fn character(self) -> char {
        match self {
            BondSymbol::Single => '-',
            BondSymbol::Double => '=',
            BondSymbol::Triple => '#',
            BondSymbol::Aromatic => ':',
            BondSymbol::Up => '/',
            BondSymbol::Down => '\\',
        }
    }

    /// The symbol of the same bond read from its other end.
    #[must_use]
    pub fn reversed(self) -> BondSymbol {
        match self {
            BondSymbol::Up => BondSymbol::Down,
            BondSymbol::Down => BondSymbol::Up,
            other => other,
        }
    }
}

/// An atom as written.
#[derive(Debug, Clone, PartialEq, Eq)]
pub struct AtomText {
    /// Which atom.
    pub symbol: Symbol,
    /// Whether the symbol is in lower case.
    pub is_aromatic: bool,
    /// What the brackets say; none for an atom without brackets, whose hydrogens are implied.
    pub bracket: Option<Bracket>,
    /// Where it stands, brackets included.
    pub span: Range<usize>,
}

/// An element symbol, hydrogen among them.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum Symbol {
    /// A hydrogen written as an atom.
    Hydrogen,
    /// Any other atom.
    Element(Element),
}

/// The facts in an atom's brackets.
#[derive(Debug, Clone, PartialEq, Eq)]
pub struct Bracket {
    /// `@` or `@@`.
    pub chirality: Option<Spanned<Handedness>>,
    /// Number of hydrogens.
    pub n_hydrogens: u8,
    /// Charge in elementary charges.
    pub charge: i8,
}
