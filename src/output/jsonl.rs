//! JSON Lines: the records of the JSON object, a line each, the header first.
//!
//! Every line says by `record` what it is: `header`, `compound` or `step`.

use std::io;

use schemars::JsonSchema;
use serde::{Deserialize, Serialize};

use super::record::{Compound, Header, Step};
use super::{Records, Writer};

/// Writes a network as JSON Lines.
#[derive(Debug, Clone, Copy)]
pub struct Jsonl;

/// One line.
#[derive(Debug, Clone, PartialEq, Serialize, Deserialize, JsonSchema)]
#[serde(tag = "record", rename_all = "lowercase")]
#[schemars(title = "haloshed-network/1, one line")]
pub enum Line {
    /// What holds for the whole network: the first line.
    Header(Header),
    /// A compound.
    Compound(Compound),
    /// A step.
    Step(Step),
}

#[derive(Serialize)]
#[serde(tag = "record", rename_all = "lowercase")]
enum Borrowed<'a> {
    Header(&'a Header),
    Compound(&'a Compound),
    Step(&'a Step),
}

impl Writer for Jsonl {
    fn write(&self, network: &dyn Records, out: &mut dyn io::Write) -> io::Result<()> {
        write_line(&Borrowed::Header(network.header()), out)?;
        for compound in network.compounds() {
            write_line(&Borrowed::Compound(&compound), out)?;
        }
        for step in network.steps() {
            write_line(&Borrowed::Step(&step), out)?;
        }
        Ok(())
    }
}

fn write_line(line: &Borrowed<'_>, out: &mut dyn io::Write) -> io::Result<()> {
    serde_json::to_writer(&mut *out, line)?;
    out.write_all(b"\n")
}
