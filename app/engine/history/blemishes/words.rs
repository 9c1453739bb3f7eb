//! Blemishes in words: what was found, and what it does to the figures where it stays as it is.

use super::{Blemish, BlemishKind, Jump};

impl Blemish {
    /// What it is and what it would do, in sentences that follow its place.
    pub fn words(&self) -> String {
        let date = self.date;
        match self.kind {
            BlemishKind::Weekends { count, rows, rows_per_year, days_per_year } => {
                weekends(count, rows, rows_per_year, days_per_year)
            }
            BlemishKind::Pause { count, from, days } => {
                let others =
                    if count == 1 { String::new() } else { format!(" ({count} such pauses in all)") };
                format!(
                    "no row between {from} and {date}, {days} days{others}. It counts as one trading day, so all that moved \
                     in it raises the volatility; begin the history after it if that is wrong."
                )
            }
            BlemishKind::TooFew { values } => {
                let found =
                    if values == 0 { "no value".to_owned() } else { format!("one value only, on {date}") };
                format!("{found}. Nothing can be fitted.")
            }
            BlemishKind::Constant { value } => {
                format!("{value} on every date. Its volatility would be 0 and its correlations undefined.")
            }
            BlemishKind::LateStart { missing, rows } => format!(
                "its first value is on {date}, with {missing} of {rows} rows before it. It is fitted on fewer dates than \
                 others, and correlations on common dates start with it, for all factors."
            ),
            BlemishKind::EarlyEnd { missing } => format!(
                "its last value is on {date}, {} before the history's last. Its level is as old as that where no other is \
                 given, and correlations on common dates end with it, for all factors.",
                counted(missing, "row")
            ),
            BlemishKind::Blanks { count, longest } => format!(
                "{} between its first and last value, {longest} in a row at most. A change over them counts with the time \
                 it took; correlations on common dates lose these rows, for all factors.",
                counted(count, "blank cell")
            ),
            BlemishKind::NotPositive { count, first } => format!(
                "{} of 0 or less, first {first} on {date}. The log diffusions can't be fitted, only reverting-level.",
                counted(count, "value")
            ),
            BlemishKind::Stale { unchanged, changes, longest } => stale(unchanged, changes, longest, date),
            BlemishKind::Split { jump, ratio: (new, old) } => format!(
                "{} looks like a split {new}:{old} that older prices are not adjusted for: check it. {}; a move of the \
                 market is no mistake.",
                went(jump),
                raised(jump)
            ),
            BlemishKind::OtherUnit { jump, factor } => format!(
                "{} is a factor of about {factor} and looks like another unit or a large split: check it. {}; a move of \
                 the market is no mistake.",
                went(jump),
                raised(jump)
            ),
            BlemishKind::Spike { jump, after } => format!(
                "{}, and then {after}, looks like a slip: check it. {}, and reversion comes out too fast.",
                went(jump),
                raised(jump)
            ),
        }
    }
}

fn weekends(count: usize, rows: usize, rows_per_year: f64, days_per_year: f64) -> String {
    const MUCH: f64 = 1.05;
    let found = format!("{count} of {rows} dates are weekends, with {days_per_year} trading days a year.");
    if rows_per_year < MUCH * days_per_year {
        return format!("{found} Each counts as a trading day; check whether they are slips of the date.");
    }
    let low = 1.0 - (days_per_year / rows_per_year).sqrt();
    format!(
        "{found} The rows are {rows_per_year:.0} a year, so volatilities come out {} too low; set that many days a year.",
        percent(low)
    )
}

/// Correlation that is lost where a price stands still with probability `p` a day and catches up later:
/// over h days `p (1 - p^h) / (h (1 - p))` of it; derived.
fn stale(unchanged: usize, changes: usize, longest: usize, date: jiff::civil::Date) -> String {
    const DAYS: i32 = 5;
    let share = unchanged as f64 / changes as f64;
    let lost_over_days = share * (1.0 - share.powi(DAYS)) / (f64::from(DAYS) * (1.0 - share));
    format!(
        "{unchanged} of {changes} values repeat the one before, {longest} in a row at most, from {date} on. If they are \
         old prices, its correlations come out {} too near 0 ({} on {DAYS}-day changes); its volatility stays about right.",
        percent(share),
        percent(lost_over_days)
    )
}

fn went(jump: Jump) -> String {
    format!("{} after {}", jump.to, jump.from)
}

fn raised(jump: Jump) -> String {
    let ratio = jump.volatility_ratio;
    let by = if ratio < 2.0 {
        format!("raises the volatility by {}", percent(ratio - 1.0))
    } else {
        format!("makes the volatility {ratio:.1} times as large")
    };
    format!("As it stands it {by}")
}

fn counted(count: usize, what: &str) -> String {
    if count == 1 { format!("1 {what}") } else { format!("{count} {what}s") }
}

/// Whole percent from 1 % on, one digit below.
fn percent(fraction: f64) -> String {
    let digits = usize::from(fraction < 0.01);
    format!("{:.digits$} %", 100.0 * fraction)
}
