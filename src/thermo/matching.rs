//! Which compounds of a network were measured.
//!
//! A measured structure is a compound of the network when it leaves nothing open that the network
//! tells apart. Mirror images have the same energy: what was measured of one, or of both mixed,
//! is known of each.
//!
//! Invariant: diastereomers never lend each other a value.

use std::collections::{BTreeMap, BTreeSet};

use rustc_hash::FxHashMap;

use super::data::{Value, combine};
use super::scheme::{Measured, Scheme};
use crate::molecule::Identity;
use crate::network::{CompoundId, Network};
use crate::smiles;

/// Most isomers of a measured structure that are looked at.
const MOST_ISOMERS: usize = 64;

/// What is known of a compound by measurement.
#[derive(Debug, Clone, PartialEq)]
pub struct Known {
    /// Combined values by [`Quantity`](super::data::Quantity).
    pub values: [Option<Value>; 3],
    /// Sources by quantity.
    pub sources: [String; 3],
    /// A Gibbs energy in water measured as such, kJ/mol, with its source.
    pub aqueous: Option<(Value, String)>,
}

/// Measured compounds that are in a network.
pub(super) fn find_measured(network: &Network, scheme: &Scheme) -> FxHashMap<CompoundId, Known> {
    let mut rows: BTreeMap<CompoundId, Vec<&Measured>> = BTreeMap::new();
    let sizes = carbons_of_bare_frames(network);
    for row in scheme.measured.iter().filter(|row| sizes.contains(&row.n_carbons)) {
        for compound in compounds_of(network, &row.smiles) {
            rows.entry(compound).or_default().push(row);
        }
    }
    let mut found: FxHashMap<CompoundId, Known> =
        rows.into_iter().map(|(compound, rows)| (compound, Known::of(&rows))).collect();
    for species in scheme.species.iter().filter(|species| species.is_compound()) {
        for compound in compounds_of(network, &species.species) {
            let value = Value { mean: species.gibbs_kj_per_mol, sd: species.sd_kj_per_mol };
            let aqueous = Some((value, species.source.clone()));
            found.insert(compound, Known { values: [None; 3], sources: Default::default(), aqueous });
        }
    }
    found
}

/// Numbers of carbons of the frames without fixed atoms: all that measured rows can be of.
fn carbons_of_bare_frames(network: &Network) -> BTreeSet<usize> {
    network
        .frames()
        .iter()
        .map(|frame| &frame.prepared.frame)
        .filter(|frame| frame.sites().len() == frame.skeleton().n_atoms())
        .map(|frame| frame.sites().len())
        .collect()
}

/// The compounds a measured structure is at the network's depth of identity.
fn compounds_of(network: &Network, text: &str) -> BTreeSet<CompoundId> {
    let Ok(mut molecule) = smiles::read(text) else { return BTreeSet::new() };
    molecule.keep_real_units(network.identity());
    let Ok(isomers) = molecule.isomers(network.identity(), MOST_ISOMERS) else { return BTreeSet::new() };
    let same_energy = match isomers.as_slice() {
        [one] if network.identity() < Identity::Full => vec![one.clone()],
        [one] => vec![one.clone(), one.mirror_image()],
        [one, other] if smiles::write(&one.mirror_image()) == smiles::write(other) => isomers,
        _ => Vec::new(),
    };
    same_energy.iter().filter_map(|isomer| network.find(isomer)).collect()
}

impl Known {
    /// Several measured isomers that the network takes for one compound are combined.
    fn of(rows: &[&Measured]) -> Known {
        let values = [0, 1, 2].map(|q| combine(&rows.iter().filter_map(|row| row.values[q]).collect::<Vec<_>>()));
        let sources = [0, 1, 2].map(|q| {
            let mut all: Vec<&str> = rows.iter().map(|r| r.sources[q].as_str()).filter(|s| !s.is_empty()).collect();
            all.dedup();
            all.join("; ")
        });
        Known { values, sources, aqueous: None }
    }
}
