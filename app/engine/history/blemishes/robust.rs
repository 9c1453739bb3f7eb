//! A spread of changes that a few wild ones do not move.

/// Standard deviation of a normal law over the median of its absolute value.
const NORMAL_PER_MEDIAN: f64 = 1.4826;

/// `1.4826 x` the median of the absolute changes that are not 0: the standard deviation where they are normal about 0,
/// whatever stands in the tails. Repeated values are left out, lest they hide everything else. 0 without a change.
///
/// Source: the median absolute deviation of Hampel (1974), J. American Statistical Association 69, here about 0.
pub(super) fn spread(changes: impl Iterator<Item = f64>) -> f64 {
    let mut sizes: Vec<f64> = changes.map(f64::abs).filter(|size| *size > 0.0).collect();
    if sizes.is_empty() {
        return 0.0;
    }
    let middle = sizes.len() / 2;
    NORMAL_PER_MEDIAN * *sizes.select_nth_unstable_by(middle, f64::total_cmp).1
}
