//! `haloshed steps`: the first half-reactions of a compound, balanced, highest potential first.

use clap::Args;
use haloshed::output::Writer;
use haloshed::output::steps::HalfReactions;

use super::build::{BuildArgs, Extent, NetworkRequest, build_network};
use super::compound::read_compound;
use super::conditions::ConditionArgs;
use super::destination::Destination;
use super::failure::Failure;
use super::report::warn;
use super::rule_choice::RuleArgs;
use super::{CAUTION, Ending};

/// Print the first half-reactions of a compound with E°, E' and uncertainty, highest first.
///
/// Example: haloshed steps "ClC(Cl)C" --ph 6.5
#[derive(Debug, Args)]
#[command(after_help = CAUTION)]
pub(crate) struct StepsArgs {
    /// The compound: a SMILES, a name, an abbreviation or a CAS number.
    #[arg(allow_hyphen_values = true)]
    compound: String,

    #[command(flatten)]
    conditions: ConditionArgs,

    #[command(flatten)]
    rules: RuleArgs,

    #[command(flatten)]
    build: BuildArgs,
}

/// Runs the command.
pub(crate) fn run(args: &StepsArgs) -> Result<Ending, Failure> {
    let request = NetworkRequest {
        parent: read_compound(&args.compound)?,
        rules: args.rules.chosen()?,
        identity: args.build.identity,
        extent: Extent::FirstSteps,
        n_threads: args.build.n_threads(),
        conditions: args.conditions.conditions()?,
    };
    let built = build_network(request)?;
    built.header().warnings.iter().for_each(|text| warn(text));
    let valued = built.valued();
    Destination::Stdout.write(|out| HalfReactions.write(&built.records(&valued), out))?;
    Ok(Ending::Whole)
}
