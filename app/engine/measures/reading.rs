//! Everything that is read on one day, named as in the program's answers.

use super::Confidence;
use serde::Serialize;

/// What a loss is counted from.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum LossFrom {
    /// Today's value less the value at the horizon.
    Today,
    /// Expected value less the value at the horizon.
    Mean,
}

/// How a sample is to be read.
#[derive(Debug, Clone, PartialEq)]
pub struct Conventions {
    /// Ascending, at least one.
    pub confidences: Vec<Confidence>,
    /// What a loss is counted from.
    pub loss_from: LossFrom,
    /// Loss from today's value that should not be passed, in money.
    pub loss_limit: Option<f64>,
}

/// All figures at one day. Losses and drawdowns are positive money of the book's currency.
#[derive(Debug, Clone, PartialEq, Serialize)]
pub struct Reading {
    /// Value of the book at the horizon.
    pub moments: MomentsReading,
    /// One row a confidence, ascending.
    pub loss: Vec<LossRow>,
    /// Largest fall from a running peak.
    pub drawdown: DrawdownReading,
    /// With a loss limit.
    pub limit: Option<LimitReading>,
}

/// A moment in closed form beside the sampled one.
#[derive(Debug, Clone, Copy, PartialEq, Serialize)]
pub struct MomentRow {
    /// Closed form.
    pub exact: Option<f64>,
    /// From the paths.
    pub sampled: Option<f64>,
    /// One standard error of the sampled figure.
    pub standard_error: Option<f64>,
}

impl MomentRow {
    /// Sampled less exact in standard errors; none where either is missing or the error is 0.
    pub fn z(&self) -> Option<f64> {
        let error = self.standard_error.filter(|error| *error > 0.0)?;
        Some((self.sampled? - self.exact?) / error)
    }
}

/// Moments of the book's value.
#[derive(Debug, Clone, Copy, PartialEq, Serialize)]
pub struct MomentsReading {
    /// Mean.
    pub mean: MomentRow,
    /// Standard deviation.
    pub sd: MomentRow,
    /// Skewness; null where the standard deviation is 0.
    pub skewness: MomentRow,
    /// Exact mean less today's value.
    pub expected_change: f64,
}

/// VaR and ES at one confidence with their 95 % simulation ranges; an end the sample can't give is none.
#[derive(Debug, Clone, Copy, PartialEq, Serialize)]
pub struct LossRow {
    /// Confidence.
    pub confidence: f64,
    /// Value-at-risk.
    pub var: f64,
    /// Lower end of its range.
    pub var_low: Option<f64>,
    /// Upper end of its range.
    pub var_high: Option<f64>,
    /// Expected shortfall.
    pub es: f64,
    /// Lower end of its range.
    pub es_low: Option<f64>,
    /// Upper end of its range.
    pub es_high: Option<f64>,
}

/// Drawdown at one confidence.
#[derive(Debug, Clone, Copy, PartialEq, Serialize)]
pub struct DrawdownRow {
    /// Confidence.
    pub confidence: f64,
    /// Quantile of the largest fall.
    pub value: f64,
    /// Lower end of its range.
    pub value_low: Option<f64>,
    /// Upper end of its range.
    pub value_high: Option<f64>,
    /// Mean of the worst `1 - confidence` of falls.
    pub mean_beyond: f64,
    /// One standard error of it; none where the sample can't give it.
    pub mean_beyond_error: Option<f64>,
}

/// The largest fall from a running peak, up to and including the day.
#[derive(Debug, Clone, PartialEq, Serialize)]
pub struct DrawdownReading {
    /// Mean.
    pub mean: f64,
    /// One standard error of the mean.
    pub mean_error: f64,
    /// One row a confidence, ascending.
    pub quantiles: Vec<DrawdownRow>,
}

/// Chance of passing the loss limit.
#[derive(Debug, Clone, Copy, PartialEq, Serialize)]
pub struct LimitReading {
    /// The limit, in money.
    pub loss: f64,
    /// Probability of a loss beyond it at the horizon.
    pub at_horizon: f64,
    /// One standard error.
    pub at_horizon_error: f64,
    /// Probability of touching it at any time up to the horizon.
    pub by_horizon: f64,
    /// One standard error.
    pub by_horizon_error: f64,
}
