//! Any edits in any order: nothing panics, all can be taken back, and what stands can be kept and read again.

use crate::support::{holding, session};
use ebbmark::desk::commands::{Command, HoldingChange, Parameter, SettingChange};
use ebbmark::workspace::format::{text_of_workspace, workspace_of_text};
use ebbmark::workspace::{View, Workspace};
use ebbmark_engine::book::{DiffusionKind, HalfLife, Kind};
use ebbmark_engine::factors::Model;
use proptest::prelude::*;

/// Numbers as a hand types them, and as nobody should.
fn number() -> impl Strategy<Value = f64> {
    prop_oneof![
        4 => -1_000.0..1_000.0_f64,
        1 => proptest::num::f64::ANY,
        1 => prop::sample::select(vec![0.0, -0.0, 1.0, 1e-300, 1e300]),
    ]
}

fn name() -> impl Strategy<Value = String> {
    prop::sample::select(vec!["Harbour", "Rate", "Cash", "Oil", "USD/EUR", "", "a \"b\" /é"])
        .prop_map(str::to_owned)
}

fn kind() -> impl Strategy<Value = Kind> {
    prop::sample::select(vec![Kind::Spot, Kind::Level, Kind::Cash, Kind::Exposure])
}

fn holding_change() -> impl Strategy<Value = HoldingChange> {
    prop_oneof![
        name().prop_map(HoldingChange::Name),
        kind().prop_map(HoldingChange::Kind),
        number().prop_map(HoldingChange::Quantity),
        number().prop_map(HoldingChange::Price),
        name().prop_map(|name| HoldingChange::Factor(Some(name))),
        number().prop_map(HoldingChange::Multiplier),
        number().prop_map(HoldingChange::Carry),
        Just(HoldingChange::Currency(Some("USD".to_owned()))),
    ]
}

fn parameter() -> impl Strategy<Value = Parameter> {
    prop_oneof![
        number().prop_map(Parameter::Level),
        number().prop_map(Parameter::Drift),
        number().prop_map(Parameter::Volatility),
        number().prop_map(Parameter::LongRun),
        number().prop_map(|days| Parameter::HalfLife(HalfLife::Days(days))),
        Just(Parameter::HalfLife(HalfLife::None)),
    ]
}

fn setting() -> impl Strategy<Value = SettingChange> {
    prop_oneof![
        number().prop_map(SettingChange::DaysPerYear),
        number().prop_map(|money| SettingChange::Capital(Some(money))),
        number().prop_map(|money| SettingChange::LossLimit(Some(money))),
        any::<usize>().prop_map(SettingChange::Paths),
        any::<u64>().prop_map(SettingChange::Seed),
        any::<u32>().prop_map(SettingChange::HorizonDays),
        any::<u32>().prop_map(SettingChange::ReadingDay),
    ]
}

fn diffusion() -> impl Strategy<Value = DiffusionKind> {
    let kinds = [DiffusionKind::Geometric, DiffusionKind::RevertingLog, DiffusionKind::RevertingLevel];
    prop::sample::select(kinds.to_vec())
}

fn command() -> impl Strategy<Value = Command> {
    prop_oneof![
        6 => (0..5_usize, holding_change()).prop_map(|(row, change)| Command::ChangeHolding { row, change }),
        4 => (name(), parameter()).prop_map(|(factor, parameter)| Command::SetParameter { factor, parameter }),
        2 => (name(), diffusion()).prop_map(|(factor, kind)| Command::SetDiffusion { factor, kind }),
        3 => (name(), name(), number()).prop_map(|(row, column, value)| {
            Command::SetCorrelation { row, column, value: value / 500.0 }
        }),
        3 => setting().prop_map(Command::ChangeSetting),
        1 => (0..5_usize).prop_map(|row| Command::RemoveHolding { row }),
        1 => (name(), kind()).prop_map(|(name, kind)| Command::AddHolding(Box::new(holding(&name, kind, 1.0, 1.0)))),
        1 => name().prop_map(Command::RenameBook),
        1 => Just(Command::Undo),
        1 => Just(Command::Redo),
    ]
}

proptest! {
    #![proptest_config(ProptestConfig { cases: 400, failure_persistence: None, ..ProptestConfig::default() })]

    #[test]
    fn always_any_edits_can_be_kept_and_taken_back(commands in prop::collection::vec(command(), 1..30)) {
        let mut session = session();
        let first = session.document().clone();
        for command in commands {
            session.apply(command);
            session.end_gesture();
        }
        let document = session.document().clone();
        // Valid or not: assembling tells, and does not panic.
        let _ = Model::assemble(&document.inputs, &document.settings.model_settings());
        let workspace = Workspace { document, view: View::default() };
        let text = text_of_workspace(&workspace).unwrap();
        prop_assert_eq!(workspace_of_text(&text), Ok(workspace));
        while session.undo_text().is_some() {
            session.apply(Command::Undo);
        }
        prop_assert_eq!(session.document(), &first);
    }
}
