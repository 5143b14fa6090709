//! A slow enumerator of whole networks by the general engine, to hold the fast one against.

use std::collections::BTreeMap;

use haloshed::molecule::canonical::{Code, canonical_code};
use haloshed::molecule::{Identity, Molecule};
use haloshed::rules::apply::apply;
use haloshed::rules::{Fraction, Rule};

/// A network by canonical codes.
#[derive(Debug, Default)]
pub(crate) struct ReferenceNetwork {
    /// Every compound, with its generation: the fewest steps from a parent.
    pub(crate) compounds: BTreeMap<Code, (Molecule, u32)>,
    /// Degeneracy of every step, by (from, to, rule name).
    pub(crate) steps: BTreeMap<(Code, Code, String), Fraction>,
}

/// Everything that the rules make of the parents, generation by generation.
pub(crate) fn reference_network(
    rules: &[Rule],
    parents: &[Molecule],
    identity: Identity,
    most: usize,
) -> ReferenceNetwork {
    let mut network = ReferenceNetwork::default();
    let mut frontier: Vec<Code> = Vec::new();
    for parent in parents {
        add(&mut network, &mut frontier, parent.clone(), 0);
    }
    let mut generation = 0;
    while !frontier.is_empty() {
        let mut next = Vec::new();
        for code in std::mem::take(&mut frontier) {
            let molecule = network.compounds[&code].0.clone();
            for rule in rules.iter().filter(|r| r.generations.as_ref().is_none_or(|g| g.contains(&generation))) {
                for product in apply(rule, &molecule, identity).unwrap() {
                    let key = (code.clone(), product.code, rule.name.clone());
                    assert!(network.steps.insert(key, product.degeneracy).is_none(), "a step comes once");
                    add(&mut network, &mut next, product.molecule, generation + 1);
                }
            }
        }
        assert!(network.compounds.len() <= most, "the network is larger than {most}");
        (frontier, generation) = (next, generation + 1);
    }
    network
}

fn add(network: &mut ReferenceNetwork, frontier: &mut Vec<Code>, molecule: Molecule, generation: u32) {
    let code = canonical_code(&molecule);
    if !network.compounds.contains_key(&code) {
        network.compounds.insert(code.clone(), (molecule, generation));
        frontier.push(code);
    }
}
