//! What can be wrong with a SMILES text.
//!
//! A [`ReadErrorKind`] carries facts; its sentence is made in `Display` alone. A [`ReadError`]
//! adds the bytes it is about, a few words to stand under them, and what to do about it.

use std::ops::Range;

use crate::molecule::Element;

use super::parse::{DEEPEST_BRANCH, LONGEST_TEXT};

/// A reason why a text is no compound, and where.
#[derive(Debug, Clone, PartialEq, Eq, thiserror::Error)]
#[error("{kind}")]
pub struct ReadError {
    /// What is wrong.
    pub kind: ReadErrorKind,
    /// Bytes of the text that it is about; empty only where the text is.
    pub span: Range<usize>,
}

/// What is wrong with a text.
#[derive(Debug, Clone, PartialEq, Eq, thiserror::Error)]
#[allow(missing_docs)]
pub enum ReadErrorKind {
    #[error("expected a compound, found no text")]
    EmptyText,
    #[error("text of {length} bytes; the most is {LONGEST_TEXT}")]
    TooLong { length: usize },
    #[error("branches nested more than {DEEPEST_BRANCH} deep")]
    TooDeep,
    #[error("expected an atom, found {}", quoted(*found))]
    ExpectedAtom { found: char },
    #[error("{} does not belong here", quoted(*found))]
    UnexpectedCharacter { found: char },
    #[error("bond leads to no atom")]
    DanglingBond,
    #[error("bracket is not closed")]
    OpenBracket,
    #[error("branch is not closed")]
    OpenBranch,
    #[error("branch is closed but was not opened")]
    UnopenedBranch,
    #[error("branch is empty")]
    EmptyBranch,
    #[error("ring number does not follow its atom")]
    MisplacedRingNumber,
    #[error("`%` is not followed by two digits")]
    ShortRingNumber,
    #[error("isotopes are not told apart")]
    Isotope,
    #[error("found `.`: a compound is one molecule")]
    SeveralComponents,
    #[error("found `*`: every atom must be known")]
    Wildcard,
    #[error("atom classes are not used here")]
    AtomClass,
    #[error("found `$`: a compound has no quadruple bonds")]
    QuadrupleBond,
    #[error("configuration other than tetrahedral: `{written}`")]
    OtherConfiguration { written: String },
    #[error("`{symbol}` is outside the elements that a compound may hold")]
    UnsupportedElement { symbol: String },
    #[error("unknown element `{symbol}`")]
    UnknownElement { symbol: String },
    #[error("`{symbol}` without brackets")]
    NeedsBrackets { symbol: String },
    #[error("ring {number} is not closed")]
    OpenRing { number: u8 },
    #[error("ring {number} bonds an atom to itself")]
    RingToItself { number: u8 },
    #[error("ring {number} bonds two atoms that are bonded already")]
    BondedTwice { number: u8 },
    #[error("ring {number} is opened with `{opened}` and closed with `{closed}`")]
    RingBondsDisagree { number: u8, opened: char, closed: char },
    #[error("{} has {bonds} {}", element.name(), if *bonds == 1 { "bond" } else { "bonds" })]
    TooManyBonds { element: Element, bonds: u32, charge: i8 },
    #[error("{} has {}, which leaves it a radical", element.name(), few(*bonds))]
    TooFewBonds { element: Element, bonds: u32, charge: i8 },
    #[error("{} cannot carry a charge of {charge:+}", element.name())]
    Charge { element: Element, charge: i8 },
    #[error("hydrogen is not bonded to one atom by a single bond")]
    Hydrogen,
    #[error("aromatic bond to an atom that is not aromatic")]
    AromaticBond,
    #[error("aromatic {} is in no aromatic ring", element.name())]
    AromaticOutsideRing { element: Element },
    #[error("aromatic ring has no alternating double bonds")]
    NotAlternating { has_bare_nitrogen: bool },
    #[error("marks put two ligands of one double-bonded atom on one side")]
    ContradictoryMarks,
    #[error("`@` at {} with {n_ligands} {}, not four", element.name(), if *n_ligands == 1 { "ligand" } else { "ligands" })]
    NotFourLigands { element: Element, n_ligands: usize },
}

fn quoted(character: char) -> String {
    match character {
        ' ' => "a space".to_owned(),
        '\t' => "a tab".to_owned(),
        '\n' | '\r' => "a line break".to_owned(),
        c if c.is_control() => format!("U+{:04X}", u32::from(c)),
        c => format!("`{c}`"),
    }
}

fn few(bonds: u32) -> String {
    match bonds {
        0 => "no bonds".to_owned(),
        1 => "1 bond".to_owned(),
        n => format!("{n} bonds"),
    }
}

impl ReadError {
    /// A few words to stand under the text that the error is about.
    pub fn label(&self) -> &'static str {
        use ReadErrorKind as Kind;
        match self.kind {
            Kind::EmptyText | Kind::ExpectedAtom { .. } => "an atom is expected here",
            Kind::TooLong { .. } => "from here on",
            Kind::TooDeep | Kind::OpenBranch | Kind::EmptyBranch => "this branch",
            Kind::UnexpectedCharacter { .. } => "this character",
            Kind::DanglingBond | Kind::QuadrupleBond | Kind::AromaticBond => "this bond",
            Kind::OpenBracket => "opened here",
            Kind::MisplacedRingNumber | Kind::ShortRingNumber | Kind::OpenRing { .. } => "this ring number",
            Kind::Isotope => "this mass number",
            Kind::SeveralComponents => "the second component begins here",
            Kind::Wildcard | Kind::Hydrogen => "this atom",
            Kind::AtomClass => "this class",
            Kind::OtherConfiguration { .. } | Kind::NotFourLigands { .. } => "this mark",
            Kind::UnsupportedElement { .. } | Kind::UnknownElement { .. } | Kind::NeedsBrackets { .. } => {
                "this element"
            }
            Kind::UnopenedBranch
            | Kind::RingToItself { .. }
            | Kind::BondedTwice { .. }
            | Kind::RingBondsDisagree { .. } => "closed here",
            Kind::TooManyBonds { element, .. } | Kind::TooFewBonds { element, .. } | Kind::Charge { element, .. } => {
                this(element)
            }
            Kind::AromaticOutsideRing { element } => this(element),
            Kind::NotAlternating { .. } => "no double bond is left for this atom",
            Kind::ContradictoryMarks => "this mark is against the other",
        }
    }

    /// What to do about it, where something can be said.
    pub fn hint(&self) -> Option<String> {
        use ReadErrorKind as Kind;
        let hint = match &self.kind {
            Kind::EmptyText => "write a compound as SMILES, such as ClC=C(Cl)Cl",
            Kind::TooLong { .. } => "a compound is one molecule; was a file pasted?",
            Kind::TooDeep => "write the longest branch as the main chain",
            Kind::ExpectedAtom { found } | Kind::UnexpectedCharacter { found } => return stray_hint(*found),
            Kind::DanglingBond => "write the atom that the bond leads to, or take the bond away",
            Kind::OpenBracket => "close it with `]`",
            Kind::OpenBranch => "close it with `)`",
            Kind::UnopenedBranch => "take the `)` away, or open the branch with `(`",
            Kind::EmptyBranch => "a branch holds at least one atom",
            Kind::MisplacedRingNumber => "ring numbers stand directly after their atom, before its branches",
            Kind::ShortRingNumber => "write %10 to %99; numbers below ten need no `%`",
            Kind::Isotope => "leave the mass number out: C instead of 13C",
            Kind::SeveralComponents => "give one compound at a time, without counter-ions",
            Kind::Wildcard => "write the atom that is meant",
            Kind::AtomClass => "leave the `:` and its number out",
            Kind::QuadrupleBond => "the highest bond order is three, `#`",
            Kind::OtherConfiguration { .. } => "tetrahedral configuration is written @ or @@",
            Kind::UnsupportedElement { .. } | Kind::UnknownElement { .. } => {
                "a compound may hold H, B, C, N, O, F, Si, P, S, Cl, Br and I"
            }
            Kind::NeedsBrackets { symbol } => return Some(brackets_hint(symbol)),
            Kind::OpenRing { number } => {
                return Some(format!("write {} again at the atom that closes the ring", ring(*number)));
            }
            Kind::RingToItself { .. } => "a ring has three atoms or more",
            Kind::BondedTwice { .. } => "write a double bond as `=`",
            Kind::RingBondsDisagree { opened, .. } => return Some(disagree_hint(*opened)),
            Kind::TooManyBonds { element, charge, .. } => return Some(too_many_hint(*element, *charge)),
            Kind::TooFewBonds { .. } => "hydrogens of an atom in brackets are written out, as in [CH3]",
            Kind::Charge { .. } => "take the charge away, or put it on another atom",
            Kind::Hydrogen => "hydrogens are implied, or written in brackets with their atom, as in [CH2]",
            Kind::AromaticBond => "aromatic atoms are written in lower case",
            Kind::AromaticOutsideRing { .. } => "lower case is for atoms of aromatic rings; write a capital",
            Kind::NotAlternating { has_bare_nitrogen: true } => "a ring nitrogen that bears hydrogen is written [nH]",
            Kind::NotAlternating { .. } => "check the hydrogens and charges of the ring, or write its double bonds out",
            Kind::ContradictoryMarks => "turn one of the two marks around, or leave it out",
            Kind::NotFourLigands { .. } => "leave the mark out; configuration is kept at atoms with four ligands",
        };
        Some(hint.to_owned())
    }
}

fn this(element: Element) -> &'static str {
    match element {
        Element::B => "this boron",
        Element::C => "this carbon",
        Element::N => "this nitrogen",
        Element::O => "this oxygen",
        Element::F => "this fluorine",
        Element::Si => "this silicon",
        Element::P => "this phosphorus",
        Element::S => "this sulfur",
        Element::Cl => "this chlorine",
        Element::Br => "this bromine",
        Element::I => "this iodine",
    }
}

fn stray_hint(found: char) -> Option<String> {
    let hint = match found {
        c if c.is_whitespace() => "a SMILES is one word",
        'L' | 'l' => "chlorine is written Cl",
        'R' | 'r' => "bromine is written Br",
        '=' | '#' | '-' | ':' | '/' | '\\' => "a bond symbol stands once, between two atoms",
        '(' => "a branch follows the atom that it hangs on",
        '+' => "a charge is written in brackets, as in [NH4+]",
        '@' => "configuration is written in brackets, as in [C@H]",
        c if c.is_ascii_digit() => "a ring number follows its atom",
        _ => return None,
    };
    Some(hint.to_owned())
}

fn brackets_hint(symbol: &str) -> String {
    match symbol {
        "H" => "hydrogens are implied; one that must be written is [H]".to_owned(),
        _ => format!("write it as [{symbol}], with its hydrogens, as in [{symbol}H4]"),
    }
}

fn ring(number: u8) -> String {
    if number < 10 { number.to_string() } else { format!("%{number}") }
}

fn disagree_hint(opened: char) -> String {
    match opened {
        '/' | '\\' => "seen from its two ends a mark is turned around: leave one of them out".to_owned(),
        _ => "write the bond symbol at one of the two numbers only".to_owned(),
    }
}

fn too_many_hint(element: Element, charge: i8) -> String {
    let takes = match (element, charge) {
        (_, 1.. | ..=-1) => return "check the charge and the hydrogens written in the brackets".to_owned(),
        (Element::C, _) => "a carbon site takes four bonds",
        (Element::Si, _) => "silicon takes four bonds",
        (Element::B, _) => "boron takes three bonds",
        (Element::N, _) => "nitrogen takes three bonds, or four as [N+]",
        (Element::O, _) => "oxygen takes two bonds, or three as [O+]",
        (Element::P, _) => "phosphorus takes three or five bonds",
        (Element::S, _) => "sulfur takes two, four or six bonds",
        (Element::F | Element::Cl | Element::Br | Element::I, _) => {
            return "a halogen takes one bond; does it belong in a branch, as in C(Cl)C?".to_owned();
        }
    };
    format!("{takes}; was a bracket atom meant?")
}
