//! The first steps of the parents as balanced half-reactions, highest potential first.

use std::io;

use super::decimals::{degeneracy_text, volt_sd_text, volt_text};
use super::layout::{Notes, table, write_wrapped};
use super::record::{Compound, Network, Step};
use super::table::{by_potential, energy_text, title};
use super::{Records, Writer};

/// Writes the half-reactions of the parents.
#[derive(Debug, Clone, Copy)]
pub struct HalfReactions;

impl Writer for HalfReactions {
    fn write(&self, network: &dyn Records, out: &mut dyn io::Write) -> io::Result<()> {
        let network = Network::collect(network);
        let header = &network.header;
        let conditions = header.conditions.text(network.halogen_elements());
        for warning in &header.warnings {
            write_wrapped(&format!("Warning: {warning}"), 2, out)?;
        }
        let mut notes = Notes::default();
        for (index, parent) in header.parents.iter().filter_map(|&id| network.compound(id)).enumerate() {
            if index > 0 {
                writeln!(out)?;
            }
            write_wrapped(&format!("Half-reactions of {}", title(parent)), 2, out)?;
            write_wrapped(&format!("E' at {conditions}, organics at equal activity; potentials against SHE"), 2, out)?;
            write_parent(&network, parent, &mut notes, out)?;
        }
        notes.write(out)
    }
}

fn write_parent(network: &Network, parent: &Compound, notes: &mut Notes, out: &mut dyn io::Write) -> io::Result<()> {
    let mut steps: Vec<&Step> = network.steps.iter().filter(|step| step.from == parent.id).collect();
    steps.sort_by(|a, b| by_potential(a, b));
    let (reductions, others): (Vec<&Step>, Vec<&Step>) = steps.into_iter().partition(|step| step.electrons != 0);
    if reductions.is_empty() {
        writeln!(out, "\nNo rule reduces it.")?;
    } else {
        let rows = reductions.iter().map(|step| reduction_row(network, step, notes)).collect();
        let headings = ["E', V", "E°, V", "±", "half-reaction", "rule", "n"];
        writeln!(out, "\n{}", table(&headings, &[0, 1, 2, 5], rows))?;
    }
    if others.is_empty() {
        return Ok(());
    }
    let rows = others.iter().map(|step| {
        let energy = energy_text(step);
        let energy = energy.strip_prefix("dG' ").unwrap_or(&energy).to_owned();
        let energy = missing_mark(step, notes).unwrap_or(energy);
        vec![energy, equation(network, step), step.rule.clone(), degeneracy_text(step.degeneracy)]
    });
    let headings = ["dG', kJ/mol", "reaction without electrons", "rule", "n"];
    writeln!(out, "\n{}", table(&headings, &[0, 3], rows.collect()))
}

fn reduction_row(network: &Network, step: &Step, notes: &mut Notes) -> Vec<String> {
    let volt = |value: Option<f64>| value.map_or_else(|| "-".to_owned(), |v| volt_text(v, step.e_sd_volt));
    vec![
        missing_mark(step, notes).unwrap_or_else(|| volt(step.e_volt)),
        volt(step.e_standard_volt),
        step.e_sd_volt.map_or_else(String::new, volt_sd_text),
        equation(network, step),
        step.rule.clone(),
        degeneracy_text(step.degeneracy),
    ]
}

/// Stands for the value of a step that has none.
fn missing_mark(step: &Step, notes: &mut Notes) -> Option<String> {
    let has_value = step.e_volt.is_some() || step.gibbs_step_kj_per_mol.is_some();
    let reason = step.e_missing.as_ref().filter(|_| !has_value)?;
    Some(format!("note {}", notes.number(format!("no estimate: {reason}"))))
}

/// A step as a balanced equation with condensed formulas.
///
/// Organics come first on each side, then water, protons, electrons and ions; whatever is
/// consumed in a negative amount stands on the right.
pub fn equation(network: &Network, step: &Step) -> String {
    let name = |id: u32| network.compound(id).map_or_else(|| format!("#{id}"), Compound::formula_text);
    let mut left = vec![counted(step.molecules, &name(step.from))];
    let mut right = vec![name(step.to)];
    for (amount, species) in [(step.water, "H2O"), (step.protons, "H+"), (step.electrons, "e-")] {
        let side = if amount > 0 { &mut left } else { &mut right };
        if amount != 0 {
            side.push(counted(amount.unsigned_abs(), species));
        }
    }
    for (element, n) in step.released.pairs() {
        if n > 0 {
            right.push(counted(n, &format!("{element}-")));
        }
    }
    format!("{} -> {}", left.join(" + "), right.join(" + "))
}

fn counted(n: u32, species: &str) -> String {
    if n == 1 { species.to_owned() } else { format!("{n} {species}") }
}
