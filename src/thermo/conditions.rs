//! The conditions at which potentials hold.

use super::constants::STANDARD_TEMPERATURE_KELVIN;

/// pH, halide activities and temperature; organics are always at equal activity.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Conditions {
    ph: f64,
    halide_mol_per_litre: [f64; 4],
}

/// A condition that no water can have.
#[derive(Debug, Clone, Copy, PartialEq, thiserror::Error)]
#[allow(missing_docs)]
pub enum ConditionError {
    #[error("the pH is {ph}, outside 0 to 14")]
    Ph { ph: f64 },
    #[error("the halide concentration is {mol_per_litre} mol/L, outside 1e-15 to 10 mol/L")]
    Halide { mol_per_litre: f64 },
}

impl Default for Conditions {
    /// The trade's usual conditions: pH 7, each halide 1 mmol/L, 25 °C.
    fn default() -> Conditions {
        Conditions { ph: 7.0, halide_mol_per_litre: [1e-3; 4] }
    }
}

impl Conditions {
    /// Conditions at 25 °C. Halides in the order F, Cl, Br, I, in mol/L.
    ///
    /// # Errors
    /// * a pH outside 0 to 14: `Ph`
    /// * a concentration outside 1e-15 to 10 mol/L: `Halide`
    pub fn new(ph: f64, halide_mol_per_litre: [f64; 4]) -> Result<Conditions, ConditionError> {
        if !(0.0..=14.0).contains(&ph) {
            return Err(ConditionError::Ph { ph });
        }
        if let Some(&wrong) = halide_mol_per_litre.iter().find(|c| !(1e-15..=10.0).contains(*c)) {
            return Err(ConditionError::Halide { mol_per_litre: wrong });
        }
        Ok(Conditions { ph, halide_mol_per_litre })
    }

    /// pH.
    pub fn ph(&self) -> f64 {
        self.ph
    }

    /// Concentrations of F-, Cl-, Br-, I-, mol/L.
    pub fn halide_mol_per_litre(&self) -> [f64; 4] {
        self.halide_mol_per_litre
    }

    /// Temperature, K. All values are of 25 °C for now.
    pub fn temperature_kelvin(&self) -> f64 {
        STANDARD_TEMPERATURE_KELVIN
    }
}
