//! Mean, standard deviation and skewness of a sample with their standard errors, in two passes and a fixed order.

use super::Estimate;

/// Groups of a sample from whose own skewness the error of the whole's is read.
const SKEWNESS_GROUPS: usize = 25;

/// Sampled moments. Divisor n throughout: these are the moments of the sample itself.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct SampleMoments {
    /// Mean; its error is `sd / sqrt(n)`.
    pub mean: Estimate,
    /// Standard deviation; its error is `sqrt((m4 - sd^4) / (4 sd^2 n))`, 0 at sd 0.
    pub sd: Estimate,
    /// `m3 / sd^3`; none at sd 0.
    pub skewness: Option<f64>,
    /// One standard error of the skewness, from 25 consecutive groups of the sample; none where a group has an sd of 0.
    pub skewness_error: Option<f64>,
}

/// Moments of a sample. One of equal values has an sd of exactly 0; an empty one has moments of 0.
pub fn sample_moments(sample: &[f64]) -> SampleMoments {
    let n = count(sample);
    let (mean, [m2, m3, m4]) = central_moments(sample);
    let sd = m2.sqrt();
    let sd_error = if sd > 0.0 { ((m4 - m2 * m2).max(0.0) / (4.0 * m2 * n)).sqrt() } else { 0.0 };
    SampleMoments {
        mean: Estimate { value: mean, standard_error: sd / n.sqrt() },
        sd: Estimate { value: sd, standard_error: sd_error },
        skewness: (sd > 0.0).then(|| m3 / (m2 * sd)),
        skewness_error: skewness_error(sample),
    }
}

/// Mean, and second to fourth central moments. Deviations are taken from the first value before the mean is known, so
/// that nothing is lost to a large common part.
fn central_moments(sample: &[f64]) -> (f64, [f64; 3]) {
    let pivot = sample.first().copied().unwrap_or(0.0);
    let n = count(sample);
    let shift = sample.iter().map(|value| value - pivot).sum::<f64>() / n;
    let mut sums = [0.0; 3];
    for value in sample {
        let deviation = (value - pivot) - shift;
        let square = deviation * deviation;
        sums[0] += square;
        sums[1] += square * deviation;
        sums[2] += square * square;
    }
    (pivot + shift, sums.map(|sum| sum / n))
}

/// Number of values, 1 for an empty sample.
fn count(sample: &[f64]) -> f64 {
    sample.len().max(1) as f64
}

/// Standard deviation of the groups' skewness over the root of their number; none where a group has no skewness.
fn skewness_error(sample: &[f64]) -> Option<f64> {
    let edge = |group: usize| group * sample.len() / SKEWNESS_GROUPS;
    let skews: Option<Vec<f64>> = (0..SKEWNESS_GROUPS)
        .map(|group| {
            let (_, [m2, m3, _]) = central_moments(&sample[edge(group)..edge(group + 1)]);
            (m2 > 0.0).then(|| m3 / (m2 * m2.sqrt()))
        })
        .collect();
    let (_, [variance, ..]) = central_moments(&skews?);
    Some((variance / (SKEWNESS_GROUPS as f64 - 1.0)).sqrt())
}
