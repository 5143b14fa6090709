//! The fast engine on frames held against the general one on molecules: same products, same
//! degeneracies, for every case that frames compile.

use std::collections::BTreeMap;

use haloshed::frame::compile::{is_compilable, places};
use haloshed::frame::{Decoration, Frame, Layout, Prepared, Workspace};
use haloshed::molecule::canonical::{Code, canonical_code};
use haloshed::molecule::{Halogen, Identity, Molecule};
use haloshed::rules::{Fraction, Rule, RuleSet, apply};

use crate::drawing::isomers;
use crate::reference::reference_network;

/// Each case that frames compile, as a rule of its own.
fn compilable() -> Vec<Rule> {
    let split = |rule: &Rule| -> Vec<Rule> {
        let cases = rule.cases.iter().filter(|case| is_compilable(case));
        cases.map(|case| Rule { cases: vec![case.clone()], ..rule.clone() }).collect()
    };
    RuleSet::shipped().rules().iter().filter(|rule| rule.copies == 1).flat_map(split).collect()
}

fn by_frame(rules: &[Rule], molecule: &Molecule, identity: Identity) -> BTreeMap<(usize, Code), Fraction> {
    let frame = Frame::of(molecule);
    let layout = Layout::new(&frame, &Halogen::ALL, identity).unwrap();
    let all = rules.iter().enumerate().flat_map(|(number, rule)| places(&frame, number, &rule.cases[0])).collect();
    let prepared = Prepared::new(frame, layout, all);
    let row = prepared.canonical_row_of(molecule).unwrap();
    let mut found: BTreeMap<(usize, Code), Fraction> = BTreeMap::new();
    prepared.expand(&row, &mut Workspace::new(&prepared), &mut |product| {
        let mut decoration = Decoration::bare(&prepared.frame);
        prepared.layout.unpack(product.row, &mut decoration);
        let mut made = prepared.frame.compose(&decoration);
        made.keep_real_units(identity);
        let share = Fraction::new(u64::from(product.n_matches), u64::from(product.n_outcomes));
        let sum = found.entry((product.case, canonical_code(&made))).or_insert(Fraction::new(0, 1));
        *sum = sum.plus(share);
    });
    found
}

fn by_molecule(rules: &[Rule], molecule: &Molecule, identity: Identity) -> BTreeMap<(usize, Code), Fraction> {
    let made = rules.iter().enumerate().flat_map(|(number, rule)| {
        let products = apply(rule, molecule, identity).unwrap();
        products.into_iter().map(move |product| ((number, product.code), product.degeneracy))
    });
    made.collect()
}

/// Walks the whole network of the cases and compares the engines at every compound.
fn check(drawing: &str, identity: Identity) {
    let rules = compilable();
    assert_eq!(rules.len(), 10, "hydration, hydrolysis and coupling alone leave the frame");
    let network = reference_network(&rules, &isomers(drawing, identity), identity, 5000);
    assert!(network.steps.len() > 3, "{drawing} has {} steps", network.steps.len());
    for (molecule, _) in network.compounds.values() {
        let (fast, slow) = (by_frame(&rules, molecule, identity), by_molecule(&rules, molecule, identity));
        if fast != slow {
            let name = |(number, code): &(usize, Code)| format!("{} {code:?}", rules[*number].name);
            let only = |a: &BTreeMap<(usize, Code), Fraction>, b: &BTreeMap<(usize, Code), Fraction>| {
                a.iter()
                    .filter(|(k, v)| b.get(k) != Some(v))
                    .map(|(k, v)| format!("{} {v}", name(k)))
                    .collect::<Vec<_>>()
            };
            panic!(
                "{drawing} {identity:?} at {} {molecule:?}\nfast only {:#?}\nslow only {:#?}",
                molecule.formula(),
                only(&fast, &slow),
                only(&slow, &fast)
            );
        }
    }
}

const DRAWINGS: [&str; 16] = [
    "ClC(Cl)(Cl)C(Cl)(Cl)Cl",
    "ClCC(Cl)CCl",
    "BrCC(Cl)C(F)=CCl",
    "ClC(Cl)=C(Cl)C(Cl)=C(Cl)Cl",
    "ClC=C(CCl)CCl",
    "CC(Cl)C(Cl)C(C)Cl",
    "ClCC(CCl)(CCl)CCl",
    "ClC1C(Cl)C(Cl)C1Cl",
    "ClC1C(Cl)C(Cl)C(Cl)C(Cl)C1Cl",
    "ClC12CCC(Cl)(C1)C(Cl)C2Cl",
    "ClC1C(Cl)CCCCC=C1",
    "ClC1=CC=CC=C1C(Cl)CCl",
    "NC(=O)C(Cl)(Cl)Br",
    "ClCC(O)C(Cl)Cl",
    "ClC=CC(Cl)C=CCl",
    "ClC1=CC(Cl)C(Cl)C2=C1CCCC2",
];

#[test]
fn engines_agree_on_connectivity() {
    for drawing in DRAWINGS {
        check(drawing, Identity::Constitutional);
    }
}

#[test]
fn engines_agree_with_geometry() {
    for drawing in DRAWINGS {
        check(drawing, Identity::Geometric);
    }
}

#[test]
fn engines_agree_with_full_configuration() {
    for drawing in DRAWINGS.into_iter().filter(|d| d.len() < 24) {
        check(drawing, Identity::Full);
    }
}
