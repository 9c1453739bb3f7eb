//! Which rows of a series hold values that can be used: too few, late, early, blank, repeated, without a logarithm.

use super::robust::spread;
use super::{Blemish, BlemishKind, Column};
use std::f64::consts::PI;

/// Repeats are told from so many in a row, or from this share of the changes on; common practice.
const LEAST_RUN: usize = 5;
const LEAST_SHARE: f64 = 0.05;
/// A share of repeats is told where it is so many times what rounding explains.
const MORE: f64 = 2.0;

pub(super) fn blemishes(column: &Column<'_>) -> Vec<Blemish> {
    let (Some(first), Some(last)) = (column.quoted.first(), column.quoted.last()) else {
        return vec![column.blemish(0, BlemishKind::TooFew { values: 0 })];
    };
    if column.quoted.len() == 1 {
        return vec![column.blemish(first.0, BlemishKind::TooFew { values: 1 })];
    }
    let rows = column.history.dates.len();
    let late = BlemishKind::LateStart { missing: first.0, rows };
    let early = BlemishKind::EarlyEnd { missing: rows - 1 - last.0 };
    [
        (first.0 > 0).then(|| column.blemish(first.0, late)),
        (last.0 + 1 < rows).then(|| column.blemish(last.0, early)),
        blanks(column),
        not_positive(column),
        repeats(column),
    ]
    .into_iter()
    .flatten()
    .collect()
}

fn blanks(column: &Column<'_>) -> Option<Blemish> {
    let skipped = column.quoted.windows(2).map(|pair| (pair[1].0 - pair[0].0 - 1, pair[0].0 + 1));
    let count = skipped.clone().map(|(blanks, _)| blanks).sum();
    let (longest, row) = skipped.rev().max_by_key(|(blanks, _)| *blanks).filter(|(blanks, _)| *blanks > 0)?;
    Some(column.blemish(row, BlemishKind::Blanks { count, longest }))
}

fn not_positive(column: &Column<'_>) -> Option<Blemish> {
    let mut found = column.quoted.iter().filter(|(_, value)| *value <= 0.0);
    let (row, first) = *found.next()?;
    Some(column.blemish(row, BlemishKind::NotPositive { count: 1 + found.count(), first }))
}

fn repeats(column: &Column<'_>) -> Option<Blemish> {
    let (mut unchanged, mut run, mut longest, mut begin) = (0, 0, 0, 0);
    for (at, pair) in column.quoted.windows(2).enumerate() {
        let is_repeat = pair[0].1 == pair[1].1;
        run = if is_repeat { run + 1 } else { 0 };
        unchanged += usize::from(is_repeat);
        if run > longest {
            (longest, begin) = (run, at + 1 - run);
        }
    }
    let changes = column.quoted.len() - 1;
    let (row, value) = column.quoted[begin];
    if unchanged == changes {
        return Some(column.blemish(row, BlemishKind::Constant { value }));
    }
    let share = unchanged as f64 / changes as f64;
    let is_told = longest >= LEAST_RUN || share >= LEAST_SHARE && share > MORE * share_by_rounding(column);
    is_told.then(|| column.blemish(row, BlemishKind::Stale { unchanged, changes, longest }))
}

/// Share of changes that vanish where a normal change of standard deviation `s` is rounded to multiples of `d`, the
/// smallest change there is: about the density at 0 times `d`,
///
/// ```text
/// d / (s sqrt(2 pi))
/// ```
fn share_by_rounding(column: &Column<'_>) -> f64 {
    let changes = || column.quoted.windows(2).map(|pair| pair[1].1 - pair[0].1);
    let tick = changes().map(f64::abs).filter(|size| *size > 0.0).fold(f64::INFINITY, f64::min);
    tick / (spread(changes()) * (2.0 * PI).sqrt())
}
