//! Writing, reading back, and the canonical form.

use haloshed::molecule::canonical::canonical_code;
use haloshed::molecule::{Identity, Molecule};
use haloshed::smiles::{read, write};
use petgraph::algo::is_isomorphic_matching;
use proptest::collection::vec;
use proptest::prelude::*;

use super::molecules::{configured, molecules, shuffled};

const N_CASES: u32 = 1000;

fn pruned_code(molecule: &Molecule) -> Vec<u32> {
    let mut pruned = molecule.clone();
    pruned.keep_real_units(Identity::Full);
    canonical_code(&pruned)
}

fn are_isomorphic(a: &Molecule, b: &Molecule) -> bool {
    is_isomorphic_matching(a.graph(), b.graph(), |x, y| x == y, |x, y| x == y)
}

proptest! {
    #![proptest_config(ProptestConfig::with_cases(N_CASES))]

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
    fn moving_a_halogen_is_noticed(molecule in molecules(), at in any::<prop::sample::Index>(), to in any::<prop::sample::Index>()) {
        let halogens: Vec<usize> =
            (0..molecule.n_atoms()).filter(|&a| molecule.leaving_halogen(a).is_some()).collect();
        let with_hydrogen: Vec<usize> =
            (0..molecule.n_atoms()).filter(|&a| molecule.atom(a).n_hydrogens > 0).collect();
        if halogens.is_empty() || with_hydrogen.is_empty() {
            return Ok(());
        }
        let moved = with_halogen_moved(&molecule, *at.get(&halogens), *to.get(&with_hydrogen));
        prop_assert_eq!(canonical_code(&molecule) == canonical_code(&moved), are_isomorphic(&molecule, &moved));
        prop_assert_eq!(write(&molecule) == write(&moved), are_isomorphic(&molecule, &moved));
    }
}

/// One bridgehead given and the other open: once the first turns out to tell nothing, the
/// centre between them tells nothing either.
#[test]
fn what_is_left_out_makes_other_configuration_idle() {
    let open = write(&read("N#CC1(Cl)C23CC12C3").unwrap());
    assert_eq!(write(&read("N#C[C@]1(Cl)[C@]23CC12C3").unwrap()), open);
    assert_eq!(write(&read("N#C[C@]1(Cl)C23CC12C3").unwrap()), open);
}

/// The molecule with a halogen in the place of a hydrogen of `target`.
fn with_halogen_moved(molecule: &Molecule, halogen: usize, target: usize) -> Molecule {
    let mut out = Molecule::new();
    for atom in molecule.atoms() {
        out.add_atom(atom);
    }
    for (a, b, order) in molecule.bonds() {
        if a == halogen || b == halogen {
            let source = if a == halogen { b } else { a };
            out.atom_mut(source).n_hydrogens += 1;
            out.atom_mut(target).n_hydrogens -= 1;
            out.add_bond(target, halogen, order);
        } else {
            out.add_bond(a, b, order);
        }
    }
    out
}
