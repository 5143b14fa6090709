//! What can be wrong with a SMILES, and where.
//!
//! A kind carries facts; its sentence is made here, once. The span is in bytes of the text.

use std::ops::Range;

use crate::molecule::Element;

/// Longest text that is read, in bytes.
pub const LONGEST_TEXT: usize = 10_000;

/// Something is wrong at a place of the text.
#[derive(Debug, Clone, PartialEq, Eq, thiserror::Error)]
#[error("{kind}")]
pub struct ReadError {
    /// What is wrong.
    pub kind: Kind,
    /// Where, in bytes.
    pub span: Range<usize>,
}

/// What can be wrong.
#[derive(Debug, Clone, PartialEq, Eq, thiserror::Error)]
#[allow(missing_docs)]
pub enum Kind {
    #[error("the compound is empty")]
    Empty,
    #[error("the compound is {length} characters long, more than the {LONGEST_TEXT} that are read")]
    TooLong { length: usize },
    #[error("expected an atom, a bond or a branch, found {found}")]
    Unexpected { found: String },
    #[error("isotopes are not told apart")]
    Isotope,
    #[error("found a dot: a compound is one molecule")]
    SeveralComponents,
    #[error("found `*`: every atom must be known")]
    Wildcard,
    #[error("atom classes are not used here")]
    AtomClass,
    #[error("{symbol} is not among the elements that a compound may hold")]
    UnsupportedElement { symbol: String },
    #[error("the bracket is not closed")]
    OpenBracket,
    #[error("expected {expected} in the bracket, found {found}")]
    InBracket { expected: &'static str, found: String },
    #[error("a quadruple bond is none of those that carbon makes")]
    QuadrupleBond,
    #[error("the branch is not closed")]
    OpenBranch,
    #[error("`)` closes no branch")]
    NoBranch,
    #[error("the branch is empty")]
    EmptyBranch,
    #[error("a branch or bond stands before any atom")]
    NothingBefore,
    #[error("no atom follows the bond")]
    NothingAfterBond,
    #[error("ring {number} is not closed")]
    OpenRing { number: u32 },
    #[error("ring {number} is opened with one bond and closed with another")]
    RingBondsDiffer { number: u32 },
    #[error("ring {number} joins an atom to itself")]
    RingToItself { number: u32 },
    #[error("these two atoms are bonded twice")]
    BondedTwice,
    #[error("`%` is followed by two digits, found {found}")]
    RingNumber { found: String },
    #[error("{element} has {bonds} bonds", element = element.name())]
    Valence { element: Element, bonds: u32 },
    #[error("{element} has {bonds} bonds and an unpaired electron", element = element.name())]
    Radical { element: Element, bonds: u32 },
    #[error("the aromatic atoms cannot be given alternating bonds")]
    NotAromatic,
    #[error("{symbol} cannot be aromatic")]
    NeverAromatic { symbol: &'static str },
    #[error("the marks give one side of the double bond two directions")]
    ContradictoryMarks,
    #[error("`@` stands on an atom with {n_ligands} ligands, not four")]
    NotTetrahedral { n_ligands: usize },
    #[error("a hydrogen has {n} neighbours")]
    HydrogenBonds { n: usize },
}

impl ReadError {
    pub(super) fn new(kind: Kind, span: Range<usize>) -> ReadError {
        ReadError { kind, span }
    }

    /// A few words that stand under the marked characters.
    pub fn label(&self) -> &'static str {
        match self.kind {
            Kind::Empty => "nothing here",
            Kind::Valence { .. } | Kind::Radical { .. } | Kind::NotTetrahedral { .. } => "this atom",
            Kind::OpenBranch | Kind::OpenBracket | Kind::OpenRing { .. } => "opened here",
            Kind::NotAromatic => "in this ring",
            Kind::ContradictoryMarks => "this mark",
            _ => "here",
        }
    }

    /// What to do about it, where that can be said.
    pub fn hint(&self) -> Option<String> {
        let hint = match &self.kind {
            Kind::Empty => "give a SMILES such as ClC=C(Cl)Cl, a name, or a CAS number",
            Kind::TooLong { .. } => "give one molecule, not a file of them",
            Kind::Unexpected { .. } => "a bracket is needed for charges and for elements but B C N O P S F Cl Br I",
            Kind::Isotope => "leave the mass number out: Cl instead of 37Cl",
            Kind::SeveralComponents => "give the part of interest without counter-ions and solvents",
            Kind::Wildcard => "put the atom that is meant in its place",
            Kind::AtomClass => "leave out the colon and the number",
            Kind::UnsupportedElement { .. } => "the elements are C, N, O, S, P, Si, B and the halogens F, Cl, Br, I",
            Kind::OpenBracket => "close it with `]`",
            Kind::InBracket { .. } => "a bracket reads element, @ or @@, H and a number, charge: [C@@H], [N+], [O-]",
            Kind::QuadrupleBond => "use `=` or `#`",
            Kind::OpenBranch => "close it with `)`",
            Kind::NoBranch => "open the branch with `(` or leave this out",
            Kind::EmptyBranch => "leave the two parentheses out",
            Kind::NothingBefore => "begin with an atom",
            Kind::NothingAfterBond => "end with an atom",
            Kind::OpenRing { .. } => "write the same digit again at the atom that closes the ring",
            Kind::RingBondsDiffer { .. } => "write the bond at one end of the ring only",
            Kind::RingToItself { .. } => "a ring needs three atoms",
            Kind::BondedTwice => "write a double bond as `=`",
            Kind::RingNumber { .. } => "write ring numbers from 10 on as %10",
            Kind::Valence { element, .. } => return Some(valence_hint(*element)),
            Kind::Radical { .. } => "a radical is no stable compound; add the missing hydrogens as in [CH3]",
            Kind::NotAromatic => "was [nH] meant, or a ring in upper case with `=`?",
            Kind::NeverAromatic { .. } => "write it in upper case",
            Kind::ContradictoryMarks => "two ligands of one end must point to opposite sides; turn one mark round",
            Kind::NotTetrahedral { .. } => "leave the `@` out",
            Kind::HydrogenBonds { .. } => "write hydrogens in the bracket of their atom: [CH2]",
        };
        Some(hint.to_owned())
    }
}

fn valence_hint(element: Element) -> String {
    match element {
        Element::C => "a carbon site takes four bonds; was a bracket atom meant?".to_owned(),
        _ => format!("that is more than {} takes; was a charge meant, in a bracket?", element.name()),
    }
}
