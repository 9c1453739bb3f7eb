//! What looks odd about the dates of all series: weekends and long pauses.

use super::{Blemish, BlemishKind, at};
use crate::history::{History, Spacing};
use jiff::civil::{Date, Weekday};

/// A year has at most so many days that are no weekend.
const WEEKDAYS_PER_YEAR: f64 = 262.0;
const CALENDAR_DAYS_PER_YEAR: f64 = 365.25;
/// Calendar days that holidays leave between two trading days at most; common practice.
const LONGEST_HOLIDAYS: i32 = 10;

pub(super) fn blemishes(history: &History, spacing: Spacing, days_per_year: f64) -> Vec<Blemish> {
    if spacing.row_days() != Some(1) {
        return Vec::new();
    }
    [weekends(history, days_per_year), pause(history)].into_iter().flatten().collect()
}

fn weekends(history: &History, days_per_year: f64) -> Option<Blemish> {
    let is_weekend = |date: &Date| matches!(date.weekday(), Weekday::Saturday | Weekday::Sunday);
    let first = history.dates.iter().position(is_weekend).filter(|_| days_per_year <= WEEKDAYS_PER_YEAR)?;
    let count = history.dates.iter().filter(|date| is_weekend(date)).count();
    let rows = history.dates.len();
    let days = gap(history, 0, rows - 1);
    let rows_per_year = (rows - 1) as f64 / f64::from(days.max(1)) * CALENDAR_DAYS_PER_YEAR;
    Some(at(history, first, None, BlemishKind::Weekends { count, rows, rows_per_year, days_per_year }))
}

fn pause(history: &History) -> Option<Blemish> {
    let is_pause = |row: &usize| gap(history, row - 1, *row) > LONGEST_HOLIDAYS;
    let pauses: Vec<usize> = (1..history.dates.len()).filter(is_pause).collect();
    let longest = pauses.iter().copied().max_by_key(|row| gap(history, row - 1, *row))?;
    let (from, days) = (history.dates[longest - 1], gap(history, longest - 1, longest));
    Some(at(history, longest, None, BlemishKind::Pause { count: pauses.len(), from, days }))
}

fn gap(history: &History, earlier: usize, later: usize) -> i32 {
    (history.dates[later] - history.dates[earlier]).get_days()
}
