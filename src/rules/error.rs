//! What can be wrong with a rule file, and where.
//!
//! A kind carries facts; the sentence is made in its `Display`. An error adds the byte range
//! it is about, a label for what stands there, and what to do.

use super::syntax::{Reagent, Span};
use crate::molecule::Unit;

/// One mistake in a rule file.
#[derive(Debug, Clone, PartialEq, Eq, thiserror::Error)]
#[error("{kind}")]
pub struct RuleError {
    /// What is wrong.
    pub kind: RuleErrorKind,
    /// The bytes of the file that it is about.
    pub span: Span,
    /// What stands there, in a few words.
    pub label: String,
    /// What to do about it.
    pub hint: Option<String>,
}

/// The mistakes there are.
#[derive(Debug, Clone, PartialEq, Eq, thiserror::Error)]
pub enum RuleErrorKind {
    /// A line could not be read on from some place.
    #[error("expected {expected}, found {found}")]
    Unexpected {
        /// What would have been right.
        expected: String,
        /// What stands there.
        found: String,
    },
    /// A line begins with no word of the language.
    #[error("{found} begins no line of a rule")]
    UnknownLine {
        /// The word.
        found: String,
    },
    /// A line is right in itself but not where it stands.
    #[error("expected {expected}, found {found}")]
    Misplaced {
        /// What should come here.
        expected: &'static str,
        /// What came.
        found: &'static str,
    },
    /// A block has a heading and nothing else.
    #[error("nothing stands under {heading}")]
    EmptyBlock {
        /// The heading.
        heading: &'static str,
    },
    /// A setting, budget or option is given more than once.
    #[error("{what} is given twice")]
    GivenTwice {
        /// Which.
        what: &'static str,
    },
    /// Two rules have one name.
    #[error("two rules are called {name}")]
    NameTaken {
        /// The name.
        name: String,
    },
    /// A rule has the name of a group.
    #[error("{name} is the name of a rule and of a group")]
    NameIsGroup {
        /// The name.
        name: String,
    },
    /// A label stands for two things.
    #[error("{label} is named twice")]
    LabelTaken {
        /// The label.
        label: String,
    },
    /// A label stands for nothing.
    #[error("{label} is not named")]
    UnknownLabel {
        /// The label.
        label: String,
    },
    /// A label stands for something else than is needed.
    #[error("{label} is {is}, expected {wanted}")]
    WrongKind {
        /// The label.
        label: String,
        /// What it is.
        is: &'static str,
        /// What is needed.
        wanted: &'static str,
    },
    /// A prime in a rule with one copy.
    #[error("{label} stands in a second copy, but the rule takes one")]
    NoSecondCopy {
        /// The label, prime included.
        label: String,
    },
    /// The rule asks for no or too many copies.
    #[error("a rule takes 1 or 2 copies, found {copies}")]
    Copies {
        /// How many.
        copies: u32,
    },
    /// The first generation lies after the last.
    #[error("generations {from} to {to} are none")]
    Generations {
        /// First.
        from: u32,
        /// Last.
        to: u32,
    },
    /// More atoms than a pattern may have.
    #[error("{n} labels in one case, at most {most} are allowed")]
    TooManyLabels {
        /// How many.
        n: usize,
        /// The limit.
        most: usize,
    },
    /// A bond from an atom to itself.
    #[error("{label} cannot be bonded to itself")]
    SelfBond {
        /// The label.
        label: String,
    },
    /// A bond is named, or made, where there is one.
    #[error("{a}-{b} is bonded already")]
    BondTwice {
        /// One end.
        a: String,
        /// The other.
        b: String,
    },
    /// A bond is to be changed that `find` does not name.
    #[error("no bond {a}-{b} under find")]
    NoBond {
        /// One end.
        a: String,
        /// The other.
        b: String,
    },
    /// A bond would be raised above triple or lowered below single.
    #[error("the bond {a}-{b} may be {order}, which cannot be {verb}")]
    OrderRange {
        /// One end.
        a: String,
        /// The other.
        b: String,
        /// Its order before.
        order: &'static str,
        /// What is done to it.
        verb: &'static str,
    },
    /// An atom of the pattern hangs on nothing.
    #[error("{label} is not joined to the rest of what is found")]
    Apart {
        /// The label.
        label: String,
    },
    /// An atom is named, but nothing is asked of it nor done to it.
    #[error("{label} is named but never used")]
    Unused {
        /// The label.
        label: String,
    },
    /// A halogen is found and not released.
    #[error("{label} is found but never released")]
    NotReleased {
        /// The label.
        label: String,
    },
    /// A halogen is released more than once.
    #[error("{label} is released twice")]
    ReleasedTwice {
        /// The label.
        label: String,
    },
    /// A new atom, or the second copy, is joined to nothing.
    #[error("{what} is joined to nothing")]
    NotJoined {
        /// What.
        what: String,
    },
    /// A hydrogen is taken that may not be there.
    #[error("{taken} hydrogen{} taken from {label}, which has {sure} for sure", plural(*.taken))]
    MissingHydrogen {
        /// The label.
        label: String,
        /// How many are taken.
        taken: u32,
        /// How many `find` makes sure of.
        sure: u32,
    },
    /// An atom would end with the wrong number of bonds.
    #[error("{label} would have {found} bond{} {direction}", plural(*.found))]
    Valence {
        /// The label.
        label: String,
        /// How many bonds amiss, or in all.
        found: u32,
        /// Too many, too few, or in all where another number is wanted.
        direction: String,
    },
    /// An account of a case does not balance.
    #[error("{what} does not balance: expected {}, found {}", budget(*.reagent, *.needed), budget(*.reagent, *.found))]
    Unbalanced {
        /// Which account: an element, or charge.
        what: &'static str,
        /// What balances it.
        reagent: Reagent,
        /// How many the edits need; negative when they set some free.
        needed: i32,
        /// How many `uses` and `gives` say.
        found: i32,
    },
    /// An edit brings in an element that nothing supplies.
    #[error("nothing supplies {element}: water brings oxygen and hydrogen only")]
    NoSupply {
        /// The element's name.
        element: &'static str,
    },
    /// `retain configuration` where nothing can be retained.
    #[error("no atom loses one ligand and gains one, so no configuration can be retained")]
    NothingToRetain,
}

/// A rule file that could not be used: every mistake in it, in the order of the text.
#[derive(Debug, Clone, PartialEq, Eq, thiserror::Error)]
#[error("{}", self.summary())]
pub struct RuleFileError {
    /// Name of the file, as it was given.
    pub file: String,
    /// What stands in the file.
    pub text: String,
    /// The mistakes; at least one.
    pub errors: Vec<RuleError>,
}

/// A choice of rules that names one that is not there.
#[derive(Debug, Clone, PartialEq, Eq, thiserror::Error)]
pub enum SelectionError {
    /// No rule or group has this name.
    #[error("no rule or group is called {name}")]
    UnknownName {
        /// The name.
        name: String,
        /// The nearest known names, nearest first; empty if none is near.
        nearest: Vec<String>,
        /// All known names: rules, then groups.
        known: Vec<String>,
    },
}

/// A rule that could not be applied to a molecule.
#[derive(Debug, Clone, PartialEq, Eq, thiserror::Error)]
pub enum ApplyError {
    /// The molecule stands for several compounds.
    #[error("{} has no configuration, so this is not one compound; expand it to its isomers first", unit_name(*.unit))]
    NotSpecified {
        /// The first stereo-unit that is open.
        unit: Unit,
    },
    /// A step would have more configurations than are enumerated.
    #[error("one step leaves {n_units} stereo-units open, at most {most} are enumerated")]
    TooManyOutcomes {
        /// How many.
        n_units: usize,
        /// The limit.
        most: usize,
    },
}

fn unit_name(unit: Unit) -> String {
    match unit {
        Unit::Centre(atom) => format!("the centre at atom {}", atom + 1),
        Unit::DoubleBond(bond) => format!("the double bond that is bond {}", bond + 1),
    }
}

impl RuleFileError {
    fn summary(&self) -> String {
        let lines = self.errors.iter().map(|error| {
            let (line, column) = line_column(&self.text, error.span.start);
            format!("{}:{line}:{column}: {error}", self.file)
        });
        lines.collect::<Vec<_>>().join("\n")
    }
}

/// Line and column of a byte offset, both from 1; columns count characters.
pub fn line_column(text: &str, offset: usize) -> (usize, usize) {
    let offset = (0..=offset.min(text.len())).rev().find(|&o| text.is_char_boundary(o)).unwrap_or(0);
    let before = &text[..offset];
    let start = before.rfind('\n').map_or(0, |i| i + 1);
    (before.matches('\n').count() + 1, before[start..].chars().count() + 1)
}

/// Known names near a misspelt one, nearest first, at most three.
pub(super) fn nearest<'a>(found: &str, known: impl Iterator<Item = &'a str>) -> Vec<String> {
    let found = found.to_lowercase();
    let mut scored: Vec<(usize, &str)> = known.map(|k| (strsim::damerau_levenshtein(&found, k), k)).collect();
    scored.sort_unstable();
    scored.dedup();
    let is_near = |&&(distance, k): &&(usize, &str)| {
        distance <= 2.min(k.chars().count() / 2) || (found.len() > 3 && k.starts_with(&found))
    };
    scored.iter().filter(is_near).take(3).map(|&(_, k)| k.to_owned()).collect()
}

/// A `uses` or `gives` line, or the lack of one.
pub(super) fn budget(reagent: Reagent, n: i32) -> String {
    let word = reagent.word();
    let ending = if n.abs() == 1 || reagent == Reagent::Water { "" } else { "s" };
    match n {
        0 => format!("no {word}{ending}"),
        1.. => format!("`uses {n} {word}{ending}`"),
        _ => format!("`gives {} {word}{ending}`", -n),
    }
}

fn plural(n: u32) -> &'static str {
    if n == 1 { "" } else { "s" }
}
