//! Counts of a network by generation and by rule, and the time it took.

use std::io;
use std::time::Duration;

use super::counts::Generation;
use super::layout::{counted, table, write_wrapped};
use super::{Records, Writer};

/// Writes the counts of a network.
#[derive(Debug, Clone, Copy)]
pub struct Summary {
    /// Time that enumeration took, if it is to be shown.
    pub enumeration: Option<Duration>,
    /// Time that energies took, if it is to be shown.
    pub energies: Option<Duration>,
}

impl Writer for Summary {
    fn write(&self, network: &dyn Records, out: &mut dyn io::Write) -> io::Result<()> {
        let counts = network.counts();
        let header = network.header();
        let n_compounds: usize = counts.generations.iter().map(|g| g.compounds).sum();
        let n_steps: usize = counts.n_steps_by_rule.iter().sum();
        let extent = if header.complete { "complete" } else { "INCOMPLETE: a limit was reached" };
        let (compounds, steps) = (counted(n_compounds, "compound"), counted(n_steps, "step"));
        writeln!(out, "{compounds}, {steps}; {extent}")?;
        writeln!(out, "At {}", header.conditions.text(counts.elements))?;
        for warning in &header.warnings {
            write_wrapped(&format!("Warning: {warning}"), 2, out)?;
        }
        let headings = ["generation", "compounds", "transients", "end products"];
        writeln!(out, "\n{}", table(&headings, &[0, 1, 2, 3], generation_rows(&counts.generations)))?;
        let by_rule = header.rules.iter().zip(&counts.n_steps_by_rule);
        let rows = by_rule.map(|(rule, n)| vec![rule.clone(), n.to_string()]).collect();
        writeln!(out, "\n{}", table(&["rule", "steps"], &[1], rows))?;
        if counts.n_without_value > 0 {
            writeln!(out, "\n{} without an estimate", counted(counts.n_without_value, "step"))?;
        }
        self.write_times(out)
    }
}

impl Summary {
    fn write_times(&self, out: &mut dyn io::Write) -> io::Result<()> {
        let times = [("enumeration", self.enumeration), ("energies", self.energies)];
        let shown: Vec<String> =
            times.iter().filter_map(|(what, time)| time.map(|t| format!("{what} {}", time_text(t)))).collect();
        if shown.is_empty() { Ok(()) } else { writeln!(out, "\ntime: {}", shown.join(", ")) }
    }
}

fn time_text(time: Duration) -> String {
    match time.as_secs_f64() {
        s if s < 1e-3 => format!("{:.0} µs", s * 1e6),
        s if s < 1.0 => format!("{:.1} ms", s * 1e3),
        s => format!("{s:.2} s"),
    }
}

fn generation_rows(generations: &[Generation]) -> Vec<Vec<String>> {
    let rows = generations.iter().enumerate().map(|(number, g)| {
        vec![number.to_string(), g.compounds.to_string(), g.transients.to_string(), g.end_products.to_string()]
    });
    rows.collect()
}
