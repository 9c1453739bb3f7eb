//! What looks odd in a history, factor by factor, and what it would do to the figures. Nothing is repaired: the reader
//! decides, in the file.

use super::{History, Series, Spacing};
use crate::tables::{Notice, NoticeLevel};
use jiff::civil::Weekday;

/// A change this many robust standard deviations from the middle is looked at.
const FAR_OUT: f64 = 10.0;
/// Factors by which levels change when a unit is split or mistaken, larger over smaller.
const RATIOS: [(f64, &str); 8] = [
    (1.5, "a split 3 for 2"),
    (2.0, "a split 2 for 1"),
    (3.0, "a split 3 for 1"),
    (4.0, "a split 4 for 1"),
    (5.0, "a split 5 for 1"),
    (10.0, "a split 10 for 1 or another unit"),
    (100.0, "another unit (100 to 1)"),
    (1000.0, "another unit (1,000 to 1)"),
];
/// How near such a factor a change must be, in the log.
const NEAR: f64 = 0.1;
/// Repeated values are told from this share of the changes on, or from a run this long.
const LEAST_STALE_SHARE: f64 = 0.05;
const LEAST_STALE_RUN: usize = 5;
/// Calendar days without a row that are told where a row is a trading day.
const LONGEST_PAUSE_DAYS: i32 = 10;
/// Trading days in a year above which weekends are expected to be traded.
const WEEKDAYS_OF_YEAR: f64 = 262.0;

/// Something odd.
#[derive(Debug, Clone, PartialEq, Eq)]
pub struct Blemish {
    /// Factor; none where it concerns the dates of all.
    pub factor: Option<String>,
    /// What it is and what it would do, a whole sentence.
    pub text: String,
}

impl From<&Blemish> for Notice {
    fn from(blemish: &Blemish) -> Self {
        let lead = blemish.factor.as_ref().map(|factor| format!("{factor}: ")).unwrap_or_default();
        Self { level: NoticeLevel::Warning, text: format!("{lead}{}", blemish.text) }
    }
}

/// Everything odd in a history: of its dates first, then factor by factor.
pub fn blemishes(history: &History, spacing: Spacing, days_per_year: f64) -> Vec<Blemish> {
    let of_dates = [weekends(history, days_per_year), pause(history, spacing)].into_iter().flatten();
    let of_series = history.series.iter().flat_map(|series| {
        let told = [
            blanks(history, series),
            constant(series),
            not_positive(history, series),
            stale(history, series),
        ];
        let told = told.into_iter().flatten().chain(jumps(history, series));
        told.map(|text| Blemish { factor: Some(series.name.clone()), text })
    });
    of_dates.map(|text| Blemish { factor: None, text }).chain(of_series).collect()
}

fn weekends(history: &History, days_per_year: f64) -> Option<String> {
    let is_weekend =
        |date: &&jiff::civil::Date| matches!(date.weekday(), Weekday::Saturday | Weekday::Sunday);
    let mut weekends = history.dates.iter().filter(is_weekend);
    let first = weekends.next().filter(|_| days_per_year <= WEEKDAYS_OF_YEAR)?;
    Some(format!(
        "{} of {} dates are weekends, the first {first}, with {days_per_year} trading days a year: where every day counts, \
         volatilities are too low by a sixth; set 365 days a year (--days-per-year).",
        1 + weekends.count(),
        history.dates.len(),
    ))
}

fn pause(history: &History, spacing: Spacing) -> Option<String> {
    spacing.row_days()?;
    let gaps = history.dates.windows(2).map(|two| ((two[1] - two[0]).get_days(), two[0], two[1]));
    let (days, from, to) = gaps.max_by_key(|(days, ..)| *days)?;
    let is_daily = spacing.row_days() == Some(1);
    (is_daily && days > LONGEST_PAUSE_DAYS).then(|| {
        format!(
            "No row between {from} and {to}: these {days} days count as one trading day, and what happened in them as one \
             day's change."
        )
    })
}

fn blanks(history: &History, series: &Series) -> Option<String> {
    let values = &series.values;
    let Some(first) = values.iter().position(Option::is_some) else {
        return Some("no value in these dates: nothing can be fitted.".to_owned());
    };
    let last = values.iter().rposition(Option::is_some).unwrap_or(first);
    let inside = values[first..=last].iter().filter(|value| value.is_none()).count();
    let late = (first > 0).then(|| format!("starts on {}", history.dates[first]));
    let early = (last + 1 < values.len()).then(|| format!("ends on {}", history.dates[last]));
    let gaps = (inside > 0).then(|| {
        let longest = values[first..=last].split(Option::is_some).map(<[_]>::len).max().unwrap_or(0);
        format!("{inside} blank between its first and last value, {longest} in a row at most")
    });
    let parts: Vec<String> = [late, early, gaps].into_iter().flatten().collect();
    (!parts.is_empty()).then(|| {
        format!(
            "{}; changes over blanks count with their length, and correlations on common dates lose them.",
            parts.join(", ")
        )
    })
}

fn constant(series: &Series) -> Option<String> {
    let mut values = series.values.iter().flatten();
    let first = values.next()?;
    let count = 1 + series.values.iter().flatten().skip(1).count();
    (count > 1 && values.all(|value| value == first))
        .then(|| format!("{first} on every date: without a change nothing can be fitted."))
}

fn not_positive(history: &History, series: &Series) -> Option<String> {
    let mut bad =
        series.values.iter().zip(&history.dates).filter(|(value, _)| value.is_some_and(|value| value <= 0.0));
    let (_, first) = bad.next()?;
    Some(format!(
        "{} values are zero or negative, the first on {first}: only reverting-level can be fitted, in the level's own units.",
        1 + bad.count()
    ))
}

fn stale(history: &History, series: &Series) -> Option<String> {
    let quoted: Vec<(usize, f64)> = series.quoted().collect();
    let repeats: Vec<bool> = quoted.windows(2).map(|two| two[0].1 == two[1].1).collect();
    let count = repeats.iter().filter(|is_repeat| **is_repeat).count();
    if count == repeats.len() {
        return None;
    }
    let (mut longest, mut end, mut run) = (0, 0, 0);
    for (at, is_repeat) in repeats.iter().enumerate() {
        run = if *is_repeat { run + 1 } else { 0 };
        if run > longest {
            (longest, end) = (run, at + 1);
        }
    }
    let share = count as f64 / repeats.len() as f64;
    let is_told = longest >= LEAST_STALE_RUN || (share >= LEAST_STALE_SHARE && count >= LEAST_STALE_RUN);
    is_told.then(|| {
        format!(
            "{count} of {} changes are none ({:.1} %), {longest} in a row up to {}: repeated values hide moves and draw \
             correlations towards zero; compare 1, 5 and 10-day changes.",
            repeats.len(),
            share * 100.0,
            history.dates[quoted[end].0]
        )
    })
}

/// Changes far out that look like a split or another unit, and values that are gone again on the next row.
fn jumps(history: &History, series: &Series) -> Vec<String> {
    let quoted: Vec<(usize, f64)> = series.quoted().collect();
    let is_positive = quoted.iter().all(|(_, value)| *value > 0.0);
    let variable = |value: f64| if is_positive { value.ln() } else { value };
    let changes: Vec<f64> = quoted.windows(2).map(|two| variable(two[1].1) - variable(two[0].1)).collect();
    let Some(spread) = robust_spread(&changes).filter(|spread| *spread > 0.0) else { return Vec::new() };
    let is_far = |change: f64| change.abs() > FAR_OUT * spread;
    let mut told = Vec::new();
    let mut at = 0;
    while at < changes.len() {
        let (change, (row, value)) = (changes[at], quoted[at + 1]);
        let back = changes.get(at + 1).copied().unwrap_or(0.0);
        if is_far(change) && is_far(back) && (change + back).abs() < 0.25 * change.abs() {
            told.push(format!(
                "{value} on {} is far from the values before and after it: if it is a slip, volatility is too high and \
                 reversion too fast.",
                history.dates[row]
            ));
            at += 1;
        } else if let Some(words) =
            Some(change).filter(|change| is_positive && is_far(*change)).and_then(ratio_words)
        {
            told.push(format!(
                "{} to {value} on {} looks like {words}: check it, since as a move of the market it raises the volatility.",
                quoted[at].1, history.dates[row]
            ));
        }
        at += 1;
    }
    told
}

fn ratio_words(log_change: f64) -> Option<&'static str> {
    let near = RATIOS.iter().min_by(|one, other| {
        let gap = |ratio: f64| (log_change.abs() - ratio.ln()).abs();
        gap(one.0).total_cmp(&gap(other.0))
    })?;
    ((log_change.abs() - near.0.ln()).abs() < NEAR).then_some(near.1)
}

/// 1.4826 x the median distance from the median: the standard deviation of a normal law, whatever its tails hold.
fn robust_spread(changes: &[f64]) -> Option<f64> {
    let middle = median(changes.to_vec())?;
    Some(1.4826 * median(changes.iter().map(|change| (change - middle).abs()).collect())?)
}

fn median(mut sample: Vec<f64>) -> Option<f64> {
    let middle = sample.len() / 2;
    (!sample.is_empty()).then(|| *sample.select_nth_unstable_by(middle, f64::total_cmp).1)
}
