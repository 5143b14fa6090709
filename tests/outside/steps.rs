//! Products, degeneracies and whole networks held against a second implementation.
//!
//! `rdkit/README.md` says how the tables were made.

use std::collections::BTreeMap;

use super::counts::{reached_by_core_rules, reached_by_hydrogenolysis};

use haloshed::molecule::{Identity, Molecule};
use haloshed::network::{Limits, enumerate};
use haloshed::rules::apply::apply;
use haloshed::rules::{Fraction, RuleSet, Selection};
use haloshed::smiles::{read, write};

fn rows(table: &str) -> Vec<Vec<String>> {
    let mut reader = csv::Reader::from_reader(table.as_bytes());
    reader.records().map(|row| row.unwrap().iter().map(String::from).collect()).collect()
}

fn at(text: &str, identity: Identity) -> Molecule {
    let mut molecule = read(text).unwrap_or_else(|error| panic!("{text}: {error}"));
    molecule.keep_real_units(identity);
    molecule
}

#[test]
fn first_steps_are_those_of_the_second_implementation() {
    let rules = RuleSet::shipped();
    let mut expected: BTreeMap<(String, String, String), BTreeMap<String, String>> = BTreeMap::new();
    for row in rows(include_str!("rdkit/steps.csv")) {
        let identity = if row[0] == "full" { Identity::Full } else { Identity::Geometric };
        let products = expected.entry((row[0].clone(), row[1].clone(), row[2].clone())).or_default();
        if !row[3].is_empty() {
            assert_eq!(products.insert(write(&at(&row[3], identity)), row[5].clone()), None, "{row:?}");
        }
    }
    let mut wrong = Vec::new();
    for ((depth, parent, rule), products) in &expected {
        let identity = if depth == "full" { Identity::Full } else { Identity::Geometric };
        let found = match apply(rules.get(rule).unwrap(), &at(parent, identity), identity) {
            Ok(found) => found,
            Err(error) => {
                wrong.push(format!("{rule} on {parent} at {depth}: {error}"));
                continue;
            }
        };
        let found: BTreeMap<String, String> =
            found.iter().map(|product| (write(&product.molecule), product.degeneracy.to_string())).collect();
        if found != *products {
            wrong.push(format!("{rule} on {parent} at {depth}:\n  found {found:?}\n  expected {products:?}"));
        }
    }
    assert!(wrong.is_empty(), "{} of {} differ\n{}", wrong.len(), expected.len(), wrong.join("\n"));
}

#[test]
fn networks_are_those_of_the_second_implementation() {
    let core = Selection { only: Some(vec!["core".to_owned()]), with: vec![] };
    let rules = RuleSet::shipped().select(&core).unwrap();
    let mut listed: BTreeMap<String, Vec<String>> = BTreeMap::new();
    for row in rows(include_str!("rdkit/network_compounds.csv")) {
        listed.entry(row[0].clone()).or_default().push(write(&at(&row[1], Identity::Geometric)));
    }
    let mut wrong = Vec::new();
    for row in rows(include_str!("rdkit/networks.csv")) {
        let parents = read(&row[0]).unwrap().isomers(Identity::Geometric, 4096).unwrap();
        let network = enumerate(&parents, &rules, Identity::Geometric, Limits::default(), 1).unwrap();
        let molecules: Vec<Molecule> = (0..network.n_compounds() as u32).map(|id| network.molecule(id)).collect();
        let transients = molecules.iter().filter(|m| (0..m.n_atoms()).any(|a| m.is_carbene(a))).count();
        let sum = network.steps().fold(Fraction::new(0, 1), |sum, step| sum.plus(step.degeneracy));
        let by_rule = (0..3).map(|rule| network.steps().filter(|step| step.rule == rule).count());
        let mut found = vec![parents.len(), molecules.len(), transients, network.n_steps()];
        found.extend(by_rule);
        let found: Vec<String> = found.iter().map(usize::to_string).chain([sum.to_string()]).collect();
        let mut texts: Vec<String> = molecules.iter().map(write).collect();
        texts.sort();
        let wanted = listed.get_mut(&row[0]).unwrap();
        wanted.sort();
        if found != row[1..] {
            wrong.push(format!("{}: found {found:?}, expected {:?}", row[0], &row[1..]));
        }
        if texts != *wanted {
            wrong.push(format!("{}: found {texts:?}\n  expected {wanted:?}", row[0]));
        }
    }
    assert!(wrong.is_empty(), "{}", wrong.join("\n"));
}

/// Number of compounds that rules of these names reach from the perchlorinated n-alkane.
fn reached(n_carbons: usize, names: &str) -> u64 {
    let middle = "C(Cl)(Cl)".repeat(n_carbons - 1);
    let parent = read(&format!("Cl{middle}C(Cl)(Cl)Cl")).unwrap();
    let selection = Selection { only: Some(vec![names.to_owned()]), with: vec![] };
    let rules = RuleSet::shipped().select(&selection).unwrap();
    let network = enumerate(&[parent], &rules, Identity::Constitutional, Limits::default(), 1).unwrap();
    network.n_compounds() as u64
}

#[test]
fn networks_of_perchloroalkanes_are_as_large_as_counted() {
    for n_carbons in 1..=5 {
        assert_eq!(reached(n_carbons, "hydrogenolysis"), reached_by_hydrogenolysis(n_carbons));
        assert_eq!(reached(n_carbons, "core"), reached_by_core_rules(n_carbons));
    }
}
