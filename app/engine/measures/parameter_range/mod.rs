//! How sure VaR and ES are of the parameters they rest on: a parametric bootstrap. What the paths' own number makes
//! unsure is the simulation range beside it.

mod draw;
mod histories;
mod shares;

use super::{Confidence, Conventions, LossFrom, exact_moments};
use crate::factors::{Fitted, Inputs, Model, ModelSettings, TypedFactor, typed_factors};
use crate::fit::{Fit, FitSettings, history_for};
use crate::history::History;
use crate::maths::UpperTail;
use crate::simulate::{SimulateError, values_in_one_step};
use crate::tables::Faults;
use draw::Draw;
use histories::Simulator;
use rayon::prelude::*;
use serde::Serialize;
use std::sync::atomic::{AtomicUsize, Ordering};

/// Histories usually simulated.
pub const USUAL_DRAWS: usize = 200;
/// Paths that a reading under one of them usually rests on: readings share their random numbers, so that few will do.
pub const USUAL_PATHS: usize = 20_000;

/// VaR and ES over the fit's 95 % parameter range.
///
/// Histories are simulated from the fit on the dates and with the blanks of the real one, all factors jointly; each is
/// fitted again by the same settings, and the book is read under each fit on the same random numbers. Ends are the 2.5
/// and 97.5 % points of the readings, counted from the reading at hand. What is typed stays as typed in all of them.
#[derive(Debug, Clone, PartialEq, Serialize)]
pub struct ParameterRange {
    /// Histories simulated.
    pub draws: usize,
    /// Reverting fits that were refused in them; each counts as no reversion.
    pub refused: usize,
    /// One row a confidence, ascending.
    pub loss: Vec<ParameterRow>,
    /// Where the range of VaR at the highest confidence comes from, largest share first.
    pub most_from: Vec<ParameterShare>,
}

/// Range of one confidence, money of the book's currency.
#[derive(Debug, Clone, Copy, PartialEq, Serialize)]
pub struct ParameterRow {
    /// Confidence.
    pub confidence: f64,
    /// Lower end of VaR.
    pub var_low: f64,
    /// Upper end of VaR.
    pub var_high: f64,
    /// Lower end of ES.
    pub es_low: f64,
    /// Upper end of ES.
    pub es_high: f64,
}

/// Share of one parameter in the variance of VaR over the draws; shares of parameters that offset each other may be
/// negative.
#[derive(Debug, Clone, PartialEq, Serialize)]
pub struct ParameterShare {
    /// Factor; none for the correlation, which is all factors' together.
    pub factor: Option<String>,
    /// `volatility`, `long run`, `half-life`, `drift` or `correlation`.
    pub parameter: &'static str,
    /// `Cov(effect, VaR) / Var(VaR)`.
    pub share: f64,
}

/// What is to be ranged.
#[derive(Debug, Clone, Copy)]
pub struct RangeRequest<'a> {
    /// The book.
    pub inputs: &'a Inputs,
    /// Its history.
    pub history: &'a History,
    /// How that is fitted.
    pub fit: &'a FitSettings,
    /// How the book is assembled.
    pub model: &'a ModelSettings,
    /// Day that is read.
    pub day: u32,
    /// How it is read.
    pub conventions: &'a Conventions,
    /// Histories to simulate.
    pub draws: usize,
    /// Paths that each reading rests on.
    pub paths: usize,
    /// Seed of histories and paths.
    pub seed: u64,
}

/// Told of the draws done; may stop them. Called from several threads.
pub trait RangeWatcher: Sync {
    /// So many draws are done.
    fn progress(&self, draws: usize);
    /// Whether to end now.
    fn is_stopped(&self) -> bool;
}

/// Why there is no range.
#[derive(Debug, Clone, PartialEq, thiserror::Error)]
pub enum RangeError {
    /// The inputs or the history are no valid book.
    #[error("{0}")]
    Faults(#[from] Faults),
    /// A reading failed, or the watcher stopped it.
    #[error("{0}")]
    Simulate(#[from] SimulateError),
}

/// VaR and ES at each confidence of one reading.
pub(super) type Losses = Vec<(f64, f64)>;

/// Everything that the draws share.
struct Base<'a> {
    request: RangeRequest<'a>,
    typed: Vec<TypedFactor>,
    columns: Vec<String>,
    fitted: Fitted,
    losses: Losses,
}

/// Ranges the losses of `reading`, one `(VaR, ES)` a confidence of the request.
///
/// # Errors
/// [`RangeError`] where the book or its history is not valid, or the watcher stopped it.
pub fn parameter_range(
    request: RangeRequest<'_>,
    reading: &[(f64, f64)],
    watcher: &dyn RangeWatcher,
) -> Result<ParameterRange, RangeError> {
    let columns: Vec<String> = request.history.series.iter().map(|series| series.name.clone()).collect();
    let typed = typed_factors(request.inputs, &columns, request.model)?;
    let days_per_year = request.model.days_per_year;
    let history = history_for(request.history, request.fit, &typed)?;
    let fit = Fit::estimated(&history, request.fit, days_per_year, &typed)?;
    let fitted = fit.taken(&typed, columns.clone(), request.fit, days_per_year);
    let typed = draw::held_kinds(typed, &fit);
    let mut base = Base { request, typed, columns, fitted, losses: Losses::new() };
    base.losses = base.losses_under(&base.fitted)?;
    let simulator = Simulator::of(history, &fit, &base.fitted, days_per_year);
    let done = AtomicUsize::new(0);
    let draws: Result<Vec<Draw>, RangeError> = (0..request.draws)
        .into_par_iter()
        .map(|number| {
            if watcher.is_stopped() {
                return Err(SimulateError::Stopped.into());
            }
            let draw = base.draw(&simulator.history(request.seed, number as u32));
            watcher.progress(1 + done.fetch_add(1, Ordering::Relaxed));
            draw
        })
        .collect();
    let draws = draws?;
    Ok(ParameterRange {
        draws: draws.len(),
        refused: draws.iter().map(|draw| draw.refused).sum(),
        loss: rows(&base, &draws, reading),
        most_from: shares::most_from(&base, &draws)?,
    })
}

impl Base<'_> {
    /// Losses of the book under some fitted figures, on the common random numbers.
    fn losses_under(&self, fitted: &Fitted) -> Result<Losses, RangeError> {
        let request = &self.request;
        let model = Model::assemble_fitted(request.inputs, Some(fitted), request.model)?;
        let values = values_in_one_step(&model, request.day, request.paths, request.seed)?;
        let reference = match request.conventions.loss_from {
            LossFrom::Today => model.value,
            LossFrom::Mean => exact_moments(&model, request.day).mean,
        };
        let losses: Vec<f64> = values.iter().map(|value| reference - value).collect();
        Ok(tail(losses, &request.conventions.confidences))
    }
}

fn tail(losses: Vec<f64>, confidences: &[Confidence]) -> Losses {
    let n = losses.len();
    let lowest = confidences.iter().map(|level| level.rank(n)).min().unwrap_or(n);
    let tail = UpperTail::from_rank(losses, lowest);
    let of = |level: &Confidence| {
        let rank = level.rank(n);
        let beyond = tail.mean_beyond(rank, level.tail_count(n)).map(|estimate| estimate.value);
        Some((tail.order_statistic(rank)?, beyond?))
    };
    confidences.iter().filter_map(of).collect()
}

fn rows(base: &Base<'_>, draws: &[Draw], reading: &[(f64, f64)]) -> Vec<ParameterRow> {
    let confidences = base.request.conventions.confidences.iter();
    let ends = |at: usize, of: fn(&(f64, f64)) -> f64| {
        let gaps: Vec<f64> = draws.iter().map(|draw| of(&draw.losses[at]) - of(&base.losses[at])).collect();
        [0.025, 0.975].map(|share| of(&reading[at]) + quantile(&gaps, share))
    };
    let row = |(at, confidence): (usize, &Confidence)| {
        let ([var_low, var_high], [es_low, es_high]) = (ends(at, |loss| loss.0), ends(at, |loss| loss.1));
        ParameterRow { confidence: confidence.value(), var_low, var_high, es_low, es_high }
    };
    confidences.enumerate().map(row).collect()
}

/// Quantile of a sample, between its order statistics in a straight line; 0 of an empty one.
fn quantile(sample: &[f64], share: f64) -> f64 {
    let mut sorted = sample.to_vec();
    sorted.sort_unstable_by(f64::total_cmp);
    let place = share * (sorted.len().max(1) - 1) as f64;
    let (low, part) = (place.floor() as usize, place.fract());
    match (sorted.get(low), sorted.get(low + 1)) {
        (Some(low), Some(high)) => low + part * (high - low),
        (Some(only), None) => *only,
        _ => 0.0,
    }
}
