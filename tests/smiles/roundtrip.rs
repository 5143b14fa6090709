//! Writing, reading back, and the canonical form.

use haloshed::molecule::canonical::canonical_code;
use haloshed::molecule::{Identity, Molecule};
use haloshed::smiles::{read, write};
use petgraph::algo::is_isomorphic_matching;
use proptest::collection::vec;
use proptest::prelude::*;

use super::molecules::{configured, molecules, shuffled};

fn pruned_code(molecule: &Molecule) -> Vec<u32> {
    let mut pruned = molecule.clone();
    pruned.keep_real_units(Identity::Full);
    canonical_code(&pruned)
}

fn are_isomorphic(a: &Molecule, b: &Molecule) -> bool {
    is_isomorphic_matching(a.graph(), b.graph(), |x, y| x == y, |x, y| x == y)
}

proptest! {
    #![proptest_config(ProptestConfig::with_cases(1500))]

    #[test]
    fn what_was_written_reads_back(molecule in configured()) {
        let text = write(&molecule);
        let back = read(&text).map_err(|e| TestCaseError::fail(format!("{text}: {e}")))?;
        prop_assert_eq!(canonical_code(&back), pruned_code(&molecule), "{}", &text);
        prop_assert_eq!(write(&back), text);
    }

    #[test]
    fn every_order_of_atoms_gives_one_text(molecule in configured(), keys in vec(any::<u32>(), 14)) {
        let other = shuffled(&molecule, &keys);
        prop_assert_eq!(write(&molecule), write(&other));
        prop_assert_eq!(canonical_code(&molecule).len(), canonical_code(&other).len());
    }

    #[test]
    fn codes_are_equal_exactly_when_the_graphs_are_isomorphic(
        a in molecules(), b in molecules(), keys in vec(any::<u32>(), 14),
    ) {
        prop_assert_eq!(canonical_code(&a) == canonical_code(&b), are_isomorphic(&a, &b));
        let other = shuffled(&a, &keys);
        prop_assert!(are_isomorphic(&a, &other));
        prop_assert_eq!(canonical_code(&a), canonical_code(&other));
    }

    #[test]
    fn moving_one_bond_is_noticed(molecule in molecules(), at in any::<prop::sample::Index>(), to in any::<prop::sample::Index>()) {
        let halogens: Vec<usize> =
            (0..molecule.n_atoms()).filter(|&a| molecule.leaving_halogen(a).is_some()).collect();
        let with_hydrogen: Vec<usize> =
            (0..molecule.n_atoms()).filter(|&a| molecule.atom(a).n_hydrogens > 0).collect();
        prop_assume!(!halogens.is_empty() && !with_hydrogen.is_empty());
        let moved = with_halogen_moved(&molecule, *at.get(&halogens), *to.get(&with_hydrogen));
        prop_assert_eq!(canonical_code(&molecule) == canonical_code(&moved), are_isomorphic(&molecule, &moved));
        prop_assert_eq!(write(&molecule) == write(&moved), are_isomorphic(&molecule, &moved));
    }
}

/// The molecule with a halogen on another atom.
fn with_halogen_moved(molecule: &Molecule, halogen: usize, target: usize) -> Molecule {
    let mut out = Molecule::new();
    for atom in molecule.atoms() {
        out.add_atom(atom);
    }
    for (a, b, order) in molecule.bonds() {
        let (a, b) = if a == halogen {
            (target, b)
        } else if b == halogen {
            (a, target)
        } else {
            (a, b)
        };
        if (a, b) == (target, target) || [a, b] == [target, target] {
            continue;
        }
        let touches = |end: usize| molecule.bond_between(halogen, end).is_some();
        if a == target && touches(b) && molecule.bond_between(target, b).is_none()
            || b == target && touches(a) && molecule.bond_between(target, a).is_none()
        {
            let source = if a == target { b } else { a };
            out.atom_mut(source).n_hydrogens += 1;
            out.atom_mut(target).n_hydrogens -= 1;
            out.add_bond(target, halogen, order);
        } else if out.bond_between(a, b).is_none() {
            out.add_bond(a, b, order);
        }
    }
    out
}
