//! Workspaces and kept sessions: what is written is read again, whole or not at all.

use crate::support::{Folder, document};
use ebbmark::workspace::format::{
    FormatError, kept_of_text, text_of_kept, text_of_workspace, workspace_of_text,
};
use ebbmark::workspace::{
    Beginning, BookColumn, BookOrder, Document, Kept, MatrixOrder, Settings, Slot, Tab, Theme, View,
    Workspace, read, write, write_whole,
};
use ebbmark_engine::measures::LossFrom;
use jiff::civil::date;
use std::sync::Arc;

/// A workspace in which nothing stands as usual.
fn workspace() -> Workspace {
    let usual = document();
    let settings = Settings {
        book_currency: Some("EUR".to_owned()),
        days_per_year: 250.0,
        repairs_correlation: true,
        as_of: Some(date(2031, 3, 14)),
        capital: Some(1.0e6 / 3.0),
        loss_limit: Some(0.1),
        loss_from: LossFrom::Mean,
        confidences: ["0.9", "0.975", "0.999"].map(|level| level.parse().unwrap()).to_vec(),
        chosen_confidence: "0.975".parse().unwrap(),
        paths: 12_345,
        seed: u64::MAX,
        horizon_days: 100,
        reading_day: 7,
    };
    let view = View {
        tab: Tab::Correlation,
        theme: Theme::Dark,
        factor: Some("Rate".to_owned()),
        holding: Some("Harbour".to_owned()),
        cell: Some(("Harbour".to_owned(), "Rate".to_owned())),
        matrix_order: MatrixOrder::Closeness,
        marked: vec!["Rate".to_owned()],
        order: Some(BookOrder { column: BookColumn::Value, is_ascending: false }),
        filter: "har".to_owned(),
    };
    let holidays = Some(Arc::new(vec![date(2031, 4, 11), date(2031, 4, 14)]));
    Workspace { document: Document { name: "Größe \"1\"".to_owned(), holidays, settings, ..usual }, view }
}

#[test]
fn always_a_workspace_reads_back_the_same() {
    let workspace = workspace();
    let text = text_of_workspace(&workspace).unwrap();
    assert_eq!(workspace_of_text(&text), Ok(workspace));
}

#[test]
fn always_a_kept_session_reads_back_the_same() {
    let kept = Kept { workspace: workspace(), file: Some("a/b.ron".into()), has_unsaved_edits: true };
    assert_eq!(kept_of_text(&text_of_kept(&kept).unwrap()), Ok(kept));
}

/// Interface: a newer format is refused with both numbers, and the file is left untouched.
#[test]
fn exact_a_newer_format_is_refused_with_both_numbers() {
    let folder = Folder::new();
    let text = "(format: 2, something_new: [1, 2])";
    let path = folder.write("newer.ron", text);
    let words = read(&path).unwrap_err().to_string();
    assert!(words.contains("format 2") && words.contains("format 1"), "{words}");
    assert_eq!(std::fs::read_to_string(&path).unwrap(), text);
}

#[test]
fn always_a_damaged_workspace_is_refused_with_its_line() {
    let text = text_of_workspace(&workspace()).unwrap().replace("seed: ", "seed: x");
    let line = text.lines().position(|line| line.contains("seed")).unwrap() + 1;
    assert!(
        matches!(workspace_of_text(&text), Err(FormatError::Unreadable { line: found, .. }) if found == line)
    );
    let text = text_of_workspace(&workspace()).unwrap().replace("0.999", "1.0");
    assert!(matches!(workspace_of_text(&text), Err(FormatError::Unreadable { .. })));
    for cut in [0, 10, text.len() / 2] {
        assert!(workspace_of_text(&text[..cut]).is_err());
    }
}

#[test]
fn always_settings_out_of_range_are_refused() {
    let text = text_of_workspace(&workspace()).unwrap();
    for (from, to) in [
        ("paths: 12345", "paths: 999"),
        ("reading_day: 7", "reading_day: 101"),
        ("days_per_year: 250.0", "days_per_year: inf"),
        ("chosen_confidence: \"0.975\"", "chosen_confidence: \"0.95\""),
    ] {
        let bad = text.replace(from, to);
        assert_ne!(bad, text, "{from} is not written");
        assert!(matches!(workspace_of_text(&bad), Err(FormatError::Value { .. })), "{to}");
    }
}

/// A workspace is text: a hand may have been at it, and nothing it can write ends in a panic further on.
#[test]
fn always_rows_that_no_file_could_hold_are_refused() {
    let text = text_of_workspace(&workspace()).unwrap();
    for (from, to) in [
        ("quantity: 1000.0", "quantity: NaN"),
        ("price: 50.0", "price: -50.0"),
        ("price: 50.0", "price: inf"),
        ("name: \"Rate\"", "name: \"Harbour\""),
        ("name: \"Rate\"", "name: \"\""),
        ("cells: [1.0, -0.3, -0.3, 1.0]", "cells: [1.0, -0.3, -0.3]"),
        ("cells: [1.0, -0.3, -0.3, 1.0]", "cells: [1.0, -0.3, 0.3, 1.0]"),
        ("cells: [1.0, -0.3, -0.3, 1.0]", "cells: [1.0, -1.3, -1.3, 1.0]"),
        ("cells: [1.0, -0.3, -0.3, 1.0]", "cells: [0.9, -0.3, -0.3, 1.0]"),
    ] {
        let bad = text.replace(from, to);
        assert_ne!(bad, text, "{from} is not written in\n{text}");
        assert!(matches!(workspace_of_text(&bad), Err(FormatError::Value { .. })), "{to}");
    }
}

#[test]
fn always_writing_replaces_the_file_whole_and_leaves_nothing_beside() {
    let folder = Folder::new();
    let path = folder.file("book.ron");
    write(&path, &workspace()).unwrap();
    let other = Workspace { document: document(), view: View::default() };
    write(&path, &other).unwrap();
    assert_eq!(read(&path).unwrap(), other);
    assert_eq!(folder.names(), ["book.ron"]);
}

#[test]
fn always_a_failed_write_leaves_the_old_file() {
    let folder = Folder::new();
    std::fs::create_dir(folder.file("taken")).unwrap();
    folder.write("taken/inside", "old");
    assert!(write_whole(&folder.file("taken"), b"new").is_err());
    assert_eq!(std::fs::read_to_string(folder.file("taken/inside")).unwrap(), "old");
    assert_eq!(folder.names(), ["taken"]);
    assert!(write_whole(&folder.file("no/such/folder"), b"new").is_err());
}

fn kept(name: &str, has_unsaved_edits: bool) -> Kept {
    let document = Document { name: name.to_owned(), ..document() };
    Kept { workspace: Workspace { document, view: View::default() }, file: None, has_unsaved_edits }
}

fn name(kept: Option<Kept>) -> Option<String> {
    kept.map(|kept| kept.workspace.document.name)
}

#[test]
fn always_the_last_session_is_found_again() {
    let folder = Folder::new();
    let (slot, found) = Slot::take(folder.path(), Beginning::Last).unwrap();
    assert_eq!(name(found), None);
    slot.keep(&kept("first", true)).unwrap();
    slot.keep(&kept("second", true)).unwrap();
    drop(slot);
    let (_slot, found) = Slot::take(folder.path(), Beginning::Last).unwrap();
    assert_eq!(name(found), Some("second".to_owned()));
}

#[test]
fn always_two_programs_at_once_keep_two_sessions() {
    let folder = Folder::new();
    let (one, _) = Slot::take(folder.path(), Beginning::Last).unwrap();
    one.keep(&kept("one", true)).unwrap();
    let (two, found) = Slot::take(folder.path(), Beginning::Last).unwrap();
    assert_eq!(name(found), None, "the first program still runs");
    two.keep(&kept("two", true)).unwrap();
    drop((one, two));
    let (one, first) = Slot::take(folder.path(), Beginning::Last).unwrap();
    let (_two, second) = Slot::take(folder.path(), Beginning::Last).unwrap();
    let mut names = [name(first), name(second)];
    names.sort();
    assert_eq!(names, [Some("one".to_owned()), Some("two".to_owned())]);
    drop(one);
}

#[test]
fn always_other_files_leave_a_session_with_unsaved_edits_alone() {
    let folder = Folder::new();
    let (slot, _) = Slot::take(folder.path(), Beginning::Last).unwrap();
    slot.keep(&kept("typed", true)).unwrap();
    drop(slot);
    let (other, found) = Slot::take(folder.path(), Beginning::Other).unwrap();
    assert_eq!(name(found), None);
    other.keep(&kept("other", false)).unwrap();
    let (_slot, found) = Slot::take(folder.path(), Beginning::Last).unwrap();
    assert_eq!(name(found), Some("typed".to_owned()));
}

#[test]
fn always_a_session_of_a_newer_program_is_left_as_it_is() {
    let folder = Folder::new();
    let text = "(format: 9)";
    let path = folder.write("session-1.ron", text);
    let (slot, found) = Slot::take(folder.path(), Beginning::Last).unwrap();
    assert_eq!(name(found), None);
    slot.keep(&kept("mine", true)).unwrap();
    assert_eq!(std::fs::read_to_string(path).unwrap(), text);
}
