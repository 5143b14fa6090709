//! Wrong input, and the whole of what is said of it; kept in `tests/messages/`.

use std::path::Path;

use super::haloshed;

/// Holds exit code and stderr of a wrong call against `tests/messages/NAME.snap`.
fn check(name: &str, arguments: &[&str], code: i32) {
    let output = haloshed().args(arguments).output().unwrap();
    let stderr = String::from_utf8(output.stderr).unwrap();
    assert_eq!(output.status.code(), Some(code), "{arguments:?}: {stderr}");
    assert!(output.stdout.is_empty(), "an error leaves stdout alone: {arguments:?}");
    let mut settings = insta::Settings::clone_current();
    settings.set_snapshot_path(Path::new(env!("CARGO_MANIFEST_DIR")).join("tests/messages"));
    settings.set_prepend_module_to_snapshot(false);
    settings.set_omit_expression(true);
    settings.set_description(format!("haloshed {}", arguments.join(" ")));
    settings.bind(|| insta::assert_snapshot!(name, stderr));
}

#[test]
fn compounds_that_are_wrong() {
    let cases = [
        ("carbon_with_five_bonds", "ClC(Cl)(Cl)(Cl)Cl"),
        ("isotope", "[13CH3]Cl"),
        ("several_components", "CCl.[Na+]"),
        ("wildcard", "C*Cl"),
        ("unknown_element", "C[Zn]Cl"),
        ("open_branch", "ClC(Cl"),
        ("closing_branch", "CCl)"),
        ("open_ring", "C1CCl"),
        ("nothing_after_bond", "ClC="),
        ("nothing_before_bond", "=CCl"),
        ("contradictory_marks", r"F/C(\Cl)=C/Cl"),
        ("open_bracket", "C[CH2"),
        ("quadruple_bond", "C$C"),
        ("ring_of_one_atom", "C11Cl"),
        ("radical", "[CH2]Cl"),
        ("not_aromatic", "c1cccc1"),
        ("tetrahedral_mark_on_three_ligands", "C[C@H]=C"),
    ];
    for (name, compound) in cases {
        check(name, &["network", compound], 1);
    }
}

#[test]
fn rule_choices_that_are_wrong() {
    check("misspelt_rule", &["network", "ClCCCl", "--with", "hydrogenolisis"], 1);
    check("unknown_rule", &["network", "ClCCCl", "--rules-only", "magic"], 1);
    check("unknown_rule_shown", &["rules", "show", "croe"], 1);
    check("missing_rule_file", &["network", "ClCCCl", "--rules", "tests/messages/none.rules"], 1);
}

#[test]
fn rule_files_that_are_wrong() {
    check("three_mistakes", &["rules", "check", "tests/messages/three_mistakes.rules"], 1);
    check("rule_file_in_use", &["network", "ClCCCl", "--rules", "tests/messages/three_mistakes.rules"], 1);
}

#[test]
fn options_that_are_wrong() {
    check("mass_concentration", &["network", "ClCCCl", "--chloride", "35mg/L"], 2);
    check("negative_concentration", &["network", "ClCCCl", "--chloride", "-1mM"], 2);
    check("ph_too_high", &["steps", "ClCCCl", "--ph", "15"], 2);
    check("time_without_unit", &["network", "ClCCCl", "--time-limit", "30"], 2);
    check("no_compounds_wanted", &["network", "ClCCCl", "--max-compounds", "0"], 2);
    check("unknown_identity", &["network", "ClCCCl", "--identity", "stereo"], 2);
    check("csv_to_stdout", &["network", "ClCCCl", "--format", "csv"], 2);
    check("table_without_csv", &["network", "ClCCCl", "--format", "json", "--table", "steps"], 2);
    check("unknown_ending", &["network", "ClCCCl", "-o", "result.xlsx"], 2);
    check("unknown_command", &["netwrok", "ClCCCl"], 2);
    check("no_compound", &["network"], 2);
}

#[test]
fn files_that_cannot_be_written() {
    check("missing_folder", &["network", "ClCCCl", "-o", "tests/messages/none/result.json"], 1);
    check("a_folder", &["network", "ClCCCl", "--format", "json", "-o", "tests/messages"], 1);
}
