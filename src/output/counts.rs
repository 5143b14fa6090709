//! Counts of a network by generation and by rule.

use std::borrow::Cow;

use super::record::{ByHalogen, Compound, Header, Step, mark_elements};

/// Numbers of one generation.
#[derive(Debug, Default, Clone, PartialEq, Eq)]
pub struct Generation {
    /// Compounds first reached in it.
    pub compounds: usize,
    /// Of these, short-lived intermediates.
    pub transients: usize,
    /// Of these, compounds that no rule leads on from.
    pub end_products: usize,
}

/// Numbers of a network.
#[derive(Debug, Default, Clone, PartialEq, Eq)]
pub struct Counts {
    /// By generation, parents first.
    pub generations: Vec<Generation>,
    /// Halogens that any compound holds.
    pub elements: ByHalogen<bool>,
    /// Steps by rule, in the order of the header.
    pub n_steps_by_rule: Vec<usize>,
    /// Steps that have neither a potential nor an energy.
    pub n_without_value: usize,
}

impl Counts {
    /// Counts records one by one.
    pub fn of<'a>(
        header: &Header,
        compounds: impl Iterator<Item = Cow<'a, Compound>>,
        steps: impl Iterator<Item = Cow<'a, Step>>,
    ) -> Counts {
        let mut counts = Counts { n_steps_by_rule: vec![0; header.rules.len()], ..Counts::default() };
        for compound in compounds {
            mark_elements(&mut counts.elements, &compound);
            let generation = compound.generation as usize;
            if counts.generations.len() <= generation {
                counts.generations.resize(generation + 1, Generation::default());
            }
            let tally = &mut counts.generations[generation];
            tally.compounds += 1;
            tally.transients += usize::from(compound.transient);
            tally.end_products += usize::from(compound.is_end_product);
        }
        for step in steps {
            if let Some(rule) = header.rules.iter().position(|name| *name == step.rule) {
                counts.n_steps_by_rule[rule] += 1;
            }
            counts.n_without_value += usize::from(step.e_volt.is_none() && step.gibbs_step_kj_per_mol.is_none());
        }
        counts
    }
}
