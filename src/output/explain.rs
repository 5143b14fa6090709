//! Where one Gibbs energy comes from: part by part, and group by group within a part.
//!
//! The parts are those of the sum dGf(aq) = dHf - T dSf + dGhyd, each measured or put together
//! from groups. Values come as plain numbers with their unit; nothing is added up here.

use std::io;

use super::decimals::{kj_sd_text, kj_text, plain};
use super::layout::{table, write_wrapped};
use super::record::GibbsOrigin;

/// Where the Gibbs energy of a compound comes from.
#[derive(Debug, Clone, PartialEq)]
pub struct Explanation {
    /// Name and condensed formula, as they are printed.
    pub title: String,
    /// Canonical SMILES.
    pub smiles: String,
    /// The parts of the value, in the order they are added.
    pub parts: Vec<Part>,
    /// The value in kJ/mol and its standard uncertainty; none where a part is missing.
    pub gibbs_kj_per_mol: Option<(f64, f64)>,
    /// Whether it was measured or estimated.
    pub origin: GibbsOrigin,
    /// What the reader must know: parts that are missing, values set aside.
    pub remarks: Vec<String>,
}

/// A part of the value.
#[derive(Debug, Clone, PartialEq)]
pub struct Part {
    /// What it is, such as `enthalpy of formation, ideal gas`.
    pub quantity: String,
    /// Its unit.
    pub unit: String,
    /// Value and standard uncertainty; none where it is missing.
    pub value: Option<(f64, f64)>,
    /// Where it comes from: a source, `sum of groups`, or why it is missing.
    pub source: String,
    /// The groups it is the sum of; none where it was measured.
    pub contributions: Vec<Contribution>,
}

/// What one kind of group contributes to a part.
#[derive(Debug, Clone, PartialEq)]
pub struct Contribution {
    /// The group.
    pub label: String,
    /// How often it occurs.
    pub count: f64,
    /// Value of one, in the unit of the part.
    pub value: f64,
    /// Standard uncertainty of one.
    pub sd: f64,
    /// Where the value comes from.
    pub source: String,
}

/// Writes an explanation for reading.
///
/// # Errors
/// * whatever `out` reports
pub fn write_explanation(explanation: &Explanation, out: &mut dyn io::Write) -> io::Result<()> {
    write_wrapped(&format!("Gibbs energy of formation of {}", explanation.title), 2, out)?;
    writeln!(out, "SMILES {}; in water, 298.15 K, 1 mol/L", explanation.smiles)?;
    for part in &explanation.parts {
        write_part(part, out)?;
    }
    writeln!(out)?;
    match explanation.gibbs_kj_per_mol {
        Some((value, sd)) => {
            let (value, sd) = (kj_text(value, Some(sd)), kj_sd_text(sd));
            writeln!(out, "dGf(aq) = {value} ± {sd} kJ/mol, {}", origin_words(explanation.origin))?;
        }
        None => writeln!(out, "dGf(aq): no value")?,
    }
    explanation.remarks.iter().try_for_each(|remark| write_wrapped(remark, 2, out))
}

fn write_part(part: &Part, out: &mut dyn io::Write) -> io::Result<()> {
    let value = match part.value {
        Some((value, sd)) => format!("{} ± {} {}", fixed(value), fixed(sd), part.unit),
        None => "no value".to_owned(),
    };
    writeln!(out)?;
    write_wrapped(&format!("{}: {value} ({})", part.quantity, part.source), 2, out)?;
    if part.contributions.is_empty() {
        return Ok(());
    }
    let rows = part.contributions.iter().map(|c| {
        vec![c.label.clone(), plain(c.count), fixed(c.value), fixed(c.sd), fixed(c.count * c.value), c.source.clone()]
    });
    writeln!(out, "{}", table(&["group", "count", "each", "±", "sum", "from"], &[1, 2, 3, 4], rows.collect()))
}

/// Two decimals, as the parts of a sum are shown.
fn fixed(value: f64) -> String {
    format!("{:.2}", if value.abs() < 0.005 { 0.0 } else { value })
}

fn origin_words(origin: GibbsOrigin) -> &'static str {
    match origin {
        GibbsOrigin::Measured => "measured",
        GibbsOrigin::PartlyMeasured => "partly measured, partly estimated",
        GibbsOrigin::Estimated => "estimated",
        GibbsOrigin::None => "without a value",
    }
}
