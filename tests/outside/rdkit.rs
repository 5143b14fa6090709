//! Identity and isomers held against InChI, by way of `RDKit`.
//!
//! `rdkit/README.md` says with which versions the tables were made, and how to make them again.

use std::collections::{BTreeMap, BTreeSet};

use haloshed::molecule::Identity;
use haloshed::smiles::{read, write};

/// Most settings of open units that are tried for one parent.
const MOST_SETTINGS: usize = 4096;

/// Rows of a table as text, by column.
fn rows(table: &str) -> Vec<Vec<String>> {
    let mut reader = csv::Reader::from_reader(table.as_bytes());
    reader.records().map(|row| row.unwrap().iter().map(String::from).collect()).collect()
}

/// Pairs that set two names of things against each other where one has two partners.
fn disagreements(pairs: &BTreeSet<(String, String)>) -> Vec<String> {
    let mut partners: BTreeMap<&str, BTreeSet<&str>> = BTreeMap::new();
    for (one, other) in pairs {
        partners.entry(one).or_default().insert(other);
        partners.entry(other).or_default().insert(one);
    }
    let torn = partners.iter().filter(|(_, with)| with.len() > 1);
    torn.map(|(name, with)| format!("{name} goes with {with:?}")).collect()
}

#[test]
fn one_canonical_text_for_each_inchi_and_one_inchi_for_each_text() {
    let table = rows(include_str!("rdkit/identity.csv"));
    assert!(table.len() >= 200, "{} rows", table.len());
    let mut pairs = BTreeSet::new();
    for row in &table {
        for drawn in &row[2..] {
            let compound = read(drawn).unwrap_or_else(|error| panic!("{drawn}: {error}"));
            pairs.insert((row[1].clone(), write(&compound)));
        }
    }
    assert_eq!(disagreements(&pairs), Vec::<String>::new());
}

#[test]
fn the_texts_read_back_to_themselves() {
    for row in rows(include_str!("rdkit/identity.csv")) {
        let text = write(&read(&row[2]).unwrap());
        assert_eq!(write(&read(&text).unwrap()), text, "from {}", row[2]);
    }
}

/// Canonical texts of the isomers that a drawing stands for.
fn isomer_texts(drawn: &str, identity: Identity) -> Vec<String> {
    let isomers = read(drawn).unwrap().isomers(identity, MOST_SETTINGS);
    let isomers = isomers.unwrap_or_else(|n| panic!("{drawn}: {n} settings"));
    let mut texts: Vec<String> = isomers.iter().map(write).collect();
    texts.sort();
    texts
}

#[test]
fn isomers_are_those_that_inchi_tells_apart() {
    let mut expected: BTreeMap<(String, String), Vec<String>> = BTreeMap::new();
    for row in rows(include_str!("rdkit/isomers.csv")) {
        let texts = expected.entry((row[0].clone(), row[1].clone())).or_default();
        texts.push(write(&read(&row[2]).unwrap()));
    }
    assert!(expected.len() >= 50, "{} sets", expected.len());
    let mut wrong = Vec::new();
    for ((drawn, depth), mut texts) in expected {
        let identity = if depth == "full" { Identity::Full } else { Identity::Geometric };
        texts.sort();
        let found = isomer_texts(&drawn, identity);
        if found != texts {
            wrong.push(format!("{drawn} at {depth}: found {found:?}, expected {texts:?}"));
        }
    }
    assert!(wrong.is_empty(), "{}", wrong.join("\n"));
}
