//! The second range: VaR and ES at the chosen confidence over the fit's parameters, and where it comes from.

use crate::desk::commands::{Command, Queue};
use crate::desk::readout::{Money, chosen_row, confidence_words, half_range};
use crate::desk::session::{AtLine, Session};
use crate::desk::theme;
use crate::desk::worker::Ranging;
use ebbmark_engine::figures::source_words;
use ebbmark_engine::measures::ParameterRange;
use egui::{Align, Label, Layout, ProgressBar, Ui};

/// Sources named.
const MOST_NAMED: usize = 3;

/// Draws the range, how far it is, or the press that asks for it; nothing without fitted parameters.
pub fn range_ui(ui: &mut Ui, session: &Session, queue: &mut Queue, money: &Money<'_>, at_line: &AtLine) {
    if !session.can_range() {
        return;
    }
    theme::section_ui(ui, "Range over the fit's parameters");
    match &session.live().ranging {
        Some(Ranging::Running { done, whole }) => {
            let share = *done as f32 / (*whole).max(1) as f32;
            let bar = ProgressBar::new(share).text(format!("{done} of {whole} histories"));
            ui.horizontal(|ui| {
                if ui.button(Command::StopRange.text()).clicked() {
                    queue.push(Command::StopRange);
                }
                ui.add(bar.desired_width(ui.available_width()));
            });
        }
        Some(Ranging::Done(range)) => told_ui(ui, session, money, at_line, range),
        _ => {
            let command = Command::RangeParameters;
            let response = ui.button(command.text()).on_hover_text(command.explanation());
            if response.clicked() {
                queue.push(command);
            }
        }
    }
}

fn told_ui(ui: &mut Ui, session: &Session, money: &Money<'_>, at_line: &AtLine, range: &ParameterRange) {
    let Some(chosen) = chosen_row(session, at_line) else { return };
    let Some(row) = range.loss.iter().find(|row| (row.confidence - chosen.confidence).abs() < 1e-12) else {
        return;
    };
    for (measure, low, high) in [("VaR", row.var_low, row.var_high), ("ES", row.es_low, row.es_high)] {
        let error = half_range(Some(low), Some(high)) / 10.0;
        let words = money.range(Some(low), Some(high), error).unwrap_or_default();
        ui.horizontal(|ui| {
            ui.label(format!("{measure} {}", confidence_words(row.confidence)));
            ui.with_layout(Layout::right_to_left(Align::Center), |ui| ui.label(words));
        });
    }
    if !range.most_from.is_empty() {
        let words = format!("Most from {}", source_words(range, MOST_NAMED));
        ui.add(Label::new(theme::soft(ui, words)).wrap());
    }
    let refused = if range.refused == 0 {
        String::new()
    } else {
        format!("; {} refits refused, taken as no reversion", range.refused)
    };
    let words = format!("95 %, from {} simulated histories fitted again{refused}", range.draws);
    ui.add(Label::new(theme::soft(ui, words)).wrap());
}
