//! The fit: group values from measured compounds, by weighted Bayesian ridge.
//!
//! Each quantity is a sum of group values plus a compound's own deviation (the *model error*).
//! Group values have Gaussian priors of mean zero whose widths are set for each family in
//! `data/priors.csv`; rows are weighted by 1/(sd² + model error²), less if they stand far off
//! (Student's t with four degrees of freedom). The model error, one for each [`Class`], is set so
//! that deviations of left-out measurements are as large as foretold.
//!
//! # Source
//! Ridge as a posterior mean: A. E. Hoerl, R. W. Kennard, Technometrics 12, 55 (1970).
//! Left-out residuals r/(1 - h): D. M. Allen, Technometrics 16, 125 (1974).

use nalgebra::{DMatrix, DVector};

use super::data::Value;

/// Rounds of settling model errors and weights.
const N_ROUNDS: usize = 10;
/// Of the t distribution whose weights spare the fit from rows far off.
const DEGREES_OF_FREEDOM: f64 = 4.0;

/// Classes of compounds with a model error each.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
#[allow(missing_docs)]
pub enum Class {
    NoHalogen,
    NoFluorine,
    Fluorine,
}

impl Class {
    /// The class of a compound with these halogens, by [`Halogen`](crate::molecule::Halogen).
    pub fn of(halogens: [u32; 4]) -> Class {
        match halogens {
            [0, 0, 0, 0] => Class::NoHalogen,
            [0, ..] => Class::NoFluorine,
            _ => Class::Fluorine,
        }
    }
}

/// A compound of the fit.
#[derive(Debug, Clone)]
pub struct Observation {
    /// Structure, for reports.
    pub smiles: String,
    /// Counts of groups, sparse.
    pub groups: Vec<(usize, f64)>,
    /// Measured value.
    pub value: Value,
    /// Its class.
    pub class: Class,
    /// Whether the value is a measurement, and not one that only steadies the fit.
    pub is_measured: bool,
}

/// What a fit gives.
#[derive(Debug, Clone)]
pub struct Fit {
    /// Group values.
    pub values: DVector<f64>,
    /// Their covariance.
    pub covariance: DMatrix<f64>,
    /// Model error by class.
    pub model_sd: [f64; 3],
    /// Measured less foretold when left out, by observation.
    pub left_out: Vec<f64>,
    /// Standard uncertainty foretold for that, by observation.
    pub left_out_sd: Vec<f64>,
}

/// Fits group values with prior widths `prior_sd`, one a group.
///
/// # Errors
/// * the normal matrix is not positive definite, which takes a prior width of zero or no rows:
///   a sentence
pub fn fit(observations: &[Observation], prior_sd: &[f64]) -> Result<Fit, String> {
    let mut model_sd = [median_sd(observations); 3];
    let mut weights = vec![1.0; observations.len()];
    let mut result = solve(observations, prior_sd, model_sd, &weights)?;
    for _ in 0..N_ROUNDS {
        for class in [Class::NoHalogen, Class::NoFluorine, Class::Fluorine] {
            model_sd[class as usize] *= ratio(observations, &result, class);
        }
        for (i, weight) in weights.iter_mut().enumerate() {
            let z = result.left_out[i] / result.left_out_sd[i];
            *weight = ((DEGREES_OF_FREEDOM + 1.0) / (DEGREES_OF_FREEDOM + z * z)).min(1.0);
        }
        result = solve(observations, prior_sd, model_sd, &weights)?;
    }
    Ok(result)
}

fn median_sd(observations: &[Observation]) -> f64 {
    let mut all: Vec<f64> = observations.iter().map(|o| o.value.sd).collect();
    all.sort_by(f64::total_cmp);
    all.get(all.len() / 2).copied().unwrap_or(1.0).max(1e-3)
}

/// By how much left-out deviations exceed what was foretold: the root mean square of z, with
/// z cut at 3 so that single wrong rows do not widen everything.
fn ratio(observations: &[Observation], fit: &Fit, class: Class) -> f64 {
    let z: Vec<f64> = (0..observations.len())
        .filter(|&i| observations[i].class == class && observations[i].is_measured)
        .map(|i| (fit.left_out[i] / fit.left_out_sd[i]).abs().min(3.0))
        .collect();
    if z.len() < 5 {
        return 1.0;
    }
    (z.iter().map(|z| z * z).sum::<f64>() / z.len() as f64).sqrt().clamp(0.5, 2.0)
}

fn solve(observations: &[Observation], prior_sd: &[f64], model_sd: [f64; 3], weights: &[f64]) -> Result<Fit, String> {
    let n = prior_sd.len();
    let mut normal = DMatrix::from_diagonal(&DVector::from_iterator(n, prior_sd.iter().map(|s| 1.0 / (s * s))));
    let mut right = DVector::zeros(n);
    let plain: Vec<f64> = observations
        .iter()
        .map(|o| o.value.sd * o.value.sd + model_sd[o.class as usize] * model_sd[o.class as usize])
        .collect();
    let noise: Vec<f64> = plain.iter().zip(weights).map(|(noise, weight)| noise / weight).collect();
    for (o, noise) in observations.iter().zip(&noise) {
        for &(i, x) in &o.groups {
            right[i] += x * o.value.mean / noise;
            for &(j, y) in &o.groups {
                normal[(i, j)] += x * y / noise;
            }
        }
    }
    let cholesky = normal.cholesky().ok_or("the normal matrix is not positive definite")?;
    let values = cholesky.solve(&right);
    let covariance = cholesky.inverse();
    let mut fit = Fit { values, covariance, model_sd, left_out: Vec::new(), left_out_sd: Vec::new() };
    for ((o, noise), plain) in observations.iter().zip(&noise).zip(&plain) {
        let foretold: f64 = o.groups.iter().map(|&(i, x)| x * fit.values[i]).sum();
        let shared = quadratic(&fit.covariance, &o.groups);
        let left = (1.0 - shared / noise).max(1e-6);
        fit.left_out.push((o.value.mean - foretold) / left);
        // A fresh row of this quality, foretold without this one.
        fit.left_out_sd.push((plain + shared / left).sqrt());
    }
    Ok(fit)
}

/// xᵀ C x for sparse x.
pub fn quadratic(covariance: &DMatrix<f64>, x: &[(usize, f64)]) -> f64 {
    x.iter().map(|&(i, a)| x.iter().map(|&(j, b)| a * b * covariance[(i, j)]).sum::<f64>()).sum()
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn a_line_through_exact_points_is_found() {
        let point = |x: f64| Observation {
            smiles: String::new(),
            groups: vec![(0, 1.0), (1, x)],
            value: Value { mean: 3.0 + 2.0 * x, sd: 0.1 },
            class: Class::NoHalogen,
            is_measured: true,
        };
        let all: Vec<Observation> = (0..20).map(|i| point(f64::from(i))).collect();
        let found = fit(&all, &[100.0, 100.0]).unwrap();
        assert!((found.values[0] - 3.0).abs() < 1e-3 && (found.values[1] - 2.0).abs() < 1e-4);
        assert!(found.left_out.iter().all(|d| d.abs() < 1e-2));
    }
}
