//! Workspaces as the commands read them: their settings are taken, options on the line stand above them, and one of a
//! newer format is refused untouched. What a workspace keeps is tested with the window.

use super::support::{call, read_json, without_seconds, write};
use ebbmark::opening::built_in_example;
use ebbmark::workspace::{self, Document, Settings, View, Workspace};
use std::path::Path;

/// The example as a workspace that reads it at 42 days with another seed and a loss limit.
fn saved(name: &str) -> String {
    let (mut document, _) = Document::of_book(built_in_example().unwrap(), &Settings::usual());
    let settings = &mut document.settings;
    (settings.seed, settings.reading_day, settings.loss_limit) = (5, 42, Some(4e6));
    let path = write("workspace", name, "");
    workspace::write(Path::new(&path), &Workspace { document, view: View::default() }).unwrap();
    path
}

#[test]
fn agree_workspace_and_the_options_it_keeps() {
    let path = saved("kept.ron");
    let workspace = without_seconds(read_json(&["--workspace", &path]));
    let spelled = read_json(&["--seed", "5", "--horizon", "42", "--loss-limit", "4000000"]);
    assert_eq!(workspace, without_seconds(spelled));
}

#[test]
fn exact_options_stand_above_the_workspace() {
    let path = saved("above.ron");
    let line = ["--workspace", &path, "--seed", "9", "--horizon", "10", "--confidence", "0.9"];
    let answer = read_json(&line);
    assert_eq!(answer["run"]["seed"], 9);
    assert_eq!(answer["horizon"]["days"], 10);
    assert_eq!(answer["loss"][0]["confidence"], 0.9);
    assert_eq!(answer["limit"]["loss"], 4e6);
}

#[test]
fn exact_newer_format_is_refused_with_both_numbers() {
    let path = saved("newer.ron");
    let newer = std::fs::read_to_string(&path).unwrap().replace("format: 1", "format: 7");
    std::fs::write(&path, &newer).unwrap();
    let call = call(&["read", "--workspace", &path]);
    assert_eq!((call.code, call.out.as_str()), (2, ""));
    assert!(call.err.contains("format 7") && call.err.contains("format 1"), "{}", call.err);
    assert_eq!(std::fs::read_to_string(&path).unwrap(), newer);
}

#[test]
fn exact_text_that_is_no_workspace_is_refused() {
    let path = write("workspace", "words.ron", "(format: 1, name: 3)");
    let call = call(&["read", "--workspace", &path]);
    assert_eq!(call.code, 2);
    assert!(call.err.contains("words.ron"), "{}", call.err);
}
