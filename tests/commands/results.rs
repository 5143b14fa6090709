//! What the program gives when all is well: formats, files, exit codes, help.

use std::io::Read;
use std::process::Stdio;

use insta::assert_snapshot;

use super::haloshed;

/// Runs a call, checks its exit code and gives stdout and stderr.
fn run(arguments: &[&str], code: i32) -> (String, String) {
    let output = haloshed().args(arguments).output().unwrap();
    let text = |bytes| String::from_utf8(bytes).unwrap();
    let (stdout, stderr) = (text(output.stdout), text(output.stderr));
    assert_eq!(output.status.code(), Some(code), "{arguments:?}: {stderr}");
    (stdout, stderr)
}

#[test]
fn every_format_begins_as_it_should() {
    let beginnings = [
        ("table", "Reductive network of "),
        ("json", "{\n  \"format\": \"haloshed-network/1\""),
        ("jsonl", "{\"record\":\"header\""),
        ("dot", "digraph haloshed {"),
        ("summary", "4 compounds, 4 steps; complete"),
    ];
    for (format, beginning) in beginnings {
        let (stdout, stderr) = run(&["network", "BrCCBr", "--format", format], 0);
        assert!(stdout.starts_with(beginning), "{format}: {stdout}");
        assert_eq!(stderr, "", "{format}");
    }
}

#[test]
fn one_table_of_csv_goes_to_stdout() {
    let (compounds, _) = run(&["network", "BrCCBr", "--table", "compounds"], 0);
    assert!(compounds.starts_with("id,generation,smiles,"));
    let (steps, _) = run(&["network", "BrCCBr", "--format", "csv", "--table", "steps"], 0);
    assert!(steps.starts_with("id,from,"));
}

#[test]
fn the_ending_of_a_file_says_the_format() {
    let folder = tempfile::tempdir().unwrap();
    let path = |name: &str| folder.path().join(name).display().to_string();
    for (name, beginning) in [
        ("a.json", "{\n"),
        ("a.jsonl", "{\"record\""),
        ("a.txt", "Reductive network"),
        ("a.dot", "digraph"),
        ("a.GV", "digraph"),
    ] {
        let (stdout, stderr) = run(&["network", "BrCCBr", "-o", &path(name)], 0);
        assert_eq!((stdout.as_str(), stderr.as_str()), ("", ""));
        assert!(std::fs::read_to_string(path(name)).unwrap().starts_with(beginning), "{name}");
    }
}

#[test]
fn csv_to_a_file_makes_two_and_one_with_a_table() {
    let folder = tempfile::tempdir().unwrap();
    let names = || {
        let mut names: Vec<String> = std::fs::read_dir(folder.path())
            .unwrap()
            .map(|entry| entry.unwrap().file_name().into_string().unwrap())
            .collect();
        names.sort();
        names
    };
    let file = folder.path().join("edb.csv").display().to_string();
    run(&["network", "BrCCBr", "-o", &file], 0);
    assert_eq!(names(), ["edb.compounds.csv", "edb.steps.csv"]);
    run(&["network", "BrCCBr", "-o", &file, "--table", "steps"], 0);
    assert_eq!(names(), ["edb.compounds.csv", "edb.csv", "edb.steps.csv"]);
}

#[test]
fn a_dash_stands_for_stdout() {
    let (stdout, _) = run(&["network", "BrCCBr", "-o", "-"], 0);
    assert!(stdout.starts_with("Reductive network"));
}

#[test]
fn a_limit_gives_a_partial_result_a_warning_and_code_3() {
    for limit in [["--max-generation", "1"], ["--max-compounds", "3"]] {
        let (stdout, stderr) = run(&["network", "ClC(Cl)C(Cl)Cl", "--format", "json", limit[0], limit[1]], 3);
        assert!(stdout.contains("\"complete\": false"));
        assert!(stderr.starts_with("warning: the network is incomplete"), "{stderr}");
        assert!(stderr.contains(limit[0]), "it says what to change: {stderr}");
    }
}

#[test]
fn first_steps_are_no_partial_result() {
    let (stdout, stderr) = run(&["steps", "ClCCCl"], 0);
    assert_eq!(stderr, "");
    assert!(!stdout.contains("incomplete"), "{stdout}");
    assert!(stdout.contains("+ 2 e- ->"), "{stdout}");
}

#[test]
fn a_compound_without_its_geometry_is_expanded_and_said_so() {
    let (stdout, stderr) = run(&["network", "ClC=CCl", "--format", "json"], 0);
    assert!(stderr.starts_with("warning: "), "{stderr}");
    assert!(stdout.contains("\"parents\": [\n    1,\n    2\n  ]"), "{stdout}");
    let (_, stderr) = run(&["network", "ClC=CCl", "--format", "json", "--identity", "constitutional"], 0);
    assert_eq!(stderr, "");
}

#[test]
fn the_same_bytes_for_any_number_of_threads() {
    let with = |n: &str| run(&["network", "ClC(Cl)(Cl)C(Cl)(Cl)Cl", "--format", "jsonl", "--threads", n], 0).0;
    assert_eq!(with("1"), with("3"));
}

#[test]
fn a_large_figure_is_given_with_a_warning() {
    let (stdout, stderr) = run(&["network", "ClC(Cl)=C(Cl)C(Cl)=C(Cl)Cl", "--format", "dot"], 0);
    assert!(stdout.starts_with("digraph"));
    assert!(stderr.contains("cannot be read on one page"), "{stderr}");
}

#[test]
fn hidden_isomers_of_cumulenes_are_told() {
    // CHCl=C=C=CHCl has a cis and a trans form that are not told apart.
    let (_, stderr) = run(&["network", "ClC(Cl)=C(Cl)C(Cl)=C(Cl)Cl", "--format", "summary"], 0);
    assert!(stderr.contains("cumulene whose configuration is not told apart"), "{stderr}");
}

#[test]
fn impossible_isomers_of_small_cages_are_told() {
    let (_, stderr) = run(&["network", "ClC1CC2CCC1C2", "--identity", "full", "--format", "summary"], 0);
    assert!(stderr.contains("configurations at bridgeheads that strain forbids"), "{stderr}");
}

/// The reader goes away after one byte; the program ends quietly.
#[test]
fn a_closed_pipe_ends_quietly() {
    let program = assert_cmd::cargo::cargo_bin!("haloshed");
    let mut child = std::process::Command::new(program)
        .args(["network", "ClC(Cl)(Cl)C(Cl)(Cl)C(Cl)(Cl)Cl", "--format", "json"])
        .stdout(Stdio::piped())
        .stderr(Stdio::piped())
        .spawn()
        .unwrap();
    let mut stdout = child.stdout.take().unwrap();
    stdout.read_exact(&mut [0]).unwrap();
    drop(stdout);
    let output = child.wait_with_output().unwrap();
    assert_eq!(output.status.code(), Some(0));
    assert_eq!(String::from_utf8(output.stderr).unwrap(), "");
}

#[test]
fn no_part_of_a_missing_energy_is_given_as_a_value() {
    let (stdout, _) = run(&["explain", "COP(=O)(OC)OC=C(Cl)Cl"], 0);
    for quantity in ["enthalpy of formation, ideal gas", "standard entropy, ideal gas", "log10 of the Henry solubility"]
    {
        assert!(stdout.contains(&format!("\n{quantity}: no value (groups with oxygen, phosphorus")), "{stdout}");
    }
    assert!(stdout.contains("\ndGf(aq): no value\n"));
}

#[test]
fn counts_of_one_are_singular() {
    let (summary, _) = run(&["network", "CCl", "--format", "summary", "--rules-only", "hydrogenolysis"], 0);
    assert!(summary.starts_with("2 compounds, 1 step; complete\n"), "{summary}");
    let (table, _) = run(&["network", "C"], 0);
    assert!(table.contains("\n1 compound, 0 steps; complete\n"), "{table}");
    let (summary, _) = run(&["network", "CC(Cl)Cl", "--format", "summary"], 0);
    assert!(summary.contains("\n1 step without an estimate\n"), "{summary}");
}

#[test]
fn rules_are_listed_shown_and_checked() {
    let (list, _) = run(&["rules"], 0);
    assert_eq!(list, run(&["rules", "list"], 0).0);
    assert!(list.contains("vicinal-elimination"));
    let (group, _) = run(&["rules", "show", "core"], 0);
    assert_eq!(group.matches("\nrule ").count() + 1, 3, "{group}");
    let (checked, _) = run(&["rules", "check", "rules/carbene.rules"], 0);
    assert_eq!(checked, "rules/carbene.rules: 2 rules in order: carbene-hydration, carbene-shift\n");
}

#[test]
fn a_rule_file_of_ones_own_is_used() {
    let folder = tempfile::tempdir().unwrap();
    let path = folder.path().join("own.rules");
    let shipped = run(&["rules", "show", "hydrogenolysis"], 0).0;
    let text = shipped.replace("rule hydrogenolysis", "rule my-own").replace("  group core\n", "");
    let mut target = haloshed::output::file::Target::open(&path).unwrap();
    std::io::Write::write_all(&mut target, text.as_bytes()).unwrap();
    target.finish().unwrap();
    let file = path.display().to_string();
    let (stdout, _) = run(&["network", "CCl", "--format", "json", "--rules", &file, "--rules-only", "my-own"], 0);
    assert!(stdout.contains("\"rule\": \"my-own\""), "{stdout}");
}

#[test]
fn help_of_every_command() {
    for command in ["", "network", "steps", "rules", "explain"] {
        let arguments: Vec<&str> = [command, "--help"].into_iter().filter(|a| !a.is_empty()).collect();
        let (stdout, _) = run(&arguments, 0);
        let name = if command.is_empty() { "help" } else { &format!("help_{command}") };
        assert_snapshot!(name, stdout);
    }
}
