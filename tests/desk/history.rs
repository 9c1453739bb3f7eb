//! A history in the session: what it fills, what stands above it, how it is kept, and what becomes of it when it is lost.

use crate::hand::Hand;
use crate::support::{Driven, Folder, document, holding, inputs, session};
use ebbmark::desk::commands::{Command, FitChange, Parameter, SettingChange};
use ebbmark::desk::session::{RunState, Session};
use ebbmark::desk::worker::Ranging;
use ebbmark::workspace::{BookHistory, Document, Kept, MatrixOrder, View, Workspace, read, write};
use ebbmark_engine::book::{Description, DiffusionKind, Holding, Kind};
use ebbmark_engine::factors::{CorrelationTable, Inputs, Origin};
use ebbmark_engine::fit::{Estimator, FitSettings};
use egui_kittest::kittest::Queryable;
use std::path::Path;
use std::sync::Arc;

/// Levels of the small book's two factors: waves without a common period, 300 days of them.
fn levels() -> String {
    let mut text = "date,Harbour,Rate\n".to_owned();
    for day in 0..300_u32 {
        let date = jiff::civil::date(2031, 1, 1).saturating_add(jiff::Span::new().days(day));
        let wave = |speed: f64| (f64::from(day) * speed).sin();
        text.push_str(&format!("{date},{:.4},{:.4}\n", 50.0 + wave(0.8) + wave(2.3), 2.5 + 0.1 * wave(1.3)));
    }
    text
}

/// The small book with nothing typed about its factors but that the rate's level reverts.
fn open_inputs() -> Inputs {
    let mut inputs = inputs();
    inputs.correlation = None;
    inputs.holdings[0].description = Description::default();
    let diffusion = Some(DiffusionKind::RevertingLevel);
    inputs.holdings[1].description = Description { diffusion, ..Description::default() };
    inputs
}

fn with_history(folder: &Folder) -> Document {
    let path = folder.write("levels.csv", &levels());
    let opened = ebbmark::opening::read_history_file(&path).unwrap();
    let history = Some(BookHistory::of(opened, FitSettings::usual()));
    Document { inputs: Arc::new(open_inputs()), history, ..document() }
}

fn session_of(document: Document) -> Session {
    let workspace = Workspace { document, view: View::default() };
    Session::new(Kept { workspace, file: None, has_unsaved_edits: false })
}

fn driven(folder: &Folder) -> Driven {
    let mut driven = Driven::start(session_of(with_history(folder)));
    driven.until("the first run", |session| session.live().state == RunState::Finished);
    driven
}

fn volatility(session: &Session, factor: usize) -> (f64, Origin) {
    let factor = &session.live().model.as_ref().unwrap().factors[factor];
    (factor.diffusion.volatility(), factor.origins.volatility)
}

#[test]
fn always_a_history_fills_and_what_is_typed_stands_above_it() {
    let folder = Folder::new();
    let mut driven = driven(&folder);
    let (fitted, origin) = volatility(&driven.session, 0);
    assert_eq!(origin, Origin::Fitted);
    // These waves revert, and the evidence says so.
    let fit = driven.session.live().fit.as_ref().unwrap().factor("Harbour").unwrap().clone();
    assert_eq!(fit.chosen, Some(DiffusionKind::RevertingLog));
    assert_eq!(fitted, fit.reverting_log.unwrap().volatility.value);
    let parameter = Parameter::Volatility(0.33);
    driven.apply(Command::SetParameter { factor: "Harbour".to_owned(), parameter });
    let typed = driven.session.document().inputs.holdings[0].description.diffusion;
    assert_eq!(typed, Some(DiffusionKind::RevertingLog), "a parameter is typed for the diffusion shown");
    driven.until("the typed one", |session| volatility(session, 0) == (0.33, Origin::Typed));
    driven.apply(Command::TakeDiffusion {
        factors: vec!["Harbour".to_owned()],
        kind: DiffusionKind::Geometric,
    });
    driven.until("the fitted one", |session| volatility(session, 0).1 == Origin::Fitted);
    let kind = driven.session.live().model.as_ref().unwrap().factors[0].diffusion.kind();
    assert_eq!(kind, DiffusionKind::Geometric);
    driven.apply(Command::Undo);
    driven.until("the typed one again", |session| volatility(session, 0) == (0.33, Origin::Typed));
}

#[test]
fn always_settings_of_the_fit_are_steps_and_stay_in_their_bounds() {
    let folder = Folder::new();
    let mut driven = driven(&folder);
    let settings = |driven: &Driven| driven.session.document().history.as_ref().unwrap().settings.clone();
    for change in
        [FitChange::ChangeDays(3), FitChange::WeightHalfLife(0.0), FitChange::WeightHalfLife(f64::NAN)]
    {
        driven.apply(Command::ChangeFit(change));
        assert_eq!(settings(&driven), FitSettings::usual());
    }
    driven.apply(Command::ChangeFit(FitChange::Estimator(Estimator::ShrunkConstant)));
    driven.until("the new estimator", |session| {
        let fit = session.live().fit.as_ref();
        fit.and_then(|fit| fit.correlation.as_ref()).is_some_and(|fitted| fitted.shrinkage.is_some())
    });
    driven.apply(Command::Undo);
    assert_eq!(settings(&driven), FitSettings::usual());
    driven.apply(Command::LeaveHistory);
    driven.until("what is missing now", |session| !session.faults().is_empty());
    driven.apply(Command::Undo);
    driven.until("the history again", |session| session.faults().is_empty());
}

#[test]
fn always_a_workspace_finds_its_history_again_or_keeps_what_it_gave() {
    let folder = Folder::new();
    let driven = driven(&folder);
    let path = folder.file("book.ron");
    let saved = Workspace { document: driven.session.document().clone(), view: View::default() };
    write(&path, &saved).unwrap();
    let sd = |document: &Document| {
        let model = document.assemble().unwrap().model;
        ebbmark_engine::measures::exact_moments(&model, 21).sd
    };
    let expected = sd(&saved.document);
    assert_eq!(sd(&read(&path).unwrap().document), expected);
    // Moved together with the workspace it is found beside it.
    let other = Folder::new();
    for name in ["book.ron", "levels.csv"] {
        std::fs::rename(folder.file(name), other.file(name)).unwrap();
    }
    let moved = read(&other.file("book.ron")).unwrap().document;
    assert!(moved.history.as_ref().unwrap().history().is_some());
    // Changed or lost, the figures are those it gave, and a notice says so.
    for text in [Some("date,Harbour\n2031-01-01,5\n"), None] {
        match text {
            Some(text) => drop(other.write("levels.csv", text)),
            None => std::fs::remove_file(other.file("levels.csv")).unwrap(),
        }
        let document = read(&other.file("book.ron")).unwrap().document;
        assert!(document.history.as_ref().unwrap().history().is_none());
        assert_eq!(sd(&document), expected);
        let notices = document.assemble().unwrap().model.notices;
        assert!(notices.iter().any(|notice| notice.text.contains("not at hand")), "{notices:?}");
    }
}

#[test]
fn always_a_workspace_of_before_histories_still_opens() {
    let folder = Folder::new();
    let path = folder.file("old.ron");
    write(&path, &Workspace { document: document(), view: View::default() }).unwrap();
    let text = std::fs::read_to_string(&path).unwrap();
    let lines =
        text.lines().filter(|line| !line.contains("history:") && !line.contains("repairs_correlation"));
    let old: Vec<&str> = lines.collect();
    assert_eq!(old.len() + 2, text.lines().count());
    std::fs::write(&path, old.join("\n")).unwrap();
    assert_eq!(read(&path).unwrap().document, document());
}

#[test]
fn always_a_dropped_history_joins_the_book() {
    let folder = Folder::new();
    let path = folder.write("levels.csv", &levels());
    let mut driven = Driven::start(session());
    driven.until("the first run", |session| session.live().state == RunState::Finished);
    driven.apply(Command::Open(vec![path]));
    driven.until("its fit", |session| session.live().fit.is_some());
    assert_eq!(driven.session.document().inputs.holdings.len(), 3);
    assert_eq!(driven.session.document().as_of(), Some(jiff::civil::date(2031, 10, 27)));
    let both = folder.write("both.csv", "date,Harbour\n2031-01-01,5\nyesterday,6\n");
    driven.apply(Command::Open(vec![both]));
    driven.until("the refusal", |session| session.refusal().is_some());
    assert!(driven.session.live().fit.is_some());
}

#[test]
fn always_the_range_belongs_to_what_is_shown() {
    let folder = Folder::new();
    let mut driven = driven(&folder);
    driven.apply(Command::RangeParameters);
    driven.until("the range", |session| matches!(session.live().ranging, Some(Ranging::Done(_))));
    let Some(Ranging::Done(range)) = &driven.session.live().ranging else { unreachable!() };
    let losses = &driven.session.live().at_line.as_ref().unwrap().reading.loss;
    assert_eq!(range.loss.len(), losses.len());
    assert!(range.loss.iter().all(|row| row.var_low < row.var_high && row.es_low < row.es_high));
    driven.apply(Command::ChangeSetting(SettingChange::ReadingDay(5)));
    assert!(driven.session.live().ranging.is_none());
    driven.until("the reading there", |session| {
        session.live().at_line.as_ref().is_some_and(|line| line.day == 5)
    });
    driven.apply(Command::RangeParameters);
    driven.apply(Command::StopRange);
    assert!(driven.session.live().ranging.is_none());
}

#[test]
fn click_the_range_is_asked_for_and_read() {
    let folder = Folder::new();
    let mut hand = Hand::on(session_of(with_history(&folder)));
    hand.click("Range over the parameters");
    hand.until("the range", |session| matches!(session.live().ranging, Some(Ranging::Done(_))));
    hand.0.get_by_label("VaR 99 %");
}

/// Three shares whose correlations can't hold together: eigenvalues 1.9, 1.9 and -0.8.
fn impossible() -> Session {
    let share = |name: &str| {
        let description = inputs().holdings[0].description.clone();
        let factor = Some(format!("{name} wood"));
        Holding { description, factor, ..holding(name, Kind::Spot, 100.0, 50.0) }
    };
    let names = ["Elm wood", "Oak wood", "Yew wood"].map(str::to_owned).to_vec();
    let cells = vec![1.0, -0.9, -0.9, -0.9, 1.0, -0.9, -0.9, -0.9, 1.0];
    let mut possible = cells.clone();
    possible.iter_mut().filter(|cell| **cell < 0.0).for_each(|cell| *cell = -0.2);
    let table = |cells| Some(CorrelationTable { names: names.clone(), cells, lines: Vec::new() });
    let holdings = vec![share("Elm"), share("Oak"), share("Yew")];
    let inputs = Inputs { holdings, correlation: table(possible), ..inputs() };
    session_of(Document { inputs: Arc::new(inputs), ..document() })
}

#[test]
fn click_an_impossible_matrix_is_repaired_by_a_press_and_undone() {
    let mut hand = Hand::on(impossible());
    hand.click("Correlation");
    for (row, column) in [("Oak wood", "Elm wood"), ("Yew wood", "Elm wood"), ("Yew wood", "Oak wood")] {
        hand.0.state_mut();
        choose(&mut hand, row, column);
        hand.click(&format!("Correlation of {row} and {column}"));
        hand.enter("-0.9");
    }
    hand.until("the offer", |session| session.repair_offered().is_some());
    hand.click("Use the nearest valid matrix");
    hand.until("the repaired model", |session| {
        session.live().model.as_ref().is_some_and(|model| model.repair.is_some())
    });
    let correlation = &hand.session().live().model.as_ref().unwrap().correlation;
    assert!((correlation.at(0, 1) + 0.5).abs() < 1e-6, "{}", correlation.at(0, 1));
    hand.click("Undo");
    hand.until("the faults again", |session| !session.faults().is_empty());
}

/// Chooses a cell by the two lists; a name that is chosen already is left alone.
fn choose(hand: &mut Hand, row: &str, column: &str) {
    for (list, name) in [("First factor", row), ("Second factor", column)] {
        hand.click(list);
        let choices: Vec<_> = hand.0.query_all_by_label(name).collect();
        choices.last().unwrap().click();
        hand.0.run_steps(4);
    }
}

#[test]
fn click_the_matrix_is_ordered_by_closeness() {
    let mut hand = Hand::on(impossible());
    hand.click("Correlation");
    hand.click("Like beside like");
    assert_eq!(hand.session().view().matrix_order, MatrixOrder::Closeness);
    hand.click("As in the book");
    assert_eq!(hand.session().view().matrix_order, MatrixOrder::Book);
    assert_eq!(hand.session().undo_text(), None);
}

#[test]
fn always_a_missing_history_is_refused_at_its_path() {
    let faults = ebbmark::opening::read_history_file(Path::new("nowhere/levels.csv")).unwrap_err();
    assert!(faults.to_string().contains("nowhere/levels.csv"));
}
