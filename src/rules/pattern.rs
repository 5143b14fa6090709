//! Checks what a case has to find: labels, bonds, halogens and conditions.

use std::collections::BTreeMap;

use super::check::error;
use super::error::{RuleError, RuleErrorKind};
use super::parse::listed;
use super::rule::{
    AtomKind, Case, Configuration, CountCondition, PatternAtom, PatternBond, PatternHalogen, RingLimits,
};
use super::syntax::{CaseText, CountText, FindItem, Label, Span, Spanned};
use crate::molecule::BondOrder;

/// Most labels in one case: keeps the search for matches short.
const MOST_LABELS: usize = 24;

/// What a label stands for, by index in the case's lists.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub(super) enum Named {
    /// A pattern atom.
    Atom(usize),
    /// A pattern halogen.
    Halogen(usize),
    /// An atom brought in.
    New(usize),
}

impl Named {
    /// What it is, in words.
    pub(super) fn kind(self) -> &'static str {
        match self {
            Named::Atom(_) => "a carbon",
            Named::Halogen(_) => "a halogen",
            Named::New(_) => "a new atom",
        }
    }
}

/// The labels of a case.
pub(super) struct Labels {
    known: BTreeMap<String, Named>,
    pub(super) copies: u8,
}

impl Labels {
    pub(super) fn new(copies: u8) -> Labels {
        Labels { known: BTreeMap::new(), copies }
    }

    /// Gives a label its meaning.
    pub(super) fn add(&mut self, label: &Label, named: Named, errors: &mut Vec<RuleError>) {
        if let Some(before) = self.known.get(&label.value) {
            let hint = format!("{} is {} already; take another letter", label.value, before.kind());
            let kind = RuleErrorKind::LabelTaken { label: label.value.clone() };
            errors.push(error(kind, &label.span, "the second time").hint(hint));
        } else {
            self.known.insert(label.value.clone(), named);
        }
    }

    /// What a label stands for; reported if nothing.
    pub(super) fn find(&self, label: &str, span: &Span, errors: &mut Vec<RuleError>) -> Option<Named> {
        let found = self.known.get(label).copied();
        if found.is_none() {
            let kind = RuleErrorKind::UnknownLabel { label: label.to_owned() };
            let hint = match self.known.len() {
                0 => "name it under `find`, such as `site A`".to_owned(),
                _ => format!("named here: {}", listed(self.known.keys().cloned(), "and")),
            };
            errors.push(error(kind, span, "this label").hint(hint));
        }
        found
    }

    /// The pattern atom that a label stands for; reported if it stands for none.
    fn atom(&self, label: &Label, errors: &mut Vec<RuleError>) -> Option<usize> {
        match self.find(&label.value, &label.span, errors)? {
            Named::Atom(atom) => Some(atom),
            other => {
                errors.push(wrong_kind(&label.value, other, "a carbon", &label.span));
                None
            }
        }
    }
}

/// The error that a label stands for something else.
pub(super) fn wrong_kind(label: &str, is: Named, wanted: &'static str, span: &Span) -> RuleError {
    error(RuleErrorKind::WrongKind { label: label.to_owned(), is: is.kind(), wanted }, span, "this label")
}

/// The pattern and the conditions of a case, its edits still missing.
pub(super) fn pattern(tree: &CaseText, labels: &mut Labels, errors: &mut Vec<RuleError>) -> Case {
    let mut case = Case {
        name: tree.name.as_ref().map(|name| name.value.clone()),
        atoms: Vec::new(),
        bonds: Vec::new(),
        halogens: Vec::new(),
        conditions: tree.conditions.iter().map(|line| condition(line.value)).collect(),
        new_atoms: Vec::new(),
        edits: Vec::new(),
        electrons: 0,
        protons: 0,
        water: 0,
        configuration: Configuration::EveryOutcome,
        ring_limits: RingLimits::Kept,
    };
    // Labels first, so that a bond may be written above its atoms.
    for item in &tree.find {
        label_of(&item.value, &mut case, labels, errors);
    }
    for item in &tree.find {
        relation(item, &mut case, labels, errors);
    }
    let n = case.atoms.len() + case.halogens.len();
    if n > MOST_LABELS {
        let kind = RuleErrorKind::TooManyLabels { n, most: MOST_LABELS };
        errors.push(error(kind, &tree.edit_heading, "this case").hint("split the rule into smaller ones"));
    }
    case
}

fn condition(text: CountText) -> CountCondition {
    CountCondition { counted: text.counted, amount: text.amount }
}

/// Adds the atom or halogen that a line names.
fn label_of(item: &FindItem, case: &mut Case, labels: &mut Labels, errors: &mut Vec<RuleError>) {
    let (label, kind) = match item {
        FindItem::Site(label, state) => (label, AtomKind::Site(*state)),
        FindItem::Aryl(label) => (label, AtomKind::Aryl),
        FindItem::Carbene(label) => (label, AtomKind::Carbene),
        FindItem::Halogen(allowed, label, _) => {
            labels.add(label, Named::Halogen(case.halogens.len()), errors);
            case.halogens.push(PatternHalogen { label: label.value.clone(), on: 0, allowed: *allowed });
            return;
        }
        FindItem::Bond(..) | FindItem::Ligands(..) => return,
    };
    labels.add(label, Named::Atom(case.atoms.len()), errors);
    case.atoms.push(PatternAtom { label: label.value.clone(), kind, conditions: Vec::new() });
}

/// Adds what a line says of atoms and halogens that are named.
fn relation(item: &Spanned<FindItem>, case: &mut Case, labels: &Labels, errors: &mut Vec<RuleError>) {
    match &item.value {
        FindItem::Halogen(_, label, on) => {
            let carrier = labels.atom(on, errors);
            let same = case.halogens.iter_mut().find(|h| h.label == label.value);
            if let (Some(carrier), Some(halogen)) = (carrier, same) {
                halogen.on = carrier;
            }
        }
        FindItem::Ligands(label, count) => {
            if let Some(atom) = labels.atom(label, errors) {
                case.atoms[atom].conditions.push(condition(*count));
            }
        }
        FindItem::Bond(a, b, orders) => {
            if let (Some(at_a), Some(at_b)) = (labels.atom(a, errors), labels.atom(b, errors)) {
                bond(item, (a, at_a), (b, at_b), orders, case, errors);
            }
        }
        FindItem::Site(..) | FindItem::Aryl(_) | FindItem::Carbene(_) => {}
    }
}

fn bond(
    item: &Spanned<FindItem>,
    (a, at_a): (&Label, usize),
    (b, at_b): (&Label, usize),
    orders: &[Spanned<BondOrder>],
    case: &mut Case,
    errors: &mut Vec<RuleError>,
) {
    if at_a == at_b {
        let kind = RuleErrorKind::SelfBond { label: a.value.clone() };
        errors.push(error(kind, &item.span, "both ends are one atom"));
        return;
    }
    if bond_between(case, at_a, at_b).is_some() {
        let kind = RuleErrorKind::BondTwice { a: a.value.clone(), b: b.value.clone() };
        errors.push(
            error(kind, &item.span, "the second time").hint("write one line, such as `bond A-B single or double`"),
        );
        return;
    }
    let mut plain: Vec<BondOrder> = orders.iter().map(|order| order.value).collect();
    plain.sort_unstable();
    plain.dedup();
    if plain.len() < orders.len() {
        let kind = RuleErrorKind::GivenTwice { what: "a bond order" };
        errors.push(error(kind, &item.span, "in this bond").hint("leave one of them out"));
    }
    case.bonds.push(PatternBond { a: at_a, b: at_b, orders: plain });
}

/// Index of the pattern bond between two pattern atoms.
pub(super) fn bond_between(case: &Case, a: usize, b: usize) -> Option<usize> {
    case.bonds.iter().position(|bond| (bond.a, bond.b) == (a, b) || (bond.a, bond.b) == (b, a))
}
