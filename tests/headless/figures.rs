//! Figures as the commands answer them: the same for any threads, the same as the engine's at that day of a longer
//! run, the same from a file with decimal commas, and gains told as gains.

use super::support::{ONE_SHARE, call, read_json, without_seconds, write};
use ebbmark::opening::built_in_example;
use ebbmark::workspace::{Document, Settings};
use ebbmark_engine::measures::{self, Conventions, LossFrom};
use ebbmark_engine::simulate::{self, Plan, Unwatched};
use serde_json::Value;

#[test]
fn always_the_same_for_any_number_of_threads() {
    let one = without_seconds(read_json(&["--threads", "1", "--loss-limit", "4000000"]));
    for threads in ["2", "3", "16"] {
        let many = without_seconds(read_json(&["--threads", threads, "--loss-limit", "4000000"]));
        assert_eq!(one, many, "{threads} threads");
    }
}

#[test]
fn always_another_seed_is_another_sample() {
    assert_ne!(read_json(&["--seed", "1"])["loss"], read_json(&["--seed", "2"])["loss"]);
}

/// What `read --horizon 21` prints are the digits of a run to 63 days read at day 21.
#[test]
fn agree_horizon_and_longer_run_read_at_that_day() {
    let (document, _) = Document::of_book(built_in_example().unwrap(), &Settings::usual());
    let model = document.assemble().unwrap().model;
    let loss_limit = Some(4e6);
    let plan = Plan { paths: 2000, seed: 1, kept_days: (1..=63).collect(), loss_limit, threads: None };
    let sample = simulate::run(&model, &plan, &Unwatched).unwrap().sample(21).unwrap();
    let confidences = ["0.95", "0.99"].map(|level| level.parse().unwrap()).to_vec();
    let conventions = Conventions { confidences, loss_from: LossFrom::Today, loss_limit };
    // Through text as well, so that both sides are parsed alike.
    let text = serde_json::to_string(&measures::reading(&model, &sample, &conventions)).unwrap();
    let reading: Value = serde_json::from_str(&text).unwrap();
    let answer = read_json(&["--horizon", "21", "--loss-limit", "4000000"]);
    for part in ["moments", "loss", "drawdown", "limit"] {
        assert_eq!(answer[part], reading[part], "{part}");
    }
}

#[test]
fn agree_decimal_comma_and_point() {
    let point = "name;quantity;price;volatility\nBrook;1000.5;50.25;20%\n";
    let with_point = write("figures/point", "book.csv", point);
    let with_comma = write("figures/comma", "book.csv", &point.replace('.', ","));
    let figures = |path: &str| without_seconds(read_json(&["--positions", path]));
    assert_eq!(figures(&with_point), figures(&with_comma));
}

#[test]
fn agree_files_named_and_told_apart_by_headers() {
    let folder = "example-portfolios/three-holdings";
    let (positions, correlation) = (format!("{folder}/positions.csv"), format!("{folder}/correlation.csv"));
    let named = call(&["read", "--positions", &positions, "--correlation", &correlation]);
    // Without a display the window answers in text; the order of the files does not matter.
    let told_apart = call(&[&correlation, &positions]);
    assert_eq!(told_apart.code, 0, "{}", told_apart.err);
    assert_eq!(named.out, told_apart.out);
}

#[test]
fn exact_a_gain_in_the_tail_stays_negative_and_is_called_a_gain() {
    let sure = "name,kind,quantity,price,carry\nDeposit,cash,100000,,12%\n";
    let deposit = write("figures", "deposit.csv", sure);
    let answer = read_json(&["--positions", &deposit]);
    // 100,000 x 0.12 x 21/252, to rounding.
    let var = answer["loss"][1]["var"].as_f64().unwrap();
    assert!((var + 1000.0).abs() < 1e-9 * 100_000.0, "{var}");
    assert_eq!(
        answer["moments"]["skewness"],
        serde_json::json!({"exact": null, "sampled": null, "standard_error": null})
    );
    let table = call(&["read", "--positions", &deposit, "--paths", "1000"]).out;
    assert!(table.contains("-1,000") && table.contains("(gain)"), "{table}");
}

#[test]
fn exact_open_range_is_null_and_said_in_words() {
    // With 1,000 paths and 99.9 % no order statistic is high enough: 1 - 0.999^1000 = 0.63 < 0.975.
    let share = write("figures", "open.csv", ONE_SHARE);
    let line = ["read", "--positions", &share, "--paths", "1000", "--confidence", "0.999"];
    let table = call(&line).out;
    let answer: Value = serde_json::from_str(&call(&[&line[..], &["--json"]].concat()).out).unwrap();
    assert!(answer["loss"][0]["var"].is_number());
    assert_eq!(answer["loss"][0]["var_high"], Value::Null);
    assert!(table.contains("no upper end"), "{table}");
}
