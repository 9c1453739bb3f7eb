//! Reads a sample of paths: every figure of a `Reading` with its sampling error. What the figures are is said in
//! `reading`.

use super::reading::*;
use super::{Confidence, ExactMoments, exact_moments};
use crate::factors::Model;
use crate::maths::{Estimate, TWO_SIDED_95, UpperTail, rank_range, sample_moments};
use crate::simulate::DaySample;

/// Probability that a 95 % range misses on either side.
const MISS_EACH_SIDE: f64 = 0.025;

/// Everything read on the day of a sample.
///
/// - `var` is the `ceil(n c)`-th smallest loss; its range lies between order statistics by binomial ranks, whatever the
///   distribution. An end is none where the sample is too small for it (250 paths at 99 % have no upper end).
/// - `es` splits the atom at `var` (Acerbi and Tasche); its range is `es -/+ 1.96` standard errors (Manistre and
///   Hancock). Where `var` has no upper end the tail holds too few paths for an error: then `es` has no upper end
///   either, and its lower end is that of `var`, which no shortfall can lie below.
/// - Drawdowns likewise; without an upper end of `value`, `mean_beyond` has no error.
/// - Skewness is none where the exact or the sampled sd is 0. A moment too large for a double is none.
/// - `limit` is none without a limit, or where the run did not watch one.
pub fn reading(model: &Model, sample: &DaySample, conventions: &Conventions) -> Reading {
    let exact = exact_moments(model, sample.day);
    let reference = match conventions.loss_from {
        LossFrom::Today => model.value,
        LossFrom::Mean => exact.mean,
    };
    let losses = sample.values.iter().map(|value| reference - value).collect();
    Reading {
        moments: moments(&exact, &sample.values),
        loss: tail_rows(losses, &conventions.confidences).map(loss_row).collect(),
        drawdown: drawdown(&sample.falls, &conventions.confidences),
        limit: conventions.loss_limit.and_then(|limit| limit_reading(model.value, limit, sample)),
    }
}

fn moments(exact: &ExactMoments, values: &[f64]) -> MomentsReading {
    let sampled = sample_moments(values);
    let row = |exact: f64, sampled: Estimate| MomentRow {
        exact: finite(exact),
        sampled: finite(sampled.value),
        standard_error: finite(sampled.standard_error),
    };
    let has_shape = exact.sd > 0.0 && sampled.sd.value > 0.0;
    let shape = |figure: Option<f64>| figure.filter(|_| has_shape).and_then(finite);
    MomentsReading {
        mean: row(exact.mean, sampled.mean),
        sd: row(exact.sd, sampled.sd),
        skewness: MomentRow {
            exact: shape(exact.skewness),
            sampled: shape(sampled.skewness),
            standard_error: shape(sampled.skewness_error),
        },
        expected_change: exact.change,
    }
}

fn finite(figure: f64) -> Option<f64> {
    Some(figure).filter(|figure| figure.is_finite())
}

/// The upper tail of a column at one confidence: quantile, its range, and the mean beyond.
struct TailRow {
    confidence: Confidence,
    quantile: f64,
    low: Option<f64>,
    high: Option<f64>,
    beyond: Estimate,
}

/// One row a confidence, from one partial sort of the column.
fn tail_rows(column: Vec<f64>, confidences: &[Confidence]) -> impl Iterator<Item = TailRow> {
    let n = column.len();
    let ranks: Vec<_> =
        confidences.iter().map(|level| (*level, rank_range(n, level.value(), MISS_EACH_SIDE))).collect();
    let lowest = ranks.iter().map(|(level, range)| range.low.unwrap_or(n).min(level.rank(n))).min();
    let tail = UpperTail::from_rank(column, lowest.unwrap_or(n));
    ranks.into_iter().filter_map(move |(confidence, range)| {
        let rank = confidence.rank(n);
        Some(TailRow {
            confidence,
            quantile: tail.order_statistic(rank)?,
            low: range.low.and_then(|rank| tail.order_statistic(rank)),
            high: range.high.and_then(|rank| tail.order_statistic(rank)),
            beyond: tail.mean_beyond(rank, confidence.tail_count(n))?,
        })
    })
}

fn loss_row(row: TailRow) -> LossRow {
    let reach = TWO_SIDED_95 * row.beyond.standard_error;
    LossRow {
        confidence: row.confidence.value(),
        var: row.quantile,
        var_low: row.low,
        var_high: row.high,
        es: row.beyond.value,
        es_low: if row.high.is_some() { Some(row.beyond.value - reach) } else { row.low },
        es_high: row.high.map(|_| row.beyond.value + reach),
    }
}

fn drawdown(falls: &[f64], confidences: &[Confidence]) -> DrawdownReading {
    let mean = sample_moments(falls).mean;
    let rows = tail_rows(falls.to_vec(), confidences).map(|row| DrawdownRow {
        confidence: row.confidence.value(),
        value: row.quantile,
        value_low: row.low,
        value_high: row.high,
        mean_beyond: row.beyond.value,
        mean_beyond_error: row.high.map(|_| row.beyond.standard_error),
    });
    DrawdownReading { mean: mean.value, mean_error: mean.standard_error, quantiles: rows.collect() }
}

fn limit_reading(today: f64, limit: f64, sample: &DaySample) -> Option<LimitReading> {
    let touched = sample.touched?;
    let n = sample.values.len() as f64;
    let beyond = sample.values.iter().filter(|value| today - *value > limit).count() as f64 / n;
    Some(LimitReading {
        loss: limit,
        at_horizon: beyond,
        at_horizon_error: (beyond * (1.0 - beyond) / n).sqrt(),
        by_horizon: touched.value,
        by_horizon_error: touched.standard_error,
    })
}
