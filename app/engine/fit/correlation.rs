//! Correlations of the Brownian motions behind the chosen diffusions: estimated from innovations on common dates or pair
//! by pair, then turned by the speeds, kept inside their range, and made valid where that is needed.

use super::innovations::{Mover, span_years, spans};
use super::{Estimator, FitSettings, Missing};
use crate::history::{History, Spacing};
use crate::maths::{
    Shrunk, decay_integral, gram, nearest_correlation, shrink_to_constant_correlation, shrink_to_identity,
    symmetric_eigenvalues,
};
use crate::tables::{Notice, NoticeLevel};
use rayon::prelude::*;

/// A matrix whose smallest eigenvalue lies below this is repaired.
const SMALLEST_EIGENVALUE: f64 = -1e-9;
/// Up to so many factors the two ways with missing values are compared; beyond, that costs more than it tells.
const MOST_COMPARED: usize = 100;

/// A fitted correlation matrix, valid.
#[derive(Debug, Clone, PartialEq)]
pub struct FittedCorrelation {
    /// Factors, n of them.
    pub factors: Vec<String>,
    /// n x n, row per factor.
    pub cells: Vec<f64>,
    /// How it was estimated.
    pub estimator: Estimator,
    /// Weight of the target; none for an estimator that does not shrink.
    pub shrinkage: Option<f64>,
    /// Of `cells`; 1 without factors.
    pub smallest_eigenvalue: f64,
    /// Changes that it rests on; with [`Missing::Pairs`] the fewest of any pair.
    pub changes: usize,
}

impl FittedCorrelation {
    /// Correlation of two factors; none where one of them is not among them.
    pub fn of(&self, one: &str, other: &str) -> Option<f64> {
        let find = |name: &str| self.factors.iter().position(|factor| factor == name);
        Some(self.cells[find(one)? * self.factors.len() + find(other)?])
    }
}

/// What correlations are estimated from.
pub(super) struct Sample<'a> {
    pub(super) movers: &'a [Mover<'a>],
    pub(super) history: &'a History,
    pub(super) spacing: Spacing,
    pub(super) days_per_year: f64,
    pub(super) settings: &'a FitSettings,
}

/// Correlations before they are turned.
struct Estimated {
    cells: Vec<f64>,
    shrinkage: Option<f64>,
    changes: usize,
    /// Years that a change spans, on average.
    years: f64,
}

impl Sample<'_> {
    /// The correlation of the Brownian motions, and what is worth telling about it; none where fewer than three changes
    /// are common.
    pub(super) fn correlation(&self, notices: &mut Vec<Notice>) -> Option<FittedCorrelation> {
        let Some(estimated) = self.estimated(notices) else {
            let text = "Fewer than three changes on common dates: no correlation is fitted. Leave out the columns that \
                        start late, or estimate pair by pair (--missing pairs).";
            notices.extend((self.movers.len() > 1).then(|| warning(text.to_owned())));
            return None;
        };
        let n = self.movers.len();
        if estimated.changes <= n && self.settings.missing == Missing::Common && estimated.shrinkage.is_none()
        {
            notices.push(warning(format!(
                "{n} factors on {} changes: their correlation matrix is singular; a shrunk estimator is not.",
                estimated.changes
            )));
        }
        let turned = self.turned(&estimated, notices);
        let (cells, smallest_eigenvalue) = self.valid(turned, notices);
        Some(FittedCorrelation {
            factors: self.movers.iter().map(|mover| mover.name().to_owned()).collect(),
            cells,
            estimator: self.settings.estimator,
            shrinkage: estimated.shrinkage,
            smallest_eigenvalue,
            changes: estimated.changes,
        })
    }

    fn rows(&self) -> usize {
        self.history.dates.len()
    }

    fn estimated(&self, notices: &mut Vec<Notice>) -> Option<Estimated> {
        let has_gaps = (0..self.rows()).any(|row| self.movers.iter().any(|mover| !mover.is_quoted(row)));
        if !has_gaps {
            return self.on_common_dates();
        }
        let is_compared = self.movers.len() <= MOST_COMPARED;
        let (common, pairs) = match self.settings.missing {
            Missing::Common => (self.on_common_dates(), is_compared.then(|| self.pair_by_pair()).flatten()),
            Missing::Pairs => (is_compared.then(|| self.on_common_dates()).flatten(), self.pair_by_pair()),
        };
        notices.extend(difference(common.as_ref(), pairs.as_ref(), self.rows()));
        if self.settings.missing == Missing::Pairs { pairs } else { common }
    }

    fn on_common_dates(&self) -> Option<Estimated> {
        let spans = spans(self.movers, self.rows(), self.settings.change_days as usize);
        if spans.len() < 3 {
            return None;
        }
        let years = span_years(self.history, &spans, self.spacing, self.days_per_year);
        let columns: Vec<Vec<f64>> =
            self.movers.par_iter().map(|mover| innovations(mover, &spans, &years)).collect();
        let (covariance, shrinkage) = match self.settings.estimator {
            Estimator::Sample => (gram(&demeaned(columns), None), None),
            Estimator::Weighted => (gram(&columns, Some(&self.weights(&spans))), None),
            Estimator::ShrunkIdentity => shrunk(shrink_to_identity(&demeaned(columns))),
            Estimator::ShrunkConstant => shrunk(shrink_to_constant_correlation(&demeaned(columns))),
        };
        let changes = spans.len();
        let mean_years = years.iter().sum::<f64>() / changes as f64;
        Some(Estimated { cells: normalised(&covariance), shrinkage, changes, years: mean_years })
    }

    /// Each pair on the dates that both have.
    fn pair_by_pair(&self) -> Option<Estimated> {
        let n = self.movers.len();
        let pairs: Vec<(usize, usize)> =
            (0..n).flat_map(|row| (0..row).map(move |column| (row, column))).collect();
        let found: Vec<(f64, usize, f64)> =
            pairs.par_iter().map(|(row, column)| self.pair(*row, *column)).collect();
        let mut cells: Vec<f64> =
            (0..n * n).map(|cell| if cell % (n + 1) == 0 { 1.0 } else { 0.0 }).collect();
        for ((row, column), (correlation, ..)) in pairs.iter().zip(&found) {
            cells[row * n + column] = *correlation;
            cells[column * n + row] = *correlation;
        }
        let changes = found.iter().map(|(_, changes, _)| *changes).min()?;
        let years = found.iter().map(|(_, _, years)| years).sum::<f64>() / found.len() as f64;
        Some(Estimated { cells, shrinkage: None, changes, years })
    }

    /// Correlation, number of changes and their mean years; a pair with fewer than three changes is uncorrelated.
    fn pair(&self, row: usize, column: usize) -> (f64, usize, f64) {
        let movers = [self.movers[row], self.movers[column]];
        let spans = spans(&movers, self.rows(), self.settings.change_days as usize);
        let years = span_years(self.history, &spans, self.spacing, self.days_per_year);
        let columns: Vec<Vec<f64>> = movers.iter().map(|mover| innovations(mover, &spans, &years)).collect();
        let covariance = match self.settings.estimator {
            Estimator::Weighted => gram(&columns, Some(&self.weights(&spans))),
            _ => gram(&demeaned(columns), None),
        };
        let correlation = if spans.len() < 3 { 0.0 } else { normalised(&covariance)[1] };
        (correlation, spans.len(), years.iter().sum::<f64>() / spans.len().max(1) as f64)
    }

    /// Weights of changes by age: half at each half-life before the last row.
    fn weights(&self, spans: &[(usize, usize)]) -> Vec<f64> {
        let last = spans.last().map_or(0, |(_, to)| *to);
        let days_per_unit = self.spacing.years_per_unit(self.days_per_year) * self.days_per_year;
        let age_days =
            |row: usize| f64::from(self.spacing.units_between(self.history, row, last)) * days_per_unit;
        spans.iter().map(|(_, to)| (-age_days(*to) / self.settings.weight_half_life_days).exp2()).collect()
    }

    /// From the correlation R of innovations over `dt` to that of the Brownian motions,
    /// `rho = R sqrt(phi(2 k_i, dt) phi(2 k_j, dt)) / phi(k_i + k_j, dt)`, kept within -1 and 1 with a notice.
    fn turned(&self, estimated: &Estimated, notices: &mut Vec<Notice>) -> Vec<f64> {
        let n = self.movers.len();
        let spread: Vec<f64> = self
            .movers
            .iter()
            .map(|mover| decay_integral(2.0 * mover.taken_speed, estimated.years).sqrt())
            .collect();
        let mut cells = estimated.cells.clone();
        for row in 0..n {
            for column in 0..row {
                let speeds = self.movers[row].taken_speed + self.movers[column].taken_speed;
                let turn = spread[row] * spread[column] / decay_integral(speeds, estimated.years);
                let value = cells[row * n + column] * turn;
                // A part in a million million beyond 1 is rounding.
                if value.abs() > 1.0 + 1e-12 {
                    notices.push(warning(format!(
                        "{} and {}: the correlation of their Brownian motions would be {value:.3}, beyond what there can \
                         be; {} is taken.",
                        self.movers[row].name(),
                        self.movers[column].name(),
                        value.signum()
                    )));
                }
                cells[row * n + column] = value.clamp(-1.0, 1.0);
                cells[column * n + row] = cells[row * n + column];
            }
        }
        cells
    }

    /// The matrix with its smallest eigenvalue, the nearest valid one where it is not semi-definite.
    fn valid(&self, cells: Vec<f64>, notices: &mut Vec<Notice>) -> (Vec<f64>, f64) {
        let n = self.movers.len();
        let smallest = |cells: &[f64]| symmetric_eigenvalues(n, cells).first().copied().unwrap_or(1.0);
        let before = smallest(&cells);
        if before >= SMALLEST_EIGENVALUE {
            return (cells, before);
        }
        match nearest_correlation(n, &cells, None, &[]) {
            Ok(nearest) => {
                notices.push(warning(format!(
                    "The fitted correlations can't hold together (smallest eigenvalue {before:.4}): the nearest valid matrix \
                     is taken, {:.4} away.",
                    nearest.distance
                )));
                let after = smallest(&nearest.cells);
                (nearest.cells, after)
            }
            // Cells that are no numbers; there are none here, and no correlation is then the answer that claims least.
            Err(_) => ((0..n * n).map(|cell| if cell % (n + 1) == 0 { 1.0 } else { 0.0 }).collect(), 1.0),
        }
    }
}

fn shrunk(shrunk: Shrunk) -> (Vec<f64>, Option<f64>) {
    (shrunk.covariance, Some(shrunk.intensity))
}

fn innovations(mover: &Mover<'_>, spans: &[(usize, usize)], years: &[f64]) -> Vec<f64> {
    spans.iter().zip(years).filter_map(|((from, to), years)| mover.innovation(*from, *to, *years)).collect()
}

fn demeaned(mut columns: Vec<Vec<f64>>) -> Vec<Vec<f64>> {
    columns.par_iter_mut().for_each(|column| {
        let mean = column.iter().sum::<f64>() / column.len().max(1) as f64;
        column.iter_mut().for_each(|value| *value -= mean);
    });
    columns
}

/// A covariance matrix over its standard deviations; what never moves is uncorrelated.
fn normalised(covariance: &[f64]) -> Vec<f64> {
    let n = covariance.len().isqrt();
    let cell = |at: usize| {
        let (row, column) = (at / n, at % n);
        let correlation =
            covariance[at] / (covariance[row * n + row] * covariance[column * n + column]).sqrt();
        match correlation {
            _ if row == column => 1.0,
            correlation if correlation.is_finite() => correlation.clamp(-1.0, 1.0),
            _ => 0.0,
        }
    };
    (0..n * n).map(cell).collect()
}

/// How far the two ways with missing values part.
fn difference(common: Option<&Estimated>, pairs: Option<&Estimated>, rows: usize) -> Option<Notice> {
    let common = common?;
    let all = rows.saturating_sub(1);
    let apart = pairs.map(|pairs| {
        let cells = common.cells.iter().zip(&pairs.cells);
        let most = cells.map(|(common, pair)| (common - pair).abs()).fold(0.0, f64::max);
        format!(", and no correlation moves by more than {most:.2} between the two ways")
    });
    let text = format!(
        "Not every factor has a value on every date: {} of {all} changes are on dates common to all (--missing common); each \
         pair has at least {} on its own (--missing pairs){}.",
        common.changes,
        pairs.map_or(common.changes, |pairs| pairs.changes),
        apart.unwrap_or_default()
    );
    Some(Notice { level: NoticeLevel::Info, text })
}

fn warning(text: String) -> Notice {
    Notice { level: NoticeLevel::Warning, text }
}
