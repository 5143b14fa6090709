//! Checks what a case does: that edits act on what is there, and that all that is named is used.

use super::check::error;
use super::error::{RuleError, RuleErrorKind};
use super::pattern::{Labels, Named, bond_between, wrong_kind};
use super::rule::{AtomKind, AtomRef, Case, Configuration, Edit, Partner};
use super::syntax::{CaseText, EditItem, FindItem, Place, Span};

/// Adds the edits of a case to it.
pub(super) fn edits(tree: &CaseText, labels: &mut Labels, case: &mut Case, errors: &mut Vec<RuleError>) {
    for item in &tree.edits {
        if let EditItem::New(element, label) = &item.value {
            labels.add(label, Named::New(case.new_atoms.len()), errors);
            case.new_atoms.push(*element);
        }
    }
    for item in &tree.edits {
        let mut resolver = Resolver { labels, case, errors, span: &item.span };
        if let Some(edit) = resolver.edit(&item.value) {
            case.edits.push(edit);
        }
    }
}

/// Finds what one edit acts on.
struct Resolver<'a> {
    labels: &'a Labels,
    case: &'a Case,
    errors: &'a mut Vec<RuleError>,
    span: &'a Span,
}

impl Resolver<'_> {
    fn edit(&mut self, item: &EditItem) -> Option<Edit> {
        match item {
            EditItem::Release(x) => self.release(x),
            EditItem::Add(a) => Some(Edit::AddHydrogen(self.atom(a)?)),
            EditItem::Take(a) => Some(Edit::TakeHydrogen(self.atom(a)?)),
            EditItem::Raise(a, b) => self.bond(a, b).map(|(bond, partner)| Edit::Raise { bond, partner }),
            EditItem::Lower(a, b) => self.bond(a, b).map(|(bond, partner)| Edit::Lower { bond, partner }),
            EditItem::Make(a) => self.carbene(a, false).map(Edit::MakeCarbene),
            EditItem::Close(a) => self.carbene(a, true).map(Edit::CloseCarbene),
            EditItem::New(..) => None,
            EditItem::Join(a, b, order) => self.join(a, b).map(|(a, b)| Edit::Join(a, b, *order)),
            EditItem::Charge(a, by) => Some(Edit::Charge(self.atom(a)?, *by)),
        }
    }

    /// What a place stands for, and in which molecule.
    fn named(&mut self, place: &Place) -> Option<(Named, Partner)> {
        let named = self.labels.find(&place.label, &place.span, self.errors)?;
        if !place.is_primed {
            return Some((named, Partner::First));
        }
        if self.labels.copies < 2 {
            let kind = RuleErrorKind::NoSecondCopy { label: place.written() };
            self.errors.push(error(kind, &place.span, "this label").hint("write `copies 2` above the first `find`"));
            return None;
        }
        if matches!(named, Named::New(_)) {
            self.errors.push(wrong_kind(&place.written(), named, "something found", &place.span));
            return None;
        }
        Some((named, Partner::Second))
    }

    fn atom(&mut self, place: &Place) -> Option<AtomRef> {
        match self.named(place)? {
            (Named::Atom(atom), partner) => Some(AtomRef::Found { atom, partner }),
            (Named::New(new), _) => Some(AtomRef::New(new)),
            (other, _) => {
                self.errors.push(wrong_kind(&place.written(), other, "a carbon or a new atom", &place.span));
                None
            }
        }
    }

    fn release(&mut self, place: &Place) -> Option<Edit> {
        match self.named(place)? {
            (Named::Halogen(halogen), partner) => {
                let edit = Edit::Release { halogen, partner };
                if self.case.edits.contains(&edit) {
                    let kind = RuleErrorKind::ReleasedTwice { label: place.written() };
                    self.errors.push(error(kind, self.span, "the second time").hint("leave one of the lines out"));
                }
                Some(edit)
            }
            (other, _) => {
                self.errors.push(wrong_kind(&place.written(), other, "a halogen", &place.span));
                None
            }
        }
    }

    fn bond(&mut self, a: &Place, b: &Place) -> Option<(usize, Partner)> {
        let ends = (self.atom(a), self.atom(b));
        let (Some(AtomRef::Found { atom: at_a, partner }), Some(AtomRef::Found { atom: at_b, partner: other })) = ends
        else {
            if let (Some(_), Some(_)) = ends {
                self.no_bond(a, b);
            }
            return None;
        };
        for (place, atom) in [(a, at_a), (b, at_b)] {
            if self.case.atoms[atom].kind == AtomKind::Aryl {
                let kind =
                    RuleErrorKind::WrongKind { label: place.written(), is: "an aromatic carbon", wanted: "a `site`" };
                self.errors.push(error(kind, &place.span, "bonds here never change"));
                return None;
            }
        }
        let bond = bond_between(self.case, at_a, at_b).filter(|_| partner == other);
        if bond.is_none() {
            self.no_bond(a, b);
        }
        bond.map(|bond| (bond, partner))
    }

    fn no_bond(&mut self, a: &Place, b: &Place) {
        let kind = RuleErrorKind::NoBond { a: a.written(), b: b.written() };
        let hint = format!("add `bond {}-{} single` (or another order) under `find`", a.label, b.label);
        self.errors.push(error(kind, &(a.span.start..b.span.end), "this bond").hint(hint));
    }

    /// The atom that becomes a carbene, or `was` one.
    fn carbene(&mut self, place: &Place, was: bool) -> Option<AtomRef> {
        let atom = self.atom(place)?;
        let kind = match atom {
            AtomRef::Found { atom, .. } => Some(self.case.atoms[atom].kind),
            AtomRef::New(_) => None,
        };
        let (fits, is, wanted) = match (was, kind) {
            (true, Some(AtomKind::Carbene)) | (false, Some(AtomKind::Site(_))) => (true, "", ""),
            (true, _) => (false, "no carbene", "a `carbene`"),
            (false, Some(AtomKind::Carbene)) => (false, "a carbene already", "a `site`"),
            (false, _) => (false, "no carbon site", "a `site`"),
        };
        if !fits {
            let kind = RuleErrorKind::WrongKind { label: place.written(), is, wanted };
            self.errors.push(error(kind, &place.span, "this label"));
        }
        fits.then_some(atom)
    }

    fn join(&mut self, a: &Place, b: &Place) -> Option<(AtomRef, AtomRef)> {
        let (at_a, at_b) = (self.atom(a)?, self.atom(b)?);
        if at_a == at_b {
            let kind = RuleErrorKind::SelfBond { label: a.written() };
            self.errors.push(error(kind, self.span, "both ends are one atom"));
            return None;
        }
        let in_pattern = match (at_a, at_b) {
            (AtomRef::Found { atom: x, partner: p }, AtomRef::Found { atom: y, partner: q }) => {
                p == q && bond_between(self.case, x, y).is_some()
            }
            _ => false,
        };
        let is_joined = self
            .case
            .edits
            .iter()
            .any(|&edit| matches!(edit, Edit::Join(x, y, _) if (x, y) == (at_a, at_b) || (x, y) == (at_b, at_a)));
        if in_pattern || is_joined {
            let kind = RuleErrorKind::BondTwice { a: a.written(), b: b.written() };
            self.errors.push(error(kind, self.span, "joined here").hint("to change its order, `raise` or `lower` it"));
            return None;
        }
        Some((at_a, at_b))
    }
}

/// Checks that every label has a use, and that all that is left is one molecule.
pub(super) fn whole_pattern_is_used(tree: &CaseText, copies: u8, case: &Case, errors: &mut Vec<RuleError>) {
    for (atom, pattern_atom) in case.atoms.iter().enumerate() {
        let is_bonded = case.bonds.iter().any(|bond| bond.a == atom || bond.b == atom);
        let is_edited = case.edits.iter().any(|&edit| acts_on(case, edit, atom));
        let span = find_span(tree, &pattern_atom.label);
        if !is_bonded && !is_edited && case.atoms.len() > 1 {
            let kind = RuleErrorKind::Unused { label: pattern_atom.label.clone() };
            errors
                .push(error(kind, &span, "named here").hint("leave it out, or say what is done to it or bonded to it"));
        } else if !reached_from_first(case)[atom] {
            let kind = RuleErrorKind::Apart { label: pattern_atom.label.clone() };
            errors.push(error(kind, &span, "named here").hint("say by `bond` lines how it hangs on the others"));
        }
    }
    for (halogen, found) in case.halogens.iter().enumerate() {
        for partner in [Partner::First, Partner::Second].into_iter().take(usize::from(copies)) {
            if !case.edits.contains(&Edit::Release { halogen, partner }) {
                let prime = if partner == Partner::Second { "'" } else { "" };
                let label = format!("{}{prime}", found.label);
                let carrier = &case.atoms[found.on].label;
                let hint =
                    format!("add `release {label}`, or ask only for its presence: `{carrier} has at least 1 halogen`");
                let kind = RuleErrorKind::NotReleased { label };
                errors.push(error(kind, &find_span(tree, &found.label), "found here").hint(hint));
            }
        }
    }
    all_is_joined(tree, copies, case, errors);
    something_is_retained(tree, case, errors);
}

/// Whether an edit acts on a pattern atom in either copy.
fn acts_on(case: &Case, edit: Edit, atom: usize) -> bool {
    let is_it = |r: AtomRef| matches!(r, AtomRef::Found { atom: a, .. } if a == atom);
    match edit {
        Edit::Release { halogen, .. } => case.halogens[halogen].on == atom,
        Edit::Raise { bond, .. } | Edit::Lower { bond, .. } => [case.bonds[bond].a, case.bonds[bond].b].contains(&atom),
        Edit::AddHydrogen(a)
        | Edit::TakeHydrogen(a)
        | Edit::MakeCarbene(a)
        | Edit::CloseCarbene(a)
        | Edit::Charge(a, _) => is_it(a),
        Edit::Join(a, b, _) => is_it(a) || is_it(b),
    }
}

/// Which pattern atoms hang on the first by pattern bonds.
fn reached_from_first(case: &Case) -> Vec<bool> {
    let mut reached = vec![false; case.atoms.len()];
    if let Some(first) = reached.first_mut() {
        *first = true;
    }
    for _ in 0..case.bonds.len() {
        for bond in &case.bonds {
            let any = reached[bond.a] || reached[bond.b];
            (reached[bond.a], reached[bond.b]) = (any, any);
        }
    }
    reached
}

/// Checks that new atoms and the second copy hang on the first copy when all is done.
fn all_is_joined(tree: &CaseText, copies: u8, case: &Case, errors: &mut Vec<RuleError>) {
    // Part 0 is the first copy, 1 the second, then the new atoms.
    let part = |r: AtomRef| match r {
        AtomRef::Found { partner: Partner::First, .. } => 0,
        AtomRef::Found { partner: Partner::Second, .. } => 1,
        AtomRef::New(new) => 2 + new,
    };
    let mut reached = vec![false; 2 + case.new_atoms.len()];
    reached[0] = true;
    for _ in 0..case.edits.len() {
        for &edit in &case.edits {
            if let Edit::Join(a, b, _) = edit {
                let any = reached[part(a)] || reached[part(b)];
                (reached[part(a)], reached[part(b)]) = (any, any);
            }
        }
    }
    if copies == 2 && !reached[1] {
        let kind = RuleErrorKind::NotJoined { what: "the second copy".to_owned() };
        errors.push(error(kind, &tree.edit_heading, "by these edits").hint("add an edit such as `join A-A' single`"));
    }
    let labels =
        tree.edits.iter().filter_map(|e| if let EditItem::New(_, label) = &e.value { Some(label) } else { None });
    for (label, _) in labels.zip(&reached[2..]).filter(|(_, is_reached)| !**is_reached) {
        let kind = RuleErrorKind::NotJoined { what: label.value.clone() };
        let hint = format!("add an edit such as `join A-{} single`", label.value);
        errors.push(error(kind, &label.span, "brought in here").hint(hint));
    }
}

fn something_is_retained(tree: &CaseText, case: &Case, errors: &mut Vec<RuleError>) {
    if case.configuration == Configuration::EveryOutcome {
        return;
    }
    let one_for_one = |atom: usize| {
        let this = AtomRef::first(atom);
        let lost = case.edits.iter().filter(|&&edit| match edit {
            Edit::Release { halogen, partner: Partner::First } => case.halogens[halogen].on == atom,
            Edit::TakeHydrogen(a) => a == this,
            _ => false,
        });
        let gained = case.edits.iter().filter(|&&edit| match edit {
            Edit::AddHydrogen(a) => a == this,
            Edit::Join(a, b, _) => a == this || b == this,
            _ => false,
        });
        lost.count() == 1 && gained.count() == 1
    };
    if !(0..case.atoms.len()).any(one_for_one) {
        let retain = super::syntax::CaseOption::RetainConfiguration;
        let span = tree.options.iter().find(|o| o.value == retain).map_or(0..0, |o| o.span.clone());
        errors.push(error(RuleErrorKind::NothingToRetain, &span, "this line").hint("leave the line out"));
    }
}

/// Where a label is named under `find`.
pub(super) fn find_span(tree: &CaseText, label: &str) -> Span {
    let named = tree.find.iter().find_map(|item| match &item.value {
        FindItem::Site(l, _) | FindItem::Aryl(l) | FindItem::Carbene(l) | FindItem::Halogen(_, l, _) => {
            (l.value == label).then(|| l.span.clone())
        }
        FindItem::Bond(..) | FindItem::Ligands(..) => None,
    });
    named.unwrap_or_else(|| tree.edit_heading.clone())
}
