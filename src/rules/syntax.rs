//! The tree of a rule file as it was written: words and labels, nothing looked up.
//!
//! Names follow `grammar/rules.abnf`. Invariant: every node that can be at fault keeps the
//! byte range it was read from.

use std::ops::Range;

use super::rule::{Amount, Counted, SiteState};
use crate::molecule::{BondOrder, Element};

/// Byte range of a text.
pub type Span = Range<usize>;

/// A thing with the byte range it was read from.
#[derive(Debug, Clone, PartialEq, Eq)]
pub struct Spanned<T> {
    /// The thing.
    pub value: T,
    /// Where it stands.
    pub span: Span,
}

/// A rule as written.
#[derive(Debug, Clone, PartialEq, Eq)]
pub struct RuleText {
    /// What follows `rule`.
    pub name: Spanned<String>,
    /// What follows `says`.
    pub says: Spanned<String>,
    /// Settings in the order written; a setting given twice is still here twice.
    pub settings: Vec<Spanned<Setting>>,
    /// Its cases; one without a name if the rule has no `case`.
    pub cases: Vec<CaseText>,
    /// The whole rule, from `rule` to the end of its last line.
    pub span: Span,
}

/// A line between `says` and the first case.
#[derive(Debug, Clone, PartialEq, Eq)]
pub enum Setting {
    /// `group NAME`
    Group(String),
    /// `default on` or `default off`
    Default(Switch),
    /// `copies N`
    Copies(u32),
    /// `generations N to M`
    Generations(u32, u32),
}

/// On or off.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
#[allow(missing_docs)]
pub enum Switch {
    On,
    Off,
}

/// One case as written.
#[derive(Debug, Clone, PartialEq, Eq)]
pub struct CaseText {
    /// What follows `case`, if the rule has cases.
    pub name: Option<Spanned<String>>,
    /// Lines under `find`.
    pub find: Vec<Spanned<FindItem>>,
    /// Lines under `where`.
    pub conditions: Vec<Spanned<CountText>>,
    /// Where the word `edit` stands: faults of the whole case are shown here.
    pub edit_heading: Span,
    /// Lines under `edit`.
    pub edits: Vec<Spanned<EditItem>>,
    /// `uses` and `gives` lines.
    pub budgets: Vec<Spanned<Budget>>,
    /// `retain` and `ring limits` lines.
    pub options: Vec<Spanned<CaseOption>>,
}

/// A line under `find`.
#[derive(Debug, Clone, PartialEq, Eq)]
pub enum FindItem {
    /// `site A`, with a state or without
    Site(Label, SiteState),
    /// `aryl A`
    Aryl(Label),
    /// `carbene A`
    Carbene(Label),
    /// `bond A-B single or double`
    Bond(Label, Label, Vec<Spanned<BondOrder>>),
    /// `halogen X on A`; the kinds allowed by [`Halogen`](crate::molecule::Halogen) as index
    Halogen([bool; 4], Label, Label),
    /// `A has 2 hydrogens`
    Ligands(Label, CountText),
}

/// A label such as `A` or `X1`.
pub type Label = Spanned<String>;

/// `no hydrogens`, `at least 1 halogen` and so on.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub struct CountText {
    /// How many.
    pub amount: Amount,
    /// Of what.
    pub counted: Counted,
}

/// A label with or without the prime of the second copy.
#[derive(Debug, Clone, PartialEq, Eq)]
pub struct Place {
    /// The label, prime left out.
    pub label: String,
    /// Whether it stands in the second copy of the molecule.
    pub is_primed: bool,
    /// Where it stands, prime included.
    pub span: Span,
}

/// A line under `edit`.
#[derive(Debug, Clone, PartialEq, Eq)]
pub enum EditItem {
    /// `release X`
    Release(Place),
    /// `add hydrogen to A`
    Add(Place),
    /// `take hydrogen from A`
    Take(Place),
    /// `raise A-B`
    Raise(Place, Place),
    /// `lower A-B`
    Lower(Place, Place),
    /// `make carbene A`
    Make(Place),
    /// `close carbene A`
    Close(Place),
    /// `new oxygen O`
    New(Element, Label),
    /// `join A-O single`
    Join(Place, Place, BondOrder),
    /// `charge A -1`
    Charge(Place, i8),
}

/// What a case takes from the water around, or gives to it (then negative).
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub struct Budget {
    /// Which of the three.
    pub reagent: Reagent,
    /// How many are consumed.
    pub consumed: i32,
}

/// What stands on the other side of a half-reaction.
#[derive(Debug, Clone, Copy, PartialEq, Eq, PartialOrd, Ord)]
#[allow(missing_docs)]
pub enum Reagent {
    Electron,
    Proton,
    Water,
}

/// A choice about a case.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum CaseOption {
    /// `retain configuration`
    RetainConfiguration,
    /// `ring limits off`
    RingLimitsOff,
}

impl Reagent {
    /// The word for one.
    pub fn word(self) -> &'static str {
        match self {
            Reagent::Electron => "electron",
            Reagent::Proton => "proton",
            Reagent::Water => "water",
        }
    }
}

impl Place {
    /// The label as it was written, prime included.
    pub fn written(&self) -> String {
        format!("{}{}", self.label, if self.is_primed { "'" } else { "" })
    }
}
