//! What moved each factor from one date to another, beyond what its diffusion foretold: the columns that correlations are
//! taken of.

use super::FactorFit;
use crate::book::DiffusionKind;
use crate::history::{History, Series, Spacing};
use crate::maths::{decay_integral, sample_moments};

/// A factor with the diffusion that was chosen for it.
#[derive(Debug, Clone, Copy)]
pub(super) struct Mover<'a> {
    series: &'a Series,
    is_log: bool,
    /// Fitted speed per year, uncorrected, and mean of the modelled variable; none without reversion.
    reversion: Option<(f64, f64)>,
    /// Speed that the book takes, per year: by it residuals are turned to Brownian motions.
    pub(super) taken_speed: f64,
}

impl<'a> Mover<'a> {
    /// Of a factor whose diffusion was chosen; none otherwise.
    pub(super) fn of(series: &'a Series, fit: &FactorFit, taken_speed: f64) -> Option<Self> {
        let kind = fit.chosen?;
        let is_log = kind != DiffusionKind::RevertingLevel;
        let reverting = fit.reverting(kind).and_then(|fit| fit.as_ref().ok());
        let mean = |long_run: f64| if is_log { long_run.ln() } else { long_run };
        let reversion = reverting.map(|fit| (fit.speed.value, mean(fit.long_run.value)));
        let is_fitted = fit.last.is_some() && (!is_log || fit.is_positive());
        is_fitted.then_some(Self { series, is_log, reversion, taken_speed })
    }

    /// Name of the factor.
    pub(super) fn name(&self) -> &'a str {
        &self.series.name
    }

    /// Whether the factor has a value on a row.
    pub(super) fn is_quoted(&self, row: usize) -> bool {
        self.series.values[row].is_some()
    }

    /// Change of the modelled variable from one row to another less the mean that the reversion foretells, over its
    /// spread a year: `(x' - theta - (x - theta) exp(-kappa dt)) / sqrt(phi(2 kappa, dt))`, and `(x' - x) / sqrt(dt)`
    /// without reversion. None where a value is blank.
    pub(super) fn innovation(&self, from: usize, to: usize, years: f64) -> Option<f64> {
        let variable =
            |row: usize| self.series.values[row].map(|value| if self.is_log { value.ln() } else { value });
        let (before, after) = (variable(from)?, variable(to)?);
        Some(match self.reversion {
            None => (after - before) / years.sqrt(),
            Some((speed, mean)) => {
                let pull = -(-speed * years).exp_m1();
                (after - before + (before - mean) * pull) / decay_integral(2.0 * speed, years).sqrt()
            }
        })
    }
}

/// Pairs of rows, `span` quoted rows apart and overlapping, out of the rows on which all of `movers` are quoted.
pub(super) fn spans(movers: &[Mover<'_>], rows: usize, span: usize) -> Vec<(usize, usize)> {
    let common: Vec<usize> =
        (0..rows).filter(|row| movers.iter().all(|mover| mover.is_quoted(*row))).collect();
    common.iter().zip(common.iter().skip(span)).map(|(from, to)| (*from, *to)).collect()
}

/// Years of each span.
pub(super) fn span_years(
    history: &History,
    spans: &[(usize, usize)],
    spacing: Spacing,
    days_per_year: f64,
) -> Vec<f64> {
    let unit = spacing.years_per_unit(days_per_year);
    spans.iter().map(|(from, to)| f64::from(spacing.units_between(history, *from, *to)) * unit).collect()
}

/// Innovations of two movers on the dates that both have, each less its mean and over its standard deviation.
pub(super) fn standard_pairs(
    history: &History,
    movers: [Mover<'_>; 2],
    span: usize,
    spacing: Spacing,
    days_per_year: f64,
) -> Vec<[f64; 2]> {
    let spans = spans(&movers, history.dates.len(), span);
    let years = span_years(history, &spans, spacing, days_per_year);
    let [one, other] = movers.map(|mover| {
        let moves: Vec<f64> = spans
            .iter()
            .zip(&years)
            .filter_map(|((from, to), years)| mover.innovation(*from, *to, *years))
            .collect();
        let moments = sample_moments(&moves);
        let (mean, sd) = (moments.mean.value, moments.sd.value);
        moves.into_iter().map(|value| (value - mean) / sd).collect::<Vec<f64>>()
    });
    let pairs = one.into_iter().zip(other).map(|(one, other)| [one, other]);
    pairs.filter(|pair| pair.iter().all(|value| value.is_finite())).collect()
}
