//! What each shipped rule makes of molecules drawn by hand.

use haloshed::molecule::canonical::canonical_code;
use haloshed::molecule::{Atom, BondOrder, Element, Geometry, Halogen, Identity, Ligand, Molecule};
use haloshed::rules::check::read_rules;
use haloshed::rules::{Product, Rule, RuleSet, apply};

use crate::drawing::{draw, isomers};
use crate::reference::reference_network;

fn rule(name: &str) -> Rule {
    RuleSet::shipped().get(name).unwrap().clone()
}

/// Products of every isomer of `parent` together: drawing of the product, its degeneracy.
/// A drawing stands for all its isomers, each with this degeneracy.
fn check(name: &str, parent: &str, identity: Identity, expected: &[(&str, &str)]) {
    for parent in isomers(parent, identity) {
        check_one(&rule(name), &parent, identity, expected);
    }
}

fn check_one(rule: &Rule, parent: &Molecule, identity: Identity, expected: &[(&str, &str)]) {
    let found = apply(rule, parent, identity).unwrap();
    let mut wanted = Vec::new();
    for (drawing, degeneracy) in expected {
        for isomer in isomers(drawing, identity) {
            wanted.push((canonical_code(&isomer), *drawing, (*degeneracy).to_owned()));
        }
    }
    wanted.sort();
    let name = |product: &Product| {
        let known = wanted.iter().find(|(code, _, _)| *code == product.code);
        known.map_or_else(
            || format!("unexpected {}", product.molecule.formula()),
            |(_, drawing, _)| (*drawing).to_owned(),
        )
    };
    let shown: Vec<(String, String)> = found.iter().map(|p| (name(p), p.degeneracy.to_string())).collect();
    let wanted: Vec<(String, String)> = wanted.iter().map(|(_, d, n)| ((*d).to_owned(), n.clone())).collect();
    assert_eq!(shown, wanted, "{}", rule.name);
    for product in &found {
        check_balance(rule, parent, product);
    }
}

/// Mass and charge of a step by the formulas of both sides.
fn check_balance(rule: &Rule, parent: &Molecule, product: &Product) {
    let copies = u32::from(rule.copies);
    let (before, after) = (parent.formula(), product.molecule.formula());
    for element in Element::ALL {
        let water = if element == Element::O { product.water } else { 0 };
        let halide = element.halogen().map_or(0, |h| product.released[h as usize]);
        let left = i64::from(copies * before.count(element)) + i64::from(water);
        assert_eq!(left, i64::from(after.count(element)) + i64::from(halide), "{element} in {}", rule.name);
    }
    let left = i64::from(copies * before.n_hydrogens()) + i64::from(product.protons) + 2 * i64::from(product.water);
    assert_eq!(left, i64::from(after.n_hydrogens()), "hydrogen in {}", rule.name);
    let released: i32 = product.released.iter().map(|&n| i32::from(n)).sum();
    let copies = i32::from(rule.copies);
    let left = copies * before.charge() + product.protons - product.electrons;
    assert_eq!(left, after.charge() - released, "charge in {}", rule.name);
}

const GEOMETRIC: Identity = Identity::Geometric;
const FULL: Identity = Identity::Full;

#[test]
fn perchloroethene_gives_trichloroethene_four_ways() {
    check("hydrogenolysis", "ClC(Cl)=C(Cl)Cl", GEOMETRIC, &[("ClC=C(Cl)Cl", "4")]);
    check("vicinal-elimination", "ClC(Cl)=C(Cl)Cl", GEOMETRIC, &[("ClC#CCl", "4")]);
    check("geminal-elimination", "ClC(Cl)=C(Cl)Cl", GEOMETRIC, &[]);
}

#[test]
fn vinyl_hydrogenolysis_gives_both_isomers() {
    check("hydrogenolysis", "ClC=C(Cl)Cl", GEOMETRIC, &[("ClC=CCl", "1"), ("C=C(Cl)Cl", "1")]);
    check("vicinal-elimination", "ClC=C(Cl)Cl", GEOMETRIC, &[("C#CCl", "2")]);
    check("vicinal-elimination", "ClC=CCl", GEOMETRIC, &[("C#C", "1")]);
    check("hydrogenolysis", "ClC=C(Cl)Cl", Identity::Constitutional, &[("ClC=CCl", "2"), ("C=C(Cl)Cl", "1")]);
}

#[test]
fn trichloroethane_goes_all_ways() {
    check("hydrogenolysis", "ClCC(Cl)Cl", GEOMETRIC, &[("ClCCCl", "2"), ("CC(Cl)Cl", "1")]);
    check("vicinal-elimination", "ClCC(Cl)Cl", GEOMETRIC, &[("C=CCl", "2")]);
    check("dehydrohalogenation", "ClCC(Cl)Cl", GEOMETRIC, &[("C=C(Cl)Cl", "1"), ("ClC=CCl", "2")]);
    check("vicinal-elimination", "ClC(Cl)C(Cl)Cl", GEOMETRIC, &[("ClC=CCl", "2")]);
    check("vicinal-elimination", "ClC(Cl)(Cl)C(Cl)(Cl)Cl", GEOMETRIC, &[("ClC(Cl)=C(Cl)Cl", "9")]);
}

#[test]
fn vinyl_beside_saturated_gives_an_allene() {
    check("vicinal-elimination", "C=C(Cl)CCl", GEOMETRIC, &[("C=C=C", "1")]);
}

#[test]
fn halogens_on_aryl_acyl_and_nitrile_carbons_are_spectators() {
    for parent in ["ClC1=CC=CC=C1", "CC(=O)Cl", "N#CCl", "CN=C(Cl)C", "CSCl"] {
        for name in ["hydrogenolysis", "vicinal-elimination", "geminal-elimination", "hydrolysis", "coupling"] {
            check(name, parent, GEOMETRIC, &[]);
        }
    }
    check("hydrogenolysis", "ClCC1=CC=CC=C1Cl", GEOMETRIC, &[("CC1=CC=CC=C1Cl", "1")]);
    check("aryl-hydrogenolysis", "ClCC1=CC=CC=C1Cl", GEOMETRIC, &[("ClCC1=CC=CC=C1", "1")]);
}

#[test]
fn mixed_halogens_are_told_apart() {
    check("hydrogenolysis", "BrCCCl", GEOMETRIC, &[("CCBr", "1"), ("CCCl", "1")]);
    let products = apply(&rule("vicinal-elimination"), &draw("BrCCCl"), GEOMETRIC).unwrap();
    assert_eq!(products.len(), 1);
    assert_eq!(products[0].released[Halogen::Cl as usize], 1);
    assert_eq!(products[0].released[Halogen::Br as usize], 1);
    assert_eq!((products[0].electrons, products[0].protons, products[0].water), (2, 0, 0));
}

#[test]
fn hydrogenations() {
    check("alkyne-hydrogenation", "ClC#CCl", GEOMETRIC, &[("ClC=CCl", "1/2")]);
    check("alkyne-hydrogenation", "C#C", GEOMETRIC, &[("C=C", "1")]);
    check("alkene-hydrogenation", "C=CCl", GEOMETRIC, &[]);
    check("alkene-hydrogenation", "C=CC1=CC=CC=C1Cl", GEOMETRIC, &[]);
    check("alkene-hydrogenation", "C=CC=C", GEOMETRIC, &[("CCC=C", "2")]);
    check("alkene-hydrogenation", "C=C=C", GEOMETRIC, &[("CC=C", "2")]);
    check("alkene-hydrogenation", "C1=CC=CC=C1", GEOMETRIC, &[]);
}

/// The product of geminal elimination, which no drawing can show.
fn carbene(parent: &str) -> Product {
    let mut products = apply(&rule("geminal-elimination"), &draw(parent), GEOMETRIC).unwrap();
    assert_eq!(products.len(), 1);
    check_balance(&rule("geminal-elimination"), &draw(parent), &products[0]);
    products.remove(0)
}

fn carbon_monoxide() -> Molecule {
    let mut molecule = Molecule::new();
    let c = molecule.add_atom(Atom { charge: -1, ..Atom::neutral(Element::C, 0) });
    let o = molecule.add_atom(Atom { charge: 1, ..Atom::neutral(Element::O, 0) });
    molecule.add_bond(c, o, BondOrder::Triple);
    molecule
}

#[test]
fn carbenes_of_one_carbon_end_at_the_carbonyl_or_methanol() {
    let dichloro = carbene("ClC(Cl)(Cl)Cl");
    assert_eq!(dichloro.degeneracy.to_string(), "6");
    let products = apply(&rule("carbene-hydration"), &dichloro.molecule, GEOMETRIC).unwrap();
    assert_eq!(products.len(), 1);
    assert_eq!(products[0].code, canonical_code(&carbon_monoxide()));
    assert_eq!((products[0].electrons, products[0].protons, products[0].water), (0, -2, 1));
    check_balance(&rule("carbene-hydration"), &dichloro.molecule, &products[0]);
    check_one(&rule("carbene-hydration"), &carbene("ClC(Cl)Cl").molecule, GEOMETRIC, &[("C=O", "1")]);
    check_one(&rule("carbene-hydration"), &carbene("ClCCl").molecule, GEOMETRIC, &[("CO", "1")]);
    check_one(&rule("carbene-hydration"), &carbene("CC(Cl)(Cl)Cl").molecule, FULL, &[("CC(O)Cl", "1/2")]);
}

#[test]
fn carbenes_shift_by_each_hydrogen() {
    let ethylidene = carbene("CC(Cl)Cl");
    assert_eq!(ethylidene.degeneracy.to_string(), "1");
    check_one(&rule("carbene-shift"), &ethylidene.molecule, GEOMETRIC, &[("C=C", "3")]);
    check_one(&rule("carbene-hydration"), &ethylidene.molecule, GEOMETRIC, &[("CCO", "1")]);
    check_one(&rule("carbene-shift"), &carbene("CCC(Cl)(Cl)Cl").molecule, GEOMETRIC, &[("CC=CCl", "1")]);
    check_one(&rule("carbene-shift"), &carbene("ClC(Cl)(Cl)Cl").molecule, GEOMETRIC, &[]);
}

#[test]
fn core_rules_leave_a_carbene_alone() {
    let chloropropylidene = carbene("BrC(Br)CCCl");
    for name in ["hydrogenolysis", "vicinal-elimination", "geminal-elimination", "coupling", "hydrolysis"] {
        check_one(&rule(name), &chloropropylidene.molecule, GEOMETRIC, &[]);
    }
}

#[test]
fn follow_up_eliminations() {
    check("conjugate-elimination", "ClCC=CCCl", GEOMETRIC, &[("C=CC=C", "1")]);
    check("conjugate-elimination", "ClC(C)C=CC(C)Cl", GEOMETRIC, &[("CC=CC=CC", "1/3")]);
    check("vinylidene-elimination", "ClC(Cl)=CC", GEOMETRIC, &[("C#CC", "1")]);
    check("vinylidene-elimination", "ClC(Cl)=C", GEOMETRIC, &[("C#C", "2")]);
    check("vinylidene-elimination", "ClC(Cl)=C(Cl)Cl", GEOMETRIC, &[]);
    check("dehydrohalogenation", "CC(Cl)CC", GEOMETRIC, &[("C=CCC", "3"), ("CC=CC", "1")]);
    check("dehydrohalogenation", "C=CCl", GEOMETRIC, &[]);
}

#[test]
fn hydrolysis_is_at_saturated_carbon() {
    check("hydrolysis", "ClCCBr", GEOMETRIC, &[("OCCBr", "1"), ("OCCCl", "1")]);
    check("hydrolysis", "C=CCl", GEOMETRIC, &[]);
    check("hydrolysis", "CC(F)(Cl)Br", FULL, &[("CC(O)(F)Cl", "1/2"), ("CC(O)(F)Br", "1/2"), ("CC(O)(Cl)Br", "1/2")]);
}

#[test]
fn coupling_counts_pairs_once() {
    check("coupling", "ClC(Cl)(Cl)Cl", GEOMETRIC, &[("ClC(Cl)(Cl)C(Cl)(Cl)Cl", "10")]);
    check("coupling", "ClCBr", GEOMETRIC, &[("ClCCCl", "1"), ("ClCCBr", "1"), ("BrCCBr", "1")]);
    check("coupling", "CC=CCl", GEOMETRIC, &[("CC=CC=CC", "1/3")]);
}

#[test]
fn ring_limits_hold() {
    check("vicinal-elimination", "ClC1=C(Cl)CCCC1", GEOMETRIC, &[]);
    check("vicinal-elimination", "ClC1=C(Cl)CCCCCC1", GEOMETRIC, &[("C1#CCCCCCC1", "1")]);
    check("vicinal-elimination", "ClC1=CCCCC1Cl", GEOMETRIC, &[]);
    check("vicinal-elimination", "ClC1CC1Cl", GEOMETRIC, &[("C1=CC1", "1")]);
    check("vicinal-elimination", "ClC12CCC(C1)CC2Cl", GEOMETRIC, &[]);
    check("vicinal-elimination", "ClC1CCCCCCC1Cl", GEOMETRIC, &[("C1=CCCCCCC1", "1/2")]);
    check("vicinal-elimination", "ClC1CCCCCC1Cl", GEOMETRIC, &[("C1=CCCCCC1", "1")]);
}

#[test]
fn ring_limits_can_be_switched_off() {
    let text = "rule strained\n says \"no limits\"\n find\n site A\n site B\n bond A-B double\n halogen X on A\n \
                halogen Y on B\n edit\n release X\n release Y\n raise A-B\n uses 2 electrons\n ring limits off\n";
    let strained = read_rules("test", text).unwrap().remove(0);
    check_one(&strained, &draw("ClC1=C(Cl)CCCC1"), GEOMETRIC, &[("C1#CCCCC1", "1")]);
}

#[test]
fn hexachlorocyclohexane_ends_at_benzene_and_its_chlorides() {
    let set = RuleSet::shipped();
    let rules = [set.get("vicinal-elimination").unwrap().clone()];
    let parents = isomers("ClC1C(Cl)C(Cl)C(Cl)C(Cl)C1Cl", GEOMETRIC);
    let network = reference_network(&rules, &parents, GEOMETRIC, 100);
    let benzene = canonical_code(&draw("C1=CC=CC=C1"));
    assert!(network.compounds.contains_key(&benzene));
    assert!(!network.steps.keys().any(|(from, _, _)| *from == benzene));
    assert_eq!(network.compounds[&benzene].1, 3);
}

#[test]
fn untouched_double_bonds_keep_their_geometry() {
    let halogen =
        |m: &Molecule, on: usize| m.neighbours(on).map(|(n, _, _)| n).find(|&n| m.leaving_halogen(n).is_some());
    let geometry = |m: &Molecule| -> Geometry {
        let bond = (0..m.n_bonds()).find(|&b| m.bond(b).2 == BondOrder::Double).unwrap();
        let (a, b, _) = m.bond(bond);
        let at = |end: usize, other: usize| {
            let carbon = || m.neighbours(end).map(|(n, _, _)| n).find(|&n| n != other);
            Ligand::Neighbour(halogen(m, end).or_else(carbon).unwrap())
        };
        m.geometry_between(bond, at(a, b), at(b, a)).unwrap()
    };
    let parents = isomers("ClC=CCCl", GEOMETRIC);
    assert_eq!(parents.len(), 2);
    for parent in parents {
        let kept = canonical_code(
            &isomers("ClC=CC", GEOMETRIC).into_iter().find(|m| geometry(m) == geometry(&parent)).unwrap(),
        );
        let products = apply(&rule("hydrogenolysis"), &parent, GEOMETRIC).unwrap();
        let mut wanted = vec![kept, canonical_code(&draw("C=CCCl"))];
        wanted.sort();
        assert_eq!(products.into_iter().map(|p| p.code).collect::<Vec<_>>(), wanted);
    }
}

#[test]
fn branches_made_unlike_by_the_cut_give_configuration_by_which_was_cut() {
    check("hydrogenolysis", "ClC=C(CCl)CCl", GEOMETRIC, &[("ClC=C(C)CCl", "1"), ("C=C(CCl)CCl", "1")]);
    check("hydrogenolysis", "ClCC(O)CCl", FULL, &[("CC(O)CCl", "1")]);
    // The two centres of meso-2,4-dichloropentane and of its chiral isomer: the kept one
    // keeps its configuration.
    check("hydrogenolysis", "CC(Cl)CC(Cl)C", GEOMETRIC, &[("CCCC(Cl)C", "2")]);
    let degeneracies: Vec<Vec<String>> = isomers("CC(Cl)CC(Cl)C", FULL)
        .iter()
        .map(|parent| apply(&rule("hydrogenolysis"), parent, FULL).unwrap())
        .map(|products| products.iter().map(|p| p.degeneracy.to_string()).collect())
        .collect();
    let mut sorted = degeneracies;
    sorted.sort();
    assert_eq!(sorted, [vec!["1", "1"], vec!["2"], vec!["2"]]);
}

#[test]
fn touched_centres_give_every_outcome() {
    check("hydrogenolysis", "CC(Cl)(Br)F", FULL, &[("CC(Br)F", "1/2"), ("CC(Cl)F", "1/2"), ("CC(Cl)Br", "1/2")]);
}

#[test]
fn retained_configuration_follows_the_parent() {
    let text = "rule swap\n says \"front-side\"\n find\n site A\n chlorine X on A\n edit\n release X\n \
                add hydrogen to A\n uses 2 electrons\n uses 1 proton\n retain configuration\n";
    let swap = read_rules("test", text).unwrap().remove(0);
    let made = |parent: &Molecule, identity| -> Vec<Product> { apply(&swap, parent, identity).unwrap() };
    let hands: Vec<Vec<Product>> = isomers("CC(Cl)(Br)F", FULL).iter().map(|parent| made(parent, FULL)).collect();
    assert_eq!(hands.iter().map(Vec::len).collect::<Vec<_>>(), [1, 1]);
    assert_ne!(hands[0][0].code, hands[1][0].code);
    assert_eq!(hands[0][0].degeneracy.to_string(), "1");
    let sides: Vec<Vec<Product>> =
        isomers("CC(Cl)=CBr", GEOMETRIC).iter().map(|parent| made(parent, GEOMETRIC)).collect();
    assert_eq!(sides.iter().map(Vec::len).collect::<Vec<_>>(), [1, 1]);
    assert_ne!(sides[0][0].code, sides[1][0].code);
}

#[test]
fn retained_hydrogen_stands_where_the_chlorine_stood() {
    let text = "rule swap\n says \"front-side\"\n find\n site A vinyl\n chlorine X on A\n edit\n release X\n \
                add hydrogen to A\n uses 2 electrons\n uses 1 proton\n retain configuration\n";
    let swap = read_rules("test", text).unwrap().remove(0);
    for parent in isomers("CC(Cl)=CBr", GEOMETRIC) {
        let (carbon, chlorine, bromine) = (0, 2, 4);
        let bond = parent.bond_between(1, 3).unwrap();
        let before = parent.geometry_between(bond, Ligand::Neighbour(carbon), Ligand::Neighbour(bromine)).unwrap();
        let other = parent.geometry_between(bond, Ligand::Neighbour(chlorine), Ligand::Neighbour(bromine)).unwrap();
        assert_ne!(before, other);
        let product = apply(&swap, &parent, GEOMETRIC).unwrap().remove(0).molecule;
        // The chlorine was atom 2, so the later atoms have moved up by one.
        let bond = product.bond_between(1, 2).unwrap();
        assert_eq!(product.geometry_between(bond, Ligand::Neighbour(0), Ligand::Neighbour(3)), Some(before));
        assert_eq!(product.geometry_between(bond, Ligand::Hydrogen, Ligand::Neighbour(3)), Some(other));
    }
}

#[test]
fn an_open_parent_is_refused() {
    let error = apply(&rule("hydrogenolysis"), &draw("ClC=CCl"), GEOMETRIC).unwrap_err();
    assert_eq!(
        error.to_string(),
        "the double bond that is bond 2 has no configuration, so this is not one compound; expand it to its isomers first"
    );
}

#[test]
fn atom_order_changes_nothing() {
    for drawing in ["ClC(Br)C=C(Cl)C(F)Cl", "ClC1C(Cl)C(Cl)C1Br", "ClCC(C)(Br)C(Cl)=CCl"] {
        for parent in isomers(drawing, FULL) {
            let n = parent.n_atoms();
            let turned = parent.relabelled(&(0..n).map(|i| (i * 7 + 3) % n).collect::<Vec<_>>());
            for rule in RuleSet::shipped().rules() {
                let view = |m: &Molecule| -> Vec<(Vec<u32>, String)> {
                    apply(rule, m, FULL).unwrap().into_iter().map(|p| (p.code, p.degeneracy.to_string())).collect()
                };
                assert_eq!(view(&parent), view(&turned), "{} on {drawing}", rule.name);
            }
        }
    }
}

#[test]
fn every_step_of_whole_networks_balances() {
    let set = RuleSet::shipped();
    for drawing in
        ["ClC(Cl)C(Cl)Cl", "ClCC(Cl)CCl", "FC(F)(F)C(Cl)Br", "NC(=O)C(Cl)(Cl)Br", "ClC(Cl)=C(Cl)C(Cl)=C(Cl)Cl"]
    {
        let defaults: Vec<Rule> = set.rules().iter().filter(|r| r.on_by_default).cloned().collect();
        let network = reference_network(&defaults, &isomers(drawing, GEOMETRIC), GEOMETRIC, 2000);
        for (molecule, _) in network.compounds.values() {
            for rule in set.rules().iter().filter(|r| r.copies == 1) {
                for product in apply(rule, molecule, GEOMETRIC).unwrap() {
                    check_balance(rule, molecule, &product);
                    assert_eq!(product.code, canonical_code(&product.molecule));
                }
            }
        }
    }
}

/// A product's code is made after idle units were forgotten; it must tell the same compounds
/// apart as the code in which every candidate is set, whatever parent they came from.
#[test]
fn forgetting_idle_units_tells_the_same_compounds_apart() {
    let core: Vec<Rule> = RuleSet::shipped().rules().iter().filter(|r| r.on_by_default).cloned().collect();
    for drawing in ["CC(Cl)C(Cl)C(Cl)C", "ClC1C(Cl)C(Cl)C1Cl", "ClC=CC(C=CCl)Cl", "ClC(C)C(C(C)Cl)=C(Cl)C"] {
        let network = reference_network(&core, &isomers(drawing, FULL), FULL, 3000);
        let mut all_set: Vec<Vec<u32>> = Vec::new();
        for (molecule, _) in network.compounds.values() {
            let mut set = molecule.clone();
            for unit in molecule.candidate_units() {
                if !molecule.is_given(unit) {
                    set.set_unit(unit, true);
                }
            }
            all_set.push(canonical_code(&set));
        }
        let n = all_set.len();
        all_set.sort();
        all_set.dedup();
        assert_eq!(all_set.len(), n, "{drawing}");
        assert!(n > 10, "{drawing} {n}");
    }
}
