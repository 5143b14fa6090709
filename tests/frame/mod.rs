//! Frame and state held against the general molecule and its canonical labelling.

use std::collections::BTreeMap;

use haloshed::frame::{Canonicaliser, Decoration, Frame, Layout};
use haloshed::molecule::canonical::canonical_code;
use haloshed::molecule::{Atom, BondOrder, Element, Halogen, Identity, Molecule};
use proptest::prelude::*;

/// Skeletons by their bonds, small enough to decorate at random and large enough to bite.
const SKELETONS: [(usize, &[(usize, usize)]); 12] = [
    (1, &[]),
    (2, &[(0, 1)]),
    (3, &[(0, 1), (1, 2)]),
    (4, &[(0, 1), (1, 2), (2, 3)]),
    (4, &[(0, 1), (0, 2), (0, 3)]),
    (5, &[(0, 1), (0, 2), (0, 3), (0, 4)]),
    (6, &[(0, 1), (1, 2), (2, 3), (3, 4), (4, 5)]),
    (4, &[(0, 1), (1, 2), (2, 3), (3, 0)]),
    (6, &[(0, 1), (1, 2), (2, 3), (3, 4), (4, 5), (5, 0)]),
    (7, &[(0, 1), (1, 2), (2, 3), (3, 4), (4, 5), (5, 0), (0, 6), (6, 3)]),
    (8, &[(0, 1), (1, 2), (2, 3), (3, 4), (4, 5), (5, 6), (6, 7), (7, 0)]),
    (7, &[(0, 1), (0, 2), (1, 3), (1, 4), (2, 5), (2, 6)]),
];

fn skeleton(index: usize) -> Molecule {
    let (n, bonds) = SKELETONS[index];
    let mut molecule = Molecule::new();
    for atom in 0..n {
        let degree = bonds.iter().filter(|&&(a, b)| a == atom || b == atom).count();
        molecule.add_atom(Atom::neutral(Element::C, 4 - degree as u8));
    }
    for &(a, b) in bonds {
        molecule.add_bond(a, b, BondOrder::Single);
    }
    molecule
}

/// A decoration made from arbitrary numbers: double bonds where there is room, then halogens,
/// then configuration at every candidate.
fn decorate(frame: &Frame, numbers: &[u32], n_kinds: usize) -> Decoration {
    let mut numbers = numbers.iter().copied().cycle();
    let mut next = move || numbers.next().unwrap();
    let mut decoration = Decoration::bare(frame);
    for bond in 0..frame.open_bonds().len() {
        let (a, b) = frame.open_bonds()[bond];
        let is_free = [a, b].iter().all(|&s| decoration.n_hydrogens(frame, s) > 0);
        if is_free && next() % 3 == 0 {
            decoration.orders[bond] = BondOrder::Double;
        }
    }
    for site in 0..frame.sites().len() {
        let n = next() % (u32::from(decoration.n_hydrogens(frame, site)) + 1);
        for _ in 0..n {
            decoration.halogens[site][1 + next() as usize % n_kinds] += 1;
        }
    }
    for bond in 0..frame.open_bonds().len() {
        decoration.trans[bond] = next() % 2 == 0;
    }
    for centre in 0..frame.centres().len() {
        decoration.clockwise[centre] = next() % 2 == 0;
    }
    decoration.clear_idle_bits(frame);
    decoration
}

fn canonical_state(frame: &Frame, layout: &Layout, canonicaliser: &Canonicaliser, decoration: &Decoration) -> Vec<u64> {
    let mut state = vec![0; layout.n_words()];
    let mut candidates = vec![0; layout.n_words()];
    let mut out = vec![0; layout.n_words()];
    layout.pack(decoration, &mut state);
    layout.candidates(frame, decoration, &mut candidates);
    canonicaliser.canonical(&state, &candidates, &mut out);
    out
}

fn general_code(frame: &Frame, decoration: &Decoration, identity: Identity) -> Vec<u32> {
    let mut molecule = frame.compose(decoration);
    molecule.keep_real_units(identity);
    canonical_code(&molecule)
}

/// One state a compound and one compound a state, by both ways of canonicalising.
fn check(index: usize, identity: Identity, many: &[Vec<u32>], n_kinds: usize) {
    let frame = Frame::of(&skeleton(index));
    let palette = [Halogen::Cl, Halogen::Br, Halogen::I];
    let layout = Layout::new(&frame, &palette[..n_kinds], identity).unwrap();
    let listed = Canonicaliser::with_longest_list(&frame, &layout, u64::MAX);
    let chained = Canonicaliser::with_longest_list(&frame, &layout, 0);
    let mut code_of = BTreeMap::new();
    let mut state_of = BTreeMap::new();
    for numbers in many {
        let decoration = decorate(&frame, numbers, n_kinds);
        let state = canonical_state(&frame, &layout, &listed, &decoration);
        assert_eq!(state, canonical_state(&frame, &layout, &chained, &decoration), "listed against chained");
        let code = general_code(&frame, &decoration, identity);
        assert_eq!(code_of.entry(state.clone()).or_insert_with(|| code.clone()), &code, "{decoration:?}");
        assert_eq!(state_of.entry(code).or_insert_with(|| state.clone()), &state, "{decoration:?}");
        let again = frame.decompose(&frame.compose(&decoration));
        assert_eq!(state, canonical_state(&frame, &layout, &listed, &again), "compose and decompose");
        let mut unpacked = Decoration::bare(&frame);
        layout.unpack(&state, &mut unpacked);
        assert_eq!(general_code(&frame, &unpacked, identity), general_code(&frame, &decoration, identity));
    }
}

proptest! {
    #![proptest_config(ProptestConfig::with_cases(60))]

    #[test]
    fn states_are_equal_exactly_when_compounds_are(
        index in 0..SKELETONS.len(),
        depth in 0..3usize,
        n_kinds in 1..3usize,
        many in proptest::collection::vec(proptest::collection::vec(any::<u32>(), 40), 20),
    ) {
        let identity = [Identity::Constitutional, Identity::Geometric, Identity::Full][depth];
        check(index, identity, &many, n_kinds);
    }
}

/// Number of compounds that all choices of one chlorine a site and configuration give.
fn count_full_isomers(index: usize) -> usize {
    let frame = Frame::of(&skeleton(index));
    let layout = Layout::new(&frame, &[Halogen::Cl], Identity::Full).unwrap();
    let canonicaliser = Canonicaliser::new(&frame, &layout);
    let mut states = std::collections::BTreeSet::new();
    for bits in 0..1u32 << frame.sites().len() {
        let mut decoration = Decoration::bare(&frame);
        for site in 0..frame.sites().len() {
            decoration.halogens[site][Halogen::Cl as usize] = 1;
            decoration.clockwise[site] = bits >> site & 1 == 1;
        }
        decoration.clear_idle_bits(&frame);
        states.insert(canonical_state(&frame, &layout, &canonicaliser, &decoration));
    }
    states.len()
}

#[test]
fn hexachlorocyclohexane_has_nine_stereoisomers() {
    // Eight diastereomers, one of them (alpha) a pair of enantiomers: Willett et al.,
    // Environ. Sci. Technol. 32, 2197 (1998), from memory.
    assert_eq!(count_full_isomers(8), 9);
}

#[test]
fn tetrachlorocyclobutane_has_four() {
    // cis-cis-cis, cis-cis-trans, cis-trans-trans(cis,trans,cis) and all-trans; none is chiral.
    assert_eq!(count_full_isomers(7), 4);
}
