//! Options for the conditions of the water.

use clap::Args;
use haloshed::thermo::Conditions;

use super::failure::Failure;
use super::quantity::{concentration_mol_per_litre, ph};
use super::report::Report;

#[derive(Debug, Args)]
#[command(next_help_heading = "Conditions")]
pub(crate) struct ConditionArgs {
    /// pH of the water, from 0 to 14.
    #[arg(long, value_name = "PH", default_value = "7", value_parser = ph, allow_negative_numbers = true)]
    ph: f64,

    /// Activity of chloride in mol/L, or with a unit such as 1mM or 250uM.
    #[arg(long, value_name = "CONC", default_value = "1mM", value_parser = concentration_mol_per_litre,
        allow_hyphen_values = true)]
    chloride: f64,

    /// Activity of bromide, written like that of chloride.
    #[arg(long, value_name = "CONC", default_value = "1mM", value_parser = concentration_mol_per_litre,
        allow_hyphen_values = true)]
    bromide: f64,

    /// Activity of fluoride, written like that of chloride.
    #[arg(long, value_name = "CONC", default_value = "1mM", value_parser = concentration_mol_per_litre,
        allow_hyphen_values = true)]
    fluoride: f64,

    /// Activity of iodide, written like that of chloride.
    #[arg(long, value_name = "CONC", default_value = "1mM", value_parser = concentration_mol_per_litre,
        allow_hyphen_values = true)]
    iodide: f64,
}

impl ConditionArgs {
    /// The conditions, at 25 °C.
    pub(crate) fn conditions(&self) -> Result<Conditions, Failure> {
        let halides = [self.fluoride, self.chloride, self.bromide, self.iodide];
        Conditions::new(self.ph, halides).map_err(|error| Report::plain(error.to_string()).into())
    }
}
