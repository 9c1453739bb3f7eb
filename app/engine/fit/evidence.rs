//! What speaks for a random walk or against it, in one variable of one factor: its logarithm or its level.

use super::autoregression::Regression;
pub use super::dickey_fuller::{DickeyFuller, critical_values};
pub use super::variance_ratio::VarianceRatio;
use super::variance_ratio::variance_ratios;
use super::{ObservedPath, RevertingFit};

/// Reversion speed x years below which a random walk often shows as much: the 95 % point of what a fit makes of one.
///
/// Source: Fuller's table of n (b - 1) with a constant (from memory), and simulation.
pub const LEAST_SPEED_TIMES_YEARS: f64 = 14.0;

/// The evidence.
#[derive(Debug, Clone, PartialEq)]
pub struct Evidence {
    /// Test of a random walk.
    pub dickey_fuller: Option<DickeyFuller>,
    /// Spread by span.
    pub variance_ratios: Vec<VarianceRatio>,
    /// Fitted speed, uncorrected, x years of history; a pure random walk shows 4.4 in the middle, 14.1 at its 95 %
    /// point. None where reversion was refused.
    pub speed_times_years: Option<f64>,
    /// Correlation of successive residuals of the regression of each value on the one before: far from 0 where neither
    /// diffusion describes the path.
    pub residual_autocorrelation: Option<f64>,
    /// Excess kurtosis of those residuals: 0 for a normal law, above for heavier tails, which no diffusion here has.
    pub excess_kurtosis: Option<f64>,
}

impl Evidence {
    /// The evidence of a path of the modelled variable, and of the reverting fit to it where there is one.
    pub fn of(path: &ObservedPath, reverting: Option<&RevertingFit>) -> Self {
        let residuals = residuals(path);
        Self {
            dickey_fuller: DickeyFuller::of(path),
            variance_ratios: variance_ratios(path),
            speed_times_years: reverting.map(|fit| fit.speed.value * path.steps.total_years()),
            residual_autocorrelation: lag_one(&residuals),
            excess_kurtosis: excess_kurtosis(&residuals),
        }
    }

    /// Whether a random walk is rejected at 5 % and the reversion is fast enough not to be one's disguise.
    pub fn speaks_for_reversion(&self) -> bool {
        self.rejects_random_walk()
            && self.speed_times_years.is_some_and(|speed| speed >= LEAST_SPEED_TIMES_YEARS)
    }

    /// Whether Dickey-Fuller's t lies below its 5 % point.
    pub fn rejects_random_walk(&self) -> bool {
        self.dickey_fuller.is_some_and(|test| test.t < test.critical_5)
    }
}

/// What the regression of each value on the one before leaves over; their mean is 0.
fn residuals(path: &ObservedPath) -> Vec<f64> {
    if path.steps.count() < 3 {
        return Vec::new();
    }
    let fit = Regression::of(&path.values);
    let of = |two: &[f64]| two[1] - fit.pivot - fit.intercept - fit.slope * (two[0] - fit.pivot);
    path.values.windows(2).map(of).collect()
}

/// `sum r_t r_{t-1} / sum r_t^2` of residuals with mean 0.
fn lag_one(residuals: &[f64]) -> Option<f64> {
    let squares: f64 = residuals.iter().map(|residual| residual * residual).sum();
    let products: f64 = residuals.windows(2).map(|two| two[0] * two[1]).sum();
    Some(products / squares).filter(|correlation| correlation.is_finite())
}

/// `m4 / m2^2 - 3` of residuals with mean 0.
fn excess_kurtosis(residuals: &[f64]) -> Option<f64> {
    let n = residuals.len() as f64;
    let mean = |power: i32| residuals.iter().map(|residual| residual.powi(power)).sum::<f64>() / n;
    Some(mean(4) / mean(2).powi(2) - 3.0).filter(|kurtosis| kurtosis.is_finite())
}
