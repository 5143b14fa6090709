//! The legend: a sample of each kind of compound and each rule that occurs in the figure.
//!
//! Samples are real nodes and arrows, so that they look as they do above. They stand in a
//! cluster of two ranks after the last generation: kinds of compounds first, then the
//! arrows, each with the name of its rule at its head.

use std::io;

use super::page::Direction;
use super::style::NodeKind;
use super::text::quoted;
use super::{Figure, SMALL_POINTS};

pub(super) fn write_legend(figure: &Figure, out: &mut dyn io::Write) -> io::Result<()> {
    let last = figure.network.compounds.iter().map(|c| c.generation).max().unwrap_or(0);
    writeln!(out, "  subgraph cluster_legend {{")?;
    writeln!(out, "    graph [label=\"\", style=solid, color=gray50, margin=6];")?;
    writeln!(out, "    node [fontsize={SMALL_POINTS}];")?;
    let mut upper = Vec::new();
    let mut lower = Vec::new();
    write_kinds(figure, &mut upper, &mut lower, out)?;
    write_rules(figure, &mut upper, &mut lower, out)?;
    for rank in [&mut upper, &mut lower].into_iter().filter(|rank| rank.len() > 1) {
        if figure.page.direction == Direction::Right {
            // Graphviz fills such a rank from the bottom.
            rank.reverse();
        }
        writeln!(out, "    {{ rank=same; {} [style=invis]; }}", rank.join(" -> "))?;
    }
    writeln!(out, "  }}")?;
    // The names of the generations stand at the left or the bottom; the legend is hung on the
    // node of its first rank that is nearest to them.
    writeln!(out, "  g{last} -> {} [style=invis];", upper.first().map_or("k0", String::as_str))
}

fn write_kinds(
    figure: &Figure,
    upper: &mut Vec<String>,
    lower: &mut Vec<String>,
    out: &mut dyn io::Write,
) -> io::Result<()> {
    let mut kinds: Vec<NodeKind> = figure.network.compounds.iter().map(NodeKind::of).collect();
    kinds.sort_unstable();
    kinds.dedup();
    for (index, kind) in kinds.iter().enumerate() {
        writeln!(out, "    k{index} [label={}{}];", quoted(kind.words()), kind.attributes())?;
        if index % 2 == 0 {
            upper.push(format!("k{index}"));
        } else {
            lower.push(format!("k{index}"));
            writeln!(out, "    k{} -> k{index} [style=invis];", index - 1)?;
        }
    }
    Ok(())
}

fn write_rules(
    figure: &Figure,
    upper: &mut Vec<String>,
    lower: &mut Vec<String>,
    out: &mut dyn io::Write,
) -> io::Result<()> {
    let steps = &figure.network.steps;
    let occurs = |rule: &&String| steps.iter().any(|step| step.rule == **rule);
    for (index, rule) in figure.network.header.rules.iter().filter(occurs).enumerate() {
        let style = figure.style_of(rule);
        let text = format!("{}: {}", style.mark, rule.replace('-', "-\n"));
        writeln!(out, "    a{index} [shape=point, width=0.02];")?;
        writeln!(out, "    b{index} [shape=plaintext, label={}];", quoted(&text))?;
        writeln!(out, "    a{index} -> b{index} [style={}, arrowhead={}, weight=100];", style.line, style.arrow)?;
        upper.push(format!("a{index}"));
        lower.push(format!("b{index}"));
    }
    Ok(())
}
