//! Each option of `read`: what it changes, and what it refuses with exit code 2.

use super::support::{ONE_SHARE, call, read_json, write};
use serde_json::Value;

fn check_refused(option: &str, value: &str) {
    let call = call(&["read", option, value]);
    assert_eq!((call.code, call.out.as_str()), (2, ""), "{option} {value}");
    assert!(call.err.contains(option), "{option} {value}: {}", call.err);
}

#[test]
fn exact_values_out_of_bounds_are_refused() {
    for (option, values) in [
        ("--horizon", &["0", "505", "2.5", "month"][..]),
        ("--confidence", &["0.5", "1", "0.95,1.2", "ninety", "40%", "100%"]),
        ("--paths", &["999", "10000001", "1e5", "many"]),
        ("--seed", &["0.5", "first"]),
        ("--threads", &["0", "all"]),
        ("--loss-from", &["yesterday"]),
        ("--days-per-year", &["0", "inf", "nan"]),
        ("--as-of", &["2026-02-30", "30.11.2026", "today"]),
        ("--book-currency", &["euro", "€"]),
        ("--capital", &["0", "nan", "lots"]),
        ("--loss-limit", &["0", "inf", "5m"]),
    ] {
        for value in values {
            check_refused(option, value);
        }
    }
}

#[test]
fn exact_unknown_options_and_missing_values_are_refused() {
    for line in [&["read", "--horizons", "5"][..], &["read", "--paths"], &["read", "stray"], &["--json"]] {
        assert_eq!(call(line).code, 2, "{line:?}");
    }
}

#[test]
fn exact_files_of_one_book_go_together() {
    let share = write("options", "share.csv", ONE_SHARE);
    assert_eq!(call(&["read", "--correlation", &share]).code, 2, "a correlation needs positions");
    assert_eq!(call(&["read", "--positions", &share, "--workspace", &share]).code, 2);
}

#[test]
fn exact_options_of_a_fit_need_a_history() {
    let share = write("options", "alone.csv", ONE_SHARE);
    for option in [
        &["--estimator", "weighted"][..],
        &["--parameter-range"],
        &["--drift", "fitted"],
        &["--model", "log"],
    ] {
        let call = call(&[&["read", "--positions", &share], option].concat());
        assert_eq!(call.code, 2, "{option:?}");
        assert!(call.err.contains("--history"), "{}", call.err);
    }
    for option in [
        &["--change-days", "3"][..],
        &["--estimator", "best"],
        &["--row-days", "0"],
        &["--weight-half-life", "0"],
    ] {
        assert_eq!(call(&[&["fit"], option].concat()).code, 2, "{option:?}");
    }
}

#[test]
fn exact_what_later_versions_do_is_answered_not_yet() {
    for line in [
        &["stress"][..],
        &["stress", "--reach", "5000000", "--dial", "volatility"],
        &["backtest", "--history", "h.csv"],
        &["report", "--out", "folder"],
        &["read", "--limits", "l.csv"],
        &["read", "--against", "a.csv"],
        &["read", "--read-as", "relative"],
    ] {
        let call = call(line);
        assert_eq!((call.code, call.out.as_str()), (2, ""), "{line:?}");
        assert!(call.err.contains("not yet"), "{line:?}: {}", call.err);
    }
}

#[test]
fn exact_defaults_are_those_of_the_page() {
    let plain = read_json(&[]);
    let spelled = read_json(&[
        "--horizon",
        "21",
        "--confidence",
        "0.95,0.99",
        "--seed",
        "1",
        "--loss-from",
        "today",
        "--days-per-year",
        "252",
        "--read-as",
        "absolute",
    ]);
    let strip = super::support::without_seconds;
    assert_eq!(strip(plain), strip(spelled));
}

#[test]
fn exact_confidence_is_sorted_and_may_be_a_percentage() {
    let answer = read_json(&["--confidence", "99%,0.9,97.5%,0.99"]);
    let levels: Vec<f64> =
        answer["loss"].as_array().unwrap().iter().map(|row| row["confidence"].as_f64().unwrap()).collect();
    assert_eq!(levels, [0.9, 0.975, 0.99]);
}

#[test]
fn exact_capital_is_the_base_of_percentages() {
    assert_eq!(read_json(&["--capital", "5e7"])["book"]["capital"], 5e7);
    let owing = write("options", "owing.csv", "name,kind,quantity,price\nOverdraft,cash,-500,\n");
    let answer = read_json(&["--positions", &owing]);
    assert_eq!(answer["book"]["value"], -500.0);
    assert_eq!(answer["book"]["capital"], Value::Null);
}

#[test]
fn exact_loss_from_the_mean_differs_by_the_expected_change() {
    let share =
        write("options", "drifting.csv", "name,quantity,price,drift,volatility\nBrook,1000,50,6%,20%\n");
    let today = read_json(&["--positions", &share]);
    let mean = read_json(&["--positions", &share, "--loss-from", "mean"]);
    let var = |answer: &Value| answer["loss"][0]["var"].as_f64().unwrap();
    let change = today["moments"]["expected_change"].as_f64().unwrap();
    // Both are differences of values near 50,000, so they agree to some units of its last place.
    assert!((var(&mean) - var(&today) - change).abs() < 1e-10 * 50_000.0);
}

#[test]
fn exact_dates_count_trading_days() {
    let share = write("options", "dated.csv", ONE_SHARE);
    let date = |options: &[&str]| {
        let line = [&["--positions", &share], options].concat();
        read_json(&line)["horizon"]["date"].clone()
    };
    assert_eq!(date(&[]), Value::Null);
    // Thursday and Friday, then the weekend.
    assert_eq!(date(&["--as-of", "2026-12-23", "--horizon", "3"]), "2026-12-28");
    let holidays = write("options", "holidays.csv", "date\n2026-12-25\n");
    let with = ["--as-of", "2026-12-23", "--horizon", "3", "--holidays", &holidays];
    assert_eq!(date(&with), "2026-12-29");
}

#[test]
fn exact_weekdays_are_told_where_a_date_is_printed() {
    let share = write("options", "weekdays.csv", ONE_SHARE);
    let is_told = |options: &[&str]| {
        let line = [&["--positions", &share], options].concat();
        let notices = read_json(&line)["notices"].to_string();
        notices.contains("weekdays")
    };
    assert!(is_told(&["--as-of", "2026-12-23"]));
    assert!(!is_told(&[]));
}
