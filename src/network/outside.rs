//! Steps that leave the frame, by the general engine on molecules.

use super::enumerate::EnumerateError;
use super::store::{CompoundId, Network};
use crate::frame::compile;
use crate::molecule::Molecule;
use crate::rules::{Fraction, Rule, apply};

/// The rules, or those cases of them, that frames do not compile.
pub(super) struct General {
    rules: Vec<(u8, Rule)>,
}

impl General {
    /// What is left of some rules when the compiled cases are taken out.
    pub(super) fn of(rules: &[Rule]) -> General {
        let left = rules.iter().enumerate().filter_map(|(number, rule)| {
            let mut rest = rule.clone();
            if rule.generations.is_none() {
                rest.cases.retain(|case| !compile::is_compilable(case));
            }
            (!rest.cases.is_empty()).then_some((number as u8, rest))
        });
        General { rules: left.collect() }
    }

    /// Gives `emit` every product of a compound as (rule, degeneracy, molecule).
    pub(super) fn expand(
        &self,
        network: &Network,
        compound: CompoundId,
        generation: u32,
        mut emit: impl FnMut(u8, Fraction, Molecule),
    ) -> Result<(), EnumerateError> {
        if self.rules.is_empty() {
            return Ok(());
        }
        let (prepared, row) = network.state(compound);
        let is_transient = prepared.layout.is_transient(row);
        let mut molecule = None;
        for (number, rule) in &self.rules {
            let is_due = rule.generations.as_ref().is_none_or(|range| range.contains(&generation));
            if !is_due || !rule.cases.iter().any(|case| case.names_carbene() == is_transient) {
                continue;
            }
            let molecule = molecule.get_or_insert_with(|| prepared.frame.compose(&network.decoration(compound)));
            for product in apply(rule, molecule, network.identity)? {
                emit(*number, product.degeneracy, product.molecule);
            }
        }
        Ok(())
    }
}
