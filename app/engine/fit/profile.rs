//! The reverting fit at irregular dates: mean and variance are known for each speed, so the likelihood is a function of
//! the speed alone.

use super::autoregression::TWICE_THE_DROP;
use super::reverting::Peak;
use super::{ObservedPath, Refusal};
use crate::maths::{decay_integral, maximum, root};

/// How near the logarithm of the speed is found.
const LOG_SPEED_TOLERANCE: f64 = 1e-10;

/// The likelihood with mean and variance at their best for one speed.
struct Profiled {
    mean: f64,
    variance: f64,
    log_spread: f64,
    log_likelihood: f64,
}

/// What the likelihood needs of steps of one length at one speed.
#[derive(Clone, Copy, Default)]
struct StepFactors {
    /// `exp(-kappa dt)`.
    decay: f64,
    /// `1 - exp(-kappa dt)`.
    pull: f64,
    /// `1 / phi(2 kappa, dt)`.
    weight: f64,
    /// `ln phi(2 kappa, dt)`.
    log_spread: f64,
}

struct Problem<'a> {
    path: &'a ObservedPath,
    /// Values are counted from here, so that a large common level costs no digits.
    pivot: f64,
    /// Number of steps of each length, by units.
    counts: Vec<u32>,
}

/// The likelihood's maximum over speeds from `0.01 / T` to `50 / shortest step`. At the slow end there is no reversion,
/// at the fast end no memory.
pub(super) fn peak(path: &ObservedPath) -> Result<Peak, Refusal> {
    let problem = Problem::of(path);
    let years = path.steps.total_years();
    let shortest = path.steps.years().fold(f64::INFINITY, f64::min);
    let (slow, fast) = ((0.01 / years).ln(), (50.0 / shortest).ln());
    let height = |log_speed: f64| problem.at(log_speed.exp()).log_likelihood;
    let top = maximum(height, slow, fast, LOG_SPEED_TOLERANCE);
    let (speed, best) = (top.exp(), problem.at(top.exp()));
    let slope = (-speed * path.steps.mean_years()).exp();
    // Within a part in a thousand of the ends nothing but the end itself stops the search.
    if top - slow < 1e-3 {
        return Err(Refusal::NoReversion { slope: 1.0 });
    }
    if fast - top < 1e-3 || slope == 0.0 {
        return Err(Refusal::NoMemory { slope: 0.0 });
    }
    if best.variance <= 0.0 {
        return Err(Refusal::NoNoise);
    }
    let drop = |log_speed: f64| 2.0 * (best.log_likelihood - height(log_speed)) - TWICE_THE_DROP;
    let end = |limit: f64| (drop(limit) > 0.0).then(|| root(drop, top, limit, LOG_SPEED_TOLERANCE)).flatten();
    Ok(Peak {
        speed,
        mean: best.mean,
        variance: best.variance,
        log_spread: best.log_spread,
        slowest: end(slow).map_or(0.0, f64::exp),
        fastest: end(fast).map(f64::exp),
    })
}

impl<'a> Problem<'a> {
    fn of(path: &'a ObservedPath) -> Self {
        let longest = path.steps.units.iter().max().copied().unwrap_or(0);
        let mut counts = vec![0; longest as usize + 1];
        for units in &path.steps.units {
            counts[*units as usize] += 1;
        }
        Self { path, pivot: path.values[0], counts }
    }

    /// ```text
    /// theta   = sum g_i (x_{i+1} - E_i x_i) / f_i / sum g_i^2 / f_i,    E = exp(-kappa dt), g = 1 - E, f = phi(2 kappa, dt)
    /// sigma^2 = (1/n) sum r_i^2 / f_i,    r_i = x_{i+1} - E_i x_i - g_i theta
    /// ```
    fn at(&self, speed: f64) -> Profiled {
        let factors: Vec<StepFactors> =
            (0..self.counts.len()).map(|units| self.factors(units, speed)).collect();
        let steps = || {
            let values = self.path.values.windows(2);
            values.zip(&self.path.steps.units).map(|(two, units)| {
                let factors = factors[*units as usize];
                (two[1] - self.pivot - factors.decay * (two[0] - self.pivot), factors)
            })
        };
        let (top, bottom) = steps().fold((0.0, 0.0), |(top, bottom), (rest, step)| {
            (top + step.pull * rest * step.weight, bottom + step.pull * step.pull * step.weight)
        });
        let mean = top / bottom;
        let squares: f64 = steps().map(|(rest, step)| (rest - step.pull * mean).powi(2) * step.weight).sum();
        let log_spread: f64 =
            factors.iter().zip(&self.counts).map(|(step, count)| step.log_spread * f64::from(*count)).sum();
        let n = self.path.steps.count() as f64;
        let variance = squares / n;
        let log_likelihood = -0.5 * (n * variance.ln() + log_spread);
        Profiled { mean: self.pivot + mean, variance, log_spread, log_likelihood }
    }

    fn factors(&self, units: usize, speed: f64) -> StepFactors {
        if self.counts[units] == 0 {
            return StepFactors::default();
        }
        let years = units as f64 * self.path.steps.years_per_unit;
        let spread_years = decay_integral(2.0 * speed, years);
        StepFactors {
            decay: (-speed * years).exp(),
            pull: -(-speed * years).exp_m1(),
            weight: spread_years.recip(),
            log_spread: spread_years.ln(),
        }
    }
}
