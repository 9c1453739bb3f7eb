//! Edits as functions of the inputs: where a figure is written, and what follows it.

use crate::support::{document, figure, holding};
use ebbmark::desk::commands::{Command, HoldingChange, Parameter, SettingChange};
use ebbmark::desk::session::edits::edited;
use ebbmark::workspace::Document;
use ebbmark_engine::book::{Exposure, HalfLife, Kind, Per};
use ebbmark_engine::factors::{FactorRow, Inputs};
use ebbmark_engine::measures::Confidence;
use std::sync::Arc;

fn after(document: &Document, command: Command) -> Document {
    edited(document, None, &command).expect("the command edits")
}

fn with(change: impl FnOnce(&mut Inputs)) -> Document {
    let mut document = document();
    change(Arc::make_mut(&mut document.inputs));
    document
}

fn change(row: usize, change: HoldingChange) -> Command {
    Command::ChangeHolding { row, change }
}

fn volatility(factor: &str, value: f64) -> Command {
    Command::SetParameter { factor: factor.to_owned(), parameter: Parameter::Volatility(value) }
}

fn confidence(text: &str) -> Confidence {
    text.parse().unwrap()
}

#[test]
fn always_a_parameter_is_written_where_the_factor_is_described() {
    let document = after(&document(), volatility("Harbour", 0.25));
    let written = document.inputs.holdings[0].description.volatility.unwrap();
    assert_eq!((written.value, written.has_percent_sign), (0.25, true));
    assert!(document.inputs.factors.is_empty());
}

#[test]
fn always_a_reverting_level_takes_its_own_units_without_a_sign() {
    let document = after(&document(), volatility("Rate", 0.9));
    assert_eq!(document.inputs.holdings[1].description.volatility, figure(0.9));
}

/// A factor described in two rows would differ from itself after an edit of one: it is described once afterwards.
#[test]
fn always_an_edited_factor_is_described_once() {
    let document = with(|inputs| {
        let mut second = holding("Second", Kind::Spot, 1.0, 50.0);
        second.factor = Some("Harbour".to_owned());
        second.description.volatility = figure(0.2);
        inputs.holdings.push(second);
    });
    let inputs = after(&document, volatility("Harbour", 0.4)).inputs;
    assert_eq!(inputs.holdings[0].description.volatility.unwrap().value, 0.4);
    assert_eq!(inputs.holdings[3].description.volatility, None);
}

#[test]
fn always_a_factor_without_a_row_is_given_one() {
    let inputs = after(&document(), volatility("USD/EUR", 0.08)).inputs;
    assert_eq!(inputs.factors.len(), 1);
    assert_eq!(inputs.factors[0].description.volatility.unwrap().value, 0.08);
}

#[test]
fn always_level_rows_of_a_factor_share_its_level() {
    let document = with(|inputs| {
        let mut second = holding("Second", Kind::Level, 1.0, 2.5);
        second.factor = Some("Rate".to_owned());
        inputs.holdings.push(second);
    });
    let inputs = after(&document, change(1, HoldingChange::Price(2.75))).inputs;
    assert_eq!([inputs.holdings[1].price, inputs.holdings[3].price], [2.75, 2.75]);
    assert_eq!(inputs.holdings[0].price, 50.0);
}

#[test]
fn always_sensitivities_follow_their_holding() {
    let exposure = |holding: &str| Exposure {
        holding: holding.to_owned(),
        factor: "Harbour".to_owned(),
        money: 10.0,
        per: Per::OnePercent,
        line: None,
    };
    let document = with(|inputs| {
        inputs.holdings.push(holding("Bond", Kind::Exposure, 1.0, 100.0));
        inputs.exposures = vec![exposure("Bond")];
    });
    let renamed = after(&document, change(3, HoldingChange::Name("Long bond".to_owned())));
    assert_eq!(renamed.inputs.exposures, [exposure("Long bond")]);
    let removed = after(&document, Command::RemoveHolding { row: 3 });
    assert!(removed.inputs.exposures.is_empty());
}

#[test]
fn always_a_renamed_holding_keeps_its_factor() {
    let inputs = after(&document(), change(0, HoldingChange::Name("Harbour B".to_owned()))).inputs;
    assert_eq!(inputs.holdings[0].factor.as_deref(), Some("Harbour"));
    assert_eq!(inputs.correlation.as_ref().unwrap().names, ["Harbour", "Rate"]);
}

#[test]
fn always_correlations_of_a_factor_that_is_gone_go_too() {
    let inputs = after(&document(), Command::RemoveHolding { row: 1 }).inputs;
    let table = inputs.correlation.as_ref().unwrap();
    assert_eq!((table.names.as_slice(), table.cells.as_slice()), (&["Harbour".to_owned()][..], &[1.0][..]));
    let described = with(|inputs| {
        inputs.factors.push(FactorRow {
            name: "Rate".to_owned(),
            level: None,
            unit: None,
            description: inputs.holdings[1].description.clone(),
            line: None,
        });
    });
    let inputs = after(&described, Command::RemoveHolding { row: 1 }).inputs;
    assert_eq!(inputs.correlation.as_ref().unwrap().names.len(), 2);
}

#[test]
fn always_the_correlation_table_stays_symmetric_and_grows_uncorrelated() {
    let set = Command::SetCorrelation { row: "Oil".to_owned(), column: "Rate".to_owned(), value: 0.6 };
    let inputs = after(&document(), set).inputs;
    let table = inputs.correlation.as_ref().unwrap();
    assert_eq!(table.names, ["Harbour", "Rate", "Oil"]);
    assert_eq!(table.cells, [1.0, -0.3, 0.0, -0.3, 1.0, 0.6, 0.0, 0.6, 1.0]);
}

#[test]
fn always_settings_stay_in_their_ranges() {
    let check = |change, is_so: fn(&Document) -> bool| {
        let document = after(&document(), Command::ChangeSetting(change));
        assert!(is_so(&document), "{:?}", document.settings);
    };
    check(SettingChange::Paths(5), |document| document.settings.paths == 1_000);
    check(SettingChange::Paths(usize::MAX), |document| document.settings.paths == 10_000_000);
    check(SettingChange::HorizonDays(9_999), |document| document.settings.horizon_days == 504);
    check(SettingChange::HorizonDays(10), |document| document.settings.reading_day == 10);
    check(SettingChange::ReadingDay(9_999), |document| document.settings.reading_day == 63);
    check(SettingChange::BookCurrency(Some(" eur ".to_owned())), |document| {
        document.settings.book_currency.as_deref() == Some("EUR")
    });
}

#[test]
fn always_what_can_not_be_taken_edits_nothing() {
    for change in [
        SettingChange::DaysPerYear(0.0),
        SettingChange::DaysPerYear(f64::INFINITY),
        SettingChange::LossLimit(Some(-1.0)),
        SettingChange::Capital(Some(f64::NAN)),
        SettingChange::Confidences(Vec::new()),
    ] {
        assert_eq!(edited(&document(), None, &Command::ChangeSetting(change)), None);
    }
    let half_life = Parameter::HalfLife(HalfLife::Days(0.0));
    let command = Command::SetParameter { factor: "Rate".to_owned(), parameter: half_life };
    assert_eq!(edited(&document(), None, &command), None);
    let command =
        Command::SetCorrelation { row: "Rate".to_owned(), column: "Harbour".to_owned(), value: 1.1 };
    assert_eq!(edited(&document(), None, &command), None);
}

#[test]
fn always_a_row_stays_what_its_kind_says() {
    let inputs = [
        change(0, HoldingChange::Price(0.0)),
        change(0, HoldingChange::Name("Cash".to_owned())),
        change(0, HoldingChange::Name("  ".to_owned())),
        change(2, HoldingChange::Price(2.0)),
    ];
    for command in inputs {
        assert_eq!(edited(&document(), None, &command), None, "{command:?}");
    }
    let exposure = after(&document(), change(0, HoldingChange::Kind(Kind::Exposure)));
    assert_eq!(exposure.inputs.holdings[0].quantity, 1.0);
    assert_eq!(edited(&exposure, None, &change(0, HoldingChange::Quantity(2.0))), None);
}

#[test]
fn always_a_level_below_zero_becomes_a_price_above() {
    let below = after(&document(), change(1, HoldingChange::Price(-0.4)));
    assert_eq!(below.inputs.holdings[1].price, -0.4);
    let spot = after(&below, change(1, HoldingChange::Kind(Kind::Spot)));
    assert_eq!(spot.inputs.holdings[1].price, 1.0);
}

#[test]
fn always_an_added_holding_has_a_name_of_its_own() {
    let cash = Box::new(holding("Cash", Kind::Cash, 1.0, 1.0));
    let once = after(&document(), Command::AddHolding(cash.clone()));
    let twice = after(&once, Command::AddHolding(cash));
    let names: Vec<&str> = twice.inputs.holdings.iter().map(|holding| holding.name.as_str()).collect();
    assert_eq!(names, ["Harbour", "Rate", "Cash", "Cash 2", "Cash 3"]);
}

#[test]
fn always_the_chosen_confidence_is_one_of_the_levels() {
    let levels = ["0.975", "0.9", "0.975"].map(confidence).to_vec();
    let settings = after(&document(), Command::ChangeSetting(SettingChange::Confidences(levels))).settings;
    assert_eq!(settings.confidences, ["0.9", "0.975"].map(confidence));
    assert_eq!(settings.chosen_confidence, confidence("0.975"));
    let chosen = SettingChange::ChosenConfidence(confidence("0.9"));
    let settings = after(&document(), Command::ChangeSetting(chosen)).settings;
    assert_eq!(settings.confidences, ["0.9", "0.95", "0.99"].map(confidence));
}
