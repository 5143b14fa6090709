//! How kinds of compounds and rules are drawn: by shape, line, arrowhead and letter, never by
//! colour.

use crate::output::record::Compound;

/// Kinds of compounds that are told apart.
#[derive(Debug, Clone, Copy, PartialEq, Eq, PartialOrd, Ord)]
pub enum NodeKind {
    /// A parent: two outlines.
    Parent,
    /// A compound on the way: one thin outline.
    Intermediate,
    /// A short-lived one: dashed outline, formula in brackets.
    Transient,
    /// One that no rule leads on from: thick rounded outline.
    EndProduct,
}

impl NodeKind {
    /// The kind of a compound; the first that fits in the order parent, transient, end product.
    pub fn of(compound: &Compound) -> NodeKind {
        match compound {
            c if c.is_parent => NodeKind::Parent,
            c if c.transient => NodeKind::Transient,
            c if c.is_end_product => NodeKind::EndProduct,
            _ => NodeKind::Intermediate,
        }
    }

    /// DOT attributes, a comma before each.
    pub(super) fn attributes(self) -> &'static str {
        match self {
            NodeKind::Parent => ", peripheries=2",
            NodeKind::Intermediate => "",
            NodeKind::Transient => ", style=dashed",
            NodeKind::EndProduct => ", style=\"rounded,bold\", penwidth=2.5",
        }
    }

    /// What the legend calls it.
    pub(super) fn words(self) -> &'static str {
        match self {
            NodeKind::Parent => "parent",
            NodeKind::Intermediate => "on the way",
            NodeKind::Transient => "[transient]",
            NodeKind::EndProduct => "end product",
        }
    }
}

/// How the steps of a rule are drawn.
#[derive(Debug, Clone, PartialEq, Eq)]
pub struct RuleStyle {
    /// Letters on the arrow.
    pub mark: String,
    /// Line style in DOT.
    pub line: &'static str,
    /// Arrowhead in DOT.
    pub arrow: &'static str,
}

/// The shipped rules: mark, line, arrowhead.
const SHIPPED: [(&str, &str, &str, &str); 13] = [
    ("hydrogenolysis", "H", "solid", "normal"),
    ("vicinal-elimination", "V", "bold", "normal"),
    ("geminal-elimination", "G", "dashed", "normal"),
    ("alkyne-hydrogenation", "Y", "solid", "empty"),
    ("alkene-hydrogenation", "N", "solid", "vee"),
    ("carbene-hydration", "W", "dotted", "normal"),
    ("carbene-shift", "S", "dotted", "empty"),
    ("aryl-hydrogenolysis", "A", "solid", "dot"),
    ("conjugate-elimination", "C", "bold", "dot"),
    ("vinylidene-elimination", "D", "dashed", "empty"),
    ("dehydrohalogenation", "X", "dotted", "vee"),
    ("hydrolysis", "O", "dotted", "box"),
    ("coupling", "P", "bold", "diamond"),
];

/// How a rule is drawn. A rule of the user's own is marked `R` and its number among the rules
/// of the network, and drawn with an open diamond.
pub fn rule_style(rule: &str, rules: &[String]) -> RuleStyle {
    if let Some(&(_, mark, line, arrow)) = SHIPPED.iter().find(|(name, ..)| *name == rule) {
        return RuleStyle { mark: mark.to_owned(), line, arrow };
    }
    let number = rules.iter().position(|name| name == rule).map_or(0, |index| index + 1);
    RuleStyle { mark: format!("R{number}"), line: "solid", arrow: "odiamond" }
}
