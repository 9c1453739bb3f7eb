//! Every panel driven by its accessible labels: the book, the factor, the correlation map, the reading, the line.

use crate::hand::Hand;
use crate::support::{document, holding, inputs, session};
use ebbmark::desk::session::{RunState, Session};
use ebbmark::workspace::{Document, Kept, View, Workspace};
use ebbmark_engine::book::{Description, DiffusionKind, HalfLife, Holding, Kind, TypedFigure};
use ebbmark_engine::factors::{CorrelationTable, Inputs};
use egui::{Key, Modifiers, Role};
use egui_kittest::kittest::{NodeT, Queryable};
use std::sync::Arc;

fn hand() -> Hand {
    Hand::on(session())
}

/// Two shares beside the book's own, so that one correlation bounds another: .9 and .9 leave .62 to 1.
fn three_shares() -> Session {
    let volatility = Some(TypedFigure { value: 0.2, has_percent_sign: false });
    let share = |name: &str| Holding {
        description: Description { volatility, ..Description::default() },
        ..holding(name, Kind::Spot, 100.0, 50.0)
    };
    let names = ["Elm", "Oak", "Yew"].map(str::to_owned).to_vec();
    let cells = vec![1.0, 0.9, 0.7, 0.9, 1.0, 0.9, 0.7, 0.9, 1.0];
    let inputs = Inputs {
        holdings: vec![share("Elm"), share("Oak"), share("Yew")],
        correlation: Some(CorrelationTable { names, cells, lines: Vec::new() }),
        ..inputs()
    };
    let document = Document { inputs: Arc::new(inputs), ..document() };
    let workspace = Workspace { document, view: View::default() };
    Session::new(Kept { workspace, file: None, has_unsaved_edits: false })
}

#[test]
fn click_quantity_and_price_are_edited_on_the_row() {
    let mut hand = hand();
    hand.click("Quantity of Harbour");
    hand.enter("2,000");
    hand.click("Price of Harbour");
    hand.enter("51.5");
    let harbour = &hand.session().document().inputs.holdings[0];
    assert_eq!((harbour.quantity, harbour.price), (2_000.0, 51.5));
}

#[test]
fn click_a_field_left_as_it_was_changes_nothing() {
    let mut hand = hand();
    hand.click("Price of Harbour");
    hand.press(Modifiers::NONE, Key::Enter);
    hand.click("Loss limit");
    hand.press(Modifiers::NONE, Key::Enter);
    assert_eq!(hand.session().undo_text(), None);
}

#[test]
fn click_the_book_is_filtered_and_sorted() {
    let mut hand = hand();
    hand.click("Filter the book");
    hand.0.event(egui::Event::Text("rat".to_owned()));
    hand.0.run_steps(3);
    assert!(hand.0.query_by_label("Holding Harbour").is_none());
    assert!(hand.0.query_by_label("Holding Rate").is_some());
    hand.enter(" ");
    hand.enter("");
    hand.click("Sort by value");
    assert!(hand.session().view().order.is_some_and(|order| order.is_ascending));
}

#[test]
fn click_a_holding_is_added_named_and_removed() {
    let mut hand = hand();
    hand.click("Add holding");
    assert_eq!(hand.session().view().holding.as_deref(), Some("New holding"));
    hand.click("Holding");
    hand.click("Name of the holding");
    hand.enter("Lantern");
    assert!(hand.session().document().inputs.holdings.iter().any(|holding| holding.name == "Lantern"));
    assert!(hand.session().faults().is_empty());
    hand.0.get_by_label("Holding Lantern").click();
    hand.0.run_steps(4);
    hand.click("Remove holding");
    assert_eq!(hand.session().document().inputs.holdings.len(), 3);
}

#[test]
fn click_a_factor_is_given_another_diffusion() {
    let mut hand = hand();
    hand.click("Diffusion of Harbour");
    hand.click("reverting, on the log");
    let described = |hand: &Hand| hand.session().document().inputs.holdings[0].description.clone();
    assert_eq!(described(&hand).diffusion, Some(DiffusionKind::RevertingLog));
    hand.until("its run", |session| session.live().state == RunState::Finished);
    hand.click("Half-life of Harbour");
    hand.enter("40");
    assert_eq!(described(&hand).half_life, Some(HalfLife::Days(40.0)));
    hand.until("its run", |session| session.live().state == RunState::Finished);
    hand.click("Reversion, Half-life of Harbour");
    assert_eq!(described(&hand).half_life, Some(HalfLife::None));
}

#[test]
fn click_a_correlation_is_typed_into_the_map() {
    let mut hand = hand();
    hand.click("Correlation");
    hand.0.get_by_label("First factor");
    hand.click("Correlation of Rate and Harbour");
    hand.enter("0.25");
    let cells = |hand: &Hand| hand.session().document().inputs.correlation.clone().unwrap().cells;
    assert_eq!(cells(&hand), [1.0, 0.25, 0.25, 1.0]);
    // The middle of the map is the corner where four cells meet: the one below the diagonal's end is not it.
    hand.click("Correlation matrix");
    hand.press(Modifiers::NONE, Key::ArrowLeft);
    hand.press(Modifiers::NONE, Key::ArrowDown);
    assert_eq!(hand.session().view().cell, Some(("Rate".to_owned(), "Harbour".to_owned())));
    hand.0.event(egui::Event::Text("-".to_owned()));
    hand.0.run_steps(2);
    hand.0.event(egui::Event::Text("0.5".to_owned()));
    hand.0.run_steps(2);
    hand.press(Modifiers::NONE, Key::Enter);
    assert_eq!(cells(&hand), [1.0, -0.5, -0.5, 1.0]);
}

#[test]
fn click_an_impossible_matrix_is_told_at_once_and_taken_back() {
    let mut hand = Hand::on(three_shares());
    let generation = hand.session().live().generation;
    hand.click("Correlation");
    hand.click("First factor");
    hand.0.get_all_by_label("Yew").last().unwrap().click();
    hand.0.run_steps(4);
    hand.0.get_by_label("may be 0.62 to 1.00");
    hand.click("Correlation of Yew and Elm");
    hand.enter("-0.5");
    hand.until("the verdict", |session| !session.faults().is_empty());
    assert!(hand.session().live().is_before_edit);
    assert_eq!(hand.session().live().generation, generation);
    hand.0.get_by_label("may be 0.62 to 1.00");
    hand.click("Undo the edit");
    hand.until("the matrix as it was", |session| session.faults().is_empty());
}

#[test]
fn click_the_reading_is_set_where_it_is_read() {
    let mut hand = hand();
    hand.click("Confidence levels");
    hand.enter("90 %, 0.975; 99%");
    let levels: Vec<f64> =
        hand.session().document().settings.confidences.iter().map(|level| level.value()).collect();
    assert_eq!(levels, [0.9, 0.975, 0.99]);
    hand.until("the rows", |session| {
        session.live().at_line.as_ref().is_some_and(|line| line.reading.loss.len() == 3)
    });
    hand.click("Show 97.5 % confidence");
    assert_eq!(hand.session().document().settings.chosen_confidence.value(), 0.975);
    hand.click("Loss limit");
    hand.enter("7,500");
    assert_eq!(hand.session().document().settings.loss_limit, Some(7_500.0));
    hand.click("Capital");
    hand.enter("100000");
    assert_eq!(hand.session().document().settings.capital, Some(100_000.0));
    hand.click("Loss limit");
    hand.enter(" ");
    assert_eq!(hand.session().document().settings.loss_limit, None);
}

#[test]
fn click_levels_that_are_none_are_refused_in_words() {
    let mut hand = hand();
    hand.click("Confidence levels");
    hand.enter("40 %");
    assert_eq!(hand.session().undo_text(), None);
    hand.0.get_by_label("Expected levels between 50 and 100 %, for example 95 %, 99 %");
}

#[test]
fn click_the_line_is_moved_with_keys_and_at_one_press() {
    let mut hand = hand();
    hand.click("Read at 10 days");
    assert_eq!(hand.session().reading_day(), 10);
    hand.0.get_by_label("Reading line").focus();
    hand.0.run_steps(2);
    hand.press(Modifiers::NONE, Key::ArrowRight);
    hand.press(Modifiers::NONE, Key::ArrowRight);
    hand.press(Modifiers::NONE, Key::PageUp);
    assert_eq!(hand.session().reading_day(), 33);
    hand.press(Modifiers::NONE, Key::Home);
    assert_eq!(hand.session().reading_day(), 1);
    hand.press(Modifiers::NONE, Key::End);
    assert_eq!(hand.session().reading_day(), 63);
}

#[test]
fn click_a_horizon_beyond_the_end_is_looked_at() {
    let mut hand = hand();
    hand.click("Read at 1 year");
    hand.until("the longer run", |session| session.reading_day() == 252);
    assert_eq!(hand.session().document().settings.horizon_days, 252);
}

#[test]
fn click_every_control_has_a_name() {
    let mut hand = hand();
    for tab in ["Correlation", "Horizon"] {
        hand.click(tab);
        for role in
            [Role::Button, Role::ComboBox, Role::SpinButton, Role::TextInput, Role::Slider, Role::CheckBox]
        {
            for node in hand.0.query_all_by_role(role) {
                let name = node.accesskit_node().label().or(node.accesskit_node().value());
                assert!(name.is_some_and(|name| !name.trim().is_empty()), "a {role:?} without a name");
            }
        }
    }
}
