//! Numbers of isomers, each counted by hand or by Burnside's lemma.

use std::collections::BTreeSet;

use haloshed::molecule::Identity;
use haloshed::smiles::{read, write};

fn texts(text: &str, identity: Identity) -> BTreeSet<String> {
    let isomers = read(text).unwrap().isomers(identity, 1 << 16).unwrap();
    let texts: BTreeSet<String> = isomers.iter().map(write).collect();
    assert_eq!(texts.len(), isomers.len(), "{text}: one text an isomer");
    for written in &texts {
        assert_eq!(write(&read(written).unwrap()), *written);
    }
    texts
}

fn check(text: &str, identity: Identity, expected: usize) {
    let texts = texts(text, identity);
    assert_eq!(texts.len(), expected, "{text}: {texts:#?}");
}

#[test]
fn tetrahedral_isomers_are_counted() {
    for (text, expected) in [
        ("CC(Cl)C(Cl)C", 3),
        ("CC(Cl)C(Cl)C(Cl)C", 4),
        ("CC(Cl)C(Cl)C(Cl)C(Cl)C", 10),
        ("C[C@H](Cl)C(Cl)C", 2),
        ("FC(Cl)Br", 2),
        ("FC(Cl)(Br)C(F)(Cl)Br", 3),
        ("ClC1C(Cl)C(Cl)C(Cl)C(Cl)C1Cl", 9),
        ("ClC1C(Cl)C(Cl)C(Cl)C(Cl)C1", 16),
        ("ClC1CC1Cl", 3),
        ("ClC1CC(Cl)C1", 2),
        ("ClC1CCC(Cl)CC1", 2),
        ("C1CCC2CCCCC2C1", 2),
        ("FC(Cl)C(C(F)Cl)(C(F)Cl)C(F)Cl", 5),
    ] {
        check(text, Identity::Full, expected);
    }
}

#[test]
fn geometric_isomers_are_counted() {
    for (text, expected) in [
        ("ClC=CCl", 2),
        ("ClC(Cl)=CCl", 1),
        ("ClC=CC=CCl", 3),
        ("ClC=CC(Cl)=CCl", 4),
        ("ClC(Cl)=C(Cl)C(Cl)=C(Cl)Cl", 1),
        ("ClC=CC(C=CCl)=CCl", 4),
        ("ClC=CC(=C(C=CCl)C=CCl)C=CCl", 7),
        ("C1=CCCCCC1", 1),
        ("C1=CCCCCCC1", 2),
        ("C1=CC=CC=CC=C1", 6),
        ("ClC=C1CC1", 1),
        ("ClC=C1CC1Cl", 2),
        ("ClC=C1CC(=CCl)C1", 2),
        ("CC=C=CC", 1),
        ("C=NCl", 1),
    ] {
        check(text, Identity::Geometric, expected);
    }
}

#[test]
fn given_configuration_is_kept_and_the_rest_is_expanded() {
    check(r"Cl/C=C/C=CCl", Identity::Geometric, 2);
    check(r"Cl/C=C/C=CCl", Identity::Constitutional, 1);
    check(r"C[C@H](Cl)C=CCl", Identity::Full, 2);
    check(r"CC(Cl)C=CCl", Identity::Full, 4);
    check(r"CC(Cl)C=CCl", Identity::Geometric, 2);
}

/// Whether a cage can be built is not asked: a bridgehead counts as any centre does. By
/// Burnside over the six automorphisms of chlorocubane, (256 + 2 x 16 + 3 x 0) / 6.
#[test]
fn cages_are_counted_formally() {
    check("ClC12C3C4C1C5C2C3C45", Identity::Full, 48);
}
