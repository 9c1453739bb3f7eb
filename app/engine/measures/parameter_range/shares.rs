//! Which parameter the range comes from: the effect of each alone, against the readings of all together.

use super::draw::Draw;
use super::{Base, ParameterShare, RangeError};
use crate::book::HalfLife;
use crate::factors::{Diffusion, Fitted};
use rayon::prelude::*;
use std::f64::consts::LN_2;

/// Most shares told.
const MOST_TOLD: usize = 10;

/// A parameter of a diffusion, as a number that is finite under every fit.
#[derive(Debug, Clone, Copy, PartialEq)]
enum Parameter {
    Volatility,
    LongRun,
    /// `ln 2 / half-life`, 0 without reversion.
    Speed,
    Drift,
}

/// Shares of every fitted parameter in the variance of VaR at the highest confidence, largest first. A parameter's effect
/// in a draw is its gap from the fit times VaR's slope in it, taken over one standard deviation of its draws; that of the
/// correlation is the reading under the draw's correlation with all else as fitted.
pub(super) fn most_from(base: &Base<'_>, draws: &[Draw]) -> Result<Vec<ParameterShare>, RangeError> {
    let highest = |losses: &super::Losses| losses.last().map_or(0.0, |loss| loss.0);
    let var = highest(&base.losses);
    let readings: Vec<f64> = draws.iter().map(|draw| highest(&draw.losses)).collect();
    let factors = base.fitted.factors.iter().enumerate();
    let parameters: Vec<(usize, Parameter)> = factors
        .flat_map(|(at, factor)| {
            factor.diffusion.iter().flat_map(move |diffusion| {
                Parameter::of(diffusion).into_iter().map(move |parameter| (at, parameter))
            })
        })
        .collect();
    let effects: Result<Vec<Option<Vec<f64>>>, RangeError> = parameters
        .par_iter()
        .map(|(at, parameter)| {
            let name = &base.fitted.factors[*at].name;
            let fitted = parameter.value(base.fitted.factors[*at].diffusion.as_ref());
            let drawn =
                draws.iter().map(|draw| parameter.value(draw.fitted.factor(name)?.diffusion.as_ref()));
            let (Some(fitted), Some(drawn)) = (fitted, drawn.collect::<Option<Vec<f64>>>()) else {
                return Ok(None);
            };
            let spread = covariance(&drawn, &drawn).sqrt();
            if spread <= 0.0 {
                return Ok(None);
            }
            let mut moved = base.fitted.clone();
            parameter.set(&mut moved, *at, fitted + spread);
            let slope = (highest(&base.losses_under(&moved)?) - var) / spread;
            Ok(Some(drawn.iter().map(|value| slope * (value - fitted)).collect()))
        })
        .collect();
    let of_correlation: Result<Vec<f64>, RangeError> = draws
        .par_iter()
        .map(|draw| {
            let correlation = draw.fitted.correlation.clone();
            Ok(highest(&base.losses_under(&Fitted { correlation, ..base.fitted.clone() })?))
        })
        .collect();
    let total = covariance(&readings, &readings);
    let share = |effect: &[f64]| covariance(effect, &readings) / total;
    let mut shares: Vec<ParameterShare> = parameters
        .iter()
        .zip(effects?)
        .filter_map(|((at, parameter), effect)| {
            let factor = Some(base.fitted.factors[*at].name.clone());
            Some(ParameterShare { factor, parameter: parameter.word(), share: share(&effect?) })
        })
        .collect();
    shares.push(ParameterShare { factor: None, parameter: "correlation", share: share(&of_correlation?) });
    shares.retain(|share| share.share.is_finite() && share.share != 0.0);
    shares.sort_by(|one, other| other.share.abs().total_cmp(&one.share.abs()));
    shares.truncate(MOST_TOLD);
    Ok(shares)
}

fn covariance(one: &[f64], other: &[f64]) -> f64 {
    let n = one.len().max(1) as f64;
    let mean = |sample: &[f64]| sample.iter().sum::<f64>() / n;
    let (mean_one, mean_other) = (mean(one), mean(other));
    one.iter().zip(other).map(|(one, other)| (one - mean_one) * (other - mean_other)).sum::<f64>() / n
}

impl Parameter {
    fn of(diffusion: &Diffusion) -> Vec<Self> {
        match diffusion {
            Diffusion::Geometric { drift, .. } if *drift != 0.0 => vec![Self::Volatility, Self::Drift],
            Diffusion::Geometric { .. } => vec![Self::Volatility],
            _ => vec![Self::Volatility, Self::LongRun, Self::Speed],
        }
    }

    fn word(self) -> &'static str {
        match self {
            Self::Volatility => "volatility",
            Self::LongRun => "long run",
            Self::Speed => "half-life",
            Self::Drift => "drift",
        }
    }

    fn value(self, diffusion: Option<&Diffusion>) -> Option<f64> {
        let diffusion = diffusion?;
        match self {
            Self::Volatility => Some(diffusion.volatility()),
            Self::Drift => Some(diffusion.drift()),
            Self::LongRun => diffusion.reversion().map(|(long_run, _)| long_run),
            Self::Speed => diffusion.reversion().map(|(_, half_life)| match half_life {
                HalfLife::Days(days) => LN_2 / days,
                HalfLife::None => 0.0,
            }),
        }
    }

    fn set(self, fitted: &mut Fitted, at: usize, value: f64) {
        let Some(diffusion) = &mut fitted.factors[at].diffusion else { return };
        match (self, diffusion) {
            (Self::Volatility, Diffusion::Geometric { volatility, .. })
            | (Self::Volatility, Diffusion::RevertingLog { volatility, .. })
            | (Self::Volatility, Diffusion::RevertingLevel { volatility, .. }) => *volatility = value,
            (Self::Drift, Diffusion::Geometric { drift, .. }) => *drift = value,
            (
                Self::LongRun,
                Diffusion::RevertingLog { long_run, .. } | Diffusion::RevertingLevel { long_run, .. },
            ) => {
                *long_run = value;
            }
            (
                Self::Speed,
                Diffusion::RevertingLog { half_life, .. } | Diffusion::RevertingLevel { half_life, .. },
            ) => {
                *half_life = HalfLife::Days(LN_2 / value);
            }
            _ => {}
        }
    }
}
