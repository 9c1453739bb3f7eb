//! Who may use whom: each rule takes sources and gives the places that break it, in words.
//! That the sources at hand keep them is tested next door, that each rule can find a break is tested here.

use super::source::Source;

/// Words that code of the engine must not hold: clocks, files, the surroundings, printing, unaddressed chance.
const KEPT_OUT_OF_ENGINE: [&str; 17] = [
    "std::time",
    "Instant::",
    "SystemTime",
    "Zoned::now",
    "Timestamp::now",
    "std::fs",
    "File::",
    "std::env",
    "std::process",
    "std::net",
    "println!",
    "print!(",
    "eprint",
    "dbg!",
    "rand::rng(",
    "thread_rng",
    "from_os_rng",
];
const THREAD_STARTERS: [&str; 5] =
    ["thread::spawn", "thread::Builder", "thread::scope", "rayon::spawn", "ThreadPoolBuilder"];
const COLOUR_NAMES: [&str; 3] = ["Color32::", "Rgba::", "hex_color!"];
const LIBRARIES_OF_ENGINE: [&str; 8] = ["csv", "faer", "jiff", "pulp", "rand", "rayon", "serde", "thiserror"];

/// Rule 1: the engine's manifest names only libraries of numbers, dates and text.
pub(super) fn foreign_libraries_of_engine(manifest: &str) -> Vec<String> {
    let section = manifest.split("[dependencies]").nth(1).unwrap_or("");
    let lines = section.lines().take_while(|line| !line.starts_with('['));
    let names = lines.filter_map(|line| line.split(['.', ' ', '=']).next()).filter(|name| !name.is_empty());
    names.filter(|name| !LIBRARIES_OF_ENGINE.contains(name)).map(str::to_owned).collect()
}

/// Rule 1: the engine reads no clock, opens no file, prints nothing and has no chance of its own.
pub(super) fn surroundings_in_engine(sources: &[Source]) -> Vec<String> {
    holding(sources, "app/engine/", &[], &KEPT_OUT_OF_ENGINE)
}

/// Rule 2: a room of the engine uses only rooms named above it in `lib.rs`.
pub(super) fn rooms_out_of_order(order: &[String], sources: &[Source]) -> Vec<String> {
    let rank = |room: &str| order.iter().position(|named| named == room);
    let mut breaks = Vec::new();
    for source in sources {
        let Some(own) = source.path.strip_prefix("app/engine/").and_then(|path| path.split('/').next())
        else {
            continue;
        };
        for (line, code) in source.code() {
            for used in rooms_after("crate::", code) {
                if rank(own).is_some() && rank(&used) > rank(own) {
                    breaks.push(format!("{}:{line} uses {used}, which stands below {own}", source.path));
                }
            }
        }
    }
    breaks
}

/// Rule 3: what a room of the program must not name.
pub(super) fn rooms_that_must_not_meet(sources: &[Source]) -> Vec<String> {
    let mut breaks = Vec::new();
    for (folder, kept_out) in [
        ("app/export/", &["crate::headless", "crate::desk", "crate::opening", "crate::workspace"][..]),
        ("app/headless/", &["crate::desk"][..]),
        ("app/desk/", &["crate::headless"][..]),
        ("app/opening/", &["crate::headless", "crate::desk", "crate::export", "crate::workspace"][..]),
        ("app/workspace/", &["crate::headless", "crate::desk", "crate::export"][..]),
    ] {
        breaks.extend(holding(sources, folder, &[], kept_out));
    }
    breaks
}

/// Rule 3: paper is drawn from finished figures and plain results.
pub(super) fn rooms_behind_paper(sources: &[Source]) -> Vec<String> {
    let mut breaks = Vec::new();
    for source in sources.iter().filter(|source| source.path.starts_with("app/export/")) {
        for (line, code) in source.code() {
            let used = rooms_after("ebbmark_engine::", code).into_iter();
            let behind = used.filter(|room| !["figures", "measures"].contains(&room.as_str()));
            breaks.extend(behind.map(|room| format!("{}:{line} uses {room}", source.path)));
        }
    }
    breaks
}

/// Rule 4: a panel names no other panel.
pub(super) fn panels_that_meet(sources: &[Source]) -> Vec<String> {
    let folder = "app/desk/panels/";
    let name = |source: &Source| {
        let rest = source.path.strip_prefix(folder)?;
        Some(rest.split(['/', '.']).next()?.to_owned())
    };
    let panels: Vec<String> = sources.iter().filter_map(name).filter(|name| name != "mod").collect();
    let mut breaks = Vec::new();
    for source in sources {
        let Some(own) = name(source).filter(|name| name != "mod") else { continue };
        for (line, code) in source.code() {
            let used = rooms_after("panels::", code).into_iter().chain(rooms_after("super::", code));
            let met = used.filter(|used| *used != own && panels.contains(used));
            breaks.extend(met.map(|other| format!("{}:{line} uses the panel {other}", source.path)));
        }
    }
    breaks
}

/// Rule 5: in the program only the worker starts threads.
pub(super) fn threads_outside_worker(sources: &[Source]) -> Vec<String> {
    holding(sources, "app/", &["app/engine/", "app/desk/worker"], &THREAD_STARTERS)
}

/// Rule 5: in the window only the theme names colours.
pub(super) fn colours_outside_theme(sources: &[Source]) -> Vec<String> {
    holding(sources, "app/desk/", &["app/desk/theme"], &COLOUR_NAMES)
}

/// Rule 5: only the workspace knows RON.
pub(super) fn ron_outside_workspace(sources: &[Source]) -> Vec<String> {
    holding(sources, "app/", &["app/workspace/"], &["ron::", "use ron"])
}

/// Every file opens with words on what lives there.
pub(super) fn files_without_opening_words(sources: &[Source]) -> Vec<String> {
    const FEWEST_CHARACTERS: usize = 50;
    let silent = sources.iter().filter(|source| source.opening_words().len() < FEWEST_CHARACTERS);
    silent.map(|source| source.path.clone()).collect()
}

/// Places below `folder`, the excepted ones aside, where code holds one of the words as a word of its own.
fn holding(sources: &[Source], folder: &str, excepted: &[&str], words: &[&str]) -> Vec<String> {
    let is_meant =
        |path: &str| path.starts_with(folder) && !excepted.iter().any(|part| path.starts_with(part));
    let mut breaks = Vec::new();
    for source in sources.iter().filter(|source| is_meant(&source.path)) {
        for (line, code) in source.code() {
            let held = words.iter().filter(|word| holds_word(code, word));
            breaks.extend(held.map(|word| format!("{}:{line} holds {word}", source.path)));
        }
    }
    breaks
}

fn holds_word(code: &str, word: &str) -> bool {
    let is_part = |before: &str| before.ends_with(|letter: char| letter.is_alphanumeric() || letter == '_');
    code.match_indices(word).any(|(at, _)| !is_part(&code[..at]))
}

/// Names that directly follow `prefix` in a line, those in braces too.
fn rooms_after(prefix: &str, code: &str) -> Vec<String> {
    let mut rooms = Vec::new();
    for (at, _) in code.match_indices(prefix) {
        let rest = &code[at + prefix.len()..];
        if let Some(list) = rest.strip_prefix('{') {
            rooms.extend(list.split([',', '}']).filter_map(leading_name));
        } else {
            rooms.extend(leading_name(rest));
        }
    }
    rooms
}

fn leading_name(text: &str) -> Option<String> {
    let name: String =
        text.trim().chars().take_while(|letter| letter.is_alphanumeric() || *letter == '_').collect();
    (!name.is_empty()).then_some(name)
}

/// Each rule finds a break in a made-up bad source, and none in its good neighbour.
#[cfg(test)]
mod tests {
    use super::*;

    fn check(rule: impl Fn(&[Source]) -> Vec<String>, path: &str, bad: &str, good: &str) {
        assert_eq!(rule(&[Source::made_up(path, bad)]).len(), 1, "{bad}");
        assert_eq!(rule(&[Source::made_up(path, good)]), Vec::<String>::new(), "{good}");
    }

    #[test]
    fn tidy_finds_a_screen_in_the_engine() {
        let manifest =
            "[dependencies]\ncsv.workspace = true\negui = \"1\"\n\n[dev-dependencies]\nimage = \"1\"\n";
        assert_eq!(foreign_libraries_of_engine(manifest), ["egui"]);
    }

    #[test]
    fn tidy_finds_surroundings_in_the_engine() {
        let path = "app/engine/maths/roots.rs";
        check(surroundings_in_engine, path, "let now = Instant::now();", "// Instant::now() would be wrong");
        check(surroundings_in_engine, path, "use std::fs;", "use std::fmt;");
        check(surroundings_in_engine, path, "println!(\"hm\");", "let sprintln = 1;");
    }

    #[test]
    fn tidy_finds_rooms_out_of_order() {
        let order = ["maths", "book", "measures"].map(str::to_owned);
        let rule = |sources: &[Source]| rooms_out_of_order(&order, sources);
        check(rule, "app/engine/book/read.rs", "use crate::measures::Reading;", "use crate::maths::roots;");
        check(rule, "app/engine/maths/roots.rs", "use crate::{book, maths};", "use crate::maths::estimate;");
    }

    #[test]
    fn tidy_finds_rooms_that_must_not_meet() {
        let rule = rooms_that_must_not_meet;
        check(rule, "app/headless/read.rs", "use crate::desk::theme;", "use crate::export::csv;");
        check(rule, "app/desk/mod.rs", "crate::headless::read::run();", "use crate::workspace::Document;");
        check(rule, "app/export/svg.rs", "use crate::workspace::Document;", "use crate::export::csv;");
        let rule = rooms_behind_paper;
        check(
            rule,
            "app/export/svg.rs",
            "use ebbmark_engine::book::Kind;",
            "use ebbmark_engine::figures::Axis;",
        );
    }

    #[test]
    fn tidy_finds_panels_that_meet() {
        let neighbour = || Source::made_up("app/desk/panels/strip.rs", "");
        let with = |code: &str| [Source::made_up("app/desk/panels/book.rs", code), neighbour()];
        assert_eq!(panels_that_meet(&with("use super::strip::height;")).len(), 1);
        assert_eq!(panels_that_meet(&with("use crate::desk::panels::strip;")).len(), 1);
        assert_eq!(panels_that_meet(&with("use crate::desk::plot::bands;")).len(), 0);
    }

    #[test]
    fn tidy_finds_threads_colours_and_ron_out_of_place() {
        let path = "app/desk/panels/book.rs";
        check(threads_outside_worker, path, "std::thread::spawn(run);", "thread_count();");
        check(colours_outside_theme, path, "let red = Color32::from_rgb(200, 0, 0);", "colour: Color32,");
        check(ron_outside_workspace, path, "ron::to_string(&document)", "electron::charge()");
        let worker = [Source::made_up("app/desk/worker/mod.rs", "std::thread::spawn(run);")];
        assert_eq!(threads_outside_worker(&worker).len(), 0);
    }

    #[test]
    fn tidy_finds_silent_files() {
        let words = "//! Roots of functions of one variable by bracketing; nothing here differentiates.";
        check(files_without_opening_words, "app/engine/maths/roots.rs", "fn root() {}", words);
    }
}
