//! Runs, readings and files: what the worker's threads make of a session's requests.

use crate::support::{Driven, Folder, document, session};
use ebbmark::desk::commands::{Command, Parameter, SettingChange};
use ebbmark::desk::session::{RunState, Session};
use ebbmark::desk::worker::assemble::kept_days;
use ebbmark::desk::worker::files::whole_path;
use ebbmark::desk::worker::{Answer, Figures};
use ebbmark_engine::book::DiffusionKind;
use ebbmark_engine::factors::Model;
use ebbmark_engine::measures::{Reading, reading};
use ebbmark_engine::simulate::{Plan, Unwatched, run};
use std::path::{Path, PathBuf};

fn is_settled(session: &Session) -> bool {
    let live = session.live();
    let paths = session.document().settings.paths;
    live.state == RunState::Finished
        && live.at_line.as_ref().is_some_and(|line| {
            line.paths == Some(paths)
                && line.day == session.reading_day()
                && line.conventions == session.document().settings.conventions()
        })
}

fn settled(session: Session) -> Driven {
    let mut driven = Driven::start(session);
    driven.until("the first run", is_settled);
    driven
}

fn set(change: SettingChange) -> Command {
    Command::ChangeSetting(change)
}

fn volatility(value: f64) -> Command {
    Command::SetParameter { factor: "Harbour".to_owned(), parameter: Parameter::Volatility(value) }
}

/// What `ebbmark read --horizon day` computes for the session's document.
fn read_alone(session: &Session, day: u32) -> Reading {
    let document = session.document();
    let settings = &document.settings;
    let model = Model::assemble(&document.inputs, &settings.model_settings()).unwrap();
    let plan = Plan {
        paths: settings.paths,
        seed: settings.seed,
        kept_days: vec![day],
        loss_limit: settings.loss_limit,
        threads: Some(1),
    };
    let sample = run(&model, &plan, &Unwatched).unwrap().sample(day).unwrap();
    reading(&model, &sample, &settings.conventions())
}

#[test]
fn agree_the_line_shows_what_a_run_to_its_day_alone_gives() {
    let mut driven = settled(session());
    let generation = driven.session.live().generation;
    for day in [21, 1, 40, 63] {
        driven.apply(set(SettingChange::ReadingDay(day)));
        driven.until("the reading", is_settled);
        let shown = &driven.session.live().at_line.as_ref().unwrap().reading;
        assert_eq!(*shown, read_alone(&driven.session, day), "day {day}");
    }
    assert_eq!(driven.session.live().generation, generation, "moving the line starts no run");
}

#[test]
fn agree_other_confidences_and_origins_are_read_without_a_run() {
    let mut driven = settled(session());
    let generation = driven.session.live().generation;
    let levels = ["0.9", "0.975"].map(|level| level.parse().unwrap()).to_vec();
    driven.apply(set(SettingChange::Confidences(levels)));
    driven.until("the reading", is_settled);
    let live = driven.session.live();
    assert_eq!(live.generation, generation);
    assert_eq!(live.at_line.as_ref().unwrap().reading, read_alone(&driven.session, 21));
}

#[test]
fn always_a_first_answer_in_closed_form_comes_before_the_paths() {
    let mut driven = Driven::start(session());
    driven.until("a first reading", |session| session.live().at_line.is_some());
    assert_eq!(driven.session.live().at_line.as_ref().unwrap().paths, None);
    driven.until("the run", is_settled);
    driven.until("bands on all days", |session| {
        session.live().bands.as_ref().is_some_and(|bands| !bands.is_closed_form && bands.days.len() == 63)
    });
    let live = driven.session.live();
    assert_eq!((live.paths_done, live.days.len()), (4_000, 63));
}

#[test]
fn always_a_line_that_never_rests_keeps_nothing_waiting() {
    let mut session = session();
    session.apply(set(SettingChange::Paths(100_000)));
    let mut driven = Driven::start(session);
    for day in (1..=63).cycle().take(1_000_000) {
        driven.apply(set(SettingChange::ReadingDay(day)));
        driven.take_one();
        let bands = driven.session.live().bands.as_ref();
        if bands.is_some_and(|bands| !bands.is_closed_form && bands.days.len() == 63) {
            assert_eq!(driven.session.live().state, RunState::Finished);
            return;
        }
    }
    panic!("the bands waited for the line");
}

#[test]
fn always_an_edit_starts_a_run_and_answers_of_the_old_one_are_dropped() {
    let mut driven = settled(session());
    let old = driven.session.live().generation;
    let old_line = driven.session.live().at_line.clone().unwrap();
    driven.apply(volatility(0.4));
    driven.until("the new run", |session| session.live().generation > old && is_settled(session));
    let new_line = driven.session.live().at_line.clone().unwrap();
    assert!(new_line.reading.loss[0].var > old_line.reading.loss[0].var * 1.5);
    driven.session.take(Answer::Figures { generation: old, figures: Figures::AtLine(old_line) });
    assert_eq!(driven.session.live().at_line.as_ref().unwrap().reading, new_line.reading);
}

#[test]
fn always_an_invalid_edit_leaves_the_last_valid_run() {
    let mut session = session();
    session.apply(Command::SetDiffusion { factor: "Rate".to_owned(), kind: DiffusionKind::RevertingLog });
    let mut driven = settled(session);
    let before = driven.session.live().at_line.clone().unwrap();
    // A log factor needs a level above 0.
    driven.apply(Command::SetParameter { factor: "Rate".to_owned(), parameter: Parameter::Level(-1.0) });
    driven.until("its faults", |session| !session.faults().is_empty());
    let live = driven.session.live();
    assert!(live.is_before_edit && live.state == RunState::Finished);
    assert_eq!(live.at_line.as_ref().unwrap().reading, before.reading);
    driven.apply(set(SettingChange::ReadingDay(5)));
    driven.until("the old run at another day", |session| {
        session.live().at_line.as_ref().is_some_and(|line| line.day == 5)
    });
    driven.apply(Command::Undo);
    driven.apply(Command::Undo);
    driven.until("a valid run", is_settled);
    assert!(driven.session.faults().is_empty() && !driven.session.live().is_before_edit);
}

#[test]
fn always_a_run_can_be_stopped_and_started_again() {
    let mut driven = settled(session());
    driven.apply(set(SettingChange::Paths(5_000_000)));
    driven.until("some paths", |session| {
        session.live().paths_done > 0 && session.live().state == RunState::Running
    });
    driven.apply(Command::StopRun);
    driven.until("the stop", |session| session.live().state == RunState::Stopped);
    assert!(driven.session.live().at_line.as_ref().unwrap().paths.unwrap() < 5_000_000);
    driven.apply(set(SettingChange::Paths(2_000)));
    driven.until("a whole run", is_settled);
}

#[test]
fn exact_all_days_are_kept_while_they_fit() {
    let check = |paths, horizon, budget, expected: &[u32]| {
        assert_eq!(kept_days(paths, horizon, budget), expected);
    };
    check(10, 4, 4 * 160, &[1, 2, 3, 4]);
    check(10, 4, 4 * 160 - 1, &[1, 2, 4]);
    check(10, 30, 0, &[1, 10, 21, 30]);
    check(10, 30, 6 * 160, &[1, 10, 20, 21, 30]);
    assert_eq!(kept_days(100_000, 504, 1 << 30).len(), 504);
}

#[test]
fn always_kept_days_keep_to_the_budget() {
    for paths in [1_000, 150_000, 1_000_000, 5_000_000] {
        for horizon in [1, 21, 22, 252, 504] {
            let days = kept_days(paths, horizon, 1 << 30);
            assert!(days.is_sorted_by(|a, b| a < b) && days.last() == Some(&horizon));
            assert!(days.len() * paths * 16 <= 1 << 30, "{paths} paths, {horizon} days");
            let one_press = [1, 10, 21, 63, 126, 252].into_iter().filter(|day| *day <= horizon);
            assert!(one_press.into_iter().all(|day| days.contains(&day)));
        }
    }
}

#[test]
fn always_paths_are_kept_from_the_root_on() {
    assert!(whole_path(Path::new("book.ron")).is_absolute());
    let home = std::env::var("HOME").unwrap_or_default();
    if !home.is_empty() {
        assert_eq!(whole_path(Path::new("~/a/b.csv")), Path::new(&home).join("a/b.csv"));
    }
    assert_eq!(whole_path(Path::new("/a/~b.csv")), Path::new("/a/~b.csv"));
}

const POSITIONS: &str = "name,quantity,price,volatility\nQuay,100,20,0.3\nMole,50,40,25%\n";
const CORRELATION: &str = "factor,Quay,Mole\nQuay,1,0.4\nMole,0.4,1\n";

fn open(driven: &mut Driven, paths: Vec<PathBuf>) {
    driven.apply(Command::Open(paths));
}

#[test]
fn always_files_together_open_as_one_book() {
    let folder = Folder::new();
    let files = vec![folder.write("a.csv", CORRELATION), folder.write("quays.csv", POSITIONS)];
    let mut driven = Driven::start(session());
    open(&mut driven, files);
    driven.until("the book", |session| session.document().name == "quays" && is_settled(session));
    let inputs = &driven.session.document().inputs;
    assert_eq!((inputs.holdings.len(), inputs.correlation.is_some()), (2, true));
    assert!(!driven.session.has_unsaved_edits());
    driven.apply(Command::Undo);
    assert_eq!(*driven.session.document(), document());
}

/// Only the book's currency is left to be said: the book is there, and figures of the one before are not shown as its.
#[test]
fn always_a_book_without_its_currency_is_opened_and_asked_for() {
    let folder = Folder::new();
    let positions = folder.write("two.csv", "name,quantity,price,currency\nA,1,1,EUR\nB,1,1,USD\n");
    let factors = folder.write("f.csv", "factor,level,volatility\nA,,0.1\nB,,0.1\nUSD/EUR,0.9,0.08\n");
    let mut driven = settled(session());
    open(&mut driven, vec![positions, factors]);
    driven.until("the question", |session| !session.faults().is_empty());
    assert_eq!(driven.session.document().name, "two");
    assert!(driven.session.live().at_line.is_none() && driven.session.live().model.is_none());
    driven.apply(set(SettingChange::BookCurrency(Some("EUR".to_owned()))));
    driven.until("its figures", is_settled);
    assert_eq!(driven.session.live().model.as_ref().unwrap().value, 1.9);
}

#[test]
fn always_a_correlation_alone_joins_the_book() {
    let folder = Folder::new();
    let mut driven = Driven::start(session());
    open(&mut driven, vec![folder.write("quays.csv", POSITIONS)]);
    driven.until("the book", |session| session.document().name == "quays");
    open(&mut driven, vec![folder.write("c.csv", CORRELATION)]);
    driven.until("the correlation", |session| session.document().inputs.correlation.is_some());
    assert_eq!(driven.session.document().name, "quays");
}

#[test]
fn always_a_bad_file_leaves_the_session_and_lists_every_bad_line() {
    let folder = Folder::new();
    let bad = folder.write("bad.csv", "name,quantity,price,volatility\nA,x,1,0.1\nB,1,y,0.1\nC,1,1,0.1\n");
    let good = folder.write("c.csv", CORRELATION);
    let mut driven = settled(session());
    let before = driven.session.document().clone();
    open(&mut driven, vec![bad, good]);
    driven.until("the refusal", |session| session.refusal().is_some());
    let lines: Vec<_> =
        driven.session.refusal().unwrap().faults.iter().map(|fault| fault.place.line).collect();
    assert!(lines.contains(&Some(2)) && lines.contains(&Some(3)), "{lines:?}");
    assert_eq!(*driven.session.document(), before);
    driven.apply(Command::DismissRefusal);
    assert!(driven.session.refusal().is_none());
}

#[test]
fn always_a_saved_workspace_opens_as_it_was() {
    let folder = Folder::new();
    let path = folder.file("kept");
    let mut driven = Driven::start(session());
    driven.apply(volatility(0.27));
    driven.apply(Command::SaveAs(path.clone()));
    driven.until("the file", |session| !session.has_unsaved_edits());
    assert_eq!(driven.session.file(), Some(&folder.file("kept.ron")));
    let saved = driven.session.document().clone();
    driven.apply(volatility(0.5));
    assert!(driven.session.has_unsaved_edits());
    open(&mut driven, vec![folder.file("kept.ron")]);
    driven.until("the workspace", |session| *session.document() == saved);
    assert!(!driven.session.has_unsaved_edits());
    driven.apply(volatility(0.3));
    driven.apply(Command::Save);
    driven.until("the file again", |session| !session.has_unsaved_edits());
}

#[test]
fn always_what_can_not_be_written_is_told() {
    let folder = Folder::new();
    let mut driven = Driven::start(session());
    driven.apply(volatility(0.27));
    driven.apply(Command::SaveAs(folder.file("no/such/folder.ron")));
    driven.until("the notice", |session| session.notices().all().iter().any(|note| note.is_failure));
    assert!(driven.session.has_unsaved_edits());
}
