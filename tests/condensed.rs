//! Condensed formulas, and that they do not depend on the order of atoms.

use std::collections::BTreeMap;
use std::iter::Peekable;
use std::str::Chars;

use haloshed::catalogue;
use haloshed::molecule::condensed::condensed;
use haloshed::molecule::{Identity, Molecule};
use haloshed::network::{Limits, enumerate};
use haloshed::rules::RuleSet;
use haloshed::rules::library::Selection;
use haloshed::smiles::read;
use proptest::prelude::*;

/// SMILES with the formula expected; a dash where there is none.
const FORMULAS: [(&str, &str); 60] = [
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
    ("CS(=O)(=O)CCl", "CH2ClSO2CH3"),
    ("O=C=O", "CO2"),
    ("ClC(Cl)=O", "COCl2"),
    ("CC(=O)CCl", "CH3COCH2Cl"),
    ("COC(=O)CCl", "CH2ClCOOCH3"),
    (r"Cl/C=C\C=C\Cl", "(Z,E)-CHCl=CHCH=CHCl"),
    (r"Cl/C=C/C=C\Cl", "(Z,E)-CHCl=CHCH=CHCl"),
    (r"Cl/C=C\C=C/Cl", "(Z,Z)-CHCl=CHCH=CHCl"),
    // The ligands differ in a branch only: CH2Cl and CH3 against CH2F and CH3.
    (r"CC(CCl)/C(C)=C(\Cl)C(F)F", "(Z)-CH2ClCH(CH3)C(CH3)=CClCHF2"),
    (r"Cl/C(F)=C(C(C)CCl)\C(C)CF", "(E)-CH2FCH(CH3)C(=CClF)CH(CH3)CH2Cl"),
    // The same, its branches drawn in other orders.
    (r"Cl/C(F)=C(C(CCl)C)\C(C)CF", "(E)-CH2FCH(CH3)C(=CClF)CH(CH3)CH2Cl"),
    (r"Cl/C(F)=C(C(CCl)C)\C(CF)C", "(E)-CH2FCH(CH3)C(=CClF)CH(CH3)CH2Cl"),
    (r"Cl/C(F)=C(C(C)CCl)\C(CF)C", "(E)-CH2FCH(CH3)C(=CClF)CH(CH3)CH2Cl"),
    (r"C(CF)(C)\C(C(C)CCl)=C(F)\Cl", "(Z)-CH2FCH(CH3)C(=CClF)CH(CH3)CH2Cl"),
    // One letter for each of three side chains would not say which is which.
    (r"Cl/C=C\CC(C/C=C\Cl)C/C=C/Cl", "-"),
    ("ClCC[CH-]CCl", "-"),
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

/// Symbols with their numbers in a condensed formula without prefix, what stands in parentheses
/// counted as often as it says.
fn counted(formula: &mut Peekable<Chars<'_>>) -> BTreeMap<String, u32> {
    let mut counts: BTreeMap<String, u32> = BTreeMap::new();
    while let Some(c) = formula.next() {
        let group = match c {
            ')' => break,
            '(' => counted(formula),
            '=' | '≡' | ':' => continue,
            _ => {
                let second = formula.next_if(char::is_ascii_lowercase);
                BTreeMap::from([(String::from(c) + &second.map_or(String::new(), String::from), 1)])
            }
        };
        let mut times = String::new();
        while let Some(digit) = formula.next_if(char::is_ascii_digit) {
            times.push(digit);
        }
        for (symbol, n) in group {
            *counts.entry(symbol).or_default() += n * times.parse().unwrap_or(1);
        }
    }
    counts
}

/// Holds the atoms of a condensed formula against the molecular formula.
fn check_atoms(molecule: &Molecule) {
    let Some(found) = condensed(molecule) else { return };
    let plain = found.find(")-").map_or(found.as_str(), |end| &found[end + 2..]);
    let plain = plain.trim_start_matches("cis-").trim_start_matches("trans-");
    let formula = molecule.formula().to_string();
    assert_eq!(counted(&mut plain.chars().peekable()), counted(&mut formula.chars().peekable()), "{found}");
}

#[test]
fn no_atom_is_lost_or_added() {
    let every = catalogue::entries().iter().map(|entry| entry.smiles.as_str());
    every.chain(FORMULAS.iter().map(|&(smiles, _)| smiles)).for_each(|smiles| check_atoms(&read(smiles).unwrap()));
}

#[test]
fn a_formula_stands_for_one_compound_of_a_network() {
    let rules = RuleSet::shipped().select(&Selection::default()).unwrap();
    let parents = [
        "ClC(Cl)C(Cl)Cl",
        "ClC(Cl)=C(Cl)C(Cl)=C(Cl)Cl",
        "ClC(Cl)C(Br)CC(Cl)Br",
        "ClCC(CCl)(CCl)C(Cl)Br",
        "ClCOC(Cl)CCl",
    ];
    for parent in parents {
        let network = enumerate(&[read(parent).unwrap()], &rules, Identity::Geometric, Limits::default(), 1).unwrap();
        let mut known = BTreeMap::new();
        for id in 0..network.n_compounds() as u32 {
            let molecule = network.molecule(id);
            check_atoms(&molecule);
            if let Some(formula) = condensed(&molecule) {
                let other = known.insert(formula.clone(), id);
                assert_eq!(other, None, "{formula} in the network of {parent}");
            }
        }
        assert!(known.len() > 5, "{parent}");
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
