//! The JSON object of `read`: every field of the README, in its order, with its type. Values are looked at elsewhere.

use super::support::{call, read_json};
use serde_json::Value;

/// Asserts the names and the types of an object's fields: `n` number, `s` string, `0` null, `a` list, `o` object.
fn check(object: &Value, expected: &[(&str, char)]) {
    let found: Vec<(&str, char)> =
        object.as_object().unwrap().iter().map(|(name, value)| (name.as_str(), kind(value))).collect();
    let mut sorted = expected.to_vec();
    sorted.sort_unstable();
    assert_eq!(found, sorted);
}

fn kind(value: &Value) -> char {
    match value {
        Value::Null => '0',
        Value::Bool(_) => 'b',
        Value::Number(_) => 'n',
        Value::String(_) => 's',
        Value::Array(_) => 'a',
        Value::Object(_) => 'o',
    }
}

#[test]
fn exact_fields_of_the_example() {
    let answer = read_json(&["--loss-limit", "5000000"]);
    check(
        &answer,
        &[
            ("book", 'o'),
            ("horizon", 'o'),
            ("run", 'o'),
            ("moments", 'o'),
            ("loss", 'a'),
            ("parameter_range", '0'),
            ("drawdown", 'o'),
            ("limit", 'o'),
            ("limits", 'a'),
            ("contributions", 'a'),
            ("contributions_by", 'o'),
            ("notices", 'a'),
        ],
    );
    let book = [
        ("name", 's'),
        ("currency", 's'),
        ("value", 'n'),
        ("as_of", 's'),
        ("capital", 'n'),
        ("read_as", 's'),
    ];
    check(&answer["book"], &book);
    check(&answer["horizon"], &[("days", 'n'), ("years", 'n'), ("date", 's')]);
    let run = [("paths", 'n'), ("seed", 'n'), ("steps", 'n'), ("sampling", 's'), ("seconds", 'n')];
    check(&answer["run"], &run);
    check(&answer["moments"], &[("mean", 'o'), ("sd", 'o'), ("skewness", 'o'), ("expected_change", 'n')]);
    for moment in ["mean", "sd", "skewness"] {
        check(&answer["moments"][moment], &[("exact", 'n'), ("sampled", 'n'), ("standard_error", 'n')]);
    }
    check(&answer["drawdown"], &[("mean", 'n'), ("mean_error", 'n'), ("quantiles", 'a')]);
    check(&answer["contributions_by"], &[("group", 'a'), ("factor", 'a'), ("currency", 'a')]);
}

#[test]
fn exact_fields_of_rows() {
    let answer = read_json(&["--loss-limit", "5000000"]);
    let row = ["confidence", "var", "var_low", "var_high", "es", "es_low", "es_high"].map(|name| (name, 'n'));
    check(&answer["loss"][1], &row);
    let row = ["confidence", "value", "value_low", "value_high", "mean_beyond", "mean_beyond_error"];
    check(&answer["drawdown"]["quantiles"][1], &row.map(|name| (name, 'n')));
    let limit = ["loss", "at_horizon", "at_horizon_error", "by_horizon", "by_horizon_error"];
    check(&answer["limit"], &limit.map(|name| (name, 'n')));
}

#[test]
fn exact_fields_in_their_order() {
    let out = call(&["read", "--json", "--paths", "1000", "--quiet"]).out;
    let order = [
        "book",
        "name",
        "currency",
        "value",
        "as_of",
        "capital",
        "read_as",
        "horizon",
        "days",
        "years",
        "date",
        "run",
        "paths",
        "seed",
        "steps",
        "sampling",
        "seconds",
        "moments",
        "mean",
        "exact",
        "sampled",
        "standard_error",
        "sd",
        "skewness",
        "expected_change",
        "loss",
        "confidence",
        "var",
        "var_low",
        "var_high",
        "es",
        "es_low",
        "es_high",
        "parameter_range",
        "drawdown",
        "mean_error",
        "quantiles",
        "value_low",
        "value_high",
        "mean_beyond",
        "mean_beyond_error",
        "limit",
        "limits",
        "contributions",
        "contributions_by",
        "group",
        "factor",
        "notices",
    ];
    let at: Vec<usize> = order.iter().map(|name| out.find(&format!("\"{name}\":")).unwrap()).collect();
    assert!(at.is_sorted(), "{at:?}");
}

#[test]
fn exact_values_of_plain_fields() {
    let answer = read_json(&["--horizon", "42", "--seed", "7"]);
    assert_eq!(answer["book"]["name"], "Ellerwick");
    assert_eq!(answer["book"]["currency"], "EUR");
    assert_eq!(answer["book"]["read_as"], "absolute");
    assert_eq!(answer["book"]["capital"], answer["book"]["value"]);
    assert_eq!(answer["horizon"]["days"], 42);
    assert_eq!(answer["horizon"]["years"], 42.0 / 252.0);
    assert_eq!(answer["run"]["paths"], 2000);
    assert_eq!(answer["run"]["seed"], 7);
    assert_eq!(answer["run"]["steps"], 42);
    assert_eq!(answer["run"]["sampling"], "plain");
    assert_eq!(answer["limit"], Value::Null);
    assert_eq!(answer["limits"], Value::Array(Vec::new()));
    assert_eq!(answer["contributions"], Value::Array(Vec::new()));
    for list in ["group", "factor", "currency"] {
        assert_eq!(answer["contributions_by"][list], Value::Array(Vec::new()));
    }
}
