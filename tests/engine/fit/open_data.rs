//! Fits of real prices and rates against scipy, statsmodels, scikit-learn and numpy: `tests/reference/fit.py` makes the
//! figures, `tests/engine/data/open` says where the data come from.

use crate::support::*;
use ebbmark_engine::fit::evidence::critical_values;
use ebbmark_engine::fit::{Estimator, Evidence, FactorFit, Fit, FitSettings, RevertingFit};
use ebbmark_engine::history::{History, Series, read_history};
use ebbmark_engine::maths::RangedEstimate;
use ebbmark_engine::tables::Table;
use serde_json::Value;

/// Maxima that are searched for, against roots of exact derivatives: a flat top shows to the root of the rounding.
const SEARCHED: f64 = 1e-6;
/// Standard errors and ends by numerical derivatives and roots on both sides.
const BY_DIFFERENCES: f64 = 1e-4;

const STOCKS: &str = include_str!("../data/open/stocks_daily.csv");
const QUARTERLY: &str = include_str!("../data/open/macro_quarterly.csv");
const OIL: &str = include_str!("../data/open/wti_daily.csv");
const OIL_WITH_BLANKS: &str = include_str!("../data/open/wti_daily_gaps.csv");

fn expected() -> Value {
    serde_json::from_str(include_str!("../data/fit.json")).unwrap()
}

fn history(text: &str) -> History {
    read_history(&Table::read(text, "history.csv").unwrap()).unwrap().0
}

/// The quarterly set without the rows that the script leaves out.
fn thinned_quarters() -> History {
    let left_out = expected()["left_out_rows"].clone();
    let is_left_out = |row: usize| left_out.as_array().unwrap().iter().any(|left| left == row);
    let lines = QUARTERLY.lines().enumerate();
    // Line 0 is the header.
    let kept = lines.filter(|(line, _)| *line == 0 || !is_left_out(line - 1)).map(|(_, text)| text);
    history(&kept.collect::<Vec<_>>().join("\n"))
}

fn fit_with(history: &History, settings: FitSettings) -> Fit {
    Fit::of(history, &settings, 252.0, &[]).unwrap()
}

fn fit(history: &History, row_days: Option<u32>) -> Fit {
    fit_with(history, FitSettings { row_days, ..FitSettings::usual() })
}

fn of(value: &Value, field: &str) -> f64 {
    value[field].as_f64().unwrap_or_else(|| panic!("no {field} in {value}"))
}

/// Compares an estimate that the script gives in the modelled variable.
#[track_caller]
fn same(found: RangedEstimate, expected: &Value) {
    close(found.value, of(expected, "value"), SEARCHED);
    close(found.standard_error.unwrap(), of(expected, "error"), BY_DIFFERENCES);
}

#[track_caller]
fn same_reverting(found: &RevertingFit, expected: &Value, is_log: bool) {
    let in_variable = |found: RangedEstimate| RangedEstimate {
        value: found.value.ln(),
        standard_error: found.standard_error.map(|error| error / found.value),
        ..found
    };
    same(found.speed, &expected["speed"]);
    same(found.volatility, &expected["volatility"]);
    let long_run = if is_log { in_variable(found.long_run) } else { found.long_run };
    same(long_run, &expected["long_run"]);
    close(found.log_likelihood, of(expected, "log_likelihood"), SEARCHED);
    // An end that no reversion lies within is 0 here and null there.
    let low = expected["speed"]["low"].as_f64().unwrap_or(0.0);
    close(found.speed.low.unwrap(), low, BY_DIFFERENCES);
    close(found.speed.high.unwrap(), of(&expected["speed"], "high"), BY_DIFFERENCES);
    let half_life = found.half_life_days;
    close(half_life.value, std::f64::consts::LN_2 / of(&expected["speed"], "value") * 252.0, SEARCHED);
    assert_eq!(half_life.high.is_none(), low == 0.0);
}

#[test]
fn agree_reverting_fits_with_scipy() {
    let expected = expected();
    let [quarterly, thinned, oil] = [history(QUARTERLY), thinned_quarters(), history(OIL)];
    for (words, history, factor, row_days, is_log) in [
        ("TBILL, 63 days a row", &quarterly, "TBILL", Some(63), false),
        ("UNEMP, 63 days a row", &quarterly, "UNEMP", Some(63), false),
        ("INFL, 63 days a row", &quarterly, "INFL", Some(63), false),
        ("TBILL, calendar", &quarterly, "TBILL", None, false),
        ("TBILL with rows left out, calendar", &thinned, "TBILL", None, false),
        ("log of UNEMP with rows left out, calendar", &thinned, "UNEMP", None, true),
        ("WTI, daily", &oil, "WTI", None, false),
        ("log of WTI, daily", &oil, "WTI", None, true),
    ] {
        let expected = &expected["reverting"][words];
        let all = fit(history, row_days);
        let found = all.factor(factor).unwrap();
        assert_eq!(found.observations as f64, of(expected, "returns"), "{words}");
        let reverting = if is_log { &found.reverting_log } else { &found.reverting_level };
        same_reverting(reverting.as_ref().unwrap(), expected, is_log);
    }
}

#[test]
fn agree_geometric_fits_with_numpy() {
    let expected = &expected()["geometric"];
    let stocks = fit(&history(STOCKS), None);
    let check = |words: &str, found: &FactorFit| {
        let expected = &expected[words];
        let found = found.geometric.unwrap();
        same(found.drift, &expected["drift"]);
        close(found.volatility.value, of(&expected["volatility"], "value"), RELATIVE);
        close(found.log_likelihood, of(expected, "log_likelihood"), RELATIVE);
    };
    for factor in &stocks.factors {
        check(&format!("{}, daily", factor.name), factor);
    }
    check("WTI, daily", &fit(&history(OIL), None).factors[0]);
    check("TBILL with rows left out, calendar", &fit(&thinned_quarters(), None).factors[0]);
    // Blank cells beside prices of others; the change over one counts with two days.
    let mut gaps = history(STOCKS);
    blank_every_seventh(&mut gaps.series[0]);
    check("AAPL, every row 3 of 7 blank", &fit(&gaps, None).factors[0]);
}

fn blank_every_seventh(series: &mut Series) {
    series.values.iter_mut().skip(3).step_by(7).for_each(|value| *value = None);
}

#[test]
fn agree_blank_rows_change_nothing() {
    let [plain, blank] = [OIL, OIL_WITH_BLANKS].map(|text| fit(&history(text), None).factors);
    assert_eq!(plain, blank);
}

#[test]
fn agree_tests_of_a_random_walk_with_statsmodels() {
    let expected = expected();
    for row in expected["mackinnon"].as_array().unwrap() {
        for (at, found) in critical_values(of(row, "returns")).into_iter().enumerate() {
            close(found, row["critical_1_5_10"][at].as_f64().unwrap(), RELATIVE);
        }
    }
    let evidence = |history: &History| fit(history, None).factors[0].evidence.clone().unwrap();
    let oil: Evidence = evidence(&history(OIL));
    close(
        oil.dickey_fuller.unwrap().t,
        of(&expected["reverting"]["log of WTI, daily"], "dickey_fuller_t"),
        SEARCHED,
    );
    let ratios = expected["variance_ratios"]["log of WTI"].as_array().unwrap().clone();
    for (found, expected) in oil.variance_ratios.iter().zip(&ratios) {
        assert_eq!(found.span as f64, of(expected, "span"));
        close(found.ratio, of(expected, "ratio"), RELATIVE);
        close(found.z, of(expected, "z"), RELATIVE);
        close(found.robust_z, of(expected, "z_robust"), RELATIVE);
    }
    assert_eq!(ratios.len(), 4);
}

#[test]
fn agree_correlations_with_numpy_and_scikit_learn() {
    let expected = &expected()["correlation_of_stocks"];
    let stocks = history(STOCKS);
    let usual = FitSettings::usual();
    let shrunk = &expected["shrunk"];
    for (settings, matrix, intensity) in [
        (usual.clone(), &expected["sample"], None),
        (FitSettings { change_days: 5, ..usual.clone() }, &expected["overlapping changes over 5 days"], None),
        (
            FitSettings { estimator: Estimator::Weighted, weight_half_life_days: 60.0, ..usual.clone() },
            &expected["weighted, half-life 60 days"],
            None,
        ),
        (
            FitSettings { estimator: Estimator::ShrunkIdentity, ..usual.clone() },
            &shrunk["identity"]["correlation"],
            Some(&shrunk["identity"]["intensity"]),
        ),
        (
            FitSettings { estimator: Estimator::ShrunkConstant, ..usual.clone() },
            &shrunk["constant"]["correlation"],
            Some(&shrunk["constant"]["intensity"]),
        ),
    ] {
        let found = fit_with(&stocks, settings).correlation.unwrap();
        for (row, expected) in matrix.as_array().unwrap().iter().enumerate() {
            for (column, expected) in expected.as_array().unwrap().iter().enumerate() {
                close(found.cells[row * 4 + column], expected.as_f64().unwrap(), RELATIVE);
            }
        }
        assert_eq!(found.shrinkage.is_some(), intensity.is_some());
        if let (Some(found), Some(expected)) = (found.shrinkage, intensity) {
            close(found, expected.as_f64().unwrap(), RELATIVE);
        }
    }
}
