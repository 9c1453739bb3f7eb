//! An estimate and how sure it is. What it estimates is the caller's business.

use serde::Serialize;

/// A sampled figure with one standard error of it, both in the unit of the figure.
#[derive(Debug, Clone, Copy, PartialEq, Serialize)]
pub struct Estimate {
    /// The figure.
    pub value: f64,
    /// One standard error.
    pub standard_error: f64,
}
