//! The network as a figure for Graphviz.
//!
//! Generations are ranks from the top down or from the left, isomers side by side; an arrow carries the mark of
//! its rule and E'. Everything that tells kinds apart is shape, line or letter, so the figure
//! survives a black-and-white print: see [`style`]. The caption states the conditions, and the
//! legend explains what occurs in this figure and nothing else.
//!
//! The figure is fitted to one A4 page, as `page` decides. It is for reading: all of the
//! network is held while it is written.

mod caption;
mod legend;
mod page;
pub mod style;
pub mod text;

use std::fmt::Write as _;
use std::io;

use self::caption::caption;
use self::legend::write_legend;
use self::page::{Direction, Page};
use self::style::{NodeKind, RuleStyle, rule_style};
use self::text::{formula_markup, markup, name_lines, quoted};
use super::decimals::{kj_text, volt_text};
use super::record::{Compound, Network, Step};
use super::{Records, Writer};

/// Writes a network in Graphviz's DOT language.
#[derive(Debug, Clone, Copy)]
pub struct Dot;

/// Whether a figure of so many compounds can be read when fitted to one page. A larger one is
/// left at its natural size.
pub fn fits_a_page(n_compounds: usize) -> bool {
    n_compounds <= page::MOST_FOR_A_PAGE
}

/// Points of the formula of a node, before the figure is fitted to the page.
const FORMULA_POINTS: u32 = 16;
/// Points of names and of what stands on arrows.
const SMALL_POINTS: u32 = 13;

/// A network with what the figure asks of it again and again.
struct Figure {
    network: Network,
    /// By compound: whether a step leads on from it.
    leads_on: Vec<bool>,
    page: Page,
}

impl Writer for Dot {
    fn write(&self, network: &dyn Records, out: &mut dyn io::Write) -> io::Result<()> {
        Figure::of(network).write(out)
    }
}

impl Figure {
    fn of(records: &dyn Records) -> Figure {
        let network = Network::collect(records);
        let mut leads_on = vec![false; network.compounds.len()];
        for step in &network.steps {
            leads_on[step.from as usize - 1] = true;
        }
        let page = Page::of(&network);
        Figure { network, leads_on, page }
    }

    fn write(&self, out: &mut dyn io::Write) -> io::Result<()> {
        writeln!(out, "digraph haloshed {{")?;
        self.write_page(out)?;
        self.write_ranks(out)?;
        for step in &self.network.steps {
            self.write_step(step, out)?;
        }
        write_legend(self, out)?;
        writeln!(out, "}}")
    }

    fn write_page(&self, out: &mut dyn io::Write) -> io::Result<()> {
        let direction = match self.page.direction {
            Direction::Down => "TB",
            Direction::Right => "LR",
        };
        let size = self.page.inches.map_or_else(String::new, |(width, height)| format!("size=\"{width},{height}\", "));
        writeln!(out, "  graph [{size}rankdir={direction}, margin=0.1, ranksep=0.45, nodesep=0.14,")?;
        writeln!(out, "    fontname=\"Arial\", fontsize={SMALL_POINTS}, labelloc=b, labeljust=l,")?;
        writeln!(out, "    label=<{}>];", caption(&self.network))?;
        writeln!(
            out,
            "  node [shape=box, fontname=\"Arial\", fontsize={FORMULA_POINTS}, margin=\"0.07,0.04\", height=0.3];"
        )?;
        writeln!(out, "  edge [fontname=\"Arial\", fontsize={SMALL_POINTS}, arrowsize=0.8];")
    }

    fn write_ranks(&self, out: &mut dyn io::Write) -> io::Result<()> {
        let n_generations = self.network.compounds.iter().map(|c| c.generation + 1).max().unwrap_or(0);
        writeln!(out, "  node [shape=plaintext];")?;
        let names: Vec<String> = (0..n_generations).map(|g| format!("g{g}")).collect();
        for (generation, name) in names.iter().enumerate() {
            let text = if generation == 0 { "parent".to_owned() } else { generation.to_string() };
            writeln!(out, "  {name} [label={}, group=generations];", quoted(&text))?;
        }
        if names.len() > 1 {
            writeln!(out, "  {} [style=invis, weight=100];", names.join(" -> "))?;
        }
        writeln!(out, "  node [shape=box];")?;
        for (generation, name) in names.iter().enumerate() {
            writeln!(out, "  {{ rank=same; {name};")?;
            for compound in self.network.compounds.iter().filter(|c| c.generation as usize == generation) {
                self.write_node(compound, out)?;
            }
            writeln!(out, "  }}")?;
        }
        Ok(())
    }

    fn write_node(&self, compound: &Compound, out: &mut dyn io::Write) -> io::Result<()> {
        let mut label = formula_markup(compound);
        if !self.leads_on[compound.id as usize - 1] && !compound.is_end_product {
            // A limit left it unexpanded.
            label.push_str(" ...");
        }
        if !compound.title().is_empty() {
            let lines: Vec<String> = name_lines(compound).iter().map(|line| markup(line)).collect();
            let _ = write!(label, "<br/><font point-size=\"{SMALL_POINTS}\">{}</font>", lines.join("<br/>"));
        }
        let style = NodeKind::of(compound).attributes();
        writeln!(out, "    c{} [label=<{label}>, tooltip={}{style}];", compound.id, quoted(&compound.smiles))
    }

    fn write_step(&self, step: &Step, out: &mut dyn io::Write) -> io::Result<()> {
        let RuleStyle { mark, line, arrow } = self.style_of(&step.rule);
        let energy = match (step.e_volt, step.gibbs_step_kj_per_mol) {
            // Two decimals are enough for a figure; the tables have them all.
            (Some(volt), _) => volt_text(volt, None),
            (None, Some(kj)) => format!("({} kJ)", kj_text(kj, step.gibbs_step_sd_kj_per_mol)),
            (None, None) => "(?)".to_owned(),
        };
        let generation = |id: u32| self.network.compound(id).map_or(0, |c| c.generation);
        let is_onward = generation(step.to) > generation(step.from);
        // Downward, Graphviz sets the two ends of an arrow within a generation side by side and its
        // text between them. Rightward, such texts would only widen the figure: there they float.
        let (label, constraint) = if is_onward || self.page.direction == Direction::Down {
            ("label", "")
        } else {
            ("xlabel", ", constraint=false")
        };
        let text = quoted(&format!(" {mark} {energy}"));
        writeln!(out, "  c{} -> c{} [{label}={text}, style={line}, arrowhead={arrow}{constraint}];", step.from, step.to)
    }

    fn style_of(&self, rule: &str) -> RuleStyle {
        rule_style(rule, &self.network.header.rules)
    }
}
