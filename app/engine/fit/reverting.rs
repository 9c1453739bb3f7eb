//! The reverting diffusion fitted to a path of the modelled variable, at regular or irregular dates.

use super::information::standard_errors;
use super::{ObservedPath, Refusal, autoregression, profile};
use crate::maths::RangedEstimate;
use serde::Serialize;
use std::f64::consts::{LN_2, PI};

/// A fitted reverting diffusion `dX = kappa (theta - X) dt + sigma dW` of the level or its logarithm, by maximum
/// likelihood of the exact transition density, conditional on the first value (divisor n).
///
/// Standard errors come from the observed information; the ends for speed and half-life from the profile likelihood
/// (twice the drop is 3.841), those of the others are `-/+ 1.96` standard errors.
#[derive(Debug, Clone, Copy, PartialEq, Serialize)]
pub struct RevertingFit {
    /// Level it is drawn to, in the level's own units; for a log model the median `exp(theta)`.
    pub long_run: RangedEstimate,
    /// `ln 2 / kappa` in trading days. No upper end where the data do not exclude that there is no reversion.
    pub half_life_days: RangedEstimate,
    /// `kappa` per year, uncorrected. No upper end where the data do not exclude that nothing is remembered.
    pub speed: RangedEstimate,
    /// `kappa` less its bias in a short history; may be 0 or negative: then a reversion can't be told from none.
    pub speed_corrected: f64,
    /// `sigma` of the modelled variable, per square-root year.
    pub volatility: RangedEstimate,
    /// Of the modelled variable at its maximum, without a Jacobian.
    pub log_likelihood: f64,
}

/// The likelihood's maximum and the profile's 95 % ends for the speed.
#[derive(Debug, Clone, Copy, PartialEq)]
pub(super) struct Peak {
    /// `kappa`, per year.
    pub(super) speed: f64,
    /// `theta`, in the modelled variable.
    pub(super) mean: f64,
    /// `sigma^2`, per year.
    pub(super) variance: f64,
    /// `sum ln f_i`, where `f_i` is `phi(2 kappa, dt_i)`.
    pub(super) log_spread: f64,
    /// Slowest speed not excluded; 0 where no reversion is not excluded.
    pub(super) slowest: f64,
    /// Fastest speed not excluded; none where no memory is not excluded.
    pub(super) fastest: Option<f64>,
}

/// Fits a path of the modelled variable; `is_log` says that it is the logarithm of the level.
///
/// # Errors
/// [`Refusal`]: fewer than four values, values that never change, no reversion, no memory.
pub fn fit_reverting(path: &ObservedPath, is_log: bool, days_per_year: f64) -> Result<RevertingFit, Refusal> {
    match path.values.len() {
        0 => return Err(Refusal::Empty),
        found @ 1..=3 => return Err(Refusal::TooFew { found, needed: 4 }),
        _ if path.is_constant() => return Err(Refusal::Constant),
        _ => {}
    }
    let peak = if path.steps.is_regular() { autoregression::peak(path) } else { profile::peak(path) }?;
    let is_sound =
        [peak.speed, peak.mean, peak.variance, peak.log_spread].iter().all(|part| part.is_finite());
    if is_sound { Ok(described(path, &peak, is_log, days_per_year)) } else { Err(Refusal::TooLarge) }
}

fn described(path: &ObservedPath, peak: &Peak, is_log: bool, days_per_year: f64) -> RevertingFit {
    let n = path.steps.count() as f64;
    let errors = standard_errors(path, peak);
    let days_of = |speed: f64| LN_2 / speed * days_per_year;
    let half_life_days = days_of(peak.speed);
    let volatility = peak.variance.sqrt();
    let long_run = if is_log { peak.mean.exp() } else { peak.mean };
    let long_run_error = errors.map(|errors| errors.mean * if is_log { long_run } else { 1.0 });
    RevertingFit {
        long_run: RangedEstimate::of_error(long_run, long_run_error),
        half_life_days: RangedEstimate {
            value: half_life_days,
            standard_error: errors.map(|errors| half_life_days * errors.speed / peak.speed),
            low: Some(peak.fastest.map_or(0.0, days_of)),
            high: Some(peak.slowest).filter(|speed| *speed > 0.0).map(days_of),
        },
        speed: RangedEstimate {
            value: peak.speed,
            standard_error: errors.map(|errors| errors.speed),
            low: Some(peak.slowest),
            high: peak.fastest,
        },
        speed_corrected: peak.speed - speed_bias(peak.speed, path.steps.mean_years(), n),
        volatility: RangedEstimate::of_error(
            volatility,
            errors.map(|errors| errors.log_volatility * volatility),
        ),
        log_likelihood: -0.5 * (n * ((2.0 * PI * peak.variance).ln() + 1.0) + peak.log_spread),
    }
}

/// How much the fitted speed is too high on average where the mean is fitted too, per year:
///
/// ```text
/// E[kappa^] - kappa = (5 + 2 exp(kappa dt) + exp(2 kappa dt)) / (2 n dt),    about 4 / T
/// ```
///
/// Source: Tang and Chen (2009), J. Econometrics 149, after Kendall's bias of an autoregressive slope. At irregular
/// dates `dt` is the mean step.
pub fn speed_bias(speed: f64, step_years: f64, steps: f64) -> f64 {
    let growth = (speed * step_years).exp();
    (5.0 + 2.0 * growth + growth * growth) / (2.0 * steps * step_years)
}
