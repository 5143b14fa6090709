//! Options for which rules are used, and reading of rule files.

use std::path::{Path, PathBuf};

use clap::Args;
use haloshed::rules::error::{RuleFileError, SelectionError};
use haloshed::rules::library::Selection;
use haloshed::rules::{Rule, RuleSet};

use super::failure::Failure;
use super::report::{Excerpt, Report};

#[derive(Debug, Args)]
#[command(next_help_heading = "Rules")]
pub(crate) struct RuleArgs {
    /// Read rules from this file as well; one of a known name takes its place. May be repeated.
    #[arg(long, value_name = "FILE")]
    rules: Vec<PathBuf>,

    /// Use these rules or groups and no others, separated by commas [default: those that are on].
    #[arg(long, value_name = "NAME,...", value_delimiter = ',')]
    rules_only: Option<Vec<String>>,

    /// Use these rules or groups besides, separated by commas; `haloshed rules` lists them.
    #[arg(long, value_name = "NAME,...", value_delimiter = ',')]
    with: Vec<String>,
}

impl RuleArgs {
    /// The chosen rules.
    pub(crate) fn chosen(&self) -> Result<Vec<Rule>, Failure> {
        let mut set = RuleSet::shipped();
        for file in &self.rules {
            let text = read_text(file)?;
            set = set.with_file_text(&file.to_string_lossy(), &text).map_err(|e| rule_file_reports(&e))?;
        }
        let trimmed = |names: &[String]| names.iter().map(|name| name.trim().to_owned()).collect();
        let selection = Selection { only: self.rules_only.as_deref().map(trimmed), with: trimmed(&self.with) };
        set.select(&selection).map_err(|error| selection_report(&error).into())
    }
}

/// The text of a file.
pub(crate) fn read_text(file: &Path) -> Result<String, Failure> {
    let bytes = std::fs::read(file).map_err(|error| {
        let text = error.to_string();
        let reason = text[..text.find(" (os error").unwrap_or(text.len())].to_lowercase();
        Report::plain(format!("cannot read {}: {reason}", file.display()))
    })?;
    String::from_utf8(bytes).map_err(|error| {
        let at = error.utf8_error().valid_up_to();
        let report = Report::plain(format!("{} is not text: byte {at} is no UTF-8", file.display()));
        report.with_help("save the file as UTF-8").into()
    })
}

/// Every mistake of a rule file.
pub(crate) fn rule_file_reports(error: &RuleFileError) -> Vec<Report> {
    let reports = error.errors.iter().map(|mistake| Report {
        message: mistake.to_string(),
        excerpt: Some(Excerpt {
            origin: error.file.clone(),
            text: error.text.clone(),
            span: mistake.span.clone(),
            label: mistake.label.clone(),
        }),
        help: mistake.hint.clone(),
    });
    reports.collect()
}

/// A name that is that of no rule.
pub(crate) fn selection_report(error: &SelectionError) -> Report {
    let SelectionError::UnknownName { nearest, known, .. } = error;
    let help = match nearest.as_slice() {
        [] => format!("the rules and groups are {}", known.join(", ")),
        [one] => format!("did you mean {one}?"),
        several => format!("did you mean one of {}?", several.join(", ")),
    };
    Report::plain(error.to_string()).with_help(help)
}
