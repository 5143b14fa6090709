//! How numbers are rounded when they leave, so that no output depends on a last bit.
//!
//! Records round when they are serialised: potentials to 0.1 mV, energies to 0.01 kJ/mol. Text
//! for reading shows as many decimals as the standard uncertainty bears.

use serde::Serializer;

/// Rounded to some decimals; never a negative zero.
fn rounded(value: f64, decimals: i32) -> f64 {
    let scale = libm::pow(10.0, f64::from(decimals));
    let scaled = (value * scale).round() / scale;
    if scaled == 0.0 { 0.0 } else { scaled }
}

/// Serialises a potential in volts: four decimals.
#[allow(clippy::missing_errors_doc, clippy::ref_option, reason = "the signature is serde's")]
pub fn volt<S: Serializer>(value: &Option<f64>, serializer: S) -> Result<S::Ok, S::Error> {
    optional(*value, 4, serializer)
}

/// Serialises an energy in kJ/mol: two decimals.
#[allow(clippy::missing_errors_doc, clippy::ref_option, reason = "the signature is serde's")]
pub fn kj_per_mol<S: Serializer>(value: &Option<f64>, serializer: S) -> Result<S::Ok, S::Error> {
    optional(*value, 2, serializer)
}

/// Serialises a molar mass in g/mol: three decimals.
#[allow(clippy::missing_errors_doc, clippy::trivially_copy_pass_by_ref, reason = "the signature is serde's")]
pub fn molar_mass<S: Serializer>(value: &f64, serializer: S) -> Result<S::Ok, S::Error> {
    serializer.serialize_f64(rounded(*value, 3))
}

/// Serialises an exact mass in u, or a degeneracy: five decimals.
#[allow(clippy::missing_errors_doc, clippy::trivially_copy_pass_by_ref, reason = "the signature is serde's")]
pub fn five<S: Serializer>(value: &f64, serializer: S) -> Result<S::Ok, S::Error> {
    serializer.serialize_f64(rounded(*value, 5))
}

/// A number that is not finite has no place in JSON or in a spreadsheet: it becomes null.
fn optional<S: Serializer>(value: Option<f64>, decimals: i32, serializer: S) -> Result<S::Ok, S::Error> {
    match value.filter(|v| v.is_finite()) {
        Some(value) => serializer.serialize_some(&rounded(value, decimals)),
        None => serializer.serialize_none(),
    }
}

/// A potential for reading, with its sign: two decimals, or three where the uncertainty is
/// under 10 mV.
///
/// # Example
/// ```
/// use haloshed::output::decimals::volt_text;
///
/// assert_eq!(volt_text(0.5962, Some(0.031)), "+0.60");
/// assert_eq!(volt_text(-0.0002, Some(0.004)), "+0.000");
/// ```
pub fn volt_text(volt: f64, sd_volt: Option<f64>) -> String {
    let decimals = volt_decimals(sd_volt);
    format!("{:+.*}", decimals as usize, rounded(volt, decimals))
}

/// The uncertainty of a potential, to the same decimals, rounded up: never shown as nothing.
pub fn volt_sd_text(sd_volt: f64) -> String {
    rounded_up(sd_volt, volt_decimals(Some(sd_volt)))
}

fn volt_decimals(sd_volt: Option<f64>) -> i32 {
    if sd_volt.is_some_and(|sd| sd < 0.01) { 3 } else { 2 }
}

/// An energy for reading: whole kJ/mol, or one decimal where the uncertainty is under 2 kJ/mol.
pub fn kj_text(kj_per_mol: f64, sd_kj_per_mol: Option<f64>) -> String {
    let decimals = kj_decimals(sd_kj_per_mol);
    format!("{:.*}", decimals as usize, rounded(kj_per_mol, decimals))
}

/// The uncertainty of an energy, to the same decimals, rounded up.
pub fn kj_sd_text(sd_kj_per_mol: f64) -> String {
    rounded_up(sd_kj_per_mol, kj_decimals(Some(sd_kj_per_mol)))
}

fn kj_decimals(sd_kj_per_mol: Option<f64>) -> i32 {
    i32::from(sd_kj_per_mol.is_some_and(|sd| sd < 2.0))
}

/// Rounded up, but for what a last bit adds.
fn rounded_up(value: f64, decimals: i32) -> String {
    let scale = libm::pow(10.0, f64::from(decimals));
    format!("{:.*}", decimals as usize, (value * scale - 1e-6).ceil().max(1.0) / scale)
}

/// A degeneracy for reading: whole, or a fraction of at most 12 parts, or two decimals.
///
/// # Example
/// ```
/// use haloshed::output::decimals::degeneracy_text;
///
/// assert_eq!([degeneracy_text(4.0), degeneracy_text(0.5), degeneracy_text(5.0 / 3.0)], ["4", "1/2", "5/3"]);
/// ```
pub fn degeneracy_text(degeneracy: f64) -> String {
    for parts in 1..=12_u32 {
        let count = degeneracy * f64::from(parts);
        if (count - count.round()).abs() < 1e-6 {
            let whole = format!("{:.0}", count.round());
            return if parts == 1 { whole } else { format!("{whole}/{parts}") };
        }
    }
    format!("{degeneracy:.2}")
}

/// A concentration in mol/L with the prefix that suits it.
///
/// # Example
/// ```
/// use haloshed::output::decimals::concentration_text;
///
/// assert_eq!(concentration_text(0.001), "1 mmol/L");
/// assert_eq!(concentration_text(2.5e-7), "250 nmol/L");
/// ```
pub fn concentration_text(mol_per_litre: f64) -> String {
    let prefixes = [(1.0, ""), (1e-3, "m"), (1e-6, "µ"), (1e-9, "n"), (1e-12, "p")];
    let fits = prefixes.iter().find(|(scale, _)| mol_per_litre >= scale * 0.999_999);
    let (scale, prefix) = fits.copied().unwrap_or((1e-12, "p"));
    format!("{} {prefix}mol/L", plain(mol_per_litre / scale))
}

/// A number without idle zeros, four significant decimals at most.
pub fn plain(value: f64) -> String {
    let text = format!("{value:.4}");
    text.trim_end_matches('0').trim_end_matches('.').to_owned()
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn an_uncertainty_is_never_shown_as_nothing() {
        assert_eq!(volt_sd_text(0.0001), "0.001");
        assert_eq!(volt_sd_text(0.0301), "0.04");
        assert_eq!(volt_sd_text(0.03), "0.03");
        assert_eq!(kj_sd_text(0.02), "0.1");
        assert_eq!(kj_sd_text(4.2), "5");
    }

    #[test]
    fn decimals_follow_the_uncertainty() {
        assert_eq!(kj_text(22.04, Some(0.3)), "22.0");
        assert_eq!(kj_text(22.04, Some(3.0)), "22");
        assert_eq!(kj_text(-0.4, Some(3.0)), "0");
        assert_eq!(volt_text(0.7449, None), "+0.74");
    }

    #[test]
    fn concentrations_take_the_prefix_that_suits() {
        let shown = [1.0, 0.02, 1e-3, 5e-5, 1e-9, 1e-13].map(concentration_text);
        assert_eq!(shown, ["1 mol/L", "20 mmol/L", "1 mmol/L", "50 µmol/L", "1 nmol/L", "0.1 pmol/L"]);
    }
}
