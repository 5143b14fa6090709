//! What a text means.

use haloshed::molecule::{BondOrder, Geometry, Identity, Molecule};
use haloshed::smiles::{read, write};

fn same(a: &str, b: &str) {
    assert_eq!(write(&read(a).unwrap()), write(&read(b).unwrap()), "{a} and {b}");
}

fn differ(a: &str, b: &str) {
    assert_ne!(write(&read(a).unwrap()), write(&read(b).unwrap()), "{a} and {b}");
}

fn formula(text: &str) -> String {
    read(text).unwrap().formula().to_string()
}

fn geometries(molecule: &Molecule) -> Vec<Geometry> {
    (0..molecule.n_bonds()).filter_map(|bond| molecule.geometry(bond)).collect()
}

#[test]
fn hydrogens_are_implied_by_the_normal_valences() {
    for (text, expected) in [
        ("C", "CH4"),
        ("ClC=C(Cl)Cl", "C2HCl3"),
        ("C#C", "C2H2"),
        ("O", "H2O"),
        ("N(=O)(=O)c1ccccc1", "C6H5NO2"),
        ("CN=[N+]=[N-]", "CH3N3"),
        ("CS(=O)(=O)Cl", "CH3ClO2S"),
        ("CP(Cl)(Cl)(Cl)Cl", "CH3Cl4P"),
        ("COP(=O)(OC)OC=C(Cl)Cl", "C4H7Cl2O4P"),
        ("B(Cl)Cl", "BCl2H"),
        ("Cl[Si](Cl)(Cl)C", "CH3Cl3Si"),
        ("c1cc[nH]c1", "C4H5N"),
        ("c1ccncc1", "C5H5N"),
        ("c1ccsc1", "C4H4S"),
        ("[O-][n+]1ccccc1", "C5H5NO"),
        ("O=c1cc[nH]cc1", "C5H5NO"),
        ("[cH-]1cccc1", "C5H5-"),
        ("c1cc[n-]c1", "C4H4N-"),
        ("c1cc[o+]cc1", "C5H5O+"),
        ("[NH4+]", "H4N+"),
        ("[Cl-]", "Cl-"),
        ("[C-]#[O+]", "CO"),
        ("Cl[C]Cl", "CCl2"),
        ("[CH2]", "CH2"),
        ("[C]=C(Cl)Cl", "C2Cl2"),
        ("[H]C([H])([H])Cl", "CH3Cl"),
        ("[H]Cl", "ClH"),
        ("F[P-](F)(F)(F)(F)F", "F6P-"),
        ("O[Cl](=O)(=O)=O", "ClHO4"),
    ] {
        assert_eq!(formula(text), expected, "{text}");
    }
}

#[test]
fn one_compound_has_many_texts() {
    same("C1CCCCC1", "C%10CCCCC%10");
    same("C1CC=1", "C=1CC1");
    same("C1CC=1", "C1=CC1");
    same("[CH3][CH2]Cl", "CCCl");
    same("[H]C([H])([H])CCl", "ClCC");
    same("C1=CC=CC=C1", "c1ccccc1");
    same("C1C=CC=CC=1Cl", "Clc1ccccc1");
    same("c1ccccc1c2ccccc2", "c1ccccc1-c1ccccc1");
    same("c1ccc:c:c1", "c1ccccc1");
    same("N(=O)(=O)C(Cl)(Cl)Cl", "O=[N+]([O-])C(Cl)(Cl)Cl");
    same("C1=CC=C2C=CC=CC2=C1", "c1ccc2ccccc2c1");
    same("C1=CC2=CC=CC=C2C=C1", "C1=CC=C2C=CC=CC2=C1");
    same("C1=CC2=C(C=C1)OC1=CC=CC=C12", "c1ccc2c(c1)oc1ccccc12");
    same("C1=CC2=C(C=C1)C1=CC=CC=C1N2", "c1ccc2c(c1)[nH]c1ccccc12");
}

#[test]
fn geometry_is_read_from_either_side() {
    same("F/C=C/F", r"F\C=C\F");
    same("F/C=C/F", r"C(\F)=C/F");
    same("F/C=C/F", r"C(=C/F)\F");
    differ("F/C=C/F", r"F/C=C\F");
    differ("F/C=C/F", "FC=CF");
    same("F/C=C/F", r"[H]\C(F)=C(F)\[H]");
    same("F/C=C/F", r"[H]\C(F)=C/F");
    same("F/C(Cl)=C(F)/Cl", r"FC(/Cl)=C(F)/Cl");
    same("F/C(Cl)=C(Cl)/F", r"F/C(/Cl)=C(\Cl)F");
    same("ClC(Cl)=C/F", "ClC(Cl)=CF");
    same("F/C=C1/CC1Cl", "F/C=C1/CC1Cl");
    same("C/1(Cl)=C(Cl)/CCCCCCCCC1", r"C1(/Cl)=C(Cl)\CCCCCCCCC1");
    same(r"C1=C/CCCCCC/1", r"C\1=C/CCCCCC1");
    same("C1CCCC=CC1", r"C1CCC/C=C\C1");
    same("C=C(/C=C/Cl)/C=C/Cl", r"C=C(/C=C/Cl)\C=C\Cl");
    let dichloride = read("Cl/C=C/Cl").unwrap();
    assert_eq!(geometries(&dichloride), [Geometry::Trans]);
}

#[test]
fn marks_where_there_is_no_geometry_are_dropped() {
    for (text, plain) in [
        ("C/C", "CC"),
        ("C=C(/C)/C", "C=C(C)C"),
        ("[nH]1/c(=N/C)[nH]c(=N)nc1Cl", "[nH]1c(=NC)[nH]c(=N)nc1Cl"),
        ("C/C=C", "CC=C"),
        (r"C/C=C(\C)/C", "CC=C(C)C"),
        ("C/C=N/O", "CC=NO"),
        ("C/C=C=C/C", "CC=C=CC"),
        (r"Cl/C1=C(\Cl)CCCC1", "ClC1=C(Cl)CCCC1"),
        ("C/C=C(Cl)Cl", "CC=C(Cl)Cl"),
        ("C[C@H](Cl)Cl", "CC(Cl)Cl"),
        ("C[C@H2]Cl", "CCCl"),
        (r"Cl/C1=C/C=C\C=C1", "Clc1ccccc1"),
    ] {
        same(text, plain);
    }
}

#[test]
fn handedness_follows_the_order_of_writing() {
    same("N[C@](F)(Cl)Br", "N[C@](Cl)(Br)F");
    differ("N[C@](F)(Cl)Br", "N[C@@](F)(Cl)Br");
    same("N[C@H](F)Cl", "[H][C@@](N)(F)Cl");
    same("N[C@]([H])(F)Cl", "N[C@H](F)Cl");
    same("[C@H](N)(F)Cl", "[C@@](N)([H])(F)Cl");
    same("C[C@H]1CCCCO1", "O1CCCC[C@@H]1C");
    same("C[C@@]1(F)CCO1", "C[C@@]1(F)CCO1");
    same("F[C@@]1(C)CCO1", "C[C@]1(F)CCO1");
    same("C[N@+](CC)(CCC)Cl", "CC[N@@+](C)(CCC)Cl");
}

#[test]
fn a_geometry_read_is_kept_at_each_identity_that_asks_for_it() {
    let mut molecule = read(r"C[C@H](F)/C=C\Cl").unwrap();
    molecule.keep_real_units(Identity::Geometric);
    assert_eq!(write(&molecule), write(&read(r"CC(F)/C=C\Cl").unwrap()));
    molecule.keep_real_units(Identity::Constitutional);
    assert_eq!(write(&molecule), write(&read("CC(F)C=CCl").unwrap()));
}

#[test]
fn a_bond_between_benzene_rings_is_single() {
    let biphenyl = read("c1ccccc1c1ccccc1").unwrap();
    let singles = biphenyl.bonds().filter(|&(_, _, order)| order == BondOrder::Single).count();
    assert_eq!(singles, 1);
    assert!(write(&biphenyl).contains('-'));
}
