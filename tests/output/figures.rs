//! Figures for Graphviz, kept where `.ci/run` renders them; a warning of Graphviz fails there.

use haloshed::network::Limits;
use haloshed::output::dot::style::{NodeKind, RuleStyle, rule_style};
use haloshed::output::dot::text::{formula_markup, markup, name_lines, quoted};
use haloshed::output::dot::{Dot, fits_a_page};
use haloshed::output::record::Network;
use haloshed::rules::RuleSet;
use haloshed::rules::library::Selection;

use super::sample::{limited_network_of, network_of};
use super::{check_kept, written};

fn check(name: &str, network: &Network) {
    check_kept(&format!("tests/figures/{name}.dot"), &written(&Dot, network));
}

#[test]
fn tetrachloroethene() {
    check("pce", &network_of("ClC(Cl)=C(Cl)Cl"));
}

#[test]
fn tetrachloroethane_with_carbenes() {
    check("tetrachloroethane", &network_of("ClC(Cl)C(Cl)Cl"));
}

#[test]
fn trichloropropane() {
    check("trichloropropane", &network_of("ClCC(Cl)CCl"));
}

#[test]
fn hexachloroethane_runs_to_the_right() {
    let network = network_of("ClC(Cl)(Cl)C(Cl)(Cl)Cl");
    assert!(written(&Dot, &network).contains("rankdir=LR"));
    check("hexachloroethane", &network);
}

#[test]
fn a_ring_is_drawn_with_its_smiles() {
    check("cyclohexane", &network_of("ClC1C(Cl)C(Cl)C(Cl)C(Cl)C1Cl"));
}

#[test]
fn a_network_too_large_for_a_page_is_not_shrunk() {
    let network = network_of("ClC(Cl)=C(Cl)C(Cl)=C(Cl)Cl");
    assert!(!fits_a_page(network.compounds.len()));
    assert!(!written(&Dot, &network).contains("graph [size="));
    check("hexachlorobutadiene", &network);
}

#[test]
fn a_cut_network_says_so_and_where() {
    let limits = Limits { max_generation: Some(1), ..Limits::default() };
    let network = limited_network_of("ClC(Cl)C(Cl)Cl", &Selection::default(), limits);
    let text = written(&Dot, &network);
    assert!(text.contains("INCOMPLETE"));
    assert_eq!(text.matches(" ...").count(), 4, "one mark for each compound of the last generation");
    check("cut", &network);
}

#[test]
fn every_shipped_rule_can_be_drawn() {
    let names = RuleSet::shipped().rules().iter().map(|rule| rule.name.clone()).collect();
    let every = Selection { only: Some(names), with: vec![] };
    let limits = Limits { max_generation: Some(2), ..Limits::default() };
    check("every_rule", &limited_network_of("ClCC=CC(Cl)Cl", &every, limits));
}

/// Names, conditions and reasons that would break a label that is not escaped.
#[test]
fn hostile_text_is_escaped() {
    let mut network = network_of("C=CCl");
    network.compounds[0].names = vec!["a & b <i>c</i> \"d\" \\n \\ {e|f}".to_owned()];
    network.compounds[1].names = vec!["</font>>]; x -> y\n\t\u{7}".to_owned()];
    network.compounds[2].condensed = "<CH&3>2".to_owned();
    network.header.rules.push("my \"rule\\".to_owned());
    network.steps[0].rule = "my \"rule\\".to_owned();
    check("hostile", &network);
}

#[test]
fn strings_and_markup_are_escaped() {
    assert_eq!(quoted("a\"b\\c\nd\u{7}"), "\"a\\\"b\\\\c\\nd \"");
    assert_eq!(markup("<&>\"'\n"), "&lt;&amp;&gt;&quot;' ");
}

#[test]
fn counts_in_a_formula_are_set_low() {
    let mut compound = network_of("ClC(Cl)C(Cl)Cl").compounds.remove(0);
    let mut low = |condensed: &str| {
        condensed.clone_into(&mut compound.condensed);
        formula_markup(&compound)
    };
    assert_eq!(low("CHCl2CHCl2"), "CHCl<sub>2</sub>CHCl<sub>2</sub>");
    assert_eq!(low("cis-CHCl=CHCl"), "cis-CHCl=CHCl");
    assert_eq!(low("(CH3)12C"), "(CH<sub>3</sub>)<sub>12</sub>C");
    assert_eq!(low("2-x"), "2-x");
    assert_eq!(low(&compound_smiles()), "ClC(Cl)C(Cl)Cl", "a SMILES stays as it is");
}

fn compound_smiles() -> String {
    network_of("ClC(Cl)C(Cl)Cl").compounds[0].smiles.clone()
}

#[test]
fn long_names_are_broken_after_hyphens_and_spaces() {
    let compound = &network_of("ClC(Cl)C(Cl)Cl").compounds[0];
    assert_eq!(name_lines(compound), ["1,1,2,2-", "tetrachloroethane", "(1122TeCA)"]);
}

#[test]
fn rules_are_told_apart_without_colour() {
    let names: Vec<String> = RuleSet::shipped().rules().iter().map(|rule| rule.name.clone()).collect();
    let styles: Vec<RuleStyle> = names.iter().map(|name| rule_style(name, &names)).collect();
    for (i, a) in styles.iter().enumerate() {
        for b in &styles[..i] {
            assert_ne!(a.mark, b.mark);
            assert_ne!((a.line, a.arrow), (b.line, b.arrow), "{} and {}", a.mark, b.mark);
        }
        assert!(!a.mark.starts_with('R'), "every shipped rule has a mark of its own");
    }
    let own = vec!["hydrogenolysis".to_owned(), "my-rule".to_owned()];
    assert_eq!(rule_style("my-rule", &own).mark, "R2");
}

#[test]
fn a_parent_that_is_an_end_product_is_drawn_as_parent() {
    let methane = network_of("C").compounds.remove(0);
    assert!(methane.is_end_product);
    assert_eq!(NodeKind::of(&methane), NodeKind::Parent);
}
