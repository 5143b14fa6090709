//! The command line: one file a subcommand.
//!
//! Arguments are made into ready values, handed to the library, and what comes back goes to a
//! writer. [`report`] alone shows errors; stdout carries the result, stderr everything else.
//!
//! Exit codes: 0 done, 1 bad input, 2 wrong usage, 3 partial result.

mod build;
mod compound;
mod conditions;
mod destination;
mod explain;
mod failure;
mod network;
mod quantity;
mod refit;
mod report;
mod rule_choice;
mod rules;
mod steps;

use std::io;
use std::process::ExitCode;

use clap::{Parser, Subcommand};

use failure::Failure;

/// What estimates are for; stands under every help page.
const CAUTION: &str = "Estimated potentials screen: they say what to look for and where to measure. They do not \
replace testing, local codes or licensed practice.";

/// Everything a halogenated compound can turn into under reducing conditions, with the
/// two-electron reduction potential of every step.
#[derive(Debug, Parser)]
#[command(name = "haloshed", version, after_help = CAUTION, arg_required_else_help = true, max_term_width = 98)]
struct CommandLine {
    #[command(subcommand)]
    command: Command,
}

#[derive(Debug, Subcommand)]
enum Command {
    Network(network::NetworkArgs),
    Steps(steps::StepsArgs),
    Rules(rules::RulesArgs),
    Explain(explain::ExplainArgs),
    Refit(refit::RefitArgs),
}

/// How a command ended that gave a result.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
enum Ending {
    /// All of it.
    Whole,
    /// A limit was reached.
    Partial,
}

/// Runs the program on its arguments.
pub(crate) fn main() -> ExitCode {
    let outcome = match CommandLine::parse().command {
        Command::Network(args) => network::run(&args),
        Command::Steps(args) => steps::run(&args),
        Command::Rules(args) => rules::run(&args),
        Command::Explain(args) => explain::run(&args),
        Command::Refit(args) => refit::run(&args),
    };
    match outcome {
        Ok(Ending::Whole) => ExitCode::SUCCESS,
        Ok(Ending::Partial) => ExitCode::from(3),
        Err(failure) => report_failure(&failure),
    }
}

fn report_failure(failure: &Failure) -> ExitCode {
    report::show(&failure.reports, &mut io::stderr());
    ExitCode::from(failure.kind.exit_code())
}
