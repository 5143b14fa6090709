//! Condensed formulas, and that they do not depend on the order of atoms.

use haloshed::molecule::condensed::condensed;
use haloshed::smiles::read;
use proptest::prelude::*;

/// SMILES with the formula expected; a dash where there is none.
const FORMULAS: [(&str, &str); 44] = [
    ("C", "CH4"),
    ("CC", "CH3CH3"),
    ("C=C", "CH2=CH2"),
    ("C#C", "CH≡CH"),
    ("ClC#CCl", "CCl≡CCl"),
    ("C#CCl", "CH≡CCl"),
    ("C=CCl", "CH2=CHCl"),
    ("ClC=C(Cl)Cl", "CHCl=CCl2"),
    ("ClC(Cl)=C(Cl)Cl", "CCl2=CCl2"),
    (r"Cl/C=C\Cl", "cis-CHCl=CHCl"),
    (r"Cl/C=C/Cl", "trans-CHCl=CHCl"),
    ("ClC=CCl", "CHCl=CHCl"),
    (r"Cl/C=C(\Cl)Br", "(E)-CHCl=CBrCl"),
    (r"Cl/C=C(/Cl)Br", "(Z)-CHCl=CBrCl"),
    ("CCCl", "CH3CH2Cl"),
    ("ClC(Cl)(Cl)C(Cl)(Cl)Cl", "CCl3CCl3"),
    ("ClCC(Cl)CCl", "CH2ClCHClCH2Cl"),
    ("CC(Cl)CCl", "CH3CHClCH2Cl"),
    ("C=C=C", "CH2=C=CH2"),
    ("ClC(Cl)=C(Cl)C(Cl)=C(Cl)Cl", "CCl2=CClCCl=CCl2"),
    ("CC(C)CCl", "CH3CH(CH3)CH2Cl"),
    ("CC(C)(C)Cl", "CH3CCl(CH3)CH3"),
    ("CC(C)(C)C", "CH3C(CH3)2CH3"),
    ("ClCC(CCl)(CCl)CCl", "CH2ClC(CH2Cl)2CH2Cl"),
    ("OCCCl", "CH2ClCH2OH"),
    ("OCCO", "CH2(OH)CH2OH"),
    ("O=CC(Cl)(Cl)Cl", "CCl3CHO"),
    ("OC(=O)C(Cl)(Cl)Cl", "CCl3COOH"),
    ("NC(=O)C(Cl)(Cl)Br", "CBrCl2CONH2"),
    ("N#CC(Cl)Cl", "CHCl2CN"),
    ("ClC(Cl)(Cl)[N+](=O)[O-]", "CCl3NO2"),
    ("Cl[C]Cl", ":CCl2"),
    ("[CH2]", ":CH2"),
    ("C[C]Cl", "CH3CCl:"),
    ("[CH]CCl", "CH2ClCH:"),
    ("[C-]#[O+]", "CO"),
    ("C=O", "HCHO"),
    ("CO", "CH3OH"),
    ("FC(F)(F)C(Cl)Br", "CHBrClCF3"),
    ("ClCOCCl", "CH2ClOCH2Cl"),
    ("ClC1CC1", "-"),
    ("c1ccccc1", "-"),
    ("C[N+](C)(C)CCl", "-"),
    (r"Cl/C=C\C=C", "cis-CH2=CHCH=CHCl"),
];

fn check(smiles: &str, expected: &str) {
    let found = condensed(&read(smiles).unwrap());
    assert_eq!(found.as_deref().unwrap_or("-"), expected, "{smiles}");
}

#[test]
fn formulas_are_as_a_chemist_writes_them() {
    for (smiles, expected) in FORMULAS {
        check(smiles, expected);
    }
}

proptest! {
    #![proptest_config(ProptestConfig::with_cases(64))]

    #[test]
    fn the_order_of_atoms_does_not_show(index in 0..FORMULAS.len(), seed in any::<u64>()) {
        let molecule = read(FORMULAS[index].0).unwrap();
        let mut order: Vec<usize> = (0..molecule.n_atoms()).collect();
        let mut state = seed | 1;
        for i in (1..order.len()).rev() {
            state = state.wrapping_mul(6_364_136_223_846_793_005).wrapping_add(1_442_695_040_888_963_407);
            order.swap(i, (state >> 33) as usize % (i + 1));
        }
        prop_assert_eq!(condensed(&molecule.relabelled(&order)), condensed(&molecule));
    }
}
