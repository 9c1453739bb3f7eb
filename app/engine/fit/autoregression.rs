//! The reverting fit at regular dates, in closed form: there the exact transition is an autoregression of order one.

use super::reverting::Peak;
use super::{ObservedPath, Refusal};
use crate::maths::decay_integral;

/// Twice the drop of the log-likelihood at a 95 % end: the 95 % point of chi-square with one degree of freedom.
pub(super) const TWICE_THE_DROP: f64 = 3.841_458_820_694_124;

/// Least squares of each value on the one before.
#[derive(Debug, Clone, Copy, PartialEq)]
pub(super) struct Regression {
    /// Slope.
    pub(super) slope: f64,
    /// Fitted value less slope x value before, where values are counted from `pivot`.
    pub(super) intercept: f64,
    /// What values are counted from.
    pub(super) pivot: f64,
    /// Sum of the squared residuals.
    pub(super) residual_squares: f64,
    /// Sum of squares of the values before about their mean.
    pub(super) squares_before: f64,
}

impl Regression {
    /// Of a path with at least two steps. Two passes: means first, so that a large common level costs no digits.
    pub(super) fn of(values: &[f64]) -> Self {
        let n = (values.len() - 1) as f64;
        let pivot = values[0];
        let mean_before = values[..values.len() - 1].iter().map(|value| value - pivot).sum::<f64>() / n;
        let mean_after = values[1..].iter().map(|value| value - pivot).sum::<f64>() / n;
        let (mut before_squares, mut products) = (0.0, 0.0);
        for two in values.windows(2) {
            let (before, after) = (two[0] - pivot - mean_before, two[1] - pivot - mean_after);
            before_squares += before * before;
            products += before * after;
        }
        let slope = products / before_squares;
        let intercept = mean_after - slope * mean_before;
        let residual_squares = values
            .windows(2)
            .map(|two| (two[1] - pivot - intercept - slope * (two[0] - pivot)).powi(2))
            .sum();
        Self { slope, intercept, pivot, residual_squares, squares_before: before_squares }
    }
}

/// The likelihood's maximum. With slope b and residual squares R: `kappa = -ln b / dt`, `theta = a / (1 - b)`,
/// `sigma^2 = (R / n) 2 kappa / (1 - b^2)`. The profile likelihood of b is `-(n/2) ln R(b)`, and R a parabola, so that
/// the ends are `b -/+ sqrt(R (exp(3.841 / n) - 1) / sum of squares before)`.
pub(super) fn peak(path: &ObservedPath) -> Result<Peak, Refusal> {
    let n = path.steps.count() as f64;
    let step_years = path.steps.mean_years();
    let fit = Regression::of(&path.values);
    let slope = fit.slope;
    if slope.is_nan() {
        let is_huge = path.values.iter().any(|value| value.abs() > 1e150);
        return Err(if is_huge { Refusal::TooLarge } else { Refusal::NoReversion { slope: 1.0 } });
    }
    if slope >= 1.0 {
        return Err(Refusal::NoReversion { slope });
    }
    if slope <= 0.0 {
        return Err(Refusal::NoMemory { slope });
    }
    if fit.residual_squares <= 0.0 {
        return Err(Refusal::NoNoise);
    }
    let speed_of = |slope: f64| -slope.ln() / step_years;
    let speed = speed_of(slope);
    let spread_years = decay_integral(2.0 * speed, step_years);
    let reach = (fit.residual_squares * (TWICE_THE_DROP / n).exp_m1() / fit.squares_before).sqrt();
    Ok(Peak {
        speed,
        mean: fit.pivot + fit.intercept / (1.0 - slope),
        variance: fit.residual_squares / n / spread_years,
        log_spread: n * spread_years.ln(),
        slowest: if slope + reach < 1.0 { speed_of(slope + reach) } else { 0.0 },
        fastest: Some(slope - reach).filter(|end| *end > 0.0).map(speed_of),
    })
}
