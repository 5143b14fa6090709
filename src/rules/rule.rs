//! A checked rule: plain data with indices, ready to be applied or compiled.
//!
//! A rule has one or more *cases*; each case is a *pattern* (atoms, bonds and halogens to
//! find), conditions, and *edits* in the order they were written. Pattern atoms, bonds and
//! halogens are named by their index in the case's lists.
//!
//! Invariants, kept by [`check`](super::check) which alone makes rules:
//! * mass, charge and electrons balance in every case, and every atom ends with its valence;
//! * every halogen of a pattern is released exactly once in every copy, by one edit;
//! * the pattern's atoms hang together by its bonds, so a match never spans two molecules;
//! * edits of bond order stay within single to triple for every order the pattern allows;
//! * a carbene is begun only at a site and ended only at a carbene atom of the pattern.

use std::ops::RangeInclusive;

use crate::molecule::{BondOrder, Element, Halogen};

/// A rule that has been checked.
#[derive(Debug, Clone, PartialEq, Eq)]
pub struct Rule {
    /// Its name, lower case with hyphens, unique in a rule set.
    pub name: String,
    /// One sentence that says what it does.
    pub summary: String,
    /// The group it can be chosen by, such as `core`.
    pub group: Option<String>,
    /// Whether it is used when the user chooses nothing.
    pub on_by_default: bool,
    /// How many copies of the molecule take part: 1, or 2 for a coupling.
    pub copies: u8,
    /// The generations of compounds (parents are 0) that it applies to; none for all.
    pub generations: Option<RangeInclusive<u32>>,
    /// What it does, case by case; a molecule may match several.
    pub cases: Vec<Case>,
    /// The rule as it was written, comments within it included.
    pub text: String,
}

/// One way in which a rule acts.
#[derive(Debug, Clone, PartialEq, Eq)]
pub struct Case {
    /// What tells this case from the others, if the rule has several.
    pub name: Option<String>,
    /// Carbons to find, each a different atom of the molecule.
    pub atoms: Vec<PatternAtom>,
    /// Bonds to find between them.
    pub bonds: Vec<PatternBond>,
    /// Halogens to find on them, each a different atom, all of them released.
    pub halogens: Vec<PatternHalogen>,
    /// Conditions on the whole molecule (on each copy, if there are two).
    pub conditions: Vec<CountCondition>,
    /// Elements of the atoms that the edits bring in, by index.
    pub new_atoms: Vec<Element>,
    /// What is done, in the order written. Edits commute: only their sum matters.
    pub edits: Vec<Edit>,
    /// Electrons consumed; negative when given.
    pub electrons: i32,
    /// Protons consumed; negative when given.
    pub protons: i32,
    /// Water molecules consumed; negative when given.
    pub water: i32,
    /// What becomes of the configuration at touched atoms.
    pub configuration: Configuration,
    /// Whether the ring limits are asked of what the case makes.
    pub ring_limits: RingLimits,
}

/// A carbon to find.
#[derive(Debug, Clone, PartialEq, Eq)]
pub struct PatternAtom {
    /// Its label in the rule, such as `A`.
    pub label: String,
    /// What kind of carbon it is.
    pub kind: AtomKind,
    /// How many ligands of which kind it has.
    pub conditions: Vec<CountCondition>,
}

/// The kinds of carbon that a pattern can ask for.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Hash)]
pub enum AtomKind {
    /// A carbon site in the given state; see [`is_carbon_site`](crate::molecule::Molecule::is_carbon_site).
    Site(SiteState),
    /// An aromatic plain carbon.
    Aryl,
    /// A carbene carbon.
    Carbene,
}

/// States of a carbon site, told by its bonds to other atoms.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Hash)]
pub enum SiteState {
    /// Any of the others.
    Any,
    /// Single bonds only (sp3).
    Saturated,
    /// One double bond, no triple bond (sp2).
    Vinyl,
    /// Two double bonds (the middle of C=C=C).
    Cumulated,
    /// A triple bond.
    Acetylenic,
}

/// A bond to find between two pattern atoms.
#[derive(Debug, Clone, PartialEq, Eq)]
pub struct PatternBond {
    /// Index of one pattern atom.
    pub a: usize,
    /// Index of the other.
    pub b: usize,
    /// Orders it may have, ascending; never aromatic, never empty.
    pub orders: Vec<BondOrder>,
}

/// A halogen to find: bare, uncharged, on a pattern atom by a single bond.
#[derive(Debug, Clone, PartialEq, Eq)]
pub struct PatternHalogen {
    /// Its label in the rule, such as `X`.
    pub label: String,
    /// Index of the pattern atom that bears it.
    pub on: usize,
    /// Whether each of the four may match, by [`Halogen`] as index; never all false.
    pub allowed: [bool; 4],
}

/// A number of ligands or atoms of one kind.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Hash)]
pub struct CountCondition {
    /// What is counted.
    pub counted: Counted,
    /// How many there may be.
    pub amount: Amount,
}

/// What a condition counts: ligands of a pattern atom, or atoms of the molecule.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Hash)]
pub enum Counted {
    /// Hydrogens.
    Hydrogens,
    /// Halogens of any kind. At an atom: those that could leave. In the molecule: all.
    Halogens,
    /// Halogens of one kind, counted the same way.
    OneHalogen(Halogen),
    /// Carbons: neighbours at an atom, whatever their state; all of the molecule's else.
    Carbons,
}

/// How many of a thing there may be.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Hash)]
pub enum Amount {
    /// This many.
    Exactly(u32),
    /// This many or more.
    AtLeast(u32),
    /// This many or fewer.
    AtMost(u32),
}

/// The molecule, of the one or two that react, that a pattern index is meant in.
#[derive(Debug, Clone, Copy, PartialEq, Eq, PartialOrd, Ord, Hash)]
pub enum Partner {
    /// The molecule itself.
    First,
    /// The second molecule of a coupling (`A'`), matched on its own.
    Second,
}

/// An atom that an edit acts on.
#[derive(Debug, Clone, Copy, PartialEq, Eq, PartialOrd, Ord, Hash)]
pub enum AtomRef {
    /// A pattern atom.
    Found {
        /// Its index in [`Case::atoms`].
        atom: usize,
        /// In which of the two molecules.
        partner: Partner,
    },
    /// An atom brought in, by index in [`Case::new_atoms`].
    New(usize),
}

/// One edit.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Hash)]
pub enum Edit {
    /// A halogen is cut from its carbon and leaves as the halide ion.
    Release {
        /// Index in [`Case::halogens`].
        halogen: usize,
        /// In which of the two molecules.
        partner: Partner,
    },
    /// The atom gains a hydrogen.
    AddHydrogen(AtomRef),
    /// The atom loses a hydrogen.
    TakeHydrogen(AtomRef),
    /// A pattern bond's order goes up by one.
    Raise {
        /// Index in [`Case::bonds`].
        bond: usize,
        /// In which of the two molecules.
        partner: Partner,
    },
    /// A pattern bond's order goes down by one.
    Lower {
        /// Index in [`Case::bonds`].
        bond: usize,
        /// In which of the two molecules.
        partner: Partner,
    },
    /// The atom becomes a carbene.
    MakeCarbene(AtomRef),
    /// The atom is a carbene no more.
    CloseCarbene(AtomRef),
    /// A bond is made between two atoms that have none.
    Join(AtomRef, AtomRef, BondOrder),
    /// The atom's charge changes by this many elementary charges.
    Charge(AtomRef, i8),
}

/// What becomes of the configuration at the atoms that a case touches.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Hash, Default)]
pub enum Configuration {
    /// It is lost: every E/Z and R/S outcome arises, each with the same share.
    #[default]
    EveryOutcome,
    /// Where one ligand leaves an atom and one comes, the newcomer takes its place.
    Retained,
}

/// Whether ring limits are asked of what a case makes.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Hash, Default)]
pub enum RingLimits {
    /// No triple bond nor C=C=C in a ring under eight, and Bredt's rule.
    #[default]
    Kept,
    /// Any ring may hold any bond.
    Off,
}

impl AtomRef {
    /// The pattern atom of the first copy with this index.
    pub fn first(atom: usize) -> AtomRef {
        AtomRef::Found { atom, partner: Partner::First }
    }
}

impl Amount {
    /// Whether this many will do.
    pub fn holds(self, n: u32) -> bool {
        match self {
            Amount::Exactly(m) => n == m,
            Amount::AtLeast(m) => n >= m,
            Amount::AtMost(m) => n <= m,
        }
    }
}

impl Case {
    /// Whether the case only changes the decoration of a skeleton: releases halogens, adds or
    /// takes hydrogens, changes bond orders, begins or ends carbenes, all in one molecule.
    pub fn is_in_frame(&self) -> bool {
        let is_first = |atom: AtomRef| matches!(atom, AtomRef::Found { partner: Partner::First, .. });
        self.new_atoms.is_empty()
            && self.edits.iter().all(|&edit| match edit {
                Edit::Release { partner, .. } | Edit::Raise { partner, .. } | Edit::Lower { partner, .. } => {
                    partner == Partner::First
                }
                Edit::AddHydrogen(a) | Edit::TakeHydrogen(a) | Edit::MakeCarbene(a) | Edit::CloseCarbene(a) => {
                    is_first(a)
                }
                Edit::Join(..) | Edit::Charge(..) => false,
            })
    }

    /// Whether the pattern names a carbene; if not, the case leaves alone every molecule that
    /// holds one.
    pub fn names_carbene(&self) -> bool {
        self.atoms.iter().any(|atom| atom.kind == AtomKind::Carbene)
    }

    /// Change of order of a pattern bond in the first copy: the raises less the lowers.
    pub fn order_change(&self, bond: usize) -> i32 {
        let sum = |edit: &Edit| match *edit {
            Edit::Raise { bond: b, partner: Partner::First } if b == bond => 1,
            Edit::Lower { bond: b, partner: Partner::First } if b == bond => -1,
            _ => 0,
        };
        self.edits.iter().map(sum).sum()
    }

    /// Hydrogens that edits take from an atom: so many C–H bonds are cut there.
    pub fn hydrogens_taken(&self, atom: AtomRef) -> u32 {
        self.edits.iter().filter(|&&edit| edit == Edit::TakeHydrogen(atom)).count() as u32
    }

    /// Hydrogens that edits add to an atom.
    pub fn hydrogens_added(&self, atom: AtomRef) -> u32 {
        self.edits.iter().filter(|&&edit| edit == Edit::AddHydrogen(atom)).count() as u32
    }

    /// Whether an edit changes the bonds or hydrogens of a pattern atom of the first copy:
    /// its configuration, and that of double bonds that end at it, is then open.
    pub fn touches(&self, atom: usize) -> bool {
        let this = AtomRef::first(atom);
        self.edits.iter().any(|&edit| match edit {
            Edit::Release { halogen, partner } => partner == Partner::First && self.halogens[halogen].on == atom,
            Edit::Raise { bond, partner } | Edit::Lower { bond, partner } => {
                partner == Partner::First && [self.bonds[bond].a, self.bonds[bond].b].contains(&atom)
            }
            Edit::AddHydrogen(a) | Edit::TakeHydrogen(a) | Edit::MakeCarbene(a) | Edit::CloseCarbene(a) => a == this,
            Edit::Join(a, b, _) => a == this || b == this,
            Edit::Charge(..) => false,
        })
    }
}
