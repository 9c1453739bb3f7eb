//! The window driven by its accessible labels, without a screen: what a hand does from opening to export.

use crate::hand::Hand;
use crate::support::{Folder, session};
use ebbmark::desk::commands::{Command, ExportKind};
use ebbmark::desk::session::RunState;
use ebbmark::desk::start::session_of;
use ebbmark::workspace::{Tab, Theme};
use egui::{Key, Modifiers, vec2};
use egui_kittest::kittest::Queryable;
use std::path::{Path, PathBuf};
use std::sync::Arc;

#[test]
fn click_the_window_opens_with_the_example_and_its_reading() {
    let hand = Hand::on(session_of(&[], None));
    assert!(!hand.session().document().inputs.holdings.is_empty());
    assert!(hand.session().faults().is_empty() && hand.session().refusal().is_none());
    assert!(hand.session().live().at_line.is_some() && hand.session().live().bands.is_some());
}

#[test]
fn click_a_volatility_is_typed_in_place_and_taken_back() {
    let mut hand = Hand::on(session());
    hand.click("Harbour");
    hand.click("Volatility of Harbour");
    hand.enter("31");
    assert_eq!(hand.volatility(), 0.31);
    hand.until("its run", |session| session.live().state == RunState::Finished);
    hand.click("Undo");
    assert_eq!(hand.volatility(), 0.2);
    hand.click("Redo");
    assert_eq!(hand.volatility(), 0.31);
    hand.press(Modifiers::COMMAND, Key::Z);
    assert_eq!(hand.volatility(), 0.2);
}

#[test]
fn click_a_dragged_value_is_one_step() {
    let mut hand = Hand::on(session());
    hand.click("Harbour");
    hand.drag("Volatility of Harbour", vec2(60.0, 0.0));
    assert!(hand.volatility() > 0.2, "{}", hand.volatility());
    hand.click("Undo");
    assert_eq!(hand.volatility(), 0.2);
    assert_eq!(hand.session().undo_text(), None);
}

#[test]
fn click_the_line_is_dragged_in_one_step_without_a_run() {
    let mut hand = Hand::on(session());
    let generation = hand.session().live().generation;
    hand.drag("Reading line", vec2(120.0, 0.0));
    let day = hand.session().reading_day();
    assert!(day > 21, "{day}");
    hand.until("the reading", |session| session.live().at_line.as_ref().is_some_and(|line| line.day == day));
    assert_eq!(hand.session().live().generation, generation);
    hand.click("Undo");
    assert_eq!(hand.session().reading_day(), 21);
    assert_eq!(hand.session().undo_text(), None);
}

#[test]
fn click_a_book_is_opened_by_its_path() {
    let folder = Folder::new();
    let book = folder.write("mole.csv", "name,quantity,price,volatility\nMole,50,40,25%\nQuay,5,10,0.3\n");
    let correlation = folder.write("c.csv", "factor,Mole,Quay\nMole,1,0.5\nQuay,0.5,1\n");
    let mut hand = Hand::on(session());
    hand.open_by_path(&[&correlation, &book]);
    hand.until("the book", |session| session.document().name == "mole");
    assert!(hand.session().document().inputs.correlation.is_some());
    assert_eq!(hand.session().path_field(), None);
}

/// A file that a hand lets go over the window.
#[derive(Debug)]
struct Dropped(PathBuf);

impl egui::DroppedFile for Dropped {
    fn path(&self) -> &Path {
        &self.0
    }

    fn bytes(&self) -> Result<Vec<u8>, String> {
        std::fs::read(&self.0).map_err(|error| error.to_string())
    }
}

#[test]
fn click_files_dropped_together_open_as_one_book() {
    let folder = Folder::new();
    let book = folder.write("mole.csv", "name,quantity,price,volatility\nMole,50,40,25%\nQuay,5,10,0.3\n");
    let correlation = folder.write("c.csv", "factor,Mole,Quay\nMole,1,0.5\nQuay,0.5,1\n");
    let mut hand = Hand::on(session());
    for file in [correlation, book] {
        hand.0.input_mut().dropped_files.push(Arc::new(Dropped(file)));
    }
    hand.until("the book", |session| session.document().name == "mole");
    assert!(hand.session().document().inputs.correlation.is_some());
    hand.until("its figures", |session| session.live().state == RunState::Finished);
}

#[test]
fn click_a_bad_file_is_refused_with_a_way_back() {
    let folder = Folder::new();
    let book = folder.write("bad.csv", "name,quantity,price,volatility\nMole,x,40,25%\nQuay,5,-1,0.3\n");
    let mut hand = Hand::on(session());
    hand.open_by_path(&[&book]);
    hand.until("the refusal", |session| session.refusal().is_some());
    hand.0.get_by_label("Not opened: 2 things to mend");
    hand.click("Keep small");
    assert!(hand.session().refusal().is_none());
    assert_eq!(hand.session().document().name, "small");
}

#[test]
fn click_what_is_saved_is_opened_again_as_it_was() {
    let folder = Folder::new();
    let mut hand = Hand::on(session());
    hand.click("Harbour");
    hand.click("Volatility of Harbour");
    hand.enter("44");
    hand.click("Save");
    hand.until("the path field", |session| session.path_field().is_some());
    hand.enter(&folder.file("book.ron").display().to_string());
    hand.until("the file", |session| !session.has_unsaved_edits());
    hand.click("Dark");
    hand.click("Correlation");
    hand.click("Save");
    hand.until("the file again", |session| session.notices().all().len() >= 2);

    let mut again = Hand::on(session());
    again.open_by_path(&[&folder.file("book.ron")]);
    again.until("the workspace", |session| session.file().is_some());
    assert_eq!(again.volatility(), 0.44);
    assert_eq!((again.session().view().theme, again.session().view().tab), (Theme::Dark, Tab::Correlation));
}

#[test]
fn click_the_reading_is_exported_as_it_is_shown() {
    let folder = Folder::new();
    let path = folder.file("reading.csv");
    let mut hand = Hand::on(session());
    hand.drag("Reading line", vec2(120.0, 0.0));
    hand.click("Export…");
    hand.click("Reading as CSV…");
    hand.until("the path field", |session| session.path_field().is_some());
    hand.enter(&path.display().to_string());
    hand.until("the file", |_| path.exists());
    let at_line = hand.session().live().at_line.clone().unwrap();
    let text = std::fs::read_to_string(&path).unwrap();
    assert!(text.contains(&format!("horizon_days,,{},", hand.session().reading_day())), "{text}");
    assert!(text.contains(&format!("var,0.99,{},", at_line.reading.loss[1].var)), "{text}");
}

#[test]
fn click_every_kind_of_export_is_written_or_told() {
    let folder = Folder::new();
    let mut hand = Hand::on(session());
    for (number, kind) in ExportKind::ALL.into_iter().enumerate() {
        let path = folder.file(&format!("{number}.{}", kind.extension()));
        hand.0.state_mut().push(Command::Export(kind, path.clone()));
        hand.until("the file", |_| path.exists());
        let bytes = std::fs::read(&path).unwrap();
        let is_as_named = match kind {
            ExportKind::Svg(_) => bytes.starts_with(b"<svg"),
            ExportKind::Png(_) => png_size(&bytes) == [1920, 1080],
            ExportKind::LargePng(_) => png_size(&bytes) == [3840, 2160],
            ExportKind::Numbers(_) | ExportKind::Reading => bytes.contains(&b','),
        };
        assert!(is_as_named, "{kind:?}");
    }
    let nowhere = folder.file("no/such/folder.svg");
    hand.0.state_mut().push(Command::Export(ExportKind::ALL[0], nowhere));
    hand.until("the notice", |session| session.notices().all().iter().any(|note| note.is_failure));
}

/// Width and height in a PNG's first chunk.
fn png_size(bytes: &[u8]) -> [u32; 2] {
    [16, 20].map(|at| u32::from_be_bytes(bytes[at..at + 4].try_into().unwrap()))
}

#[test]
fn click_the_smallest_window_shows_the_same() {
    let mut hand = Hand::at_size(session(), [1100.0, 700.0]);
    hand.click("Harbour");
    hand.click("Volatility of Harbour");
    hand.enter("31");
    assert_eq!(hand.volatility(), 0.31);
    hand.drag("Reading line", vec2(60.0, 0.0));
    assert!(hand.session().reading_day() > 21);
}
