//! Constants of nature and of the trade's conventions.
//!
//! # Source
//! CODATA 2022 (exact since 2019).

/// Molar gas constant, J/mol/K.
pub const GAS_CONSTANT_J_PER_MOL_K: f64 = 8.314_462_618;
/// Faraday constant, C/mol.
pub const FARADAY_C_PER_MOL: f64 = 96_485.332_12;
/// 25 °C in kelvin: the temperature of all values in `data/`.
pub const STANDARD_TEMPERATURE_KELVIN: f64 = 298.15;
/// Natural logarithm of 10.
pub const LN_10: f64 = std::f64::consts::LN_10;

/// R T ln 10 at 25 °C, kJ/mol.
pub const RT_LN_10_KJ_PER_MOL: f64 = GAS_CONSTANT_J_PER_MOL_K * STANDARD_TEMPERATURE_KELVIN * LN_10 / 1000.0;
