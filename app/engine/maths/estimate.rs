//! An estimate and how sure it is. What it estimates is the caller's business.

use super::TWO_SIDED_95;
use serde::{Deserialize, Serialize};

/// A sampled figure with one standard error of it, both in the unit of the figure.
#[derive(Debug, Clone, Copy, PartialEq, Serialize)]
pub struct Estimate {
    /// The figure.
    pub value: f64,
    /// One standard error.
    pub standard_error: f64,
}

/// An estimate with the 95 % range that goes with it, all in the unit of the figure.
#[derive(Debug, Clone, Copy, PartialEq, Serialize, Deserialize)]
pub struct RangedEstimate {
    /// The figure.
    pub value: f64,
    /// One standard error; none where the likelihood is too flat for one.
    pub standard_error: Option<f64>,
    /// Lower end; none where there is no bound.
    pub low: Option<f64>,
    /// Upper end; none where there is no bound.
    pub high: Option<f64>,
}

impl RangedEstimate {
    /// The range `value -/+ 1.96 standard errors`.
    pub fn of_error(value: f64, standard_error: Option<f64>) -> Self {
        let error = standard_error.filter(|error| error.is_finite());
        let end = |sign: f64| error.map(|error| value + sign * TWO_SIDED_95 * error);
        Self { value, standard_error: error, low: end(-1.0), high: end(1.0) }
    }
}
