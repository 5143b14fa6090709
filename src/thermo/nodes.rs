//! One compound's energy with all that stands behind it: parts, origin, uncertainty.

use super::data::{Quantity, Value};
use super::energies::{Energies, FACTORS};
use super::estimate::{Estimator, element_entropy, sum, symmetry_entropy};
use super::fit::Class;
use super::matching::Known;
use super::parts::halogens_beside_fixed;
use super::scheme::Scheme;
use crate::molecule::{Halogen, Identity};
use crate::network::{CompoundId, Network};

/// Where a compound's energy comes from.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum Origin {
    /// Enthalpy, entropy and solubility are measured.
    Measured,
    /// Some of the three are measured.
    PartlyMeasured,
    /// None is.
    Estimated,
}

impl Origin {
    /// As written in outputs.
    pub fn text(self) -> &'static str {
        match self {
            Origin::Measured => "measured",
            Origin::PartlyMeasured => "partly measured",
            Origin::Estimated => "estimated",
        }
    }
}

/// A compound's energy, taken apart.
#[derive(Debug, Clone)]
pub struct Node {
    /// Groups with their counts.
    pub groups: Vec<(usize, f64)>,
    /// Measured values, where there are any.
    pub known: Option<Known>,
    /// Estimates of the three quantities, symmetry included.
    pub estimates: [f64; 3],
    /// R ln sigma, J/mol/K.
    pub symmetry_entropy_j_per_mol_k: f64,
    /// Entropy of the elements, J/mol/K.
    pub element_entropy_j_per_mol_k: f64,
    /// Model errors of the three quantities.
    pub model_sd: [f64; 3],
    /// Halogens on carbons beside fixed atoms, by site.
    pub beside_fixed: Vec<u8>,
}

impl Node {
    /// Takes a compound's energy apart.
    pub fn of(network: &Network, energies: &Energies, scheme: &Scheme, compound: CompoundId) -> Node {
        let (prepared, row) = network.state(compound);
        let state = network.decoration(compound);
        let frame = &prepared.frame;
        let facts = energies.facts(network.frame_of(compound));
        let groups = Estimator::new(frame, facts, network.identity() >= Identity::Geometric).groups(&state);
        let mut candidates = vec![0; row.len()];
        prepared.layout.candidates(frame, &state, &mut candidates);
        let symmetry = symmetry_entropy(frame, &state, &prepared.canonicaliser.stabiliser(row, &candidates));
        let mut estimates = Quantity::ALL.map(|q| sum(scheme, q, &groups));
        estimates[Quantity::Entropy as usize] -= symmetry;
        let n_of = |x: Halogen| state.halogens.iter().map(|here| u32::from(here[x as usize])).sum();
        let class = Class::of(Halogen::ALL.map(n_of));
        Node {
            groups,
            known: energies.known(compound).cloned(),
            estimates,
            symmetry_entropy_j_per_mol_k: symmetry,
            element_entropy_j_per_mol_k: element_entropy(frame, &state),
            model_sd: [0, 1, 2].map(|q| scheme.model_sd[q][class as usize]),
            beside_fixed: halogens_beside_fixed(frame, &state),
        }
    }

    /// The measured value of a quantity.
    pub fn measured(&self, quantity: Quantity) -> Option<Value> {
        self.known.as_ref().and_then(|known| known.values[quantity as usize])
    }

    /// A Gibbs energy in water that was measured as such.
    pub fn aqueous(&self) -> Option<Value> {
        self.known.as_ref().and_then(|known| known.aqueous.as_ref()).map(|(value, _)| *value)
    }

    /// The value used for a quantity.
    pub fn used(&self, quantity: Quantity) -> f64 {
        self.measured(quantity).map_or(self.estimates[quantity as usize], |v| v.mean)
    }

    /// Gibbs energy of formation in water, kJ/mol.
    pub fn gibbs_kj_per_mol(&self) -> f64 {
        if let Some(value) = self.aqueous() {
            return value.mean;
        }
        let parts: f64 = Quantity::ALL.iter().map(|&q| FACTORS[q as usize] * self.used(q)).sum();
        parts - FACTORS[1] * self.element_entropy_j_per_mol_k
    }

    /// Its standard uncertainty, kJ/mol.
    pub fn sd_kj_per_mol(&self, scheme: &Scheme) -> f64 {
        if let Some(value) = self.aqueous() {
            return value.sd;
        }
        Quantity::ALL.iter().map(|&q| self.variance(scheme, q)).sum::<f64>().sqrt()
    }

    /// Variance that a quantity brings to the Gibbs energy, (kJ/mol)².
    pub(super) fn variance(&self, scheme: &Scheme, quantity: Quantity) -> f64 {
        let q = quantity as usize;
        let variance = match self.measured(quantity) {
            Some(value) => value.sd * value.sd,
            None => scheme.variance(quantity, &self.groups) + self.model_sd[q] * self.model_sd[q],
        };
        FACTORS[q] * FACTORS[q] * variance
    }

    /// Where the energy comes from.
    pub fn origin(&self) -> Origin {
        let n = Quantity::ALL.iter().filter(|&&q| self.measured(q).is_some()).count();
        match n {
            _ if self.aqueous().is_some() => Origin::Measured,
            3 => Origin::Measured,
            0 => Origin::Estimated,
            _ => Origin::PartlyMeasured,
        }
    }
}
