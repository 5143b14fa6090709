//! `haloshed rules`: what rules there are, what they say, and whether a file of them is right.

use std::io;
use std::path::PathBuf;

use clap::{Args, Subcommand};
use haloshed::output::rule_list::write_rule_list;
use haloshed::rules::check::read_rules;
use haloshed::rules::{Rule, RuleSet};

use super::Ending;
use super::destination::Destination;
use super::failure::Failure;
use super::rule_choice::{read_text, rule_file_reports, selection_report};

/// List the rules, show one, or check a file of your own.
///
/// Example: haloshed rules show vicinal-elimination
#[derive(Debug, Args)]
pub(crate) struct RulesArgs {
    #[command(subcommand)]
    action: Option<Action>,
}

#[derive(Debug, Subcommand)]
enum Action {
    /// List the rules with their groups and whether they are on.
    List,
    /// Check a rule file and show every mistake in it.
    Check {
        /// The rule file.
        file: PathBuf,
    },
    /// Show the text of a rule, or of the rules of a group.
    Show {
        /// Name of a rule or group.
        name: String,
    },
}

/// Runs the command.
pub(crate) fn run(args: &RulesArgs) -> Result<Ending, Failure> {
    let shipped = RuleSet::shipped();
    match args.action.as_ref().unwrap_or(&Action::List) {
        Action::List => Destination::Stdout.write(|out| write_rule_list(shipped.rules(), out)),
        Action::Check { file } => {
            let text = read_text(file)?;
            let rules = read_rules(&file.to_string_lossy(), &text).map_err(|error| rule_file_reports(&error))?;
            let names: Vec<&str> = rules.iter().map(|rule| rule.name.as_str()).collect();
            let plural = if names.len() == 1 { "rule" } else { "rules" };
            Destination::Stdout.write(|out| {
                writeln!(out, "{}: {} {plural} in order: {}", file.display(), names.len(), names.join(", "))
            })
        }
        Action::Show { name } => {
            let rules = shipped.named(name).map_err(|error| selection_report(&error))?;
            Destination::Stdout.write(|out| write_texts(&rules, out))
        }
    }?;
    Ok(Ending::Whole)
}

fn write_texts(rules: &[&Rule], out: &mut dyn io::Write) -> io::Result<()> {
    for (index, rule) in rules.iter().enumerate() {
        let gap = if index > 0 { "\n" } else { "" };
        writeln!(out, "{gap}{}", rule.text.trim_end())?;
    }
    Ok(())
}
