//! The book's mean, standard deviation and skewness in closed form. No paths here.

mod products;
mod exponents;
mod system;

use crate::factors::Model;
use system::System;

/// Moments of the book's value on a day, in closed form.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct ExactMoments {
    /// Mean, money.
    pub mean: f64,
    /// Mean less today's value, money; keeps its digits where the mean is large beside it.
    pub change: f64,
    /// Standard deviation, money; 0 where the book's variance lies within the rounding of its parts, infinite where no
    /// double holds it.
    pub sd: f64,
    /// Third central moment over `sd^3`; none at an sd of 0.
    pub skewness: Option<f64>,
}

/// A standard deviation this small beside the sum of the parts' own is rounding: a perfect hedge.
const ROUNDING_OF_SD: f64 = 4e-8;

/// Moments of the book's value `day` trading days from today.
///
/// The value is a sum of products of up to two exponentials or moves of Gaussian variables, each one coefficient of an
/// exponential `c exp(y)` with nilpotent parts (`maths::Multidual`). With `E_ij = exp(Cov(y_i, y_j)) - 1`, blocks `K_i`
/// that take the wanted coefficient of `E[c_i exp(y_i)] f g`, and `k = K 1`,
///
/// ```text
/// variance            = k' E k
/// third central moment = 3 s' K s + trace((E K)^3),   s = E k
/// ```
///
/// No large terms cancel in either. For logs alone these are the moments of a sum of correlated lognormals.
pub fn exact_moments(model: &Model, day: u32) -> ExactMoments {
    let years = f64::from(day) / model.days_per_year;
    let system = System::of(model, years);
    let (variance, gross_sd) = system.variance();
    let sd = sd_of(variance, gross_sd);
    let skewness = (sd > 0.0).then(|| system.third_central() / (sd * sd * sd));
    ExactMoments { mean: model.value + system.change, change: system.change, sd, skewness }
}

/// Infinite where no double holds the variance; 0 where it lies within the rounding of its parts.
fn sd_of(variance: f64, gross_sd: f64) -> f64 {
    let sd = variance.max(0.0).sqrt();
    if !variance.is_finite() {
        f64::INFINITY
    } else if sd > ROUNDING_OF_SD * gross_sd {
        sd
    } else {
        0.0
    }
}
