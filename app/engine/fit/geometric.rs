//! The geometric diffusion fitted to log levels, at regular or irregular dates.

use super::{ObservedPath, Refusal};
use crate::maths::RangedEstimate;
use serde::Serialize;
use std::f64::consts::PI;

/// A fitted geometric diffusion `dS/S = mu dt + sigma dW`, by maximum likelihood of the log changes `x_i` over `dt_i`
/// years, n of them, T years together:
///
/// ```text
/// nu      = ln(S_n / S_0) / T                          mean log return a year
/// sigma^2 = sum (x_i - nu dt_i)^2 / dt_i / (n - 1)
/// mu      = nu + sigma^2 / 2                           standard error sigma / sqrt(T)
/// ```
///
/// The standard error of `sigma` is `sigma / sqrt(2 n)`. A history says little about `mu`: its error falls with the years
/// alone, however often they are looked at.
#[derive(Debug, Clone, Copy, PartialEq, Serialize)]
pub struct GeometricFit {
    /// `mu`, per year.
    pub drift: RangedEstimate,
    /// `sigma` of the log, per square-root year; divisor n - 1.
    pub volatility: RangedEstimate,
    /// Log-likelihood of the log changes at its maximum (divisor n), without the Jacobian of the logarithm.
    pub log_likelihood: f64,
}

/// Fits the path of the logarithms.
///
/// # Errors
/// [`Refusal`] where there are fewer than three values, or they never change.
pub fn fit_geometric(log_path: &ObservedPath) -> Result<GeometricFit, Refusal> {
    let walk = RandomWalk::of(log_path)?;
    let n = walk.count;
    let variance = walk.squares / (n - 1.0);
    let volatility = variance.sqrt();
    let drift = walk.mean_per_year + variance / 2.0;
    Ok(GeometricFit {
        drift: RangedEstimate::of_error(drift, Some(volatility / walk.years.sqrt())),
        volatility: RangedEstimate::of_error(volatility, Some(volatility / (2.0 * n).sqrt())),
        log_likelihood: walk.log_likelihood,
    })
}

/// A random walk with drift in whatever variable: what a geometric diffusion is in the log, and what a level is that
/// does not revert.
#[derive(Debug, Clone, Copy, PartialEq)]
pub(super) struct RandomWalk {
    /// Changes.
    pub(super) count: f64,
    /// Years of all changes.
    pub(super) years: f64,
    /// Mean change a year.
    pub(super) mean_per_year: f64,
    /// `sum (x_i - nu dt_i)^2 / dt_i`.
    pub(super) squares: f64,
    /// At its maximum, divisor n.
    pub(super) log_likelihood: f64,
}

impl RandomWalk {
    pub(super) fn of(path: &ObservedPath) -> Result<Self, Refusal> {
        match path.values.len() {
            0 => return Err(Refusal::Empty),
            found @ 1..=2 => return Err(Refusal::TooFew { found, needed: 3 }),
            _ if path.is_constant() => return Err(Refusal::Constant),
            _ => {}
        }
        let count = path.steps.count() as f64;
        let years = path.steps.total_years();
        let mean_per_year = path.changes().sum::<f64>() / years;
        let squares: f64 = path
            .changes()
            .zip(path.steps.years())
            .map(|(change, years)| (change - mean_per_year * years).powi(2) / years)
            .sum();
        let log_years: f64 = path.steps.years().map(f64::ln).sum();
        let variance = squares / count;
        let log_likelihood = -0.5 * (count * ((2.0 * PI * variance).ln() + 1.0) + log_years);
        match variance {
            _ if !squares.is_finite() => Err(Refusal::TooLarge),
            0.0 => Err(Refusal::NoNoise),
            _ => Ok(Self { count, years, mean_per_year, squares, log_likelihood }),
        }
    }

    /// `sigma` with divisor n - 1, per square-root year.
    pub(super) fn volatility(&self) -> f64 {
        (self.squares / (self.count - 1.0)).sqrt()
    }
}
