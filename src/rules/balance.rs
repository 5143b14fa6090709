//! Checks that a case keeps the books: valence of every atom, hydrogens that are surely there,
//! mass, charge and electrons.
//!
//! A half-reaction reads: molecule + protons + waters + electrons -> product + halide ions.
//! Hydrogens added less hydrogens taken must be those of the protons and waters; new oxygens
//! must be those of the waters, and no other element is supplied by anything. Charge then
//! asks: electrons = protons + halides released - charge the product gains.

use super::check::error;
use super::edits::find_span;
use super::error::{RuleError, RuleErrorKind, budget};
use super::rule::{Amount, AtomRef, Case, Counted, Edit, Partner};
use super::syntax::{CaseText, EditItem, FindItem, Reagent, Span};
use crate::molecule::{BondOrder, Element};

/// Reports every account of a case that does not balance.
pub(super) fn balance(tree: &CaseText, case: &Case, errors: &mut Vec<RuleError>) {
    orders_stay_in_range(tree, case, errors);
    for partner in [Partner::First, Partner::Second] {
        for atom in 0..case.atoms.len() {
            let place = AtomRef::Found { atom, partner };
            hydrogens_are_there(tree, case, place, errors);
            found_atom_keeps_valence(tree, case, place, errors);
        }
    }
    for new in 0..case.new_atoms.len() {
        new_atom_has_valence(tree, case, new, errors);
    }
    accounts(tree, case, errors);
}

fn orders_stay_in_range(tree: &CaseText, case: &Case, errors: &mut Vec<RuleError>) {
    for (index, bond) in case.bonds.iter().enumerate() {
        for partner in [Partner::First, Partner::Second] {
            let change = order_change(case, index, partner);
            let beyond = bond.orders.iter().find(|&&order| !(1..=3).contains(&(number_of(order) + change)));
            let Some(&order) = beyond else { continue };
            let kind = RuleErrorKind::OrderRange {
                a: case.atoms[bond.a].label.clone(),
                b: case.atoms[bond.b].label.clone(),
                order: ["single", "double", "triple"][order as usize % 3],
                verb: match change {
                    1 => "raised",
                    -1 => "lowered",
                    2.. => "raised so far",
                    _ => "lowered so far",
                },
            };
            let hint = "under `find`, give this bond only orders that the edit can change";
            let span = bond_span(tree, &case.atoms[bond.a].label, &case.atoms[bond.b].label);
            errors.push(error(kind, &span, "this bond").hint(hint));
            break;
        }
    }
}

/// Where a bond is named under `find`.
fn bond_span(tree: &CaseText, a: &str, b: &str) -> Span {
    let is_it = |item: &FindItem| matches!(item, FindItem::Bond(x, y, _) if x.value == a && y.value == b);
    tree.find.iter().find(|item| is_it(&item.value)).map_or_else(|| tree.edit_heading.clone(), |item| item.span.clone())
}

fn order_change(case: &Case, index: usize, of: Partner) -> i32 {
    let sum = |edit: &Edit| match *edit {
        Edit::Raise { bond, partner } if bond == index && partner == of => 1,
        Edit::Lower { bond, partner } if bond == index && partner == of => -1,
        _ => 0,
    };
    case.edits.iter().map(sum).sum()
}

fn number_of(order: BondOrder) -> i32 {
    match order {
        BondOrder::Single | BondOrder::Aromatic => 1,
        BondOrder::Double => 2,
        BondOrder::Triple => 3,
    }
}

/// Checks that `find` makes sure of every hydrogen that is taken.
fn hydrogens_are_there(tree: &CaseText, case: &Case, place: AtomRef, errors: &mut Vec<RuleError>) {
    let AtomRef::Found { atom, .. } = place else { return };
    let taken = case.hydrogens_taken(place);
    let least = |amount: Amount| match amount {
        Amount::Exactly(n) | Amount::AtLeast(n) => n,
        Amount::AtMost(_) => 0,
    };
    let pattern_atom = &case.atoms[atom];
    let hydrogens = pattern_atom.conditions.iter().filter(|c| c.counted == Counted::Hydrogens);
    let sure = hydrogens.map(|c| least(c.amount)).max().unwrap_or(0);
    if taken > sure {
        let noun = if taken == 1 { "hydrogen" } else { "hydrogens" };
        let hint = format!("add `{} has at least {taken} {noun}` under `find`", pattern_atom.label);
        let kind = RuleErrorKind::MissingHydrogen { label: pattern_atom.label.clone(), taken, sure };
        errors.push(error(kind, &find_span(tree, &pattern_atom.label), "named here").hint(hint));
    }
}

/// Bonds that an atom gains by the edits, less those that it loses.
fn bonds_gained(case: &Case, place: AtomRef) -> i32 {
    let at = |is_here: bool, n: i32| if is_here { n } else { 0 };
    let sum = |edit: &Edit| match *edit {
        Edit::Release { halogen, partner } => {
            at(place == AtomRef::Found { atom: case.halogens[halogen].on, partner }, -1)
        }
        Edit::AddHydrogen(a) => at(a == place, 1),
        Edit::TakeHydrogen(a) => at(a == place, -1),
        Edit::Raise { bond, partner } => at(is_end(case, bond, partner, place), 1),
        Edit::Lower { bond, partner } => at(is_end(case, bond, partner, place), -1),
        Edit::Join(a, b, order) => at(a == place || b == place, number_of(order)),
        Edit::MakeCarbene(_) | Edit::CloseCarbene(_) | Edit::Charge(..) => 0,
    };
    case.edits.iter().map(sum).sum()
}

fn is_end(case: &Case, bond: usize, of: Partner, place: AtomRef) -> bool {
    let bond = &case.bonds[bond];
    [bond.a, bond.b].into_iter().any(|atom| place == AtomRef::Found { atom, partner: of })
}

fn charge_gained(case: &Case, place: AtomRef) -> i32 {
    let sum = |edit: &Edit| match *edit {
        Edit::Charge(a, by) if a == place => i32::from(by),
        _ => 0,
    };
    case.edits.iter().map(sum).sum()
}

fn found_atom_keeps_valence(tree: &CaseText, case: &Case, place: AtomRef, errors: &mut Vec<RuleError>) {
    let AtomRef::Found { atom, partner } = place else { return };
    let carbene = |edit: &Edit| match *edit {
        Edit::MakeCarbene(a) if a == place => -2,
        Edit::CloseCarbene(a) if a == place => 2,
        _ => 0,
    };
    // A charged carbon has one bond fewer, whatever the sign.
    let wanted = case.edits.iter().map(carbene).sum::<i32>() - charge_gained(case, place).abs();
    let amiss = bonds_gained(case, place) - wanted;
    if amiss == 0 {
        return;
    }
    let prime = if partner == Partner::Second { "'" } else { "" };
    let label = format!("{}{prime}", case.atoms[atom].label);
    let direction = if amiss > 0 { "too many" } else { "too few" };
    let hint = match amiss {
        -1 => format!("has `add hydrogen to {label}` been left out?"),
        -2 => format!("has `make carbene {label}` been left out, or a `raise`?"),
        2 => format!("has `close carbene {label}` been left out?"),
        _ => "count what each edit cuts from it and joins to it".to_owned(),
    };
    let kind = RuleErrorKind::Valence { label, found: amiss.unsigned_abs(), direction: direction.to_owned() };
    errors.push(error(kind, &find_span(tree, &case.atoms[atom].label), "this atom").hint(hint));
}

fn new_atom_has_valence(tree: &CaseText, case: &Case, new: usize, errors: &mut Vec<RuleError>) {
    let place = AtomRef::New(new);
    let (found, charge) = (bonds_gained(case, place), charge_gained(case, place));
    let wanted = match case.new_atoms[new] {
        Element::B => 3 - charge,
        Element::C | Element::Si => 4 - charge.abs(),
        Element::N | Element::P => 3 + charge,
        Element::O | Element::S => 2 + charge,
        Element::F | Element::Cl | Element::Br | Element::I => 1 + charge,
    };
    if found != wanted {
        let (label, span) = new_label(tree, new);
        let direction = format!("where {} takes {wanted}", case.new_atoms[new].name());
        let kind = RuleErrorKind::Valence { label, found: found.unsigned_abs(), direction };
        errors.push(error(kind, &span, "brought in here").hint("add hydrogens to it, join it, or give it a charge"));
    }
}

fn new_label(tree: &CaseText, new: usize) -> (String, Span) {
    let labels =
        tree.edits.iter().filter_map(|e| if let EditItem::New(_, label) = &e.value { Some(label) } else { None });
    labels.skip(new).map(|l| (l.value.clone(), l.span.clone())).next().unwrap_or((String::new(), 0..0))
}

/// Oxygen by water, then hydrogen by protons, then charge by electrons: each account is asked
/// with the ones before put right, so that the hints together balance the case.
fn accounts(tree: &CaseText, case: &Case, errors: &mut Vec<RuleError>) {
    for (new, element) in case.new_atoms.iter().enumerate().filter(|(_, e)| **e != Element::O) {
        let kind = RuleErrorKind::NoSupply { element: element.name() };
        errors.push(error(kind, &new_label(tree, new).1, "brought in here").hint("only `new oxygen` can balance"));
    }
    let waters = case.new_atoms.iter().filter(|&&e| e == Element::O).map(|_| 1).sum::<i32>();
    let hydrogens = |edit: &Edit| match edit {
        Edit::AddHydrogen(_) => 1,
        Edit::TakeHydrogen(_) => -1,
        _ => 0,
    };
    let protons = case.edits.iter().map(hydrogens).sum::<i32>() - 2 * waters;
    let charge = |edit: &Edit| match *edit {
        Edit::Release { .. } => 1,
        Edit::Charge(_, by) => -i32::from(by),
        _ => 0,
    };
    let electrons = protons + case.edits.iter().map(charge).sum::<i32>();
    account(tree, "oxygen", Reagent::Water, waters, case.water, errors);
    account(tree, "hydrogen", Reagent::Proton, protons, case.protons, errors);
    account(tree, "charge", Reagent::Electron, electrons, case.electrons, errors);
}

fn account(
    tree: &CaseText,
    what: &'static str,
    reagent: Reagent,
    needed: i32,
    found: i32,
    errors: &mut Vec<RuleError>,
) {
    if needed == found {
        return;
    }
    let line = tree.budgets.iter().find(|line| line.value.reagent == reagent);
    let (span, label) = line.map_or((&tree.edit_heading, "these edits"), |line| (&line.span, "this line"));
    let hint = match (needed, line) {
        (0, _) => "leave the line out".to_owned(),
        (n, None) => format!("add {} below the edits", budget(reagent, n)),
        (n, Some(_)) => format!("write {}", budget(reagent, n)),
    };
    errors.push(error(RuleErrorKind::Unbalanced { what, reagent, needed, found }, span, label).hint(hint));
}
