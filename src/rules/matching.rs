//! Finds where a case's pattern lies in a molecule.
//!
//! A *match* gives every pattern atom and halogen an atom of the molecule, no atom twice.
//! Matches that come to the same change are still apart here; see [`change`](super::change).

use super::rule::{AtomKind, Case, CountCondition, Counted, SiteState};
use crate::molecule::{BondOrder, Molecule};

/// The atoms of a molecule that a pattern lies on.
#[derive(Debug, Clone, PartialEq, Eq)]
pub(super) struct Match {
    /// Atom index of each pattern atom.
    pub(super) atoms: Vec<usize>,
    /// Atom index of each pattern halogen.
    pub(super) halogens: Vec<usize>,
}

/// Every match of a case in a molecule, in order of the atoms' indices.
pub(super) fn matches(case: &Case, molecule: &Molecule) -> Vec<Match> {
    let holds_carbene = (0..molecule.n_atoms()).any(|atom| molecule.is_carbene(atom));
    let is_fit = case.conditions.iter().all(|&condition| molecule_meets(molecule, condition));
    let mut found = Vec::new();
    if is_fit && (case.names_carbene() || !holds_carbene) {
        place_atoms(case, molecule, &mut Vec::new(), &mut found);
    }
    found
}

fn molecule_meets(molecule: &Molecule, condition: CountCondition) -> bool {
    let formula = molecule.formula();
    condition.amount.holds(match condition.counted {
        Counted::Hydrogens => formula.n_hydrogens(),
        Counted::Halogens => molecule.halogens().iter().sum(),
        Counted::OneHalogen(halogen) => molecule.halogens()[halogen as usize],
        Counted::Carbons => formula.count(crate::molecule::Element::C),
    })
}

/// Places the next pattern atom wherever it fits, then the rest.
fn place_atoms(case: &Case, molecule: &Molecule, atoms: &mut Vec<usize>, found: &mut Vec<Match>) {
    let next = atoms.len();
    if next == case.atoms.len() {
        place_halogens(case, molecule, atoms, &mut Vec::new(), found);
        return;
    }
    for image in 0..molecule.n_atoms() {
        if !atoms.contains(&image) && atom_fits(case, molecule, next, image) {
            atoms.push(image);
            if bonds_fit(case, molecule, atoms) {
                place_atoms(case, molecule, atoms, found);
            }
            atoms.pop();
        }
    }
}

fn atom_fits(case: &Case, molecule: &Molecule, pattern_atom: usize, image: usize) -> bool {
    let pattern = &case.atoms[pattern_atom];
    let is_of_kind = match pattern.kind {
        AtomKind::Site(state) => molecule.is_carbon_site(image) && is_in_state(molecule, image, state),
        AtomKind::Aryl => molecule.is_plain_carbon(image) && molecule.atom(image).is_aromatic,
        AtomKind::Carbene => molecule.is_carbene(image),
    };
    is_of_kind && pattern.conditions.iter().all(|&condition| atom_meets(molecule, image, condition))
}

fn is_in_state(molecule: &Molecule, atom: usize, state: SiteState) -> bool {
    let n = |wanted: BondOrder| molecule.neighbours(atom).filter(|&(_, order, _)| order == wanted).count();
    let is = match (n(BondOrder::Double), n(BondOrder::Triple)) {
        (0, 0) => SiteState::Saturated,
        (1, 0) => SiteState::Vinyl,
        (_, 0) => SiteState::Cumulated,
        _ => SiteState::Acetylenic,
    };
    state == SiteState::Any || state == is
}

fn atom_meets(molecule: &Molecule, atom: usize, condition: CountCondition) -> bool {
    let halogens = || molecule.neighbours(atom).filter_map(|(n, _, _)| molecule.leaving_halogen(n));
    let n = match condition.counted {
        Counted::Hydrogens => usize::from(molecule.atom(atom).n_hydrogens),
        Counted::Halogens => halogens().count(),
        Counted::OneHalogen(wanted) => halogens().filter(|&halogen| halogen == wanted).count(),
        Counted::Carbons => {
            let is_carbon = |n: usize| molecule.atom(n).element == crate::molecule::Element::C;
            molecule.neighbours(atom).filter(|&(n, _, _)| is_carbon(n)).count()
        }
    };
    condition.amount.holds(n as u32)
}

/// Whether the bonds that end at the atom placed last are as the pattern asks.
fn bonds_fit(case: &Case, molecule: &Molecule, atoms: &[usize]) -> bool {
    let last = atoms.len() - 1;
    case.bonds.iter().filter(|bond| bond.a.max(bond.b) == last).all(|bond| {
        let found = molecule.bond_between(atoms[bond.a], atoms[bond.b]);
        found.is_some_and(|index| bond.orders.contains(&molecule.bond(index).2))
    })
}

/// Places the next pattern halogen wherever it fits, then the rest.
fn place_halogens(
    case: &Case,
    molecule: &Molecule,
    atoms: &[usize],
    halogens: &mut Vec<usize>,
    found: &mut Vec<Match>,
) {
    let Some(next) = case.halogens.get(halogens.len()) else {
        found.push(Match { atoms: atoms.to_vec(), halogens: halogens.clone() });
        return;
    };
    let mut around: Vec<usize> = molecule.neighbours(atoms[next.on]).map(|(n, _, _)| n).collect();
    around.sort_unstable();
    for image in around {
        let is_allowed = molecule.leaving_halogen(image).is_some_and(|halogen| next.allowed[halogen as usize]);
        if is_allowed && !halogens.contains(&image) {
            halogens.push(image);
            place_halogens(case, molecule, atoms, halogens, found);
            halogens.pop();
        }
    }
}
