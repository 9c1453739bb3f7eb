//! The exact joint Gaussian transition of all factors over a step of any length. Draws nothing.

use super::SimulateError;
use crate::factors::{Diffusion, Model, RiskFactor};
use crate::maths::{cholesky, decay_integral};

/// How the moves `x` of the modelled variables since today (`ln S/S_0`, or `X - X_0`) go over one step:
///
/// ```text
/// x(t + dt) = decay x(t) + shift + C z,    z standard normal,    C C' = Q
/// decay_i = exp(-kappa_i dt)
/// shift_i = gap_i (1 - exp(-kappa_i dt))                 reverting; gap = ln(long_run / S_0) or long_run - X_0
///           (mu_i - sigma_i^2 / 2) dt                    geometric
/// Q_ij    = rho_ij sigma_i sigma_j phi(kappa_i + kappa_j, dt),    phi(c, t) = (1 - exp(-c t)) / c
/// ```
///
/// Exact for any step: there is no time-step error. `Q`, not `rho`, is factored, because speeds that differ lower the
/// correlation over a step.
#[derive(Debug, Clone, PartialEq)]
pub struct Transition {
    /// Part of the move that remains, per factor.
    pub decay: Vec<f64>,
    /// Mean of the move over a first step from today, per factor.
    pub shift: Vec<f64>,
    /// `Q`, n x n, row per factor.
    pub covariance: Vec<f64>,
    /// Lower triangular `C`, n x n, row per factor.
    pub lower: Vec<f64>,
}

impl Transition {
    /// The transition of a model's factors over `years`.
    ///
    /// # Errors
    /// [`SimulateError::NotSemiDefinite`] where the integrated covariance can't be factored in the factors' order.
    pub fn over(model: &Model, years: f64) -> Result<Self, SimulateError> {
        let speeds = speeds_per_year(model);
        let covariance = move_covariance(model, years);
        let lower = cholesky::factor(speeds.len(), &covariance).map_err(|failure| {
            SimulateError::NotSemiDefinite {
                factor: model.factors[failure.pivot].name.clone(),
                pivot: failure.value,
            }
        })?;
        Ok(Self {
            decay: speeds.iter().map(|speed| (-speed * years).exp()).collect(),
            shift: move_means(model, years),
            covariance,
            lower,
        })
    }
}

/// Mean of each factor's move from today over `years`: `shift` of [`Transition`].
pub fn move_means(model: &Model, years: f64) -> Vec<f64> {
    let means = model.factors.iter().map(|factor| factor_move(factor, model.days_per_year, years).0);
    means.collect()
}

/// Covariance of the factors' moves from today over `years`: `Q` of [`Transition`], n x n, row per factor.
pub fn move_covariance(model: &Model, years: f64) -> Vec<f64> {
    let speeds = speeds_per_year(model);
    let sigmas: Vec<f64> = model.factors.iter().map(|factor| factor.diffusion.volatility()).collect();
    let n = speeds.len();
    (0..n * n)
        .map(|cell| {
            let (row, column) = (cell / n, cell % n);
            let correlation = model.correlation.at(row, column);
            correlation * sigmas[row] * sigmas[column] * decay_integral(speeds[row] + speeds[column], years)
        })
        .collect()
}

/// Mean and variance of one factor's move from today over `years`.
pub fn factor_move(factor: &RiskFactor, days_per_year: f64, years: f64) -> (f64, f64) {
    let speed = factor.diffusion.speed_per_year(days_per_year);
    let sigma = factor.diffusion.volatility();
    let mean = match factor.diffusion {
        Diffusion::Geometric { drift, volatility } => (drift - volatility * volatility / 2.0) * years,
        _ => factor.gap_to_long_run() * -(-speed * years).exp_m1(),
    };
    (mean, sigma * sigma * decay_integral(2.0 * speed, years))
}

fn speeds_per_year(model: &Model) -> Vec<f64> {
    model.factors.iter().map(|factor| factor.diffusion.speed_per_year(model.days_per_year)).collect()
}
