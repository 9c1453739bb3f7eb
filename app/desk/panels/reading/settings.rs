//! Settings, each where it is read: confidence levels, loss limit and capital, paths, seed, days in a year. Every
//! change is a command.

use crate::desk::commands::{Command, Queue, SettingChange};
use crate::desk::inputs::{CommittedText, NumberField, Shown, field_row_ui, optional_figure_ui};
use crate::desk::readout::{Money, confidence_words};
use crate::desk::session::Session;
use crate::desk::theme::{self, Palette};
use crate::workspace::document::{FEWEST_PATHS, MOST_PATHS};
use ebbmark_engine::measures::{Confidence, LossFrom};
use egui::{ComboBox, Ui};

/// Width of a field for text.
const FIELD_POINTS: f32 = 130.0;
/// Largest seed that a number field holds exactly.
const MOST_SEED: f64 = 9_007_199_254_740_992.0;

/// Confidence levels as a list, and what a loss is counted from.
pub fn confidences_ui(ui: &mut Ui, session: &Session, queue: &mut Queue) {
    let settings = &session.document().settings;
    let shown: Vec<String> =
        settings.confidences.iter().map(|level| confidence_words(level.value())).collect();
    let complaint_id = ui.scope_id().with("confidence complaint");
    field_row_ui(ui, "Confidence levels", |ui| {
        let width = (ui.available_width() - 110.0).max(FIELD_POINTS);
        let field = CommittedText { name: "Confidence levels", hint: "95 %, 99 %", width };
        let (response, typed) = field.ui(ui, &shown.join(", "));
        response.on_hover_text("Between 50 and 100 %, commas between them");
        let Some(typed) = typed else { return };
        let levels = read_confidences(&typed);
        ui.data_mut(|data| data.insert_temp(complaint_id, levels.is_none()));
        if let Some(levels) = levels {
            set(queue, SettingChange::Confidences(levels));
        }
    });
    if ui.data(|data| data.get_temp(complaint_id).unwrap_or(false)) {
        let words = "Expected levels between 50 and 100 %, for example 95 %, 99 %";
        ui.label(theme::soft(ui, words).color(Palette::of(ui).loss));
    }
    field_row_ui(ui, "Loss counted from", |ui| loss_from_ui(ui, settings.loss_from, queue));
}

/// Levels as typed: `95 %, 99 %` or `0.95; 0.99`; none where one of them is none.
fn read_confidences(text: &str) -> Option<Vec<Confidence>> {
    let mut levels = Vec::new();
    for part in text.split([',', ';']).map(|part| part.replace(' ', "")).filter(|part| !part.is_empty()) {
        let bare = part.trim_end_matches('%');
        let is_percent = part.ends_with('%') || bare.parse::<f64>().ok()? > 1.0;
        levels.push(if is_percent { format!("{bare}%") } else { part }.parse().ok()?);
    }
    (!levels.is_empty()).then_some(levels)
}

fn loss_from_ui(ui: &mut Ui, chosen: LossFrom, queue: &mut Queue) {
    let words = |from| match from {
        LossFrom::Today => "today's value",
        LossFrom::Mean => "the expected value",
    };
    let combo = ComboBox::from_id_salt("loss from").selected_text(words(chosen)).width(FIELD_POINTS);
    let response = combo.show_ui(ui, |ui| {
        for from in [LossFrom::Today, LossFrom::Mean] {
            if ui.selectable_label(from == chosen, words(from)).clicked() && from != chosen {
                set(queue, SettingChange::LossFrom(from));
            }
        }
    });
    response.response.accessible_name("Loss counted from");
}

/// The loss limit, and the capital that every percentage is of.
pub fn limit_ui(ui: &mut Ui, session: &Session, queue: &mut Queue, money: &Money<'_>) {
    let settings = &session.document().settings;
    let currency = money.currency.unwrap_or("");
    field_row_ui(ui, &with_unit("Loss limit", currency), |ui| {
        let field = CommittedText { name: "Loss limit", hint: "none", width: FIELD_POINTS };
        if let Some(limit) = optional_figure_ui(ui, field, settings.loss_limit) {
            set(queue, SettingChange::LossLimit(limit));
        }
    });
    field_row_ui(ui, &with_unit("Capital", currency), |ui| {
        let field = CommittedText { name: "Capital", hint: "today's value", width: FIELD_POINTS };
        if let Some(capital) = optional_figure_ui(ui, field, settings.capital) {
            set(queue, SettingChange::Capital(capital));
        }
    });
}

fn with_unit(label: &str, unit: &str) -> String {
    if unit.is_empty() { label.to_owned() } else { format!("{label}, {unit}") }
}

/// Paths, seed, days in a year, date of the prices, currency.
pub fn run_ui(ui: &mut Ui, session: &Session, queue: &mut Queue) {
    let settings = &session.document().settings;
    field_row_ui(ui, "Paths", |ui| {
        let range = FEWEST_PATHS as f64..=MOST_PATHS as f64;
        let field = NumberField::new("Paths", "").shown(Shown::Whole).range(range);
        if let Some(paths) = field.ui(ui, settings.paths as f64) {
            set(queue, SettingChange::Paths(paths.round() as usize));
        }
    });
    field_row_ui(ui, "Seed", |ui| {
        let field = NumberField::new("Seed", "").shown(Shown::Whole).range(0.0..=MOST_SEED);
        if let Some(seed) = field.ui(ui, settings.seed as f64) {
            set(queue, SettingChange::Seed(seed.round() as u64));
        }
    });
    field_row_ui(ui, "Trading days in a year", |ui| {
        let field = NumberField::new("Trading days in a year", "").range(1.0..=366.0);
        if let Some(days) = field.ui(ui, settings.days_per_year) {
            set(queue, SettingChange::DaysPerYear(days));
        }
    });
    field_row_ui(ui, "Date of the prices", |ui| date_ui(ui, session, queue));
    field_row_ui(ui, "Currency of the book", |ui| {
        let field =
            CommittedText { name: "Currency of the book", hint: "from the files", width: FIELD_POINTS };
        if let Some(code) = field.ui(ui, settings.book_currency.as_deref().unwrap_or("")).1 {
            set(queue, SettingChange::BookCurrency(Some(code).filter(|code| !code.trim().is_empty())));
        }
    });
}

fn date_ui(ui: &mut Ui, session: &Session, queue: &mut Queue) {
    let shown = session.document().settings.as_of.map(|date| date.to_string()).unwrap_or_default();
    let field = CommittedText { name: "Date of the prices", hint: "year-month-day", width: FIELD_POINTS };
    let Some(typed) = field.ui(ui, &shown).1 else { return };
    match typed.trim() {
        "" => set(queue, SettingChange::AsOf(None)),
        typed => {
            if let Ok(date) = typed.parse() {
                set(queue, SettingChange::AsOf(Some(date)));
            }
        }
    }
}

fn set(queue: &mut Queue, change: SettingChange) {
    queue.push(Command::ChangeSetting(change));
}
