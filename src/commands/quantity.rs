//! Quantities as they are typed: concentrations, pH, times.
//!
//! A concentration is a number with `M` or `mol/L` and a prefix (`1mM`, `0.5 mM`, `250uM`,
//! `10 nmol/L`), or a bare number in mol/L. A mass concentration is refused: which mass is
//! meant (of the ion, the salt, the element) is not for the program to guess.

use std::time::Duration;

/// Prefixes, longest unit first where one ends another.
const CONCENTRATION_UNITS: [(&str, f64); 14] = [
    ("mmol/L", 1e-3),
    ("umol/L", 1e-6),
    ("µmol/L", 1e-6),
    ("μmol/L", 1e-6),
    ("nmol/L", 1e-9),
    ("pmol/L", 1e-12),
    ("mol/L", 1.0),
    ("mM", 1e-3),
    ("uM", 1e-6),
    ("µM", 1e-6),
    ("μM", 1e-6),
    ("nM", 1e-9),
    ("pM", 1e-12),
    ("M", 1.0),
];

/// Largest concentration that is taken, mol/L; above it activities say nothing any more.
const MOST_MOL_PER_LITRE: f64 = 10.0;

/// A quantity that could not be read.
#[derive(Debug, Clone, PartialEq, thiserror::Error)]
pub(crate) enum QuantityError {
    #[error("expected a value such as {example}, found `{found}`")]
    NotANumber { found: String, example: &'static str },
    #[error("{found} has no unit: expected {expected}")]
    MissingUnit { found: String, expected: &'static str },
    #[error("unknown unit `{unit}`: expected {expected}")]
    UnknownUnit { unit: String, expected: &'static str },
    #[error("`{unit}` is a mass in a volume: give the amount, such as 1mM (35 mg/L of chloride are about 1 mM)")]
    MassUnit { unit: String },
    #[error("a {what} must be greater than zero, found {found}")]
    NotPositive { what: &'static str, found: String },
    #[error("{what} must lie between {low} and {high}, found {found}")]
    OutOfRange { what: &'static str, low: &'static str, high: &'static str, found: String },
}

/// Reads a concentration in mol/L.
pub(crate) fn concentration_mol_per_litre(text: &str) -> Result<f64, QuantityError> {
    let (number, unit) = number_and_unit(text, "1mM")?;
    let scale = match CONCENTRATION_UNITS.iter().find(|(name, _)| *name == unit) {
        Some((_, scale)) => *scale,
        None if unit.is_empty() => 1.0,
        None => return Err(concentration_unit_error(unit)),
    };
    let value = positive(number * scale, "concentration", text)?;
    if value > MOST_MOL_PER_LITRE {
        let found = text.trim().to_owned();
        return Err(QuantityError::OutOfRange { what: "a concentration", low: "0", high: "10 mol/L", found });
    }
    Ok(value)
}

fn concentration_unit_error(unit: &str) -> QuantityError {
    let is_mass = ["g/", "ppm", "ppb", "%"].iter().any(|mass| unit.contains(mass));
    let unit = unit.to_owned();
    if is_mass {
        QuantityError::MassUnit { unit }
    } else {
        QuantityError::UnknownUnit { unit, expected: "M, mM, uM, nM or mol/L with a prefix" }
    }
}

/// Reads a pH between 0 and 14.
pub(crate) fn ph(text: &str) -> Result<f64, QuantityError> {
    let found = text.trim().to_owned();
    let value = found.parse::<f64>().map_err(|_| QuantityError::NotANumber { found: found.clone(), example: "7" })?;
    if (0.0..=14.0).contains(&value) {
        return Ok(value);
    }
    Err(QuantityError::OutOfRange { what: "pH", low: "0", high: "14", found })
}

/// Reads a time: a number with `ms`, `s`, `min` or `h`.
pub(crate) fn time(text: &str) -> Result<Duration, QuantityError> {
    let (number, unit) = number_and_unit(text, "30s")?;
    let expected = "ms, s, min or h";
    let seconds = match unit {
        "ms" => 1e-3,
        "s" => 1.0,
        "min" => 60.0,
        "h" => 3600.0,
        "" => return Err(QuantityError::MissingUnit { found: text.trim().to_owned(), expected }),
        _ => return Err(QuantityError::UnknownUnit { unit: unit.to_owned(), expected }),
    };
    let seconds = positive(number * seconds, "time", text)?;
    let too_long = || QuantityError::OutOfRange { what: "a time", low: "0", high: "10^9 h", found: text.to_owned() };
    if seconds > 3.6e12 { Err(too_long()) } else { Ok(Duration::from_secs_f64(seconds)) }
}

/// Cuts a text after the longest beginning that is a number.
fn number_and_unit<'a>(text: &'a str, example: &'static str) -> Result<(f64, &'a str), QuantityError> {
    let text = text.trim();
    let ends = text.char_indices().map(|(at, c)| at + c.len_utf8()).rev();
    let cut = ends.filter(|&end| text[..end].ends_with(|c: char| c.is_ascii_digit() || c == '.'));
    for end in cut {
        if let Ok(number) = text[..end].parse::<f64>() {
            return Ok((number, text[end..].trim_start()));
        }
    }
    Err(QuantityError::NotANumber { found: text.to_owned(), example })
}

fn positive(value: f64, what: &'static str, text: &str) -> Result<f64, QuantityError> {
    if value > 0.0 && value.is_finite() {
        return Ok(value);
    }
    Err(QuantityError::NotPositive { what, found: text.trim().to_owned() })
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn concentrations_are_read() {
        let cases = [
            ("1mM", 1e-3),
            ("0.5 mM", 0.5e-3),
            ("250uM", 250e-6),
            ("250µM", 250e-6),
            ("10 nM", 10e-9),
            ("1e-3", 1e-3),
            ("1e-3M", 1e-3),
            ("2 mmol/L", 2e-3),
            (".5M", 0.5),
            ("3", 3.0),
        ];
        for (text, expected) in cases {
            let value = concentration_mol_per_litre(text).unwrap();
            assert!((value - expected).abs() <= 1e-12 * expected, "{text}: {value}");
        }
    }

    fn check(read: impl Fn(&str) -> String, cases: &[(&str, &str)]) {
        for (text, expected) in cases {
            assert_eq!(read(text), *expected, "of {text}");
        }
    }

    #[test]
    fn wrong_concentrations_are_refused_with_a_reason() {
        check(
            |text| concentration_mol_per_litre(text).unwrap_err().to_string(),
            &[
                (
                    "35mg/L",
                    "`mg/L` is a mass in a volume: give the amount, such as 1mM (35 mg/L of chloride are about 1 mM)",
                ),
                (
                    "35 ppm",
                    "`ppm` is a mass in a volume: give the amount, such as 1mM (35 mg/L of chloride are about 1 mM)",
                ),
                ("0", "a concentration must be greater than zero, found 0"),
                ("-1mM", "a concentration must be greater than zero, found -1mM"),
                ("1e-400", "a concentration must be greater than zero, found 1e-400"),
                ("nan", "expected a value such as 1mM, found `nan`"),
                ("inf", "expected a value such as 1mM, found `inf`"),
                ("", "expected a value such as 1mM, found ``"),
                ("mM", "expected a value such as 1mM, found `mM`"),
                ("1 mm", "unknown unit `mm`: expected M, mM, uM, nM or mol/L with a prefix"),
                ("1,5mM", "unknown unit `,5mM`: expected M, mM, uM, nM or mol/L with a prefix"),
                ("20 M", "a concentration must lie between 0 and 10 mol/L, found 20 M"),
            ],
        );
    }

    #[test]
    fn ph_lies_between_0_and_14() {
        assert_eq!([ph("0"), ph("7.4"), ph("14")], [Ok(0.0), Ok(7.4), Ok(14.0)]);
        check(
            |text| ph(text).unwrap_err().to_string(),
            &[
                ("14.1", "pH must lie between 0 and 14, found 14.1"),
                ("-1", "pH must lie between 0 and 14, found -1"),
                ("NaN", "pH must lie between 0 and 14, found NaN"),
                ("acid", "expected a value such as 7, found `acid`"),
            ],
        );
    }

    #[test]
    fn times_are_read() {
        let read = ["30s", "2min", "1.5 h", "250 ms"].map(|text| time(text).unwrap().as_millis());
        assert_eq!(read, [30_000, 120_000, 5_400_000, 250]);
        check(
            |text| time(text).unwrap_err().to_string(),
            &[
                ("30", "30 has no unit: expected ms, s, min or h"),
                ("30 d", "unknown unit `d`: expected ms, s, min or h"),
                ("0s", "a time must be greater than zero, found 0s"),
                ("1e300s", "a time must lie between 0 and 10^9 h, found 1e300s"),
                ("soon", "expected a value such as 30s, found `soon`"),
            ],
        );
    }
}
