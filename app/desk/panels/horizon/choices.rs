//! Horizons at one press, and how far ahead the window looks.

use crate::desk::commands::{Command, Queue, SettingChange};
use crate::desk::inputs::{NumberField, Shown};
use crate::desk::session::Session;
use crate::desk::theme;
use crate::workspace::document::LONGEST_HORIZON_DAYS;
use egui::{Align, Button, Layout, Ui};

/// Narrower than this, the row becomes two.
const NARROW_POINTS: f32 = 600.0;
/// Height of a row.
const ROW_POINTS: f32 = 29.0;

/// Height of what `choices_ui` draws in a width.
pub fn height(width: f32) -> f32 {
    if width < NARROW_POINTS { 2.0 * ROW_POINTS } else { ROW_POINTS }
}

/// Draws the rows below the charts.
pub fn choices_ui(ui: &mut Ui, session: &Session, queue: &mut Queue) {
    let is_narrow = ui.available_width() < NARROW_POINTS;
    ui.horizontal(|ui| {
        ui.spacing_mut().item_spacing.x = 4.0;
        days_ui(ui, session, queue);
        if !is_narrow {
            ui.with_layout(Layout::right_to_left(Align::Center), |ui| length_ui(ui, session, queue));
        }
    });
    if is_narrow {
        ui.with_layout(Layout::right_to_left(Align::Min), |ui| length_ui(ui, session, queue));
    }
}

/// The reading line at one press.
fn days_ui(ui: &mut Ui, session: &Session, queue: &mut Queue) {
    let settings = &session.document().settings;
    ui.label(theme::soft(ui, "Read at"));
    for (words, day) in choices(settings.days_per_year) {
        let button = Button::selectable(session.reading_day() == day, words);
        let response = ui.add(button).accessible_name(format!("Read at {words}"));
        if response.on_hover_text(format!("Move the reading line to {day} trading days")).clicked() {
            if day > settings.horizon_days {
                queue.push(Command::ChangeSetting(SettingChange::HorizonDays(day)));
            }
            queue.push(Command::ChangeSetting(SettingChange::ReadingDay(day)));
        }
    }
}

/// How far ahead the window looks; drawn from right to left.
fn length_ui(ui: &mut Ui, session: &Session, queue: &mut Queue) {
    let range = 1.0..=f64::from(LONGEST_HORIZON_DAYS);
    let field = NumberField::new("Horizon", "days").shown(Shown::Whole).range(range);
    let (response, days) = field.response_ui(ui, f64::from(session.document().settings.horizon_days));
    response.on_hover_text("Length of the horizon, up to two years");
    if let Some(days) = days {
        queue.push(Command::ChangeSetting(SettingChange::HorizonDays(days.round() as u32)));
    }
    ui.label(theme::soft(ui, "Look ahead"));
}

/// Words and trading days, months and years by the days in a year.
fn choices(days_per_year: f64) -> [(&'static str, u32); 6] {
    let months =
        |months: f64| ((days_per_year * months / 12.0).round() as u32).clamp(1, LONGEST_HORIZON_DAYS);
    [
        ("1 day", 1),
        ("10 days", 10),
        ("1 month", months(1.0)),
        ("3 months", months(3.0)),
        ("6 months", months(6.0)),
        ("1 year", months(12.0)),
    ]
}
