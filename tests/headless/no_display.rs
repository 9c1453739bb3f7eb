//! Where no window can be had: one sentence on standard error, the reading on standard output, exit code 0.

use super::support::{Call, ONE_SHARE, call, command, write};

fn check(call: &Call, words: &str) {
    assert_eq!(call.code, 0, "{}", call.err);
    let sentences = call.err.lines().filter(|line| line.starts_with("ebbmark:")).count();
    assert_eq!(sentences, 1, "{}", call.err);
    assert!(call.err.contains("no window:") && call.err.contains("ebbmark read"), "{}", call.err);
    assert!(call.err.contains(words), "{}", call.err);
    assert!(!call.err.contains("panicked"), "{}", call.err);
    assert!(call.out.contains("99 % VaR"), "{}", call.out);
}

#[test]
fn exact_no_display_prints_the_example() {
    let without = call(&[]);
    check(&without, "there is no display");
    let read = call(&["read"]);
    assert_eq!(without.out, read.out);
}

#[test]
fn exact_no_display_prints_the_files_named() {
    let share = write("no_display", "brook.csv", ONE_SHARE);
    let without = call(&[&share]);
    check(&without, "there is no display");
    assert!(without.out.starts_with("brook"), "{}", without.out);
}

#[test]
fn exact_wrong_display_prints_the_example() {
    let wrong = command(&[]).env("DISPLAY", ":4711").output().unwrap().into();
    check(&wrong, "DISPLAY");
}
