//! The sources at hand keep the rules. What a rule says stands next door.

use super::rules;
use super::source::{read, sources};

fn check(breaks: &[String]) {
    assert!(breaks.is_empty(), "\n{}", breaks.join("\n"));
}

/// Rooms of the engine in the order in which `lib.rs` names them.
fn order_of_rooms() -> Vec<String> {
    let lib = read("app/engine/lib.rs");
    let rooms = lib.lines().filter_map(|line| line.strip_prefix("pub mod ")?.strip_suffix(';'));
    rooms.map(str::to_owned).collect()
}

#[test]
fn tidy_sources_are_found() {
    assert!(sources(&["app"]).len() > 40, "the rules below would hold of nothing");
    let rooms = ["maths", "tables", "history", "book", "factors", "fit", "simulate", "measures", "figures"];
    assert_eq!(order_of_rooms(), rooms);
}

#[test]
fn tidy_engine_has_no_screen_clock_files_or_printing() {
    check(&rules::foreign_libraries_of_engine(&read("app/engine/Cargo.toml")));
    check(&rules::surroundings_in_engine(&sources(&["app/engine"])));
}

#[test]
fn tidy_rooms_of_the_engine_stand_in_order() {
    check(&rules::rooms_out_of_order(&order_of_rooms(), &sources(&["app/engine"])));
}

#[test]
fn tidy_paper_commands_and_screen_keep_apart() {
    check(&rules::rooms_that_must_not_meet(&sources(&["app"])));
    check(&rules::rooms_behind_paper(&sources(&["app/export"])));
}

#[test]
fn tidy_panels_do_not_use_each_other() {
    check(&rules::panels_that_meet(&sources(&["app/desk/panels"])));
}

#[test]
fn tidy_only_the_worker_starts_threads() {
    check(&rules::threads_outside_worker(&sources(&["app"])));
}

#[test]
fn tidy_only_the_theme_names_colours() {
    check(&rules::colours_outside_theme(&sources(&["app/desk"])));
}

#[test]
fn tidy_only_the_workspace_knows_ron() {
    check(&rules::ron_outside_workspace(&sources(&["app"])));
}

#[test]
fn tidy_every_file_opens_with_its_words() {
    check(&rules::files_without_opening_words(&sources(&["app", "tests", "example-portfolios"])));
}
