//! Histories as files write them: what is read, what is refused and where, how rows are counted in time.

use ebbmark_engine::history::{History, Spacing, read_history};
use ebbmark_engine::tables::{FileKind, Notice, Table};
use jiff::civil::{Date, date};

const GOOD: &str = "date,Brook,Cedar\n2026-03-02,100,3.5\n2026-03-03,,3.6\n2026-03-06,101.5,-0.1\n";

fn read(text: &str) -> Result<(History, Vec<Notice>), String> {
    let table = Table::read(text, "history.csv").map_err(|faults| faults.to_string())?;
    read_history(&table).map_err(|faults| faults.to_string())
}

fn history(text: &str) -> History {
    read(text).unwrap().0
}

/// Dates `days` apart, as many as asked for, with one price each.
fn every(days: i64, count: i64) -> History {
    let first = date(2026, 1, 5);
    let rows = (0..count).map(|row| format!("{},1\n", first + jiff::Span::new().days(row * days)));
    history(&format!("date,Brook\n{}", rows.collect::<String>()))
}

#[test]
fn always_a_history_is_read_as_written() {
    let read = history(GOOD);
    assert_eq!(read.dates, [date(2026, 3, 2), date(2026, 3, 3), date(2026, 3, 6)]);
    assert_eq!(read.lines, [2, 3, 4]);
    assert_eq!(read.series("Brook").unwrap().values, [Some(100.0), None, Some(101.5)]);
    assert_eq!(read.series("Cedar").unwrap().last(), Some(-0.1));
    assert_eq!(read.series("cedar"), None);
}

#[test]
fn always_separators_column_order_and_case_make_no_difference() {
    let german = "Cedar;DATE;Brook\n3,5;2026-03-02;100\n3,6;2026-03-03;\n-0,1;2026-03-06;101,5\n";
    let other = history(german);
    let plain = history(GOOD);
    assert_eq!(other.dates, plain.dates);
    for series in &plain.series {
        assert_eq!(other.series(&series.name), Some(series));
    }
    assert_eq!(FileKind::of(&Table::read(german, "any").unwrap()), Ok(FileKind::History));
}

#[test]
fn always_a_bad_history_is_refused_with_every_place() {
    for (text, expected) in [
        ("", "history.csv: found an empty file"),
        ("date,Brook\n", "line 1: found no row below the header, expected a date and prices in each row"),
        (
            "date\n2026-03-02\n",
            "line 1: found no column but the date, expected a column of prices per factor",
        ),
        ("day,Brook\n2026-03-02,1\n", "column date: found no column `date`"),
        ("date,Brook\n2026-03-02,\n2026-03-03,\n", "line 1: found no price in any row"),
        ("date,Brook,brook\n2026-03-02,1,2\n", "column brook: found the column `brook` a second time"),
        ("date,,Brook\n2026-03-02,1,2\n", "line 1: found no name over column 2"),
        ("date,Brook\n2026-03-02,1,2\n", "line 2: found 3 cells, expected 2 as in the header"),
        ("date,Brook\n,1\n", "line 2, column date: found nothing, expected a date like 2026-03-31"),
        ("date,Brook\n2.3.2026,1\n", "line 2, column date: found `2.3.2026`, expected a date like"),
        ("date,Brook\n2026-02-30,1\n", "line 2, column date: found `2026-02-30`"),
        (
            "date,Brook\n2026-03-03,1\n2026-03-03,2\n",
            "line 3, column date: found 2026-03-03 as in line 2, expected each date once",
        ),
        (
            "date,Brook\n2026-03-03,1\n2026-03-02,2\n",
            "line 3, column date: found 2026-03-02 after 2026-03-03 in line 2, expected rows in order of date, the \
             oldest first",
        ),
        (
            "date,Brook\n2026-03-02,n/a\n",
            "line 2, column Brook: found `n/a`, expected a number, or nothing where there is no price",
        ),
        ("date,Brook\n2026-03-02,inf\n", "line 2, column Brook: found `inf`, expected a number"),
        ("date,Brook\n2026-03-02,1e999\n", "line 2, column Brook: found `1e999`, expected a finite number"),
        ("date,Brook\n2026-03-02,4%\n", "line 2, column Brook: found `4%`, expected a number without %"),
        (
            "date;Brook\n2026-03-02;1.234,5\n",
            "column Brook: found `1.234,5`, expected a number without thousands",
        ),
    ] {
        let faults = read(text).err().unwrap_or_else(|| panic!("{text} is not refused"));
        assert!(
            faults.contains(expected) && faults.lines().count() == 1,
            "{faults}\ndoes not say\n{expected}"
        );
    }
}

#[test]
fn always_all_bad_cells_of_a_history_are_told() {
    let faults =
        read("date,Brook,Cedar\n2026-03-02,x,1\n2026-03-04,1,y\n2026-03-03,z,1,1\nnever,1,1\n").unwrap_err();
    let places =
        ["line 2, column Brook", "line 3, column Cedar", "line 4: found 4 cells", "line 5, column date"];
    assert_eq!(faults.lines().count(), places.len(), "{faults}");
    for (line, place) in faults.lines().zip(places) {
        assert!(line.contains(place), "{line} is not at {place}");
    }
}

#[test]
fn always_one_misplaced_date_is_one_fault() {
    let faults = read("date,Brook\n2026-03-02,1\n2062-03-03,1\n2026-03-04,1\n2026-03-05,1\n").unwrap_err();
    assert_eq!(faults.lines().count(), 1, "{faults}");
    assert!(faults.contains("line 4, column date"), "{faults}");
}

#[test]
fn always_rows_without_a_price_are_left_out_and_counted() {
    let (kept, notices) = read("date,Brook,Cedar\n2026-03-02,1,\n2026-03-03,,\n,,\n2026-03-04,,2\n").unwrap();
    assert_eq!(kept.lines, [2, 5]);
    let texts: Vec<&str> = notices.iter().map(|notice| notice.text.as_str()).collect();
    assert_eq!(texts, ["history.csv: 2 rows have no price and are left out."]);
    assert_eq!(read(GOOD).unwrap().1, []);
}

#[test]
fn always_one_row_and_huge_values_are_a_history() {
    assert_eq!(history("date,Brook\n2026-03-02,1\n").series[0].values, [Some(1.0)]);
    let huge = history("date,Brook\n2026-03-02,1e308\n2026-03-03,-1e308\n");
    assert_eq!(huge.series[0].values, [Some(1e308), Some(-1e308)]);
}

#[test]
fn always_a_window_keeps_both_ends() {
    let all = history(GOOD);
    let rows = |since: Option<Date>, until: Option<Date>| all.between(since, until).lines;
    assert_eq!(rows(None, None), [2, 3, 4]);
    assert_eq!(rows(Some(date(2026, 3, 3)), None), [3, 4]);
    assert_eq!(rows(Some(date(2026, 3, 4)), Some(date(2026, 3, 6))), [4]);
    assert_eq!(rows(None, Some(date(2026, 3, 1))), [0; 0]);
    assert_eq!(rows(Some(date(2026, 3, 6)), Some(date(2026, 3, 2))), [0; 0]);
    let cut = all.between(Some(date(2026, 3, 3)), None);
    assert_eq!(cut.series("Brook").unwrap().values, [None, Some(101.5)]);
}

#[test]
fn exact_time_between_rows_follows_the_median_gap() {
    assert_eq!(Spacing::of(&every(1, 1), None), Spacing::TradingDay);
    assert_eq!(Spacing::of(&every(4, 10), None), Spacing::TradingDay);
    assert_eq!(Spacing::of(&every(5, 10), None), Spacing::CalendarDays);
    assert_eq!(Spacing::of(&every(7, 10), Some(5)), Spacing::TradingDays(5));
    // Gaps of 3 and 6: their middle is above four.
    let pair = history("date,Brook\n2026-03-02,1\n2026-03-05,1\n2026-03-11,1\n");
    assert_eq!(Spacing::of(&pair, None), Spacing::CalendarDays);
}

#[test]
fn exact_units_of_time_are_rows_or_calendar_days() {
    let weekly = every(7, 10);
    assert_eq!(Spacing::CalendarDays.units_between(&weekly, 2, 5), 21);
    assert_eq!(Spacing::TradingDay.units_between(&weekly, 2, 5), 3);
    assert_eq!(Spacing::TradingDays(5).units_between(&weekly, 2, 5), 3);
    assert_eq!(Spacing::TradingDay.years_per_unit(252.0), 1.0 / 252.0);
    assert_eq!(Spacing::TradingDays(63).years_per_unit(252.0), 0.25);
    assert_eq!(Spacing::CalendarDays.years_per_unit(252.0), 1.0 / 365.25);
}
