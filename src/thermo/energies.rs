//! Gibbs energies of a whole network: one number a compound, in one pass.
//!
//! A compound's energy is its estimate, replaced part by part (enthalpy, entropy, solubility)
//! by what was measured. Where the scheme has no value for a part of the compound the number is
//! meaningful only against compounds with the same signature: see [`parts`](super::parts).
//! Which compounds were measured is found by [`matching`](super::matching); uncertainties are made
//! when asked for, by [`nodes`](super::nodes).

use rayon::prelude::*;
use rustc_hash::FxHashMap;

use super::constants::{RT_LN_10_KJ_PER_MOL, STANDARD_TEMPERATURE_KELVIN};
use super::data::Quantity;
use super::estimate::{Estimator, element_entropy, symmetry_entropy};
use super::features::FrameFacts;
use super::matching::{Known, find_measured};
use super::parts::signature;
use super::scheme::Scheme;
use crate::frame::{Decoration, Prepared};
use crate::molecule::Identity;
use crate::network::{CompoundId, Network};

/// Compounds that one thread takes at a time.
const BLOCK: usize = 4096;

/// Energies of a network's compounds.
#[derive(Debug, Clone)]
pub struct Energies {
    /// Gibbs energy of formation in water, kJ/mol, by compound; against compounds of the same
    /// signature only, where the signature is not zero.
    gibbs_kj_per_mol: Vec<f64>,
    /// Signature of the parts without value, by compound; empty if there are none at all.
    signatures: Vec<u64>,
    /// What the groups need to know of each frame.
    facts: Vec<FrameFacts>,
    /// What was measured, by compound.
    measured: FxHashMap<CompoundId, Known>,
}

/// Factors that turn enthalpy, entropy and log10 of solubility into Gibbs energy in water.
pub(super) const FACTORS: [f64; 3] = [1.0, -STANDARD_TEMPERATURE_KELVIN / 1000.0, -RT_LN_10_KJ_PER_MOL];

/// Energies of every compound of a network.
///
/// # Cost
/// About a microsecond a compound; see `benches/enumerate.rs`. Nine bytes a compound.
pub fn energies(network: &Network, scheme: &Scheme, n_threads: usize) -> Energies {
    let measured = find_measured(network, scheme);
    let facts: Vec<FrameFacts> = network.frames().iter().map(|f| FrameFacts::of(&f.prepared.frame)).collect();
    let group_energies = group_energies(scheme);
    let starts: Vec<usize> = (0..network.n_compounds()).step_by(BLOCK).collect();
    let block = |&start: &usize| {
        let end = network.n_compounds().min(start + BLOCK);
        estimate_block(network, &facts, &group_energies, start as CompoundId..end as CompoundId)
    };
    let blocks: Vec<Vec<(f64, u64)>> = if n_threads > 1 && starts.len() > 1 {
        starts.par_iter().map(block).collect()
    } else {
        starts.iter().map(block).collect()
    };
    let mut found = Energies {
        gibbs_kj_per_mol: blocks.iter().flatten().map(|&(gibbs, _)| gibbs).collect(),
        signatures: Vec::new(),
        facts,
        measured,
    };
    if blocks.iter().flatten().any(|&(_, signature)| signature != 0) {
        found.signatures = blocks.iter().flatten().map(|&(_, signature)| signature).collect();
    }
    found.put_measured(network, scheme);
    found
}

/// What each group adds to the Gibbs energy in water, kJ/mol.
fn group_energies(scheme: &Scheme) -> Vec<f64> {
    (0..super::features::N_FEATURES).map(|g| (0..3).map(|q| FACTORS[q] * scheme.values[q][g]).sum()).collect()
}

fn estimate_block(
    network: &Network,
    facts: &[FrameFacts],
    group_energies: &[f64],
    range: std::ops::Range<CompoundId>,
) -> Vec<(f64, u64)> {
    let has_geometry = network.identity() >= Identity::Geometric;
    let mut current: Option<(usize, Estimator<'_>, Decoration)> = None;
    let mut candidates = Vec::new();
    range
        .map(|compound| {
            let number = network.frame_of(compound);
            let (prepared, row) = network.state(compound);
            let (_, estimator, state) = match &mut current {
                Some(kept) if kept.0 == number => kept,
                stale => stale.insert((
                    number,
                    Estimator::new(&prepared.frame, &facts[number], has_geometry),
                    Decoration::bare(&prepared.frame),
                )),
            };
            prepared.layout.unpack(row, state);
            let mut gibbs = 0.0;
            estimator.count(state, &mut |group, n| gibbs += n * group_energies[group]);
            gibbs += unshared_energy(prepared, state, row, &mut candidates);
            (gibbs, signature(&prepared.frame, state))
        })
        .collect()
}

/// What symmetry and the elements' entropies add to the Gibbs energy, kJ/mol.
fn unshared_energy(prepared: &Prepared, state: &Decoration, row: &[u64], candidates: &mut Vec<u64>) -> f64 {
    candidates.resize(row.len(), 0);
    prepared.layout.candidates(&prepared.frame, state, candidates);
    let stabiliser = prepared.canonicaliser.stabiliser(row, candidates);
    let symmetry = symmetry_entropy(&prepared.frame, state, &stabiliser);
    FACTORS[1] * (-symmetry - element_entropy(&prepared.frame, state))
}

impl Energies {
    fn put_measured(&mut self, network: &Network, scheme: &Scheme) {
        let mut compounds: Vec<CompoundId> = self.measured.keys().copied().collect();
        compounds.sort_unstable();
        for compound in compounds {
            let node = super::nodes::Node::of(network, self, scheme, compound);
            self.gibbs_kj_per_mol[compound as usize] = node.gibbs_kj_per_mol();
            if self.measured[&compound].aqueous.is_some() && !self.signatures.is_empty() {
                self.signatures[compound as usize] = 0;
            }
        }
    }

    /// Gibbs energy of formation in water, kJ/mol; none where a part has no value.
    pub fn gibbs_kj_per_mol(&self, compound: CompoundId) -> Option<f64> {
        (self.signature(compound) == 0).then(|| self.gibbs_kj_per_mol[compound as usize])
    }

    /// Gibbs energy on the scale of the compound's signature, kJ/mol.
    pub(super) fn relative_kj_per_mol(&self, compound: CompoundId) -> f64 {
        self.gibbs_kj_per_mol[compound as usize]
    }

    /// What the groups need to know of a frame, by its number in the network.
    pub(super) fn facts(&self, frame: usize) -> &FrameFacts {
        &self.facts[frame]
    }

    /// Whether a step between two compounds has a value: neither has parts without value, or
    /// both have the same and one becomes one.
    pub fn has_value(&self, from: CompoundId, to: CompoundId, n_reactants: u32) -> bool {
        let (of_from, of_to) = (self.signature(from), self.signature(to));
        of_from == of_to && (of_from == 0 || n_reactants == 1)
    }

    /// Signature of the parts without value.
    pub fn signature(&self, compound: CompoundId) -> u64 {
        self.signatures.get(compound as usize).copied().unwrap_or(0)
    }

    /// What was measured of a compound.
    pub fn known(&self, compound: CompoundId) -> Option<&Known> {
        self.measured.get(&compound)
    }

    /// Whether a quantity of a compound is a measured value.
    pub fn is_measured(&self, compound: CompoundId, quantity: Quantity) -> bool {
        self.known(compound).is_some_and(|k| k.aqueous.is_some() || k.values[quantity as usize].is_some())
    }
}
