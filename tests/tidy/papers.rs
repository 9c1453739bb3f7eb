//! The top level and the papers in it: what lies there, what the README opens with, marks left behind.

use super::source::{Source, read, root, sources};
use std::fs;

const TOP_LEVEL: [&str; 13] = [
    ".ci",
    ".clippy.toml",
    ".gitignore",
    ".rustfmt.toml",
    "Cargo.lock",
    "Cargo.toml",
    "DEVELOPERS.md",
    "LICENSE",
    "README.md",
    "app",
    "assets",
    "example-portfolios",
    "tests",
];
/// Made by tools, never part of the project.
const BESIDE: [&str; 2] = [".git", "target"];

/// Commands in the code blocks that stand before the guide.
fn commands_before_guide(readme: &str) -> Vec<&str> {
    let head = readme.split("\n## ").next().unwrap_or_default();
    let blocks = head.split("```").skip(1).step_by(2);
    blocks.flat_map(|block| block.lines().skip(1)).filter(|line| !line.trim().is_empty()).collect()
}

/// Marks of work left undone, in code or comments.
fn unfinished(source: &Source) -> Vec<String> {
    // Put together here, so that this file does not hold what it looks for.
    let marks = [["TO", "DO"], ["FIX", "ME"], ["to", "do!"], ["unimpl", "emented!"], ["#[ig", "nore"]];
    let held =
        marks.map(|parts| parts.concat()).into_iter().filter(|mark| source.text().contains(mark.as_str()));
    held.map(|mark| format!("{} holds {mark}", source.path)).collect()
}

#[test]
fn tidy_top_level_is_as_fixed() {
    let entries = fs::read_dir(root()).unwrap().map(|entry| entry.unwrap().file_name());
    let mut names: Vec<String> = entries.map(|name| name.to_string_lossy().into_owned()).collect();
    names.retain(|name| !BESIDE.contains(&name.as_str()));
    names.sort();
    assert_eq!(names, TOP_LEVEL);
}

#[test]
fn tidy_readme_opens_with_two_commands() {
    let commands = commands_before_guide(&read("README.md")).join("\n");
    assert_eq!(commands, "cargo run --release\ncargo test --workspace");
}

#[test]
fn tidy_commands_before_the_guide_are_counted() {
    let readme = "# Name\n\n```sh\ncargo run\n\ncargo test\n```\n\n## Guide\n\n```sh\ncargo doc\n```\n";
    assert_eq!(commands_before_guide(readme), ["cargo run", "cargo test"]);
}

#[test]
fn tidy_nothing_is_marked_unfinished() {
    let breaks: Vec<String> =
        sources(&["app", "tests", "example-portfolios"]).iter().flat_map(unfinished).collect();
    assert!(breaks.is_empty(), "\n{}", breaks.join("\n"));
    let bad = Source::made_up("app/read.rs", &["// TO", "DO: more"].concat());
    assert_eq!(unfinished(&bad).len(), 1);
}
