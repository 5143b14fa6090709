//! From the stored network to records, one by one.
//!
//! Texts and masses are made from a compound's molecule when it is asked for. Names and
//! energies are asked of those who know them, through two small traits. What a step consumes
//! and releases follows from the formulas at its two ends.

use std::borrow::Cow;

use super::Records;
use super::counts::{Counts, Generation};
use super::record::{ByHalogen, Caution, Compound, GibbsOrigin, Header, Step, mark_elements};
use crate::molecule::Molecule;
use crate::molecule::condensed::condensed;
use crate::network::half_reaction::between;
use crate::network::{self, CompoundId, HalfReaction, Network};
use crate::rules::Rule;
use crate::smiles;

/// What is known of a compound by name.
#[derive(Debug, Clone, Default, PartialEq, Eq)]
pub struct Entry {
    /// Names, the systematic one first.
    pub names: Vec<String>,
    /// Abbreviations in use at sites.
    pub abbreviations: Vec<String>,
    /// CAS registry number.
    pub cas: Option<String>,
    /// Well-known dangers.
    pub cautions: Vec<Caution>,
}

/// Knows compounds by name.
pub trait Registry {
    /// What is known of a compound with this canonical SMILES.
    fn entry(&self, smiles: &str, molecule: &Molecule) -> Entry;
}

/// Gibbs energy of a compound, as in [`Compound`].
#[derive(Debug, Clone, PartialEq)]
#[allow(missing_docs, reason = "the fields of `Compound` of the same names say it")]
pub struct CompoundEnergy {
    pub gibbs_aq_kj_per_mol: Option<f64>,
    pub gibbs_sd_kj_per_mol: Option<f64>,
    pub gibbs_origin: GibbsOrigin,
    pub gibbs_source: String,
}

/// Potential of a step, as in [`Step`].
#[derive(Debug, Clone, Default, PartialEq)]
#[allow(missing_docs, reason = "the fields of `Step` of the same names say it")]
pub struct StepEnergy {
    pub e_standard_volt: Option<f64>,
    pub e_volt: Option<f64>,
    pub e_sd_volt: Option<f64>,
    pub e_missing: Option<String>,
    pub gibbs_step_kj_per_mol: Option<f64>,
    pub gibbs_step_sd_kj_per_mol: Option<f64>,
}

/// Knows the energies of a network.
pub trait Energies {
    /// The energy of a compound.
    fn compound(&self, compound: CompoundId) -> CompoundEnergy;

    /// Whether a step of `n_reactants` molecules has an energy; cheaper than asking for it.
    fn has_value(&self, step: &network::Step, n_reactants: u32) -> bool;

    /// The energy of a step.
    fn step(&self, step: &network::Step, reaction: &HalfReaction) -> StepEnergy;
}

fn halogens(molecule: &Molecule) -> ByHalogen<u32> {
    let [fluorine, chlorine, bromine, iodine] = molecule.halogens();
    ByHalogen { fluorine, chlorine, bromine, iodine }
}

/// A network that makes its records when asked.
pub struct Assembled<'a> {
    /// What holds for the whole network.
    pub header: Header,
    /// The network.
    pub network: &'a Network,
    /// The rules it was made by, in the order of its rule numbers.
    pub rules: &'a [Rule],
    /// Who knows names.
    pub registry: &'a dyn Registry,
    /// Who knows energies.
    pub energies: &'a dyn Energies,
}

impl Records for Assembled<'_> {
    fn header(&self) -> &Header {
        &self.header
    }

    fn compounds(&self) -> Box<dyn Iterator<Item = Cow<'_, Compound>> + '_> {
        Box::new((0..self.network.n_compounds() as CompoundId).map(|id| Cow::Owned(self.compound(id))))
    }

    fn steps(&self) -> Box<dyn Iterator<Item = Cow<'_, Step>> + '_> {
        let all = 0..self.network.n_compounds() as CompoundId;
        Box::new(all.flat_map(move |from| {
            // Made once for all steps of a compound.
            let molecule = self.network.molecule(from);
            self.network.steps_from(from).map(move |step| Cow::Owned(self.step(&step, &molecule)))
        }))
    }

    fn counts(&self) -> Counts {
        let mut counts = Counts {
            generations: self.count_generations(),
            n_steps_by_rule: vec![0; self.rules.len()],
            ..Counts::default()
        };
        // No rule brings in a halogen: the parents hold every one there is.
        for parent in self.network.parents() {
            mark_elements(&mut counts.elements, &self.compound(parent));
        }
        for step in self.network.steps() {
            counts.n_steps_by_rule[step.rule] += 1;
            let n_reactants = u32::from(self.rules[step.rule].copies);
            counts.n_without_value += usize::from(!self.energies.has_value(&step, n_reactants));
        }
        counts
    }
}

impl Assembled<'_> {
    fn count_generations(&self) -> Vec<Generation> {
        let tally = |generation| {
            let compounds = self.network.generation(generation);
            let count = |holds: &dyn Fn(CompoundId) -> bool| compounds.clone().filter(|&id| holds(id)).count();
            Generation {
                compounds: compounds.len(),
                transients: count(&|id| self.network.is_transient(id)),
                end_products: count(&|id| self.is_end_product(id)),
            }
        };
        (0..self.network.n_generations()).map(tally).collect()
    }

    fn is_end_product(&self, id: CompoundId) -> bool {
        self.network.is_expanded(id) && self.network.steps_from(id).len() == 0
    }

    fn compound(&self, id: CompoundId) -> Compound {
        let molecule = self.network.molecule(id);
        let smiles = smiles::write(&molecule);
        let Entry { names, abbreviations, cas, cautions } = self.registry.entry(&smiles, &molecule);
        let energy = self.energies.compound(id);
        let formula = molecule.formula();
        Compound {
            id: id + 1,
            formula: formula.to_string(),
            condensed: condensed(&molecule).unwrap_or_else(|| smiles.clone()),
            smiles,
            names,
            abbreviations,
            cas,
            generation: self.network.generation_of(id) as u32,
            is_parent: self.network.parents().contains(&id),
            is_end_product: self.is_end_product(id),
            transient: self.network.is_transient(id),
            halogens: halogens(&molecule),
            molar_mass_g_per_mol: formula.molar_mass_g_per_mol(),
            monoisotopic_mass_u: formula.monoisotopic_mass_u(),
            gibbs_aq_kj_per_mol: energy.gibbs_aq_kj_per_mol,
            gibbs_sd_kj_per_mol: energy.gibbs_sd_kj_per_mol,
            gibbs_origin: energy.gibbs_origin,
            gibbs_source: energy.gibbs_source,
            cautions,
        }
    }

    fn step(&self, step: &network::Step, from: &Molecule) -> Step {
        let rule = &self.rules[step.rule];
        let to = self.network.molecule(step.to);
        let reaction = between(&from.formula(), &to.formula(), u32::from(rule.copies));
        let energy = self.energies.step(step, &reaction);
        let [fluorine, chlorine, bromine, iodine] = reaction.released.map(|n| n.max(0).cast_unsigned());
        Step {
            id: step.index as u32 + 1,
            from: step.from + 1,
            to: step.to + 1,
            rule: rule.name.clone(),
            degeneracy: step.degeneracy.to_f64(),
            molecules: reaction.n_reactants,
            electrons: reaction.electrons,
            protons: reaction.protons,
            water: reaction.water,
            released: ByHalogen { fluorine, chlorine, bromine, iodine },
            e_standard_volt: energy.e_standard_volt,
            e_volt: energy.e_volt,
            e_sd_volt: energy.e_sd_volt,
            e_missing: energy.e_missing,
            gibbs_step_kj_per_mol: energy.gibbs_step_kj_per_mol,
            gibbs_step_sd_kj_per_mol: energy.gibbs_step_sd_kj_per_mol,
        }
    }
}
