//! Variance ratios: how the spread of changes grows with their span, against the straight line of a random walk.

use super::ObservedPath;
use serde::Serialize;

/// Spans looked at, rows.
const SPANS: [usize; 5] = [2, 5, 10, 21, 63];

/// Variance of changes over a span, per row, over that of changes over one row: 1 for a random walk, below for a
/// reverting path.
///
/// Source: Lo and MacKinlay (1988), Review of Financial Studies 1: overlapping spans, both variances unbiased.
#[derive(Debug, Clone, Copy, PartialEq, Serialize)]
pub struct VarianceRatio {
    /// Rows that a change spans.
    pub span: usize,
    /// The ratio.
    pub ratio: f64,
    /// Standard normal under a random walk of equal variances: `sqrt(T) (VR - 1) / sqrt(2 (2q - 1) (q - 1) / (3q))`.
    pub z: f64,
    /// Standard normal under a random walk whose variance may change.
    #[serde(skip)]
    pub robust_z: f64,
}

/// Ratios at the spans of 2, 5, 10, 21 and 63 rows that fit at least twice into the path; none where nothing moves.
pub(super) fn variance_ratios(path: &ObservedPath) -> Vec<VarianceRatio> {
    let rows = path.steps.count();
    let spans: Vec<usize> = SPANS.into_iter().filter(|span| 2 * span <= rows).collect();
    let mean = path.changes().sum::<f64>() / rows.max(1) as f64;
    let squares: Vec<f64> = path.changes().map(|change| (change - mean).powi(2)).collect();
    let total: f64 = squares.iter().sum();
    if !(total > 0.0 && total.is_finite()) {
        return Vec::new();
    }
    let longest = spans.last().copied().unwrap_or(0);
    let deltas: Vec<f64> = (1..longest).map(|lag| delta(&squares, total, lag)).collect();
    spans.into_iter().map(|span| ratio(&path.values, span, mean, total, &deltas)).collect()
}

/// `T sum e_t^2 e_{t-j}^2 / (sum e_t^2)^2`: T times the variance of the autocorrelation at a lag.
fn delta(squares: &[f64], total: f64, lag: usize) -> f64 {
    let products: f64 =
        squares.iter().zip(&squares[lag..]).map(|(early, late)| (early / total) * (late / total)).sum();
    squares.len() as f64 * products
}

fn ratio(values: &[f64], span: usize, mean: f64, total: f64, deltas: &[f64]) -> VarianceRatio {
    let (rows, q) = ((values.len() - 1) as f64, span as f64);
    let long: f64 = values.iter().zip(&values[span..]).map(|(from, to)| (to - from - q * mean).powi(2)).sum();
    let long_variance = long / (q * (rows - q + 1.0) * (1.0 - q / rows));
    let ratio = long_variance / (total / (rows - 1.0));
    let plain = 2.0 * (2.0 * q - 1.0) * (q - 1.0) / (3.0 * q);
    let robust: f64 = deltas[..span - 1]
        .iter()
        .enumerate()
        .map(|(at, delta)| (2.0 * (q - (at + 1) as f64) / q).powi(2) * delta)
        .sum();
    let z = |variance: f64| rows.sqrt() * (ratio - 1.0) / variance.sqrt();
    VarianceRatio { span, ratio, z: z(plain), robust_z: z(robust) }
}
