//! What holds for a whole network: its header, and what the reader must know.

use super::record::{ByHalogen, Conditions, FORMAT, Header, Identity, Program};
use crate::molecule;
use crate::network::{Limit, Network, Outcome};
use crate::rules::Rule;
use crate::thermo;

/// How much of a network was wanted.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum Extent {
    /// All of it.
    Whole,
    /// The steps of the parents: that it ends there is no matter for a warning.
    FirstSteps,
}

/// The header of a network made by these rules, at these conditions.
pub fn header(network: &Network, rules: &[Rule], conditions: &thermo::Conditions, extent: Extent) -> Header {
    let warnings = [
        isomer_warning(network),
        idle_warning(network, rules),
        cumulene_warning(network),
        cage_warning(network),
        limit_warning(network, extent),
    ];
    Header {
        format: FORMAT.to_owned(),
        program: Program::this(),
        parents: network.parents().map(|id| id + 1).collect(),
        identity: identity(network.identity()),
        conditions: conditions_of(conditions),
        rules: rules.iter().map(|rule| rule.name.clone()).collect(),
        complete: network.outcome() == Outcome::Complete,
        warnings: warnings.into_iter().flatten().collect(),
    }
}

fn identity(identity: molecule::Identity) -> Identity {
    match identity {
        molecule::Identity::Constitutional => Identity::Constitutional,
        molecule::Identity::Geometric => Identity::Geometric,
        molecule::Identity::Full => Identity::Full,
    }
}

fn conditions_of(conditions: &thermo::Conditions) -> Conditions {
    let [fluorine, chlorine, bromine, iodine] = conditions.halide_mol_per_litre();
    Conditions {
        temperature_kelvin: conditions.temperature_kelvin(),
        ph: conditions.ph(),
        halide_mol_per_litre: ByHalogen { fluorine, chlorine, bromine, iodine },
    }
}

/// Says that the parent stands for several isomers.
fn isomer_warning(network: &Network) -> Option<String> {
    let n = network.parents().len();
    (n > 1).then(|| format!("the compound was given without its configuration: all {n} isomers are parents"))
}

/// Says that no rule acts on what was given, which is no finding about the compound.
fn idle_warning(network: &Network, rules: &[Rule]) -> Option<String> {
    let is_idle = network.n_steps() == 0 && network.outcome() == Outcome::Complete && !rules.is_empty();
    is_idle.then(|| "none of the rules chosen acts on this compound; --with adds rules that are off".to_owned())
}

/// Says that cumulenes hide isomers.
fn cumulene_warning(network: &Network) -> Option<String> {
    let n = network.n_with_hidden_cumulene_isomers();
    let what = if n == 1 { "1 compound holds a cumulene".to_owned() } else { format!("{n} compounds hold a cumulene") };
    (n > 0).then(|| format!("{what} whose configuration is not told apart: each stands for two isomers or more"))
}

/// Says that isomers are listed that a small cage cannot have.
fn cage_warning(network: &Network) -> Option<String> {
    let is_full = network.identity() == molecule::Identity::Full;
    let has_cage = network.frames().iter().any(|frame| frame.prepared.has_small_cage());
    (is_full && has_cage).then(|| {
        "the skeleton has small bridged rings: configurations at bridgeheads that strain forbids are not left out"
            .to_owned()
    })
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
