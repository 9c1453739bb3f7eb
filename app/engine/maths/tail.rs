//! The largest values of a sample: order statistics, the mean beyond one, and how sure both are.

use super::Estimate;

/// Standard normal quantile of the two-sided 95 % range, as common practice rounds it.
pub const TWO_SIDED_95: f64 = 1.96;

/// The largest values of a sample, in descending order.
#[derive(Debug, Clone, PartialEq)]
pub struct UpperTail {
    sample_size: usize,
    largest: Vec<f64>,
}

impl UpperTail {
    /// Keeps the values from the ascending rank `lowest_rank` (1 or more) up. The rest is not sorted.
    pub fn from_rank(mut sample: Vec<f64>, lowest_rank: usize) -> Self {
        let sample_size = sample.len();
        let below = lowest_rank.saturating_sub(1).min(sample_size.saturating_sub(1));
        if below > 0 {
            sample.select_nth_unstable_by(below, f64::total_cmp);
        }
        let mut largest = sample.split_off(below);
        largest.sort_unstable_by(|left, right| right.total_cmp(left));
        Self { sample_size, largest }
    }

    /// Number of values in the whole sample.
    pub fn sample_size(&self) -> usize {
        self.sample_size
    }

    /// The value of ascending `rank`, 1 to the sample size; none for a rank that was not kept.
    pub fn order_statistic(&self, rank: usize) -> Option<f64> {
        self.largest.get(self.sample_size.checked_sub(rank)?).copied()
    }

    /// The mean of the largest `count` values, with its error; `count` need not be whole, and ends inside the order
    /// statistic `v` of ascending `rank`, so that `rank = sample size - floor(count)`:
    ///
    /// ```text
    /// mean = v + (1/count) sum of (x - v)^+          (the atom at v is split, and the mean never falls below v)
    /// SE^2 = Var((x - v)^+) n / count^2
    /// ```
    ///
    /// None where the rank was not kept. Sources: Acerbi and Tasche, On the coherence of expected shortfall, J. Banking
    /// and Finance 26 (2002); Manistre and Hancock, Variance of the CTE estimator, North American Actuarial J. 9
    /// (2005); both from memory.
    pub fn mean_beyond(&self, rank: usize, count: f64) -> Option<Estimate> {
        let edge = self.order_statistic(rank)?;
        let n = self.sample_size as f64;
        let (mut excess, mut square) = (0.0, 0.0);
        for value in &self.largest[..self.sample_size - rank] {
            excess += value - edge;
            square += (value - edge) * (value - edge);
        }
        let variance = (square / n - (excess / n) * (excess / n)).max(0.0);
        Some(Estimate { value: edge + excess / count, standard_error: (variance * n).sqrt() / count })
    }
}
