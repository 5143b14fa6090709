//! The JSON schemas in `docs/`, and that what is written keeps to them.

use haloshed::output::json::Json;
use haloshed::output::jsonl::{Jsonl, Line};
use haloshed::output::record::Network;
use schemars::{JsonSchema, schema_for};
use serde_json::Value;

use super::sample::network_of;
use super::{check_kept, written};

fn schema_text<T: JsonSchema>() -> String {
    serde_json::to_string_pretty(&schema_for!(T)).unwrap() + "\n"
}

fn is_valid(schema: &str, value: &Value) -> bool {
    let schema: Value = serde_json::from_str(schema).unwrap();
    jsonschema::validator_for(&schema).unwrap().is_valid(value)
}

const PARENTS: [&str; 4] = ["ClC(Cl)=C(Cl)Cl", "ClC(Cl)C(Cl)Cl", "ClC=CCl", "C"];

#[test]
fn the_kept_schemas_are_those_of_the_records() {
    check_kept("docs/haloshed-network.schema.json", &schema_text::<Network>());
    check_kept("docs/haloshed-network-line.schema.json", &schema_text::<Line>());
}

#[test]
fn json_keeps_to_its_schema_and_reads_back() {
    for parent in PARENTS {
        let text = written(&Json, &network_of(parent));
        let value: Value = serde_json::from_str(&text).unwrap();
        assert!(is_valid(&schema_text::<Network>(), &value), "{parent}");
        let network: Network = serde_json::from_str(&text).unwrap();
        assert_eq!(written(&Json, &network), text, "reading back and writing changes nothing: {parent}");
    }
}

#[test]
fn every_line_of_json_lines_keeps_to_its_schema() {
    for parent in PARENTS {
        let network = network_of(parent);
        let text = written(&Jsonl, &network);
        let lines: Vec<Value> = text.lines().map(|line| serde_json::from_str(line).unwrap()).collect();
        assert!(lines.iter().all(|line| is_valid(&schema_text::<Line>(), line)), "{parent}");
        assert_eq!(lines.len(), 1 + network.compounds.len() + network.steps.len());
        assert_eq!(lines[0]["record"], "header");
    }
}

#[test]
fn the_schema_refuses_what_is_wrong() {
    let good: Value = serde_json::from_str(&written(&Json, &network_of("C=CCl"))).unwrap();
    let spoilt = |pointer: &str, value: Value| {
        let mut bad = good.clone();
        *bad.pointer_mut(pointer).unwrap() = value;
        bad
    };
    let schema = schema_text::<Network>();
    assert!(is_valid(&schema, &good));
    for bad in [
        spoilt("/identity", "vague".into()),
        spoilt("/compounds/0/id", "one".into()),
        spoilt("/compounds/0/gibbs_origin", "guessed".into()),
        spoilt("/steps/0/released/Cl", (-1).into()),
        spoilt("/complete", Value::Null),
    ] {
        assert!(!is_valid(&schema, &bad));
    }
}
