//! From a request to a network with energies: the library calls that `network` and `steps`
//! share.

use std::num::NonZeroUsize;
use std::ops::Range;
use std::time::{Duration, Instant};

use clap::{Args, ValueEnum};
use haloshed::molecule::{self, Molecule};
use haloshed::network::{CompoundId, Limit, Limits, Network, Outcome, enumerate};
use haloshed::output::assemble::{Assembled, Registry};
use haloshed::output::record::{Conditions, FORMAT, Header, Identity, Program};
use haloshed::output::valued::Valued;
use haloshed::rules::Rule;
use haloshed::smiles;
use haloshed::thermo;

use super::failure::Failure;
use super::known::Catalogue;
use super::report::Report;

/// What a network is asked for.
#[derive(Debug)]
pub(crate) struct NetworkRequest {
    pub(crate) parent: Molecule,
    pub(crate) rules: Vec<Rule>,
    pub(crate) identity: IdentityChoice,
    pub(crate) extent: Extent,
    pub(crate) n_threads: NonZeroUsize,
    pub(crate) conditions: Conditions,
}

/// How much of a network is wanted.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub(crate) enum Extent {
    /// All of it, within limits.
    Whole(Limits),
    /// The steps of the parents, and nothing beyond.
    FirstSteps,
}

/// A network and how long it took.
#[derive(Debug)]
pub(crate) struct Built {
    network: Network,
    rules: Vec<Rule>,
    header: Header,
    energies: thermo::Energies,
    conditions: thermo::Conditions,
    /// Time that the enumeration took.
    pub(crate) enumeration: Duration,
    /// Time that the energies took.
    pub(crate) valuation: Duration,
}

/// How compounds are told apart.
#[derive(Debug, Clone, Copy, PartialEq, Eq, ValueEnum)]
pub(crate) enum IdentityChoice {
    /// Connectivity alone
    Constitutional,
    /// Connectivity and E/Z
    Geometric,
    /// Connectivity, E/Z and tetrahedral configuration
    Full,
}

/// Options that `network` and `steps` share.
#[derive(Debug, Args)]
#[command(next_help_heading = "Identity and speed")]
pub(crate) struct BuildArgs {
    /// Tell compounds apart to this depth.
    #[arg(long, value_enum, default_value = "geometric")]
    pub(crate) identity: IdentityChoice,

    /// Use this many threads; the result is the same for any number [default: one for each core].
    #[arg(long, value_name = "N", value_parser = clap::value_parser!(u16).range(1..=1024))]
    threads: Option<u16>,
}

impl BuildArgs {
    /// The number of threads asked for.
    pub(crate) fn n_threads(&self) -> NonZeroUsize {
        let asked = self.threads.and_then(|n| NonZeroUsize::new(n.into()));
        asked.or_else(|| std::thread::available_parallelism().ok()).unwrap_or(NonZeroUsize::MIN)
    }
}

impl IdentityChoice {
    fn of_molecules(self) -> molecule::Identity {
        match self {
            IdentityChoice::Constitutional => molecule::Identity::Constitutional,
            IdentityChoice::Geometric => molecule::Identity::Geometric,
            IdentityChoice::Full => molecule::Identity::Full,
        }
    }

    fn of_records(self) -> Identity {
        match self {
            IdentityChoice::Constitutional => Identity::Constitutional,
            IdentityChoice::Geometric => Identity::Geometric,
            IdentityChoice::Full => Identity::Full,
        }
    }
}

/// Enumerates a network.
pub(crate) fn build_network(request: NetworkRequest) -> Result<Built, Failure> {
    let started = Instant::now();
    let NetworkRequest { parent, rules, identity, extent, n_threads, conditions } = request;
    let limits = match extent {
        Extent::Whole(limits) => limits,
        Extent::FirstSteps => Limits { max_generation: Some(1), ..Limits::default() },
    };
    let network = enumerate(&[parent], &rules, identity.of_molecules(), limits, n_threads.get())
        .map_err(|error| Report::plain(error.to_string()))?;
    let header = Header {
        format: FORMAT.to_owned(),
        program: Program::this(),
        parents: network.parents().map(|id| id + 1).collect(),
        identity: identity.of_records(),
        conditions,
        rules: rules.iter().map(|rule| rule.name.clone()).collect(),
        complete: network.outcome() == Outcome::Complete,
        warnings: isomer_warning(&network).into_iter().chain(limit_warning(&network, extent)).collect(),
    };
    let enumeration = started.elapsed();
    let energies = thermo::energies(&network, thermo::shipped(), n_threads.get());
    let valuation = started.elapsed().saturating_sub(enumeration);
    let conditions = conditions_of(&header)?;
    Ok(Built { network, rules, header, energies, conditions, enumeration, valuation })
}

/// The conditions of the header, checked.
fn conditions_of(header: &Header) -> Result<thermo::Conditions, Failure> {
    let halides = header.conditions.halide_mol_per_litre.pairs().map(|(_, activity)| activity);
    thermo::Conditions::new(header.conditions.ph, halides).map_err(|error| Report::plain(error.to_string()).into())
}

impl Built {
    /// What holds for the whole network.
    pub(crate) fn header(&self) -> &Header {
        &self.header
    }

    /// The parents.
    pub(crate) fn parents(&self) -> Range<CompoundId> {
        self.network.parents()
    }

    /// A compound's name and structure, for people.
    pub(crate) fn title(&self, compound: CompoundId) -> String {
        let molecule = self.network.molecule(compound);
        let smiles = smiles::write(&molecule);
        match Catalogue.entry(&smiles, &molecule).names.first() {
            Some(name) => format!("{name}, {smiles}"),
            None => smiles,
        }
    }

    /// Number of compounds.
    pub(crate) fn n_compounds(&self) -> usize {
        self.network.n_compounds()
    }

    /// The network with its energies.
    pub(crate) fn valued(&self) -> Valued<'_> {
        Valued {
            network: &self.network,
            energies: &self.energies,
            scheme: thermo::shipped(),
            conditions: self.conditions,
        }
    }

    /// The network as records, which draw on `valued`.
    pub(crate) fn records<'a>(&'a self, valued: &'a Valued<'a>) -> Assembled<'a> {
        Assembled {
            header: self.header.clone(),
            network: &self.network,
            rules: &self.rules,
            registry: &Catalogue,
            energies: valued,
        }
    }
}

/// Says that the parent stands for several isomers.
fn isomer_warning(network: &Network) -> Option<String> {
    let n = network.parents().len();
    (n > 1).then(|| format!("the compound was given without its configuration: all {n} isomers are parents"))
}

/// Says that a limit was reached, if it was one of the user's or the program's and not part of
/// what was asked.
fn limit_warning(network: &Network, extent: Extent) -> Option<String> {
    let Outcome::Cut { limit, first_unexpanded } = network.outcome() else { return None };
    if extent == Extent::FirstSteps && matches!(limit, Limit::Generation(_)) {
        return None;
    }
    let n_left = network.n_compounds() - first_unexpanded;
    let (compounds, option) = (if n_left == 1 { "compound" } else { "compounds" }, option_of(limit));
    Some(format!(
        "the network is incomplete: {limit} was reached, and {n_left} {compounds} from id {} on were not followed \
         further; raise {option} to go on",
        first_unexpanded + 1
    ))
}

fn option_of(limit: Limit) -> &'static str {
    match limit {
        Limit::Compounds(_) => "--max-compounds",
        Limit::Generation(_) => "--max-generation",
        Limit::Time(_) => "--time-limit",
    }
}
