//! Undo and redo over everything edited; a whole drag is one step.

use crate::support::session;
use ebbmark::desk::commands::{Command, HoldingChange, Parameter, SettingChange};
use ebbmark::desk::session::Session;
use ebbmark::workspace::Tab;
use ebbmark_engine::book::{DiffusionKind, Kind};
use ebbmark_engine::measures::LossFrom;

fn quantity(quantity: f64) -> Command {
    Command::ChangeHolding { row: 0, change: HoldingChange::Quantity(quantity) }
}

fn reading_day(day: u32) -> Command {
    Command::ChangeSetting(SettingChange::ReadingDay(day))
}

/// One command of each kind that edits.
fn edits() -> Vec<Command> {
    let volatility = Parameter::Volatility(0.31);
    vec![
        Command::RenameBook("other".to_owned()),
        Command::AddHolding(Box::new(crate::support::holding("New", Kind::Cash, 5.0, 1.0))),
        Command::RemoveHolding { row: 1 },
        quantity(7.0),
        Command::SetDiffusion { factor: "Harbour".to_owned(), kind: DiffusionKind::RevertingLog },
        Command::SetParameter { factor: "Harbour".to_owned(), parameter: volatility },
        Command::SetCorrelation { row: "Harbour".to_owned(), column: "Rate".to_owned(), value: 0.5 },
        Command::ChangeSetting(SettingChange::LossFrom(LossFrom::Mean)),
        Command::ChangeSetting(SettingChange::Seed(9)),
        reading_day(5),
    ]
}

#[test]
fn always_undo_takes_back_every_edit_and_redo_does_it_again() {
    for edit in edits() {
        let mut session = session();
        let before = session.document().clone();
        session.apply(edit.clone());
        let after = session.document().clone();
        assert_ne!(before, after, "{edit:?} edits nothing");
        assert_eq!(session.undo_text(), Some(edit.text().as_str()));
        session.apply(Command::Undo);
        assert_eq!(*session.document(), before, "{edit:?}");
        assert_eq!(session.redo_text(), Some(edit.text().as_str()));
        session.apply(Command::Redo);
        assert_eq!(*session.document(), after, "{edit:?}");
    }
}

#[test]
fn always_all_edits_in_a_row_are_taken_back_in_order() {
    let mut session = session();
    let mut states = vec![session.document().clone()];
    for edit in edits() {
        session.apply(edit);
        session.end_gesture();
        states.push(session.document().clone());
    }
    for state in states.iter().rev().skip(1) {
        session.apply(Command::Undo);
        assert_eq!(session.document(), state);
    }
    assert_eq!(session.undo_text(), None);
}

fn quantities(session: &mut Session, values: &[f64]) {
    values.iter().for_each(|value| {
        session.apply(quantity(*value));
    });
}

#[test]
fn always_a_drag_is_one_step() {
    let mut session = session();
    quantities(&mut session, &[1_001.0, 1_002.0, 1_003.0]);
    session.end_gesture();
    quantities(&mut session, &[1_010.0, 1_020.0]);
    session.end_gesture();
    session.apply(Command::Undo);
    assert_eq!(session.document().inputs.holdings[0].quantity, 1_003.0);
    session.apply(Command::Undo);
    assert_eq!(session.document().inputs.holdings[0].quantity, 1_000.0);
}

#[test]
fn always_another_target_within_a_gesture_is_another_step() {
    let mut session = session();
    session.apply(quantity(1_001.0));
    session.apply(Command::ChangeHolding { row: 1, change: HoldingChange::Quantity(3.0) });
    session.apply(Command::Undo);
    assert_eq!(session.document().inputs.holdings[0].quantity, 1_001.0);
    assert_eq!(session.document().inputs.holdings[1].quantity, -2_000.0);
}

#[test]
fn always_a_drag_of_the_line_is_one_step() {
    let mut session = session();
    (22..40).for_each(|day| {
        session.apply(reading_day(day));
    });
    session.end_gesture();
    session.apply(Command::Undo);
    assert_eq!(session.document().settings.reading_day, 21);
    session.apply(Command::Redo);
    assert_eq!(session.document().settings.reading_day, 39);
}

#[test]
fn always_an_edit_forgets_what_could_be_redone() {
    let mut session = session();
    session.apply(quantity(1.0));
    session.apply(Command::Undo);
    session.apply(reading_day(3));
    assert_eq!(session.redo_text(), None);
}

#[test]
fn always_what_changes_nothing_is_no_step() {
    let mut session = session();
    session.apply(quantity(1_000.0));
    session.apply(quantity(f64::NAN));
    session.apply(Command::RemoveHolding { row: 99 });
    session.apply(Command::ShowTab(Tab::Correlation));
    assert_eq!(session.undo_text(), None);
}

#[test]
fn always_undo_back_to_the_saved_state_leaves_nothing_unsaved() {
    let mut session = session();
    assert!(!session.has_unsaved_edits());
    session.apply(quantity(1.0));
    assert!(session.has_unsaved_edits());
    session.apply(Command::Undo);
    assert!(!session.has_unsaved_edits());
}
