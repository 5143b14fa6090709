//! From a request to a network with energies: the library calls that `network` and `steps`
//! share.

use std::num::NonZeroUsize;
use std::ops::Range;
use std::time::{Duration, Instant};

use clap::{Args, ValueEnum};
use haloshed::molecule::{self, Molecule};
use haloshed::network::{CompoundId, Limits, Network, enumerate};
use haloshed::output::assemble::{Assembled, Registry};
use haloshed::output::header::{self, header};
use haloshed::output::known::Catalogue;
use haloshed::output::record::Header;
use haloshed::output::valued::Valued;
use haloshed::rules::Rule;
use haloshed::smiles;
use haloshed::thermo::{self, Conditions};

use super::failure::Failure;
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
    conditions: Conditions,
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
}

impl Extent {
    fn of_headers(self) -> header::Extent {
        match self {
            Extent::Whole(_) => header::Extent::Whole,
            Extent::FirstSteps => header::Extent::FirstSteps,
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
    let enumeration = started.elapsed();
    let energies = thermo::energies(&network, thermo::shipped(), n_threads.get());
    let valuation = started.elapsed().saturating_sub(enumeration);
    let header = header(&network, &rules, &conditions, extent.of_headers());
    Ok(Built { network, rules, header, energies, conditions, enumeration, valuation })
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
