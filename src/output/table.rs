//! The network as tables for reading: conditions on top, compounds by generation, steps by
//! compound, notes below.
//!
//! All of the network is held while it is written: the widths of the columns depend on it.

use std::io;

use super::decimals::{degeneracy_text, kj_sd_text, kj_text, volt_sd_text, volt_text};
use super::layout::{Notes, counted, table, write_wrapped};
use super::record::{Compound, GibbsOrigin, Network, Step};
use super::{Records, Writer};

/// Writes a network as tables for a terminal or a page.
#[derive(Debug, Clone, Copy)]
pub struct Table;

impl Writer for Table {
    fn write(&self, network: &dyn Records, out: &mut dyn io::Write) -> io::Result<()> {
        let network = Network::collect(network);
        let mut notes = Notes::default();
        write_heading(&network, out)?;
        let compounds = compound_rows(&network, &mut notes);
        let headings = ["gen", "id", "formula", "name", "dGf(aq), kJ/mol", "", "notes"];
        writeln!(out, "\nCompounds\n{}", table(&headings, &[0, 1, 4], compounds))?;
        writeln!(out, "\nm measured, p partly measured, e estimated, - no value; * end product; [ ] transient")?;
        if network.steps.is_empty() {
            writeln!(out, "\nNo steps.")?;
        } else {
            let steps = step_rows(&network, &mut notes);
            let headings = ["from", "rule", "to", "n", "E', V", "notes"];
            writeln!(out, "\nSteps, highest potential first\n{}", table(&headings, &[3, 4], steps))?;
            writeln!(out, "\nn: number of ways (path degeneracy); dG' in kJ/mol where no electron is transferred")?;
        }
        notes.write(out)
    }
}

impl Network {
    /// Holds all records of a network.
    pub fn collect(records: &dyn Records) -> Network {
        Network {
            header: records.header().clone(),
            compounds: records.compounds().map(std::borrow::Cow::into_owned).collect(),
            steps: records.steps().map(std::borrow::Cow::into_owned).collect(),
        }
    }

    /// The compound with this id.
    pub fn compound(&self, id: u32) -> Option<&Compound> {
        self.compounds.get((id as usize).checked_sub(1)?)
    }
}

/// What the network is of, under which conditions, by which rules, and what to beware of.
pub(super) fn write_heading(network: &Network, out: &mut dyn io::Write) -> io::Result<()> {
    let header = &network.header;
    let parents: Vec<String> = header.parents.iter().filter_map(|&id| network.compound(id)).map(title).collect();
    write_wrapped(&format!("Reductive network of {}", parents.join("; ")), 2, out)?;
    let conditions = header.conditions.text(network.halogen_elements());
    write_wrapped(&format!("At {conditions}, organics at equal activity; potentials against SHE"), 2, out)?;
    write_wrapped(&format!("Rules: {}", header.rules.join(", ")), 2, out)?;
    let (n_compounds, n_steps) = (network.compounds.len(), network.steps.len());
    let extent = if header.complete { "complete" } else { "INCOMPLETE: a limit was reached" };
    let (compounds, steps) = (counted(n_compounds, "compound"), counted(n_steps, "step"));
    writeln!(out, "{compounds}, {steps}; {extent}")?;
    header.warnings.iter().try_for_each(|warning| write_wrapped(&format!("Warning: {warning}"), 2, out))
}

/// Name and formula of a compound, whichever there are.
pub(super) fn title(compound: &Compound) -> String {
    match compound.title() {
        name if name.is_empty() => compound.formula_text(),
        name => format!("{name}, {}", compound.formula_text()),
    }
}

fn compound_rows(network: &Network, notes: &mut Notes) -> Vec<Vec<String>> {
    let mut last_generation = None;
    let rows = network.compounds.iter().map(|compound| {
        let is_new = last_generation.replace(compound.generation) != Some(compound.generation);
        let mut numbers: Vec<String> =
            compound.cautions.iter().map(|c| notes.number(format!("{} [{}]", c.text, c.source)).to_string()).collect();
        if compound.gibbs_origin == GibbsOrigin::None {
            numbers.push(notes.number(format!("no value: {}", compound.gibbs_source)).to_string());
        }
        vec![
            if is_new { compound.generation.to_string() } else { String::new() },
            compound.id.to_string(),
            compound.formula_text() + if compound.is_end_product { " *" } else { "" },
            compound.title(),
            gibbs_text(compound),
            origin_mark(compound.gibbs_origin).to_owned(),
            numbers.join(", "),
        ]
    });
    rows.collect()
}

fn gibbs_text(compound: &Compound) -> String {
    match (compound.gibbs_aq_kj_per_mol, compound.gibbs_sd_kj_per_mol) {
        (Some(value), Some(sd)) => format!("{} ± {}", kj_text(value, Some(sd)), kj_sd_text(sd)),
        (Some(value), None) => kj_text(value, None),
        (None, _) => "-".to_owned(),
    }
}

fn origin_mark(origin: GibbsOrigin) -> &'static str {
    match origin {
        GibbsOrigin::Measured => "m",
        GibbsOrigin::PartlyMeasured => "p",
        GibbsOrigin::Estimated => "e",
        GibbsOrigin::None => "-",
    }
}

fn step_rows(network: &Network, notes: &mut Notes) -> Vec<Vec<String>> {
    let mut steps: Vec<&Step> = network.steps.iter().collect();
    steps.sort_by(|a, b| a.from.cmp(&b.from).then_with(|| by_potential(a, b)));
    let place = |id: u32| network.compound(id).map_or_else(String::new, |c| format!("{id} {}", c.formula_text()));
    let mut last_from = None;
    let rows = steps.into_iter().map(|step| {
        let is_new = last_from.replace(step.from) != Some(step.from);
        vec![
            if is_new { place(step.from) } else { String::new() },
            step.rule.clone(),
            place(step.to),
            degeneracy_text(step.degeneracy),
            energy_text(step),
            missing_note(step, notes),
        ]
    });
    rows.collect()
}

/// Highest potential first, then steps without one, each by id.
pub(super) fn by_potential(a: &Step, b: &Step) -> std::cmp::Ordering {
    let key = |step: &Step| step.e_volt.unwrap_or(f64::NEG_INFINITY);
    key(b).total_cmp(&key(a)).then(a.id.cmp(&b.id))
}

/// Potential, or Gibbs energy where no electron is transferred, with its uncertainty.
pub(super) fn energy_text(step: &Step) -> String {
    let sd = |text: Option<String>| text.map_or_else(String::new, |sd| format!(" ± {sd}"));
    if let Some(volt) = step.e_volt {
        return volt_text(volt, step.e_sd_volt) + &sd(step.e_sd_volt.map(volt_sd_text));
    }
    match step.gibbs_step_kj_per_mol {
        Some(kj) => {
            let text = kj_text(kj, step.gibbs_step_sd_kj_per_mol);
            format!("dG' {text}{}", sd(step.gibbs_step_sd_kj_per_mol.map(kj_sd_text)))
        }
        None => "no estimate".to_owned(),
    }
}

/// Number of the note that says why a step has no value at all.
fn missing_note(step: &Step, notes: &mut Notes) -> String {
    let has_value = step.e_volt.is_some() || step.gibbs_step_kj_per_mol.is_some();
    match &step.e_missing {
        Some(reason) if !has_value => notes.number(format!("no estimate: {reason}")).to_string(),
        _ => String::new(),
    }
}
