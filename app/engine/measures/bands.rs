//! Bands of the book's value and of its largest fall, day by day, from paths. What lies on one day alone is read next door.

use crate::simulate::Run;
use rayon::prelude::*;

/// Levels of the bands of value, per cent.
pub const VALUE_PERCENTS: [u32; 7] = [1, 5, 25, 50, 75, 95, 99];
/// Levels of the bands of the largest fall, per cent.
pub const FALL_PERCENTS: [u32; 5] = [50, 75, 90, 95, 99];

/// Quantiles per day, money of the book's currency.
#[derive(Debug, Clone, PartialEq)]
pub struct Bands {
    /// Days, ascending.
    pub days: Vec<u32>,
    /// Book value at [`VALUE_PERCENTS`], per day.
    pub values: Vec<[f64; 7]>,
    /// Largest fall from a running peak at [`FALL_PERCENTS`], per day.
    pub falls: Vec<[f64; 5]>,
    /// Whether they come from the closed form instead of paths.
    pub is_closed_form: bool,
}

/// Bands of a run on those of `days` that it kept; none before its first paths. The lower bands of value are today's
/// value less VaR at 99 and 95 %, to the last digit. Days are worked in parallel on the caller's pool.
pub fn bands(run: &Run, days: &[u32]) -> Bands {
    let rows: Vec<_> = days
        .par_iter()
        .filter_map(|day| {
            let (values, falls) = (run.values(*day)?, run.falls(*day)?);
            let value_ranks = VALUE_PERCENTS.map(|percent| rank_from_nearer_end(values.len(), percent));
            let fall_ranks = FALL_PERCENTS.map(|percent| rank_from_nearer_end(falls.len(), percent));
            let is_empty = values.is_empty();
            (!is_empty).then(|| (*day, at_ranks(values, value_ranks), at_ranks(falls, fall_ranks)))
        })
        .collect();
    Bands {
        days: rows.iter().map(|row| row.0).collect(),
        values: rows.iter().map(|row| row.1).collect(),
        falls: rows.iter().map(|row| row.2).collect(),
        is_closed_form: false,
    }
}

/// Ascending rank, from 0, of the quantile: `ceil(n p)`-th smallest above the median, `ceil(n (1 - p))`-th largest below,
/// so that a band of values lies where the VaR of the same confidence does.
fn rank_from_nearer_end(n: usize, percent: u32) -> usize {
    let rank = |percent: u32| (n * percent as usize).div_ceil(100);
    if percent < 50 { n - rank(100 - percent) } else { rank(percent) - 1 }
}

/// Values at ascending ranks: each selection works only on what lies above the one before.
fn at_ranks<const N: usize>(mut sample: Vec<f64>, ranks: [usize; N]) -> [f64; N] {
    let mut found = 0;
    ranks.map(|rank| {
        let rest = &mut sample[found..];
        let value = *rest.select_nth_unstable_by(rank - found, f64::total_cmp).1;
        found = rank;
        value
    })
}
