//! `haloshed explain`: where the Gibbs energy of a compound comes from.

use clap::Args;
use haloshed::output::explain::write_explanation;

use super::compound::read_compound;
use super::destination::Destination;
use super::failure::Failure;
use super::seam::explain_compound;
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
}

/// Runs the command.
pub(crate) fn run(args: &ExplainArgs) -> Result<Ending, Failure> {
    let explanation = explain_compound(&read_compound(&args.compound)?)?;
    Destination::Stdout.write(|out| write_explanation(&explanation, out))?;
    Ok(Ending::Whole)
}
