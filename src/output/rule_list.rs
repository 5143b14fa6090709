//! The rules as a table: name, group, whether it is on, what it does.

use std::io;

use super::layout::table;
use crate::rules::Rule;

/// Writes a list of rules for reading.
///
/// # Errors
/// * whatever `out` reports
pub fn write_rule_list(rules: &[Rule], out: &mut dyn io::Write) -> io::Result<()> {
    let rows = rules.iter().map(|rule| {
        let group = rule.group.clone().unwrap_or_default();
        let default = if rule.on_by_default { "on" } else { "off" };
        vec![rule.name.clone(), group, default.to_owned(), rule.summary.clone()]
    });
    writeln!(out, "{}", table(&["rule", "group", "default", "what it does"], &[], rows.collect()))
}
