//! Trading days: weekdays that are no holidays. Which holidays there are is the caller's to say; nothing here knows a
//! country or today's date.

use crate::tables::{Cells, Columns, Faults, Notice, Table};
use jiff::ToSpan;
use jiff::civil::{Date, Weekday};

/// Reads `holidays.csv`: one column, `date`. The days come back ascending, each once.
///
/// # Errors
/// Every cell that is empty or no date.
pub fn read_holidays(table: &Table) -> Result<(Vec<Date>, Vec<Notice>), Faults> {
    let columns = Columns::find(table, &["date"], &["date"])?;
    let mut faults = table.faults.clone();
    let mut days = Vec::new();
    for row in &table.rows {
        let mut cells = Cells::of(table, &columns, row, &mut faults);
        if cells.needed_text("date", "a date like 2026-03-31").is_some() {
            days.extend(cells.date("date"));
        }
    }
    days.sort_unstable();
    days.dedup();
    Faults::unless_any(faults, (days, columns.notice_of_unknown(table).into_iter().collect()))
}

/// The date that lies `trading_days` after `from`; `from` itself where that is 0. `holidays` ascending. None beyond the
/// last date of the calendar.
pub fn date_after(from: Date, trading_days: u32, holidays: &[Date]) -> Option<Date> {
    let mut date = from;
    let mut left = trading_days;
    while left > 0 {
        date = date.checked_add(1.day()).ok()?;
        left -= u32::from(is_trading_day(date, holidays));
    }
    Some(date)
}

fn is_trading_day(date: Date, holidays: &[Date]) -> bool {
    let is_weekend = matches!(date.weekday(), Weekday::Saturday | Weekday::Sunday);
    !is_weekend && holidays.binary_search(&date).is_err()
}
