//! What looks odd in a history: told at its row with what it would do, and nothing told of clean data.

use ebbmark_engine::history::{BlemishKind, History, Spacing, blemishes, read_history};
use ebbmark_engine::tables::{Notice, NoticeLevel, Table};
use jiff::ToSpan;
use jiff::civil::{Date, Weekday, date};

const ADJUSTED: &str = include_str!("../data/open/stocks_daily.csv");
const UNADJUSTED: &str = include_str!("../data/open/stocks_daily_raw_gaps.csv");
const QUARTERLY: &str = include_str!("../data/open/macro_quarterly.csv");

fn history(text: &str) -> History {
    read_history(&Table::read(text, "history.csv").unwrap()).unwrap().0
}

fn notices(history: &History, days_per_year: f64) -> Vec<Notice> {
    let found = blemishes(history, Spacing::of(history, None), days_per_year);
    found.iter().map(Notice::from).collect()
}

/// Cells of one factor on weekdays from Monday, 5 January 2026.
fn on_weekdays<T: ToString>(cells: &[T]) -> History {
    let is_weekday = |date: &Date| !matches!(date.weekday(), Weekday::Saturday | Weekday::Sunday);
    let dates = date(2026, 1, 5).series(1.day()).filter(is_weekday);
    // A second factor, so that a blank cell makes no blank row.
    let rows = dates.zip(cells).enumerate();
    let rows = rows.map(|(row, (date, cell))| format!("{date},{},{}\n", cell.to_string(), 50 + row % 3));
    history(&format!("date,Brook,Cedar\n{}", rows.collect::<String>()))
}

/// Sixty prices that wander by about 1 % a day around 100.
fn usual() -> Vec<f64> {
    (0..60).map(|row| 100.0 + [0.0, 1.1, 0.4, -0.7, 0.9, 1.6, -0.2][row % 7]).collect()
}

/// Asserts that nothing but one oddity is told, with these words and this weight.
#[track_caller]
fn told(history: &History, level: NoticeLevel, words: &str) {
    let found = notices(history, 252.0);
    assert_eq!(found, [Notice { level, text: format!("history.csv, {words}") }]);
}

#[test]
fn table_splits_of_unadjusted_shares_are_told() {
    let raw = history(UNADJUSTED);
    let found = blemishes(&raw, Spacing::of(&raw, None), 252.0);
    let splits: Vec<(&str, String, (u32, u32))> = found
        .iter()
        .filter_map(|blemish| match blemish.kind {
            BlemishKind::Split { ratio, .. } => Some((blemish.factor()?, blemish.date.to_string(), ratio)),
            _ => None,
        })
        .collect();
    // The fall of September 2000 followed a profit warning: the words leave that open.
    let expected = [
        ("AAPL", "2000-06-21", (2, 1)),
        ("AAPL", "2000-09-29", (2, 1)),
        ("AAPL", "2005-02-28", (2, 1)),
        ("MSFT", "2003-02-18", (2, 1)),
    ];
    assert_eq!(splits, expected.map(|(name, date, ratio)| (name, date.to_owned(), ratio)));
    for blemish in &found {
        if matches!(blemish.kind, BlemishKind::Split { .. }) {
            let words = blemish.words();
            assert!(words.contains("looks like") && words.contains("check it"), "{words}");
        }
    }
    // What remains are two late starts.
    assert_eq!(found.len(), splits.len() + 2);
}

#[test]
fn table_nothing_is_odd_about_adjusted_shares() {
    assert_eq!(notices(&history(ADJUSTED), 252.0), []);
}

#[test]
fn table_rounded_rates_are_not_called_stale() {
    // Unemployment in tenths repeats itself in 17 % of quarters, which rounding explains.
    let macro_rates = history(QUARTERLY);
    let found = blemishes(&macro_rates, Spacing::of(&macro_rates, None), 252.0);
    assert!(!found.iter().any(|blemish| matches!(blemish.kind, BlemishKind::Stale { .. })), "{found:?}");
    let not_positive = found.iter().find(|blemish| blemish.factor() == Some("INFL")).unwrap();
    assert_eq!(not_positive.kind, BlemishKind::NotPositive { count: 7, first: 0.0 });
    assert_eq!(not_positive.place.line, Some(2));
}

#[test]
fn always_usual_prices_are_not_told() {
    assert_eq!(notices(&on_weekdays(&usual()), 252.0), []);
}

#[test]
fn always_jumps_are_told_at_their_row() {
    let mut split = usual();
    split[30..].iter_mut().for_each(|price| *price /= 3.0);
    let found = notices(&on_weekdays(&split), 252.0);
    assert!(
        found[0].text.starts_with("history.csv, line 32, column Brook: 33.466666666666")
            && found[0].text.contains("after 101.1 looks like a split 3:1"),
        "{}",
        found[0].text
    );
    let mut consolidated = usual();
    consolidated[30..].iter_mut().for_each(|price| *price *= 2.0);
    assert!(notices(&on_weekdays(&consolidated), 252.0)[0].text.contains("looks like a split 1:2"));
    let mut pence = usual();
    pence[30..].iter_mut().for_each(|price| *price *= 100.0);
    let words = &notices(&on_weekdays(&pence), 252.0)[0].text;
    assert!(words.contains("is a factor of about 100 and looks like another unit"), "{words}");
}

#[test]
fn always_a_value_that_is_gone_on_the_next_row_is_told_once() {
    for (slip, shown) in [(10.04, "10.04"), (1004.0, "1004"), (-100.4, "-100.4"), (50.2, "50.2")] {
        let mut prices = usual();
        prices[30] = slip;
        let found = notices(&on_weekdays(&prices), 252.0);
        let words = format!(
            "line 32, column Brook: {shown} after 101.1, and then 99.3, looks like a slip: check it."
        );
        assert!(found.iter().any(|notice| notice.text.contains(&words)), "{found:?}\n{words}");
        assert_eq!(found.len(), 1 + usize::from(slip < 0.0));
    }
}

#[test]
fn always_wild_times_and_other_ratios_are_moves_of_the_market() {
    let mut crash = usual();
    crash[30..].iter_mut().for_each(|price| *price *= 0.8);
    assert_eq!(notices(&on_weekdays(&crash), 252.0), []);
    // A fall by half amid daily moves of a tenth.
    let wild = |row: usize| if (20..42).contains(&row) { 1.0 + 0.1 * f64::from(row as u32 % 2) } else { 1.0 };
    let halved = |row: usize| if row >= 30 { 0.5 } else { 1.0 };
    let prices: Vec<f64> =
        usual().iter().enumerate().map(|(row, price)| price * wild(row) * halved(row)).collect();
    assert_eq!(notices(&on_weekdays(&prices), 252.0), []);
}

#[test]
fn exact_volatility_that_a_jump_adds() {
    // Forty log changes of 1 % up and down, and one of ln 1/2 between them.
    let log_price = |row: i32| 0.01 * f64::from(row % 2) - if row > 20 { 2.0_f64.ln() } else { 0.0 };
    let prices: Vec<f64> = (0..42).map(|row| log_price(row).exp()).collect();
    let found = blemishes(&on_weekdays(&prices), Spacing::TradingDay, 252.0);
    let BlemishKind::Split { jump, .. } = found[0].kind else { panic!("{found:?}") };
    let split = 0.01 - 2.0_f64.ln();
    let expected = ((40.0 * 1e-4 + split * split) / 41.0 / 1e-4).sqrt();
    assert!((jump.volatility_ratio / expected - 1.0).abs() < 1e-9, "{} {expected}", jump.volatility_ratio);
}

#[test]
fn exact_repeats_dilute_correlations() {
    // Thirty of a hundred changes are none; 30 % of a correlation is lost, 8.6 % over five days (by the formula 0.8 becomes
    // 0.560 and 0.731595).
    let mut prices: Vec<f64> =
        (0..101).map(|row| 100.0 + f64::from(row % 5) + 0.01 * f64::from(row)).collect();
    for row in 40..70 {
        prices[row] = prices[39];
    }
    told(
        &on_weekdays(&prices),
        NoticeLevel::Warning,
        "line 41, column Brook: 30 of 100 values repeat the one before, 30 in a row at most, from 2026-02-27 on. If they \
         are old prices, its correlations come out 30 % too near 0 (9 % on 5-day changes); its volatility stays about \
         right.",
    );
}

#[test]
fn always_blanks_late_starts_and_early_ends_are_told() {
    let mut cells: Vec<String> = usual().iter().map(ToString::to_string).collect();
    cells[10].clear();
    cells[20..23].iter_mut().for_each(String::clear);
    told(
        &on_weekdays(&cells),
        NoticeLevel::Info,
        "line 22, column Brook: 4 blank cells between its first and last value, 3 in a row at most. A change over them \
         counts with the time it took; correlations on common dates lose these rows, for all factors.",
    );
    let mut cells: Vec<String> = usual().iter().map(ToString::to_string).collect();
    cells[..5].iter_mut().for_each(String::clear);
    cells[59].clear();
    let found = notices(&on_weekdays(&cells), 252.0);
    let lead =
        "history.csv, line 7, column Brook: its first value is on 2026-01-12, with 5 of 60 rows before it.";
    assert!(found[0].text.starts_with(lead), "{found:?}");
    let lead = "history.csv, line 60, column Brook: its last value is on 2026-03-26, 1 row before the history's last.";
    assert!(found[1].text.starts_with(lead), "{found:?}");
}

#[test]
fn always_series_without_a_change_are_told() {
    told(
        &on_weekdays(&[""; 30]),
        NoticeLevel::Warning,
        "line 2, column Brook: no value. Nothing can be fitted.",
    );
    told(
        &on_weekdays(&["", "7", ""]),
        NoticeLevel::Warning,
        "line 3, column Brook: one value only, on 2026-01-06. Nothing can be fitted.",
    );
    told(
        &on_weekdays(&[3.5; 30]),
        NoticeLevel::Warning,
        "line 2, column Brook: 3.5 on every date. Its volatility would be 0 and its correlations undefined.",
    );
    let nothing = on_weekdays(&[1.0, 2.0]).between(Some(date(2027, 1, 1)), None);
    assert_eq!(notices(&nothing, 252.0), []);
}

#[test]
fn always_weekends_and_pauses_are_told() {
    let every_day: String = date(2026, 1, 1)
        .series(1.day())
        .take(366)
        .enumerate()
        .map(|(row, date)| format!("{date},{}\n", 100 + row % 3))
        .collect();
    let every_day = history(&format!("date,Brook\n{every_day}"));
    told(
        &every_day,
        NoticeLevel::Warning,
        "line 4: 104 of 366 dates are weekends, with 252 trading days a year. The rows are 365 a year, so volatilities come \
         out 17 % too low; set that many days a year.",
    );
    assert_eq!(notices(&every_day, 365.0), []);
    let slip = history("date,Brook\n2026-01-02,1\n2026-01-03,2\n2026-01-05,1\n2026-01-06,3\n2026-01-07,1\n");
    let words = &notices(&slip, 252.0)[0].text;
    assert!(words.starts_with("history.csv, line 3: 1 of 5 dates are weekends"), "{words}");
    let paused = history(
        "date,Brook\n2025-01-02,1\n2025-01-03,2\n2026-01-05,1\n2026-01-06,3\n2026-01-07,1\n2026-01-08,2\n2026-01-23,1\n",
    );
    let words = &notices(&paused, 252.0)[0].text;
    let lead = "history.csv, line 4: no row between 2025-01-03 and 2026-01-05, 367 days (2 such pauses in all). It counts as \
                one trading day";
    assert!(words.starts_with(lead), "{words}");
}

#[test]
fn always_monstrous_values_are_survived() {
    for value in [1e308, -1e308, 1e-308, 0.0, f64::MAX] {
        let mut prices = usual();
        prices[17] = value;
        prices[18] = -value;
        notices(&on_weekdays(&prices), 252.0);
        notices(&on_weekdays(&[value, -value].repeat(30)), 252.0);
    }
}
