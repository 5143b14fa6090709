//! Two-electron reduction potentials of steps.
//!
//! E = -dGr/(n F), with dGr from the energies in water of all species of the half-reaction; E° at
//! unit activities, E' at the stated conditions by Nernst, organics at equal activity. Against
//! the standard hydrogen electrode.

use super::conditions::Conditions;
use super::constants::{FARADAY_C_PER_MOL, RT_LN_10_KJ_PER_MOL};
use super::data::Quantity;
use super::energies::{Energies, FACTORS};
use super::nodes::{Node, Origin};
use super::parts::in_words;
use super::scheme::Scheme;
use crate::molecule::Halogen;
use crate::network::{CompoundId, HalfReaction, Network};

/// Energy and potential of a step.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Potential {
    /// Gibbs energy of the step at unit activities, kJ/mol.
    pub gibbs_standard_kj_per_mol: f64,
    /// Gibbs energy of the step at the conditions, kJ/mol.
    pub gibbs_kj_per_mol: f64,
    /// Standard uncertainty of both, kJ/mol.
    pub gibbs_sd_kj_per_mol: f64,
    /// E°, E' and their standard uncertainty, V against SHE; none if no electron is transferred.
    pub volts: Option<Volts>,
    /// Where the two compounds' energies come from.
    pub origin: StepOrigin,
}

/// Potentials, V against SHE.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Volts {
    /// At unit activities.
    pub standard: f64,
    /// At the conditions.
    pub at_conditions: f64,
    /// Standard uncertainty of both.
    pub sd: f64,
}

/// Where a step's energy comes from.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
#[allow(missing_docs)]
pub enum StepOrigin {
    Measured,
    PartlyMeasured,
    Estimated,
    /// Parts without value are the same in both compounds and cancel.
    ByDifference,
}

impl StepOrigin {
    /// As written in outputs.
    pub fn text(self) -> &'static str {
        match self {
            StepOrigin::Measured => "measured",
            StepOrigin::PartlyMeasured => "partly measured",
            StepOrigin::Estimated => "estimated",
            StepOrigin::ByDifference => "estimated by difference",
        }
    }
}

/// Why a step has no potential.
#[derive(Debug, Clone, PartialEq, Eq, thiserror::Error)]
#[error("the scheme has no values for groups with {parts}, and they change in this step")]
pub struct Missing {
    /// What has no value, in words.
    pub parts: String,
}

/// Potential of a step between two compounds of a network.
///
/// The uncertainty is one standard deviation of the difference: what two estimates share
/// cancels by the covariance of the group values.
///
/// # Errors
/// * parts without value change in the step: `Missing`
///
/// # Source
/// Nernst's equation; constants CODATA 2022; ions from `data/species.csv`.
pub fn potential(
    network: &Network,
    energies: &Energies,
    scheme: &Scheme,
    conditions: &Conditions,
    (from, to): (CompoundId, CompoundId),
    reaction: &HalfReaction,
) -> Result<Potential, Missing> {
    let n_reactants = f64::from(reaction.n_reactants);
    if !energies.has_value(from, to, reaction.n_reactants) {
        let without = if energies.signature(to) == 0 { from } else { to };
        return Err(Missing { parts: in_words(&network.state(without).0.frame) });
    }
    let difference = energies.relative_kj_per_mol(to) - n_reactants * energies.relative_kj_per_mol(from);
    let (ions, ions_variance) = ions(scheme, reaction);
    let standard = difference + ions;
    let at_conditions = standard + RT_LN_10_KJ_PER_MOL * log_quotient(conditions, reaction);
    let [node_from, node_to] = [from, to].map(|c| Node::of(network, energies, scheme, c));
    let sd = (variance(scheme, &node_from, &node_to, n_reactants) + ions_variance).sqrt();
    let charge = f64::from(reaction.electrons) * FARADAY_C_PER_MOL / 1000.0;
    let volts = (reaction.electrons != 0).then(|| Volts {
        standard: -standard / charge,
        at_conditions: -at_conditions / charge,
        sd: sd / charge.abs(),
    });
    Ok(Potential {
        gibbs_standard_kj_per_mol: standard,
        gibbs_kj_per_mol: at_conditions,
        gibbs_sd_kj_per_mol: sd,
        volts,
        origin: origin(&node_from, &node_to, energies.signature(from)),
    })
}

fn origin(from: &Node, to: &Node, signature: u64) -> StepOrigin {
    match (from.origin(), to.origin()) {
        _ if signature != 0 => StepOrigin::ByDifference,
        (Origin::Measured, Origin::Measured) => StepOrigin::Measured,
        (Origin::Estimated, Origin::Estimated) => StepOrigin::Estimated,
        _ => StepOrigin::PartlyMeasured,
    }
}

/// Energy of the ions made less that of the water taken up, kJ/mol, and its variance.
fn ions(scheme: &Scheme, reaction: &HalfReaction) -> (f64, f64) {
    let halides = Halogen::ALL.map(|x| (x.element().symbol(), f64::from(reaction.released[x as usize])));
    let water = ("water", -f64::from(reaction.water));
    let (mut sum, mut variance) = (0.0, 0.0);
    for (name, n) in halides.into_iter().chain([water]).filter(|(_, n)| *n != 0.0) {
        if let Some(species) = scheme.species(name) {
            sum += n * species.gibbs_kj_per_mol;
            variance += n * n * species.sd_kj_per_mol * species.sd_kj_per_mol;
        }
    }
    (sum, variance)
}

/// Decadic logarithm of the reaction quotient: halides made over protons taken up.
fn log_quotient(conditions: &Conditions, reaction: &HalfReaction) -> f64 {
    let halides: f64 = Halogen::ALL
        .iter()
        .map(|&x| f64::from(reaction.released[x as usize]) * libm::log10(conditions.halide_mol_per_litre()[x as usize]))
        .sum();
    halides + f64::from(reaction.protons) * conditions.ph()
}

/// Variance of the difference of two compounds' energies, (kJ/mol)².
fn variance(scheme: &Scheme, from: &Node, to: &Node, n_reactants: f64) -> f64 {
    if from.aqueous().is_some() || to.aqueous().is_some() {
        let sd = (to.sd_kj_per_mol(scheme), n_reactants * from.sd_kj_per_mol(scheme));
        return sd.0 * sd.0 + sd.1 * sd.1;
    }
    let quantities: f64 = Quantity::ALL
        .iter()
        .map(|&q| {
            if from.measured(q).is_some() || to.measured(q).is_some() {
                return to.variance(scheme, q) + n_reactants * n_reactants * from.variance(scheme, q);
            }
            let m = (from.model_sd[q as usize], to.model_sd[q as usize]);
            let own = (1.0 - scheme.allowances.shared_deviation) * (m.0 * m.0 * n_reactants * n_reactants + m.1 * m.1);
            let shared = scheme.variance(q, &difference(&to.groups, &from.groups, n_reactants));
            FACTORS[q as usize] * FACTORS[q as usize] * (shared + own)
        })
        .sum();
    quantities + beside_fixed(scheme, from, to)
}

/// Variance of halogens that come or go beside fixed atoms.
fn beside_fixed(scheme: &Scheme, from: &Node, to: &Node) -> f64 {
    let n: u32 = from.beside_fixed.iter().zip(&to.beside_fixed).map(|(a, b)| u32::from(a.abs_diff(*b))).sum();
    let sd = scheme.allowances.halogen_beside_fixed_sd_kj_per_mol;
    f64::from(n) * sd * sd
}

/// Groups of `a` less `n` times those of `b`; both sorted by number.
fn difference(a: &[(usize, f64)], b: &[(usize, f64)], n: f64) -> Vec<(usize, f64)> {
    let mut counts = vec![0.0; super::features::N_FEATURES];
    for &(group, x) in a {
        counts[group] += x;
    }
    for &(group, x) in b {
        counts[group] -= n * x;
    }
    counts.into_iter().enumerate().filter(|(_, x)| *x != 0.0).collect()
}
