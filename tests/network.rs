//! The enumeration: counts that are known otherwise, limits, threads, queries.

use haloshed::molecule::{Identity, Molecule};
use haloshed::network::{Limit, Limits, Network, Outcome, enumerate};
use haloshed::rules::{Fraction, Rule, RuleSet, Selection};
use haloshed::smiles;

pub(crate) fn rules(names: &str) -> Vec<Rule> {
    let only = (names != "default").then(|| names.split(',').map(str::to_owned).collect());
    RuleSet::shipped().select(&Selection { only, with: Vec::new() }).unwrap()
}

pub(crate) fn network(parent: &str, names: &str, identity: Identity) -> Network {
    enumerate(&[smiles::read(parent).unwrap()], &rules(names), identity, Limits::default(), 1).unwrap()
}

fn perchloro_alkane(n: usize) -> String {
    let inner: String = (2..n).map(|_| "C(Cl)(Cl)").collect();
    format!("ClC(Cl)(Cl){inner}C(Cl)(Cl)Cl")
}

/// Compounds by SMILES, steps by the SMILES of their ends.
fn listing(network: &Network) -> String {
    use std::fmt::Write;
    let texts: Vec<String> = (0..network.n_compounds() as u32).map(|c| smiles::write(&network.molecule(c))).collect();
    let mut out = format!("{:?}\n", network.outcome());
    for (id, text) in texts.iter().enumerate() {
        writeln!(out, "{} {text}", network.generation_of(id as u32)).unwrap();
    }
    for step in network.steps() {
        writeln!(
            out,
            "{} > {} rule {} x {}",
            texts[step.from as usize], texts[step.to as usize], step.rule, step.degeneracy
        )
        .unwrap();
    }
    out
}

#[test]
fn perchloro_alkanes_reach_as_many_compounds_as_transfer_matrices_count() {
    // Hydrogenolysis and vicinal elimination, constitutional; C2 to C6: the numbers are those
    // of a transfer-matrix and Burnside count made outside the program.
    for (n, expected) in [(2, 19), (3, 68), (4, 286), (5, 1216), (6, 5277)] {
        let found = network(&perchloro_alkane(n), "hydrogenolysis,vicinal-elimination", Identity::Constitutional);
        assert_eq!((n, found.n_compounds(), found.outcome()), (n, expected, Outcome::Complete));
    }
}

#[test]
fn the_network_is_the_same_for_any_number_of_threads() {
    let parent = [smiles::read("ClC(Cl)=C(Cl)C(Cl)=C(Cl)Cl").unwrap()];
    let run = |n| listing(&enumerate(&parent, &rules("default"), Identity::Geometric, Limits::default(), n).unwrap());
    let one = run(1);
    assert_eq!(one, run(2));
    assert_eq!(one, run(5));
}

#[test]
fn trichloroethene_gives_its_three_dichloroethenes_once_each() {
    let found = network("ClC=C(Cl)Cl", "hydrogenolysis", Identity::Geometric);
    let products: Vec<(String, Fraction)> =
        found.steps_from(0).map(|s| (smiles::write(&found.molecule(s.to)), s.degeneracy)).collect();
    let mut texts: Vec<&str> = products.iter().map(|(text, _)| text.as_str()).collect();
    texts.sort_unstable();
    assert_eq!(texts, ["C=C(Cl)Cl", "Cl/C=C/Cl", "Cl/C=C\\Cl"]);
    assert!(products.iter().all(|(_, degeneracy)| *degeneracy == Fraction::new(1, 1)));
}

#[test]
fn a_parent_without_geometry_is_expanded() {
    let found = network("ClC=CCl", "core", Identity::Geometric);
    assert_eq!(found.parents(), 0..2);
    let full = network("ClC1C(Cl)C(Cl)C(Cl)C(Cl)C1Cl", "hydrogenolysis", Identity::Full);
    assert_eq!(full.parents().len(), 9);
}

fn check_is_correct_part(cut: &Network, whole: &Network) {
    let Outcome::Cut { first_unexpanded, .. } = cut.outcome() else { panic!("the limit was reached") };
    assert!(cut.n_compounds() < whole.n_compounds());
    for compound in 0..cut.n_compounds() as u32 {
        assert_eq!(smiles::write(&cut.molecule(compound)), smiles::write(&whole.molecule(compound)));
        let n_steps = if (compound as usize) < first_unexpanded { whole.steps_from(compound).len() } else { 0 };
        assert_eq!(cut.steps_from(compound).len(), n_steps, "compound {compound}");
        assert!(cut.steps_from(compound).eq(whole.steps_from(compound).take(n_steps)));
    }
}

#[test]
fn limits_leave_a_correct_part() {
    let parent = [smiles::read(&perchloro_alkane(4)).unwrap()];
    let run = |limits| enumerate(&parent, &rules("core"), Identity::Geometric, limits, 2).unwrap();
    let whole = run(Limits::default());
    for max_compounds in [1, 7, 50, 300] {
        let cut = run(Limits { max_compounds, ..Limits::default() });
        assert!(cut.n_compounds() <= max_compounds);
        assert!(matches!(cut.outcome(), Outcome::Cut { limit: Limit::Compounds(n), .. } if n == max_compounds));
        check_is_correct_part(&cut, &whole);
    }
    for generation in [0, 1, 3] {
        let cut = run(Limits { max_generation: Some(generation), ..Limits::default() });
        assert_eq!(cut.n_generations(), generation as usize + 1);
        check_is_correct_part(&cut, &whole);
    }
    let cut = run(Limits { time: Some(std::time::Duration::ZERO), ..Limits::default() });
    assert_eq!(cut.n_compounds(), 1);
    check_is_correct_part(&cut, &whole);
}

#[test]
fn a_last_generation_that_is_the_end_is_no_limit() {
    let parent = [smiles::read("ClCCl").unwrap()];
    let limits = Limits { max_generation: Some(2), ..Limits::default() };
    let found = enumerate(&parent, &rules("hydrogenolysis"), Identity::Geometric, limits, 1).unwrap();
    assert_eq!((found.n_compounds(), found.outcome()), (3, Outcome::Complete));
}

#[test]
fn every_product_has_fewer_halogens_or_more_hydrogens() {
    for parent in ["ClCC(Cl)CCl", "FC(F)(F)C(Cl)Br", "ClC(Cl)=C(Cl)C(Cl)=C(Cl)Cl", "O=C(N)C(Cl)(Cl)Br"] {
        let found = network(parent, "core,alkyne-hydrogenation,alkene-hydrogenation", Identity::Geometric);
        let count = |m: &Molecule| (m.halogens().iter().sum::<u32>(), m.formula().n_hydrogens());
        for step in found.steps() {
            let (before, after) = (count(&found.molecule(step.from)), count(&found.molecule(step.to)));
            assert!(after.0 < before.0 || after.1 > before.1, "{parent}");
        }
    }
}

#[test]
fn compounds_are_found_by_molecule() {
    let found = network("ClCC(Cl)CCl", "default", Identity::Geometric);
    for compound in 0..found.n_compounds() as u32 {
        assert_eq!(found.find(&found.molecule(compound)), Some(compound));
    }
    assert_eq!(found.find(&smiles::read("BrCC(Cl)CCl").unwrap()), None);
    assert_eq!(found.find(&smiles::read("CCCC").unwrap()), None);
}

#[test]
fn petgraph_runs_on_the_network() {
    let found = network("ClCC(Cl)CCl", "core", Identity::Geometric);
    let mut reached = 0;
    let mut walk = petgraph::visit::Dfs::new(&found, 0);
    while walk.next(&found).is_some() {
        reached += 1;
    }
    assert_eq!(reached, found.n_compounds());
    assert!(!petgraph::algo::is_cyclic_directed(&found.to_graph()));
    let dominators = petgraph::algo::dominators::simple_fast(&found, 0);
    assert_eq!(dominators.root(), 0);
}
