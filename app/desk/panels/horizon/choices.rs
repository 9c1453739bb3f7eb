//! Horizons at one press, and how far ahead the window looks.

use crate::desk::commands::{Command, Queue, SettingChange};
use crate::desk::inputs::{NumberField, Shown};
use crate::desk::session::Session;
use crate::desk::theme;
use crate::workspace::document::LONGEST_HORIZON_DAYS;
use egui::{Align, Button, Layout, Ui};

/// Draws the row below the charts.
pub fn choices_ui(ui: &mut Ui, session: &Session, queue: &mut Queue) {
    let settings = &session.document().settings;
    ui.horizontal(|ui| {
        ui.spacing_mut().item_spacing.x = 4.0;
        ui.label(theme::soft(ui, "Read at"));
        for (words, day) in choices(settings.days_per_year) {
            let is_chosen = session.reading_day() == day;
            let button = Button::selectable(is_chosen, words);
            let response = ui.add(button).accessible_name(format!("Read at {words}"));
            if response.on_hover_text(format!("Move the reading line to {day} trading days")).clicked() {
                if day > settings.horizon_days {
                    queue.push(Command::ChangeSetting(SettingChange::HorizonDays(day)));
                }
                queue.push(Command::ChangeSetting(SettingChange::ReadingDay(day)));
            }
        }
        ui.with_layout(Layout::right_to_left(Align::Center), |ui| {
            let range = 1.0..=f64::from(LONGEST_HORIZON_DAYS);
            let field = NumberField::new("Horizon", "days").shown(Shown::Whole).range(range);
            if let Some(days) = field.ui(ui, f64::from(settings.horizon_days)) {
                queue.push(Command::ChangeSetting(SettingChange::HorizonDays(days.round() as u32)));
            }
            ui.label(theme::soft(ui, "Look ahead"));
        });
    });
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
