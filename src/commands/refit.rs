//! `haloshed refit`: the fitted tables anew, from the measured rows.

use std::fs;
use std::path::{Path, PathBuf};

use clap::Args;
use haloshed::thermo::{Sources, refit};

use super::destination::Destination;
use super::failure::Failure;
use super::report::Report;
use super::{CAUTION, Ending};

/// Fit the additive scheme to the measured rows and rewrite data/fitted; for maintainers.
///
/// Example: haloshed refit data
#[derive(Debug, Args)]
#[command(after_help = CAUTION)]
pub(crate) struct RefitArgs {
    /// The folder with gas.csv, henry.csv and priors.csv; tables go to its folder fitted.
    #[arg(default_value = "data")]
    folder: PathBuf,
}

/// Runs the command.
pub(crate) fn run(args: &RefitArgs) -> Result<Ending, Failure> {
    let [gas, henry, priors] = ["gas.csv", "henry.csv", "priors.csv"].map(|file| read(&args.folder.join(file)));
    let (gas, henry, priors) = (gas?, henry?, priors?);
    let sources = Sources { gas: &gas, henry: &henry, priors: &priors };
    let fitted = refit(sources).map_err(|error| Report::plain(error.to_string()))?;
    for (file, text) in &fitted.files {
        let path = args.folder.join("fitted").join(file);
        Destination::open(Some(&path))?.write(|out| out.write_all(text.as_bytes()))?;
    }
    Destination::Stdout.write(|out| out.write_all(fitted.report.as_bytes()))?;
    Ok(Ending::Whole)
}

fn read(path: &Path) -> Result<String, Failure> {
    fs::read_to_string(path).map_err(|error| Report::plain(format!("{}: {error}", path.display())).into())
}
