//! Histories simulated from a fit: the dates and blanks of the real one, all factors jointly, by their exact transition.

use crate::book::HalfLife;
use crate::factors::{Diffusion, Fitted};
use crate::fit::Fit;
use crate::history::{History, Series};
use crate::maths::{cholesky, decay_integral, normal_quantile};
use crate::simulate::Stream;
use rand::RngExt;
use std::f64::consts::LN_2;

/// Makes histories like a real one.
pub(super) struct Simulator {
    history: History,
    /// Units of time from each row to the next.
    units: Vec<u32>,
    /// One a column that is simulated, in the correlation's order.
    movers: Vec<Mover>,
    /// Cholesky factor of the movers' covariance over a step, by its units.
    lowers: Vec<Vec<f64>>,
    years_per_unit: f64,
}

/// One column as its fit says it moves.
struct Mover {
    column: usize,
    is_log: bool,
    /// Per year; 0 without reversion.
    speed: f64,
    /// Where the modelled variable is drawn to.
    mean: f64,
    /// Per year, of the modelled variable; only without reversion.
    drift: f64,
    volatility: f64,
}

impl Simulator {
    /// From the fit of a history, with the speeds that the book takes.
    pub(super) fn of(history: History, fit: &Fit, fitted: &Fitted, days_per_year: f64) -> Self {
        let years_per_unit = fit.spacing.years_per_unit(days_per_year);
        let units: Vec<u32> =
            (1..history.dates.len()).map(|row| fit.spacing.units_between(&history, row - 1, row)).collect();
        let column = |name: &str| history.series.iter().position(|series| series.name == name);
        let movers: Vec<Mover> = fitted
            .factors
            .iter()
            .filter_map(|factor| {
                let mean_log_return = fit.factor(&factor.name)?.mean_log_return();
                Some(Mover::of(column(&factor.name)?, factor.diffusion?, mean_log_return, days_per_year))
            })
            .collect();
        let names: Vec<&str> =
            movers.iter().map(|mover| history.series[mover.column].name.as_str()).collect();
        let longest = units.iter().max().copied().unwrap_or(0);
        let lowers = (0..=longest)
            .map(|length| {
                let is_used = units.contains(&length);
                let years = f64::from(length) * years_per_unit;
                if is_used { lower(&movers, &names, fit, years) } else { Vec::new() }
            })
            .collect();
        Self { history, units, movers, lowers, years_per_unit }
    }

    /// History `number` of a seed. Columns that no factor of the book uses stay as they are.
    pub(super) fn history(&self, seed: u64, number: u32) -> History {
        let mut stream = Stream::new(seed, number);
        let mut history = self.history.clone();
        let n = self.movers.len();
        let mut values: Vec<f64> =
            self.movers.iter().map(|mover| mover.start(&self.history.series)).collect();
        let mut normals = vec![0.0; n];
        for (row, units) in self.units.iter().enumerate() {
            normals.fill_with(|| {
                normal_quantile(stream.random::<f64>().clamp(f64::EPSILON, 1.0 - f64::EPSILON))
            });
            let lower = &self.lowers[*units as usize];
            let years = f64::from(*units) * self.years_per_unit;
            for (at, mover) in self.movers.iter().enumerate() {
                let shock: f64 = (0..=at).map(|column| lower[at * n + column] * normals[column]).sum();
                let series = &mut history.series[mover.column].values;
                // A column that starts late starts where it did.
                if mover.has_started(&self.history.series, row) {
                    values[at] = mover.mean_after(values[at], years) + shock;
                }
                if let Some(value) = &mut series[row + 1] {
                    *value = if mover.is_log { values[at].exp() } else { values[at] };
                }
            }
        }
        history
    }
}

/// Cholesky factor of `rho_ij sigma_i sigma_j phi(kappa_i + kappa_j, dt)`.
fn lower(movers: &[Mover], names: &[&str], fit: &Fit, years: f64) -> Vec<f64> {
    let n = movers.len();
    let cells: Vec<f64> = (0..n * n)
        .map(|cell| {
            let (one, other) = (&movers[cell / n], &movers[cell % n]);
            let correlation = fit.correlation_of(names[cell / n], names[cell % n]);
            correlation * one.volatility * other.volatility * decay_integral(one.speed + other.speed, years)
        })
        .collect();
    // A fitted correlation is valid, so its covariance has a factor; without one the columns move independently.
    cholesky::factor(n, &cells).unwrap_or_else(|_| {
        (0..n * n).map(|cell| if cell % (n + 1) == 0 { cells[cell].sqrt() } else { 0.0 }).collect()
    })
}

impl Mover {
    fn of(column: usize, diffusion: Diffusion, mean_log_return: f64, days_per_year: f64) -> Self {
        let is_log = diffusion.is_log();
        let in_variable = |level: f64| if is_log { level.ln() } else { level };
        let (mean, drift) = match diffusion.reversion() {
            Some((long_run, HalfLife::Days(_))) => (in_variable(long_run), 0.0),
            Some((_, HalfLife::None)) => (0.0, 0.0),
            None => (0.0, mean_log_return),
        };
        let speed = match diffusion.reversion() {
            Some((_, HalfLife::Days(days))) => LN_2 / days * days_per_year,
            _ => 0.0,
        };
        Self { column, is_log, speed, mean, drift, volatility: diffusion.volatility() }
    }

    /// The first value that the real column has.
    fn start(&self, series: &[Series]) -> f64 {
        let first = series[self.column].values.iter().flatten().next().copied().unwrap_or(1.0);
        if self.is_log { first.ln() } else { first }
    }

    fn has_started(&self, series: &[Series], row: usize) -> bool {
        series[self.column].values[..=row].iter().any(Option::is_some)
    }

    fn mean_after(&self, value: f64, years: f64) -> f64 {
        if self.speed > 0.0 {
            value + (self.mean - value) * -(-self.speed * years).exp_m1()
        } else {
            value + self.drift * years
        }
    }
}
