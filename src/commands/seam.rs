//! Stands where names and energies will be wired in. **Nothing here is final**: the
//! compound table and the thermochemistry are being written, and take the place of this file.

use haloshed::molecule::Molecule;
use haloshed::network::{CompoundId, Step};
use haloshed::output::assemble::{CompoundEnergy, Energies, Entry, Reagents, Registry, StepEnergy};
use haloshed::output::explain::Explanation;
use haloshed::output::record::GibbsOrigin;

use super::failure::Failure;
use super::report::Report;

const NOT_WIRED: &str = "this build has no thermochemistry yet";

pub(crate) struct NoRegistry;

impl Registry for NoRegistry {
    fn entry(&self, _: &str, _: &Molecule) -> Entry {
        Entry::default()
    }
}

pub(crate) struct NoEnergies;

impl Energies for NoEnergies {
    fn compound(&self, _: CompoundId) -> CompoundEnergy {
        CompoundEnergy {
            gibbs_aq_kj_per_mol: None,
            gibbs_sd_kj_per_mol: None,
            gibbs_origin: GibbsOrigin::None,
            gibbs_source: NOT_WIRED.to_owned(),
        }
    }

    fn step(&self, _: &Step, _: &Reagents) -> StepEnergy {
        StepEnergy { e_missing: Some(NOT_WIRED.to_owned()), ..StepEnergy::default() }
    }
}

pub(crate) fn explain_compound(_: &Molecule) -> Result<Explanation, Failure> {
    Err(Report::plain(NOT_WIRED).into())
}
