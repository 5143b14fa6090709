//! Whole outputs of the writers. Energies are invented; see `sample`.

use haloshed::output::csv::Csv;
use haloshed::output::explain::{Contribution, Explanation, Part, write_explanation};
use haloshed::output::json::Json;
use haloshed::output::jsonl::Jsonl;
use haloshed::output::record::{GibbsOrigin, Network};
use haloshed::output::rule_list::write_rule_list;
use haloshed::output::steps::{HalfReactions, equation};
use haloshed::output::summary::Summary;
use haloshed::output::table::Table;
use haloshed::rules::RuleSet;
use haloshed::rules::library::Selection;
use insta::assert_snapshot;

use super::sample::{limited_network_of, network_of};
use super::written;

/// Dichloroethane with two steps spoilt: one without an estimate, one compound without a value.
fn with_gaps() -> Network {
    let mut network = network_of("CC(Cl)Cl");
    network.compounds[1].gibbs_aq_kj_per_mol = None;
    network.compounds[1].gibbs_sd_kj_per_mol = None;
    network.compounds[1].gibbs_origin = GibbsOrigin::None;
    "no value for the group X (invented)".clone_into(&mut network.compounds[1].gibbs_source);
    network.steps[0].e_standard_volt = None;
    network.steps[0].e_volt = None;
    network.steps[0].e_sd_volt = None;
    network.steps[0].e_missing = Some("no value for the group X (invented)".to_owned());
    network
}

#[test]
fn a_table_for_reading() {
    assert_snapshot!(written(&Table, &network_of("ClC(Cl)=C(Cl)Cl")));
}

#[test]
fn a_table_says_what_has_no_estimate() {
    assert_snapshot!(written(&Table, &with_gaps()));
}

#[test]
fn a_table_of_long_names_stays_on_the_page() {
    let mut network = network_of("ClC(Cl)C(Cl)Cl");
    network.compounds[1].names = vec!["a-name-that-goes-on-and-on-".repeat(6)];
    network.compounds[2].condensed = "C(Cl)".repeat(40);
    let text = written(&Table, &network);
    let widest = text.lines().map(|line| line.chars().count()).max();
    assert!(widest <= Some(98), "{widest:?}");
}

#[test]
fn a_summary() {
    assert_snapshot!(written(&Summary { enumeration: None, energies: None }, &network_of("ClC(Cl)C(Cl)Cl")));
}

#[test]
fn a_summary_with_times() {
    let summary = Summary {
        enumeration: Some(std::time::Duration::from_micros(1940)),
        energies: Some(std::time::Duration::from_millis(12_345)),
    };
    let text = written(&summary, &network_of("C"));
    assert_eq!(text.lines().last(), Some("time: enumeration 1.9 ms, energies 12.35 s"));
}

#[test]
fn json() {
    assert_snapshot!(written(&Json, &network_of("C=CCl")));
}

#[test]
fn json_lines() {
    assert_snapshot!(written(&Jsonl, &network_of("C=CCl")));
}

#[test]
fn a_table_of_compounds_as_csv() {
    assert_snapshot!(written(&Csv::Compounds, &with_gaps()));
}

#[test]
fn a_table_of_steps_as_csv() {
    assert_snapshot!(written(&Csv::Steps, &with_gaps()));
}

#[test]
fn a_csv_of_no_steps_has_its_headings() {
    let (none, some) = (written(&Csv::Steps, &network_of("C")), written(&Csv::Steps, &network_of("C=CCl")));
    assert_eq!(none.lines().count(), 1);
    assert_eq!(none.lines().next(), some.lines().next());
}

#[test]
fn no_text_cell_can_become_a_formula() {
    let mut network = network_of("C=CCl");
    let attacks = ["=1+2", "+1", "-1+2", "@SUM(A1)", "\t=1", "\r=1", "=HYPERLINK(\"x\",\"y\")"];
    for attack in attacks {
        for compound in &mut network.compounds {
            compound.names = vec![attack.to_owned(), attack.to_owned()];
            compound.abbreviations = vec![attack.to_owned()];
            compound.condensed = attack.to_owned();
            compound.gibbs_source = attack.to_owned();
        }
        network.steps[0].rule = attack.to_owned();
        network.steps[0].e_missing = Some(attack.to_owned());
        for table in [Csv::Compounds, Csv::Steps] {
            let text = written(&table, &network);
            let mut reader = csv::Reader::from_reader(text.as_bytes());
            let cells: Vec<String> =
                reader.records().flat_map(|row| row.unwrap().iter().map(str::to_owned).collect::<Vec<_>>()).collect();
            assert!(cells.contains(&format!("'{attack}")), "the text is still there: {attack:?}");
            for cell in cells.iter().filter(|cell| cell.parse::<f64>().is_err()) {
                assert!(!cell.starts_with(['=', '+', '-', '@', '\t', '\r']), "{cell:?}");
            }
        }
    }
}

#[test]
fn numbers_in_csv_stay_numbers() {
    let text = written(&Csv::Steps, &network_of("ClC#CCl"));
    let mut reader = csv::Reader::from_reader(text.as_bytes());
    let column = reader.headers().unwrap().iter().position(|name| name == "e_volt").unwrap();
    let values: Vec<f64> = reader.records().map(|row| row.unwrap()[column].parse().unwrap()).collect();
    assert!(values.len() > 3);
}

#[test]
fn half_reactions_highest_first() {
    assert_snapshot!(written(&HalfReactions, &network_of("ClC(Cl)C(Cl)Cl")));
}

#[test]
fn half_reactions_of_every_isomer() {
    assert_snapshot!(written(&HalfReactions, &network_of("ClC=CCl")));
}

#[test]
fn half_reactions_without_an_estimate() {
    assert_snapshot!(written(&HalfReactions, &with_gaps()));
}

#[test]
fn a_compound_without_steps_says_so() {
    let text = written(&HalfReactions, &network_of("C"));
    assert!(text.contains("No rule reduces it."), "{text}");
    assert!(written(&Table, &network_of("C")).contains("No steps."));
}

/// The first steps of a compound by one rule, as equations.
fn equations(parent: &str, rule: &str) -> Vec<String> {
    let selection = Selection { only: Some(vec![rule.to_owned()]), with: vec![] };
    let network = limited_network_of(parent, &selection, haloshed::network::Limits::default());
    network.steps.iter().filter(|step| step.from == 1).map(|step| equation(&network, step)).collect()
}

#[test]
fn equations_balance_on_either_side() {
    assert_eq!(equations("ClC(Cl)=C(Cl)Cl", "hydrogenolysis"), ["CCl2=CCl2 + H+ + 2 e- -> CHCl=CCl2 + Cl-"]);
    assert_eq!(equations("ClCCCl", "vicinal-elimination"), ["CH2ClCH2Cl + 2 e- -> CH2=CH2 + 2 Cl-"]);
    assert_eq!(equations("FCCBr", "vicinal-elimination"), ["CH2BrCH2F + 2 e- -> CH2=CH2 + F- + Br-"]);
    assert_eq!(equations("C#C", "alkyne-hydrogenation"), ["CH≡CH + 2 H+ + 2 e- -> CH2=CH2"]);
    assert_eq!(equations("CCCl", "dehydrohalogenation"), ["CH3CH2Cl -> CH2=CH2 + H+ + Cl-"]);
    assert_eq!(equations("CCl", "hydrolysis"), ["CH3Cl + H2O -> CO + H+ + Cl-"], "methanol, as SMILES");
    assert_eq!(equations("CCl", "coupling"), ["2 CH3Cl + 2 e- -> CH3CH3 + 2 Cl-"]);
}

#[test]
fn rules_in_a_list() {
    let mut bytes = Vec::new();
    write_rule_list(RuleSet::shipped().rules(), &mut bytes).unwrap();
    assert_snapshot!(String::from_utf8(bytes).unwrap());
}

#[test]
fn an_explanation_group_by_group() {
    // Invented numbers.
    let group = |label: &str, count, value, sd| Contribution {
        label: label.to_owned(),
        count,
        value,
        sd,
        source: "fit (invented)".to_owned(),
    };
    let explanation = Explanation {
        title: "trichloroethene (TCE), CHCl=CCl2".to_owned(),
        smiles: "C(=C(Cl)Cl)Cl".to_owned(),
        parts: vec![
            Part {
                quantity: "enthalpy of formation, ideal gas".to_owned(),
                unit: "kJ/mol".to_owned(),
                value: Some((-17.5, 3.0)),
                source: "a handbook (invented)".to_owned(),
                contributions: vec![],
            },
            Part {
                quantity: "hydration, log10 kH".to_owned(),
                unit: "log units".to_owned(),
                value: Some((-0.96, 0.26)),
                source: "sum of groups".to_owned(),
                contributions: vec![
                    group("C=C", 1.0, -2.31, 0.05),
                    group("C2-Cl", 3.0, 0.45, 0.04),
                    group("a correction", 0.5, -0.001, 0.3),
                ],
            },
            Part {
                quantity: "entropy, ideal gas".to_owned(),
                unit: "J/mol/K".to_owned(),
                value: None,
                source: "no value for the group X".to_owned(),
                contributions: vec![],
            },
        ],
        gibbs_kj_per_mol: Some((22.45, 3.3)),
        origin: GibbsOrigin::PartlyMeasured,
        remarks: vec!["A value was set aside (invented).".to_owned()],
    };
    let mut bytes = Vec::new();
    write_explanation(&explanation, &mut bytes).unwrap();
    assert_snapshot!(String::from_utf8(bytes).unwrap());
}
