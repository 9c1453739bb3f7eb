//! How much time lies between two rows. Weekends and holidays take no time in a daily history; elsewhere the calendar counts.

use super::History;
use jiff::civil::Date;

/// A year of the calendar, leap years among them.
const CALENDAR_DAYS_PER_YEAR: f64 = 365.25;
/// The widest median gap of a history whose rows are trading days.
const WIDEST_DAILY_GAP: i32 = 4;

/// What a row stands for in time.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum Spacing {
    /// Every row is one trading day, however many calendar days lie between.
    TradingDay,
    /// Every row is so many trading days, at least one.
    TradingDays(u32),
    /// Time between rows is that of the calendar.
    CalendarDays,
}

impl Spacing {
    /// What was said (`row_days` trading days a row); else trading days where the median gap between dates is at most four
    /// calendar days, and the calendar where it is more. A history without a gap is taken as daily.
    pub fn of(history: &History, row_days: Option<u32>) -> Self {
        match row_days {
            Some(days) => Self::TradingDays(days.max(1)),
            None if has_daily_rows(history) => Self::TradingDay,
            None => Self::CalendarDays,
        }
    }

    /// Trading days that a row stands for; none where time is that of the calendar.
    pub fn row_days(self) -> Option<u32> {
        match self {
            Self::TradingDay => Some(1),
            Self::TradingDays(days) => Some(days),
            Self::CalendarDays => None,
        }
    }

    /// Time from one row to a later one: rows in a daily history, so that a gap in a column counts as the rows it spans;
    /// else calendar days. 0 for rows in any other order.
    pub fn units_between(self, history: &History, earlier: usize, later: usize) -> u32 {
        let units = match self {
            Self::TradingDay | Self::TradingDays(_) => later.checked_sub(earlier).map(u32::try_from),
            Self::CalendarDays => Some(u32::try_from(calendar_days(&history.dates, earlier, later))),
        };
        units.and_then(Result::ok).unwrap_or(0)
    }

    /// Length of a unit in years of `days_per_year` trading days.
    pub fn years_per_unit(self, days_per_year: f64) -> f64 {
        match self {
            Self::TradingDay => 1.0 / days_per_year,
            Self::TradingDays(days) => f64::from(days) / days_per_year,
            Self::CalendarDays => 1.0 / CALENDAR_DAYS_PER_YEAR,
        }
    }
}

/// Whether the median gap is at most [`WIDEST_DAILY_GAP`]; of an even number of gaps the mean of the middle two counts.
fn has_daily_rows(history: &History) -> bool {
    let dates = &history.dates;
    let mut gaps: Vec<i32> = (1..dates.len()).map(|row| calendar_days(dates, row - 1, row)).collect();
    gaps.sort_unstable();
    let Some(upper) = gaps.get(gaps.len() / 2) else { return true };
    let lower = gaps[(gaps.len() - 1) / 2];
    lower + upper <= 2 * WIDEST_DAILY_GAP
}

fn calendar_days(dates: &[Date], earlier: usize, later: usize) -> i32 {
    (dates[later] - dates[earlier]).get_days()
}
