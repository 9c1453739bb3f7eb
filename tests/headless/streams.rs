//! What goes to which stream, and the exit codes. What the answer says is looked at elsewhere.

use super::support::{ONE_SHARE, call, command, write};
use serde_json::Value;
use std::io::Read;
use std::process::Stdio;

#[test]
fn exact_answer_alone_on_standard_output() {
    // One share without a correlation file: a notice says so, or none is due; either way it is not in the answer.
    let two =
        write("streams", "two.csv", "name,quantity,price,volatility\nBrook,10,50,20%\nWeir,10,40,30%\n");
    let call = call(&["read", "--positions", &two, "--paths", "1000", "--json"]);
    assert_eq!(call.code, 0);
    let answer: Value = serde_json::from_str(&call.out).unwrap();
    let texts: Vec<&str> =
        answer["notices"].as_array().unwrap().iter().map(|notice| notice["text"].as_str().unwrap()).collect();
    assert!(!texts.is_empty());
    for text in texts {
        assert!(call.err.contains(text), "{text}");
    }
}

#[test]
fn exact_quiet_silences_notices_and_not_errors() {
    let two =
        write("streams", "quiet.csv", "name,quantity,price,volatility\nBrook,10,50,20%\nWeir,10,40,30%\n");
    assert_eq!(call(&["read", "--positions", &two, "--paths", "1000", "--quiet"]).err, "");
    let bad = write("streams", "bad.csv", "name,quantity,price,volatility\nBrook,ten,50,20%\n");
    let refused = call(&["read", "--positions", &bad, "--quiet"]);
    assert_eq!((refused.code, refused.out.as_str()), (2, ""));
    assert!(refused.err.contains("line 2"), "{}", refused.err);
}

#[test]
fn exact_no_progress_where_standard_error_is_no_terminal() {
    let share = write("streams", "share.csv", ONE_SHARE);
    let call = call(&["read", "--positions", &share, "--paths", "200000"]);
    assert!(!call.err.contains('\r') && !call.err.contains("paths"), "{}", call.err);
}

#[test]
fn exact_help_explains_each_option_with_its_unit() {
    let call = call(&["read", "--help"]);
    assert_eq!((call.code, call.err.as_str()), (0, ""));
    for words in [
        "--horizon",
        "trading days",
        "--confidence",
        "--paths",
        "--seed",
        "--threads",
        "--loss-from",
        "--days-per-year",
        "--as-of",
        "YYYY-MM-DD",
        "--book-currency",
        "ISO 4217",
        "--capital",
        "--loss-limit",
        "money of the book's currency",
        "--repair",
        "--json",
        "--quiet",
        "--workspace",
        "--positions",
        "--exposures",
        "--factors",
        "--correlation",
        "--holidays",
        "--history",
        "not investment advice",
    ] {
        assert!(call.out.contains(words), "{words}");
    }
}

#[test]
fn exact_missing_files_are_named() {
    let call = call(&["read", "--positions", "no-such-book.csv"]);
    assert_eq!((call.code, call.out.as_str()), (2, ""));
    assert!(call.err.contains("no-such-book.csv"), "{}", call.err);
}

#[test]
fn exact_closed_pipe_is_no_fault() {
    let mut child = command(&["read", "--paths", "1000", "--json", "--quiet"])
        .stdout(Stdio::piped())
        .stderr(Stdio::piped())
        .spawn()
        .unwrap();
    drop(child.stdout.take());
    let mut err = String::new();
    child.stderr.take().unwrap().read_to_string(&mut err).unwrap();
    assert_eq!((child.wait().unwrap().code(), err.as_str()), (Some(0), ""));
}
