//! `haloshed explain`: where the Gibbs energy of a compound comes from.

use clap::Args;
use haloshed::output::explain::{Explanation, write_explanation};
use haloshed::thermo::Conditions;

use super::build::{BuildArgs, Extent, NetworkRequest, build_network};
use super::compound::read_compound;
use super::destination::Destination;
use super::failure::Failure;
use super::{CAUTION, Ending};

/// Print where the Gibbs energy of a compound comes from, group by group.
///
/// Example: haloshed explain "ClC=C(Cl)Cl"
#[derive(Debug, Args)]
#[command(after_help = CAUTION)]
pub(crate) struct ExplainArgs {
    /// The compound: a SMILES, a name, an abbreviation or a CAS number.
    #[arg(allow_hyphen_values = true)]
    compound: String,

    #[command(flatten)]
    build: BuildArgs,
}

/// Runs the command.
pub(crate) fn run(args: &ExplainArgs) -> Result<Ending, Failure> {
    let request = NetworkRequest {
        parent: read_compound(&args.compound)?,
        // No rules: the compound itself, or its isomers, and nothing else.
        rules: Vec::new(),
        identity: args.build.identity,
        extent: Extent::FirstSteps,
        n_threads: args.build.n_threads(),
        conditions: Conditions::default(),
    };
    let built = build_network(request)?;
    let valued = built.valued();
    let explanations = built.parents().map(|parent| valued.explanation(parent, built.title(parent)));
    let explanations: Vec<Explanation> = explanations.collect();
    Destination::Stdout.write(|out| {
        for (number, explanation) in explanations.iter().enumerate() {
            if number > 0 {
                writeln!(out)?;
            }
            write_explanation(explanation, out)?;
        }
        Ok(())
    })?;
    Ok(Ending::Whole)
}
