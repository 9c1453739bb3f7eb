//! Changes far larger than most: gone again on the next row, or by a ratio that splits and mistaken units have. A jump that is
//! neither is a move of the market as far as anyone can tell, and is not told.

use super::robust::spread;
use super::{Blemish, BlemishKind, Column, Jump};

/// A change is looked at from so many robust standard deviations on, those of the whole series and of the rows around it:
/// a wild time has wild moves. Common practice is five to ten.
const FAR_OUT: f64 = 8.0;
/// How near a ratio, or how completely gone again, counted in the same deviations: what the market did on that day besides.
const NEAR: f64 = 4.0;
/// Rows on each side that are the time around a change.
const AROUND: usize = 20;
/// Rows after a jump that show whether the level stays.
const AFTER: usize = 5;
/// With fewer changes nothing can be called usual.
const FEWEST_CHANGES: usize = 20;
/// New shares for old ones, in the order of their use.
const SPLITS: [(u32, u32); 7] = [(2, 1), (3, 1), (3, 2), (4, 1), (5, 1), (7, 1), (20, 1)];
/// A level in another unit: percent for fractions, basis points for percent, cents for dollars.
const UNITS: [u32; 3] = [10, 100, 1000];

pub(super) fn blemishes(column: &Column<'_>) -> Vec<Blemish> {
    let changes = Changes::of(column);
    if changes.sizes.len() < FEWEST_CHANGES || changes.spread == 0.0 {
        return Vec::new();
    }
    let mut found = Vec::new();
    let mut at = 0;
    while at < changes.sizes.len() {
        let told =
            changes.spike(at).map(|kind| (kind, 2)).or_else(|| changes.shift(at).map(|kind| (kind, 1)));
        if let Some((kind, _)) = told {
            found.push(column.blemish(column.quoted[at + 1].0, kind));
        }
        at += told.map_or(1, |(_, changes)| changes);
    }
    found
}

/// Changes from value to value, of the log where all are positive, each over the square root of the time it took.
struct Changes<'a> {
    quoted: &'a [(usize, f64)],
    are_logs: bool,
    sizes: Vec<f64>,
    spread: f64,
    sum_of_squares: f64,
}

impl<'a> Changes<'a> {
    fn of(column: &'a Column<'_>) -> Self {
        let quoted = column.quoted.as_slice();
        let are_logs = quoted.iter().all(|(_, value)| *value > 0.0);
        let variable = |value: f64| if are_logs { value.ln() } else { value };
        let sizes: Vec<f64> = quoted
            .windows(2)
            .map(|pair| {
                let units = column.spacing.units_between(column.history, pair[0].0, pair[1].0).max(1);
                (variable(pair[1].1) - variable(pair[0].1)) / f64::from(units).sqrt()
            })
            .collect();
        let spread = spread(sizes.iter().copied());
        let sum_of_squares = sizes.iter().map(|size| size * size).sum();
        Self { quoted, are_logs, sizes, spread, sum_of_squares }
    }

    /// The usual size of a change at that time, where the change is far beyond it.
    fn usual_if_far(&self, at: usize) -> Option<f64> {
        let size = self.sizes[at].abs();
        if size <= FAR_OUT * self.spread {
            return None;
        }
        let before = &self.sizes[at.saturating_sub(AROUND)..at];
        let after = self.sizes.get(at + 2..).unwrap_or_default();
        let around = before.iter().chain(after.iter().take(AROUND)).copied();
        let usual = spread(around).max(self.spread);
        (size > FAR_OUT * usual).then_some(usual)
    }

    /// A value that the next row takes back.
    fn spike(&self, at: usize) -> Option<BlemishKind> {
        let back = *self.sizes.get(at + 1)?;
        let usual = self.usual_if_far(at)?;
        let is_back = (self.sizes[at] + back).abs() <= NEAR * usual;
        is_back.then(|| BlemishKind::Spike { jump: self.jump(at, 2), after: self.quoted[at + 2].1 })
    }

    /// A shift by the ratio of a split or of two units.
    fn shift(&self, at: usize) -> Option<BlemishKind> {
        let usual = self.usual_if_far(at).filter(|_| self.are_logs && self.stays(at))?;
        let log_ratio = (self.quoted[at].1 / self.quoted[at + 1].1).ln();
        let gap = |up: u32, down: u32| (log_ratio.abs() - (f64::from(up) / f64::from(down)).ln()).abs();
        let jump = self.jump(at, 1);
        if let Some(factor) = UNITS.into_iter().find(|factor| gap(*factor, 1) <= NEAR * usual) {
            return Some(BlemishKind::OtherUnit { jump, factor });
        }
        let nearest = SPLITS.into_iter().min_by(|one, two| gap(one.0, one.1).total_cmp(&gap(two.0, two.1)));
        let (new, old) = nearest.filter(|(new, old)| gap(*new, *old) <= NEAR * usual)?;
        Some(BlemishKind::Split { jump, ratio: if log_ratio > 0.0 { (new, old) } else { (old, new) } })
    }

    /// Whether the values after a change are nearer to where it went than to where it came from.
    fn stays(&self, at: usize) -> bool {
        let (from, to) = (self.quoted[at].1, self.quoted[at + 1].1);
        let after = self.quoted[at + 1..].iter().take(AFTER);
        let nearer = after.clone().filter(|(_, value)| (value / to).ln().abs() < (value / from).ln().abs());
        2 * nearer.count() > after.count()
    }

    /// What `count` changes from `at` on add to the volatility.
    fn jump(&self, at: usize, count: usize) -> Jump {
        let squares: f64 = self.sizes[at..at + count].iter().map(|size| size * size).sum();
        let (all, others) = (self.sizes.len() as f64, (self.sizes.len() - count) as f64);
        let without = (self.sum_of_squares - squares).max(0.0);
        let volatility_ratio = (self.sum_of_squares / all / (without / others)).sqrt();
        Jump { from: self.quoted[at].1, to: self.quoted[at + 1].1, volatility_ratio }
    }
}
