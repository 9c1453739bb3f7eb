//! How fitted correlations are estimated: one row of choices, there only with a history.

use crate::desk::commands::{Command, FitChange, Queue};
use crate::desk::inputs::NumberField;
use crate::desk::session::Session;
use crate::desk::theme;
use ebbmark_engine::figures::percent;
use ebbmark_engine::fit::{Estimator, Missing};
use egui::{ComboBox, Ui};

const ESTIMATORS: [(Estimator, &str); 4] = [
    (Estimator::Sample, "sample"),
    (Estimator::Weighted, "weighted by age"),
    (Estimator::ShrunkIdentity, "shrunk to no correlation"),
    (Estimator::ShrunkConstant, "shrunk to one correlation"),
];

/// Draws the row.
pub fn estimator_ui(ui: &mut Ui, session: &Session, queue: &mut Queue) {
    let Some(history) = session.document().history.as_ref() else { return };
    let settings = &history.settings;
    ui.horizontal_wrapped(|ui| {
        ui.label(theme::soft(ui, "Estimated"));
        choice_ui(
            ui,
            "Estimator of the correlation",
            settings.estimator,
            &ESTIMATORS,
            queue,
            FitChange::Estimator,
        );
        if settings.estimator == Estimator::Weighted {
            let field = NumberField::new("Half-life of the weights", "days").range(1.0..=2_520.0);
            if let Some(days) = field.ui(ui, settings.weight_half_life_days) {
                queue.push(Command::ChangeFit(FitChange::WeightHalfLife(days)));
            }
        }
        let spans = [(1, "1-day changes"), (5, "5-day changes"), (10, "10-day changes")];
        choice_ui(ui, "Days of a change", settings.change_days, &spans, queue, FitChange::ChangeDays);
        let missing = [(Missing::Common, "dates common to all"), (Missing::Pairs, "dates of each pair")];
        choice_ui(ui, "Missing values", settings.missing, &missing, queue, FitChange::Missing);
        if let Some(words) = shrunk_words(session) {
            ui.label(theme::soft(ui, words));
        }
    });
}

fn choice_ui<T: Copy + PartialEq>(
    ui: &mut Ui,
    name: &str,
    chosen: T,
    choices: &[(T, &str)],
    queue: &mut Queue,
    change: impl Fn(T) -> FitChange,
) {
    let words = choices.iter().find(|(choice, _)| *choice == chosen).map_or("", |(_, words)| words);
    let combo = ComboBox::from_id_salt(name).selected_text(words).width(120.0);
    let response = combo.show_ui(ui, |ui| {
        for (choice, words) in choices {
            if ui.selectable_label(*choice == chosen, *words).clicked() {
                queue.push(Command::ChangeFit(change(*choice)));
            }
        }
    });
    response.response.accessible_name(name).on_hover_text(name);
}

/// How far a shrunk estimate was drawn to its target.
fn shrunk_words(session: &Session) -> Option<String> {
    let weight = session.live().fit.as_ref()?.correlation.as_ref()?.shrinkage?;
    Some(format!("{} of the way", percent(weight, 1)))
}
