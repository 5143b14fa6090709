//! `haloshed network`: the whole network of a compound.

use std::io;
use std::path::{Path, PathBuf};
use std::time::Duration;

use clap::{Args, ValueEnum};
use haloshed::network::Limits;
use haloshed::output::csv::Csv;
use haloshed::output::dot::{Dot, fits_a_page};
use haloshed::output::format::Format;
use haloshed::output::json::Json;
use haloshed::output::jsonl::Jsonl;
use haloshed::output::summary::Summary;
use haloshed::output::table::Table;
use haloshed::output::{Records, Writer};

use super::build::{BuildArgs, Built, Extent, NetworkRequest, build_network};
use super::compound::read_compound;
use super::conditions::ConditionArgs;
use super::destination::Destination;
use super::failure::Failure;
use super::quantity::time;
use super::report::warn;
use super::rule_choice::RuleArgs;
use super::{CAUTION, Ending};

/// List everything a compound can turn into, and every step with its potential.
///
/// Example: haloshed network "ClC(Cl)=C(Cl)Cl" --chloride 5mM -o pce.dot
#[derive(Debug, Args)]
#[command(after_help = CAUTION)]
pub(crate) struct NetworkArgs {
    /// The compound: a SMILES, a name, an abbreviation or a CAS number.
    #[arg(allow_hyphen_values = true)]
    compound: String,

    /// Write in this format [default: what the ending of FILE says, else table].
    #[arg(long, value_enum, value_name = "FORMAT")]
    format: Option<FormatChoice>,

    /// Write to this file instead of stdout; its ending (.txt, .json, .jsonl, .csv, .dot or .gv)
    /// says the format.
    #[arg(short, long, value_name = "FILE")]
    output: Option<PathBuf>,

    /// Write this table alone, as CSV; without it FILE.csv becomes FILE.compounds.csv and
    /// FILE.steps.csv.
    #[arg(long, value_enum)]
    table: Option<TableChoice>,

    #[command(flatten)]
    conditions: ConditionArgs,

    #[command(flatten)]
    rules: RuleArgs,

    #[command(flatten)]
    limits: LimitArgs,

    #[command(flatten)]
    build: BuildArgs,
}

#[derive(Debug, Args)]
#[command(next_help_heading = "Limits")]
struct LimitArgs {
    /// Stop when this many compounds are found; the result is then marked incomplete.
    #[arg(long, value_name = "N", default_value = "100000", value_parser = clap::value_parser!(u32).range(1..))]
    max_compounds: u32,

    /// Stop at this generation; parents are generation 0 [default: no limit].
    #[arg(long, value_name = "N")]
    max_generation: Option<u32>,

    /// Stop after this time, such as 30s or 2min [default: no limit].
    #[arg(long, value_name = "TIME", value_parser = time, allow_hyphen_values = true)]
    time_limit: Option<Duration>,
}

#[derive(Debug, Clone, Copy, PartialEq, Eq, ValueEnum)]
enum FormatChoice {
    /// Tables for reading
    Table,
    /// One JSON object
    Json,
    /// JSON records, a line each
    Jsonl,
    /// Comma-separated values
    Csv,
    /// A figure for Graphviz
    Dot,
    /// Counts by generation and rule
    Summary,
}

#[derive(Debug, Clone, Copy, PartialEq, Eq, ValueEnum)]
enum TableChoice {
    /// A row for each compound
    Compounds,
    /// A row for each step
    Steps,
}

/// What is written where; opened before the work starts.
enum Plan {
    One(Format, Destination),
    OneTable(Csv, Destination),
    BothTables { compounds: Destination, steps: Destination },
}

/// Runs the command.
pub(crate) fn run(args: &NetworkArgs) -> Result<Ending, Failure> {
    let request = NetworkRequest {
        parent: read_compound(&args.compound)?,
        rules: args.rules.chosen()?,
        identity: args.build.identity,
        extent: Extent::Whole(args.limits.limits()),
        n_threads: args.build.n_threads(),
        conditions: args.conditions.conditions()?,
    };
    let plan = Plan::open(args)?;
    let built = build_network(request)?;
    built.header().warnings.iter().for_each(|text| warn(text));
    plan.write(&built)?;
    Ok(if built.header().complete { Ending::Whole } else { Ending::Partial })
}

impl LimitArgs {
    fn limits(&self) -> Limits {
        Limits {
            max_compounds: self.max_compounds as usize,
            max_generation: self.max_generation,
            time: self.time_limit,
        }
    }
}

impl FormatChoice {
    fn format(self) -> Format {
        match self {
            FormatChoice::Table => Format::Table,
            FormatChoice::Json => Format::Json,
            FormatChoice::Jsonl => Format::Jsonl,
            FormatChoice::Csv => Format::Csv,
            FormatChoice::Dot => Format::Dot,
            FormatChoice::Summary => Format::Summary,
        }
    }
}

impl Plan {
    fn open(args: &NetworkArgs) -> Result<Plan, Failure> {
        let file = args.output.as_deref();
        let format = chosen_format(args)?;
        match (format, args.table) {
            (Format::Csv, Some(table)) => Ok(Plan::OneTable(table.csv(), Destination::open(file)?)),
            (Format::Csv, None) => match file.filter(|path| path.as_os_str() != "-") {
                Some(path) => {
                    let compounds = Destination::open(Some(&beside(path, "compounds")))?;
                    Ok(Plan::BothTables { compounds, steps: Destination::open(Some(&beside(path, "steps")))? })
                }
                None => Err(Failure::usage(
                    "CSV is two tables, and stdout takes one",
                    "add --table compounds or --table steps, or -o FILE.csv for both",
                )),
            },
            (_, Some(_)) => Err(Failure::usage("--table goes with CSV only", "use --format csv, or leave --table out")),
            (format, None) => Ok(Plan::One(format, Destination::open(file)?)),
        }
    }

    fn write(self, built: &Built) -> Result<(), Failure> {
        let valued = built.valued();
        let records = built.records(&valued);
        let fill = |writer: &dyn Writer, destination: Destination| {
            destination.write(|out: &mut dyn io::Write| writer.write(&records as &dyn Records, out))
        };
        match self {
            Plan::One(format, destination) => {
                if format == Format::Dot && !fits_a_page(built.n_compounds()) {
                    let n = built.n_compounds();
                    warn(&format!(
                        "a figure of {n} compounds cannot be read on one page; --max-generation or --rules-only \
                         make it smaller"
                    ));
                }
                fill(writer(format, built).as_ref(), destination)
            }
            Plan::OneTable(table, destination) => fill(&table, destination),
            Plan::BothTables { compounds, steps } => {
                fill(&Csv::Compounds, compounds)?;
                fill(&Csv::Steps, steps)
            }
        }
    }
}

impl TableChoice {
    fn csv(self) -> Csv {
        match self {
            TableChoice::Compounds => Csv::Compounds,
            TableChoice::Steps => Csv::Steps,
        }
    }
}

fn chosen_format(args: &NetworkArgs) -> Result<Format, Failure> {
    if let Some(choice) = args.format {
        return Ok(choice.format());
    }
    match &args.output {
        Some(path) if path.as_os_str() != "-" => Format::of_file(path).ok_or_else(|| {
            Failure::usage(
                format!("the ending of {} stands for no format", path.display()),
                "use .txt, .json, .jsonl, .csv, .dot or .gv, or add --format",
            )
        }),
        _ if args.table.is_some() => Ok(Format::Csv),
        _ => Ok(Format::Table),
    }
}

/// `pce.csv` and `steps` make `pce.steps.csv`.
fn beside(path: &Path, table: &str) -> PathBuf {
    let mut name = path.file_stem().unwrap_or_default().to_owned();
    name.push(format!(".{table}."));
    name.push(path.extension().unwrap_or("csv".as_ref()));
    path.with_file_name(name)
}

fn writer(format: Format, built: &Built) -> Box<dyn Writer> {
    match format {
        Format::Table => Box::new(Table),
        Format::Json => Box::new(Json),
        Format::Jsonl => Box::new(Jsonl),
        Format::Csv => Box::new(Csv::Compounds),
        Format::Dot => Box::new(Dot),
        Format::Summary => Box::new(Summary { enumeration: Some(built.enumeration), energies: Some(built.valuation) }),
    }
}
