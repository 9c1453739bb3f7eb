//! Why a diffusion could not be fitted, in words for the reader.

use thiserror::Error;

/// Why a diffusion could not be fitted. Nothing is clamped instead.
#[derive(Debug, Clone, Copy, PartialEq, Error)]
pub enum Refusal {
    /// No value at all.
    #[error("no value in these dates")]
    Empty,
    /// Too few values.
    #[error("{found} {} in these dates: this fit needs at least {needed}", if *.found == 1 { "value" } else { "values" })]
    TooFew {
        /// Values there are.
        found: usize,
        /// Values needed.
        needed: usize,
    },
    /// A log of a value that has none.
    #[error("a value that is zero or negative has no logarithm")]
    NotPositive,
    /// All values are equal.
    #[error("the value never changes in these dates")]
    Constant,
    /// The autoregressive slope is 1 or more.
    #[error("no reversion: each value starts from the one before (slope {slope:.4}, at or beyond 1)")]
    NoReversion {
        /// Slope of each value on the one before, over a mean step.
        slope: f64,
    },
    /// The autoregressive slope is not positive.
    #[error(
        "values swing back past their mean from one date to the next (slope {slope:.4}, not positive): no diffusion does so"
    )]
    NoMemory {
        /// Slope of each value on the one before, over a mean step.
        slope: f64,
    },
    /// Everything moves along the fitted line.
    #[error("the values follow their own past without any noise: no volatility can be fitted")]
    NoNoise,
    /// Values too large for a double's arithmetic.
    #[error("values too large to compute with")]
    TooLarge,
}
