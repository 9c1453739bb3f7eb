//! `ebbmark fit`, and `ebbmark read` with a history: against figures that other programs found in open data.

use crate::support::{Call, call, read_json, write};
use serde_json::Value;

/// Figures of the open data sets, made by `tests/reference/open_data.py`.
const REFERENCE: &str = include_str!("../engine/data/open/reference.json");
const OPEN: &str = "tests/engine/data/open";

fn fit_json(options: &[&str]) -> Value {
    let Call { code, out, err } = call(&[&["fit", "--json"], options].concat());
    assert_eq!(code, 0, "{err}");
    serde_json::from_str(&out).unwrap()
}

fn factor<'a>(answer: &'a Value, name: &str) -> &'a Value {
    let factors = answer["factors"].as_array().unwrap();
    factors.iter().find(|factor| factor["factor"] == name).unwrap()
}

#[track_caller]
fn close(value: &Value, expected: &Value, relative: f64) {
    let (value, expected) = (value.as_f64().unwrap(), expected.as_f64().unwrap());
    assert!((value - expected).abs() <= relative * expected.abs(), "{value} is not {expected}");
}

#[test]
fn agree_stocks_with_pandas() {
    let answer = fit_json(&["--history", &format!("{OPEN}/stocks_daily.csv")]);
    let reference: Value = serde_json::from_str(REFERENCE).unwrap();
    let reference = &reference["stocks_daily.csv"];
    assert_eq!(answer["observations"], 2147);
    assert_eq!((&answer["from"], &answer["to"]), (&"2004-08-19".into(), &"2013-03-01".into()));
    assert_eq!(answer["row_days"], 1);
    for name in ["AAPL", "GOOG", "IBM", "MSFT"] {
        let (found, expected) = (factor(&answer, name), &reference["gbm"][name]);
        // The file's digits are the limit: both programs work in doubles.
        close(&found["geometric"]["volatility"]["value"], &expected["ann_vol"], 1e-10);
        close(&found["geometric"]["drift"]["value"], &expected["gbm_mu"], 1e-10);
        close(&found["geometric"]["drift"]["standard_error"], &expected["se_mean_ann"], 1e-10);
        assert_eq!(found["chosen"], "geometric");
    }
    let matrix = &answer["correlation"]["matrix"];
    for row in 0..4 {
        for column in 0..4 {
            close(&matrix[row][column], &reference["log_return_correlation"][row][column], 1e-10);
        }
    }
    close(&answer["correlation"]["smallest_eigenvalue"], &reference["correlation_eigenvalues"][0], 1e-10);
}

#[test]
fn agree_quarterly_rates_with_statsmodels() {
    let history = format!("{OPEN}/macro_quarterly.csv");
    let answer = fit_json(&["--history", &history, "--row-days", "63", "--model", "level"]);
    let reference: Value = serde_json::from_str(REFERENCE).unwrap();
    for name in ["TBILL", "UNEMP", "INFL"] {
        let (found, expected) = (factor(&answer, name), &reference["macro_quarterly.csv"]["ou"][name]);
        let fitted = &found["reverting_level"];
        close(&fitted["speed"]["value"], &expected["kappa"], 1e-9);
        close(&fitted["long_run"]["value"], &expected["theta"], 1e-9);
        close(&fitted["volatility"]["value"], &expected["sigma_ml"], 1e-9);
        close(&found["evidence"]["dickey_fuller"]["t"], &expected["df_t"], 1e-9);
        assert_eq!(found["chosen"], "reverting-level");
    }
    // Inflation was zero or below in some quarters: it has no logarithm, and says so.
    let inflation = factor(&answer, "INFL");
    assert!(inflation["geometric"].is_null() && inflation["reverting_log"].is_null());
    assert!(inflation["refused"]["geometric"].as_str().unwrap().contains("no logarithm"));
}

#[test]
fn agree_blank_rows_leave_everything_as_it_was() {
    let dense = fit_json(&["--history", &format!("{OPEN}/wti_daily.csv")]);
    let gaps = fit_json(&["--history", &format!("{OPEN}/wti_daily_gaps.csv")]);
    assert_eq!(dense["factors"], gaps["factors"]);
    assert_eq!(dense["correlation"], gaps["correlation"]);
}

#[test]
fn always_a_history_fills_what_nobody_typed() {
    let mut history = "date,Brook,Weir,Unused\n".to_owned();
    for day in 0..400_u32 {
        let wave = |speed: f64, size: f64| 1.0 + size * (f64::from(day) * speed).sin();
        let date = jiff::civil::date(2030, 1, 1).saturating_add(jiff::Span::new().days(day));
        let (brook, weir) = (50.0 * wave(0.9, 0.02), 20.0 * wave(1.7, 0.03));
        history.push_str(&format!("{date},{brook:.4},{weir:.4},7\n"));
    }
    let history = write("fit", "waves.csv", &history);
    let bare = write("fit", "bare.csv", "name,quantity,price\nBrook,100,50\nWeir,-40,20\n");
    let read = read_json(&["--positions", &bare, "--history", &history]);
    assert_eq!(read["book"]["as_of"], "2031-02-04");
    assert!(read["loss"][0]["var"].as_f64().unwrap() > 0.0);
    // What is typed stands above what is fitted: other figures for the typed factor alone.
    let typed = write("fit", "typed.csv", "name,quantity,price,volatility\nBrook,100,50,90%\nWeir,-40,20,\n");
    let other = read_json(&["--positions", &typed, "--history", &history]);
    assert!(
        other["moments"]["sd"]["exact"].as_f64().unwrap()
            > 2.0 * read["moments"]["sd"]["exact"].as_f64().unwrap()
    );
}

#[test]
fn always_a_parameter_range_holds_the_figure_and_names_its_source() {
    let history = format!("{OPEN}/stocks_daily.csv");
    let book = write("fit", "stocks.csv", "name,quantity,price\nAAPL,10,56\nIBM,5,175\n");
    let read = read_json(&["--positions", &book, "--history", &history, "--parameter-range"]);
    let range = &read["parameter_range"];
    assert_eq!(range["draws"], 200);
    assert_eq!(range["refused"], 0);
    for (row, loss) in range["loss"].as_array().unwrap().iter().zip(read["loss"].as_array().unwrap()) {
        let [low, var, high] =
            [&row["var_low"], &loss["var"], &row["var_high"]].map(|figure| figure.as_f64().unwrap());
        assert!(low < var && var < high, "{low} {var} {high}");
        // Volatilities of 2,147 changes are known to 1.5 %, their correlation to 0.02: no wider than a few per cent.
        assert!(high - low < 0.12 * var, "{low} {var} {high}");
    }
    let first = &range["most_from"][0];
    assert_eq!((&first["factor"], &first["parameter"]), (&"AAPL".into(), &"volatility".into()));
    let without = read_json(&["--positions", &book, "--history", &history]);
    assert!(without["parameter_range"].is_null());
    assert_eq!(without["loss"], read["loss"]);
}

#[test]
fn exact_words_for_a_history_that_can_not_be_fitted() {
    for (name, text, words) in [
        ("one.csv", "date,A\n2030-01-01,5\n", "one date"),
        ("twice.csv", "date,A\n2030-01-02,5\n2030-01-02,6\n", "each date once"),
        ("back.csv", "date,A\n2030-01-02,5\n2030-01-01,6\n", "rows in order of date"),
        ("blank.csv", "date,A\n2030-01-01,\n2030-01-02,\n", "no price in any row"),
    ] {
        let call = call(&["fit", "--history", &write("fit", name, text)]);
        assert_eq!((call.code, call.out.as_str()), (2, ""), "{name}");
        assert!(call.err.contains(words) && call.err.contains(name), "{name}: {}", call.err);
    }
    let constant = fit_json(&[
        "--history",
        &write("fit", "still.csv", "date,A\n2030-01-01,5\n2030-01-02,5\n2030-01-03,5\n"),
    ]);
    let still = factor(&constant, "A");
    assert!(still["chosen"].is_null());
    assert!(still["refused"]["geometric"].as_str().unwrap().contains("never changes"));
}
