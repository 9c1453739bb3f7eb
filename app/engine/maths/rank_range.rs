//! Ranks between whose order statistics a quantile lies with a given probability, whatever the distribution.

/// Ascending ranks, 1 to n; none where the sample is too small for that end.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub struct RankRange {
    /// Rank of the lower end.
    pub low: Option<usize>,
    /// Rank of the upper end.
    pub high: Option<usize>,
}

/// The narrowest ranks `low < high` of a sample of `n` with
///
/// ```text
/// P(B <= low - 1) <= miss   and   P(B >= high) <= miss,   B ~ Binomial(n, p)
/// ```
///
/// so that the `p` quantile, 0 < p < 1, lies below the one or above the other order statistic with at most `miss`
/// each. Exact: the binomial weights are summed from the far tails inwards, by the ratio of neighbours.
/// Source: David and Nagaraja, Order Statistics, section 7.1 (from memory).
pub fn rank_range(n: usize, p: f64, miss: f64) -> RankRange {
    let (first, weights) = binomial_weights(n, p);
    let total: f64 = weights.iter().sum();
    let allowed = miss * total;
    // A tail that begins inside the weights is short of those left out, which are below any rounding.
    let low = first + count_within(weights.iter(), allowed);
    let high = first + weights.len() - count_within(weights.iter().rev(), allowed);
    RankRange { low: (low >= 1).then_some(low), high: (high <= n).then_some(high) }
}

/// How many weights from the tail inwards add up to no more than `allowed`.
fn count_within<'a>(weights: impl Iterator<Item = &'a f64>, allowed: f64) -> usize {
    let sums = weights.scan(0.0, |sum, weight| {
        *sum += weight;
        Some(*sum)
    });
    sums.take_while(|sum| *sum <= allowed).count()
}

/// Binomial probabilities up to a common factor, those that matter, and the outcome of the first.
fn binomial_weights(n: usize, p: f64) -> (usize, Vec<f64>) {
    const NEGLIGIBLE: f64 = 1e-20;
    let mode = (((n + 1) as f64 * p) as usize).min(n);
    let odds = p / (1.0 - p);
    let down = (1..=mode).rev().scan(1.0, |weight, k| {
        *weight *= k as f64 / ((n - k + 1) as f64 * odds);
        (*weight > NEGLIGIBLE).then_some(*weight)
    });
    let mut weights: Vec<f64> = down.collect();
    let first = mode - weights.len();
    weights.reverse();
    weights.push(1.0);
    let up = (mode..n).scan(1.0, |weight, k| {
        *weight *= (n - k) as f64 * odds / (k + 1) as f64;
        (*weight > NEGLIGIBLE).then_some(*weight)
    });
    weights.extend(up);
    (first, weights)
}
