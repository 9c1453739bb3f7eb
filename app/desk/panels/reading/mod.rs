//! The reading: every figure at the reading line with its range, and the settings that decide it where they are read.
//! The words of figures are made in `readout`; the sections that are forms live in `settings`.

/// The second range of the losses.
pub mod range;
/// The settings among the figures.
pub mod settings;

use crate::desk::commands::{Command, Queue, SettingChange};
use crate::desk::inputs::{row_ui, widths};
use crate::desk::readout::{Money, chosen_row, confidence_words, half_range, money_of, signed};
use crate::desk::session::{AtLine, Session};
use crate::desk::theme::{self, section_ui};
use ebbmark_engine::figures::{amounts::decimals_for, grouped, percent};
use ebbmark_engine::measures::Confidence;
use ebbmark_engine::measures::reading::{DrawdownRow, LimitReading, LossRow, MomentRow, Reading};
use egui::{Align, Button, Label, Layout, RichText, Ui};

/// Half the width of a 95 % range in standard errors.
const RANGE_ERRORS: f64 = 1.96;

/// Draws the panel.
pub fn reading_ui(ui: &mut Ui, session: &Session, queue: &mut Queue) {
    heading_ui(ui, session);
    if let Some((money, at_line)) = money_of(session).zip(session.live().at_line.as_deref()) {
        loss_ui(ui, session, queue, &money, at_line);
        settings::confidences_ui(ui, session, queue);
        range::range_ui(ui, session, queue, &money, at_line);
        section_ui(ui, "Largest fall from a peak");
        drawdown_ui(ui, session, &money, at_line);
        section_ui(ui, "Limit and capital");
        settings::limit_ui(ui, session, queue, &money);
        limit_ui(ui, at_line.reading.limit.as_ref());
        section_ui(ui, "Expected change and dispersion");
        split_ui(ui, &money, &at_line.reading);
        section_ui(ui, "Check on the run");
        check_ui(ui, &money, &at_line.reading);
    }
    section_ui(ui, "Run");
    settings::run_ui(ui, session, queue);
}

fn heading_ui(ui: &mut Ui, session: &Session) {
    ui.horizontal(|ui| {
        ui.label(theme::heading("Reading"));
        ui.with_layout(Layout::right_to_left(Align::Center), |ui| {
            let unit = money_of(session).map(|money| money.unit()).unwrap_or_default();
            ui.label(theme::soft(ui, unit));
        });
    });
}

/// VaR, ES and drawdown, a row a confidence; a press on a confidence makes it the one that every mark shows.
fn loss_ui(ui: &mut Ui, session: &Session, queue: &mut Queue, money: &Money<'_>, at_line: &AtLine) {
    let chosen = chosen_row(session, at_line).map(|row| row.confidence);
    let levels = &session.document().settings.confidences;
    let others = ((ui.available_width() - 62.0) / 3.0).min(110.0);
    let widths = widths(ui, [others; 3]);
    row_ui(ui, &widths, 18.0, |ui, column| {
        let (title, explanation) = COLUMNS[column];
        ui.label(theme::soft(ui, title)).on_hover_text(explanation);
    });
    for (loss, fall) in at_line.reading.loss.iter().zip(&at_line.reading.drawdown.quantiles) {
        let is_chosen = chosen == Some(loss.confidence);
        let level = levels.iter().copied().find(|level| (level.value() - loss.confidence).abs() < 1e-12);
        let cells = cells(loss, fall);
        row_ui(ui, &widths, if money.base.is_some() { 48.0 } else { 34.0 }, |ui, column| match column {
            0 => confidence_ui(ui, queue, level, loss.confidence, is_chosen),
            column => cell_ui(ui, money, &cells[column - 1], is_chosen),
        });
    }
}

/// Titles of the loss table with what they mean.
const COLUMNS: [(&str, &str); 4] = [
    ("Confidence", "How sure it is that the loss stays below; press one to show it in every mark"),
    (
        "VaR",
        "Value-at-risk: the loss that is not passed with this confidence, its share and its 95 % simulation range",
    ),
    ("ES", "Expected shortfall: the mean of the losses beyond VaR, its share and its 95 % simulation range"),
    (
        "Drawdown",
        "Largest fall from a peak up to the line, not passed with this confidence, its share and range",
    ),
];

/// A loss with its range.
struct Cell {
    value: f64,
    low: Option<f64>,
    high: Option<f64>,
}

fn cells(loss: &LossRow, fall: &DrawdownRow) -> [Cell; 3] {
    [
        Cell { value: loss.var, low: loss.var_low, high: loss.var_high },
        Cell { value: loss.es, low: loss.es_low, high: loss.es_high },
        Cell { value: fall.value, low: fall.value_low, high: fall.value_high },
    ]
}

fn confidence_ui(
    ui: &mut Ui,
    queue: &mut Queue,
    level: Option<Confidence>,
    confidence: f64,
    is_chosen: bool,
) {
    let words = confidence_words(confidence);
    let text = if is_chosen { theme::strong(&words) } else { RichText::new(&words) };
    let button = Button::selectable(is_chosen, text);
    let response = ui.add(button).accessible_name(format!("Show {words} confidence"));
    let response = response.on_hover_text("Show this confidence in every mark");
    if let Some(level) = level.filter(|_| response.clicked()) {
        queue.push(Command::ChangeSetting(SettingChange::ChosenConfidence(level)));
    }
}

fn cell_ui(ui: &mut Ui, money: &Money<'_>, cell: &Cell, is_chosen: bool) {
    let error = half_range(cell.low, cell.high);
    ui.with_layout(Layout::top_down(Align::Max), |ui| {
        ui.spacing_mut().item_spacing.y = 0.0;
        let mut figure = money.figure(cell.value, error);
        if cell.value < 0.0 {
            figure.push_str(" (gain)");
        }
        ui.label(if is_chosen { theme::strong(figure) } else { RichText::new(figure) });
        if let Some(share) = money.share(cell.value, error) {
            ui.label(theme::soft(ui, share));
        }
        if let Some(range) = money.range(cell.low, cell.high, error) {
            ui.add(Label::new(theme::soft(ui, range)).truncate());
        }
    });
}

fn drawdown_ui(ui: &mut Ui, session: &Session, money: &Money<'_>, at_line: &AtLine) {
    let drawdown = &at_line.reading.drawdown;
    let chosen = session.document().settings.chosen_confidence.value();
    let mean = Amount { money: drawdown.mean, error: Some(drawdown.mean_error) };
    amount_ui(ui, money, "Mean", &mean);
    let row = drawdown.quantiles.iter().find(|row| (row.confidence - chosen).abs() < 1e-12);
    if let Some(row) = row {
        let worst = Amount { money: row.mean_beyond, error: row.mean_beyond_error };
        amount_ui(ui, money, &format!("Worst {}, mean", percent_words(1.0 - chosen)), &worst);
    }
}

/// An amount with one standard error.
struct Amount {
    money: f64,
    error: Option<f64>,
}

fn amount_ui(ui: &mut Ui, money: &Money<'_>, label: &str, amount: &Amount) {
    let range = amount.error.unwrap_or(0.0) * RANGE_ERRORS;
    let error = if range > 0.0 { format!("\u{00b1} {}", money.figure(range, range)) } else { String::new() };
    let share = money.share(amount.money, range).unwrap_or_default();
    line_ui(ui, label, [&money.figure(amount.money, range), &share, &error]);
}

/// A label, then a figure, its share and its error in columns of their own.
fn line_ui(ui: &mut Ui, label: &str, figures: [&str; 3]) {
    row_ui(ui, &widths(ui, [46.0, 52.0, 46.0]), 20.0, |ui, column| match column {
        0 => {
            ui.add(Label::new(label).truncate());
        }
        1 => {
            ui.label(figures[0]);
        }
        column => {
            ui.label(theme::soft(ui, figures[column - 1]));
        }
    });
}

fn limit_ui(ui: &mut Ui, limit: Option<&LimitReading>) {
    let Some(limit) = limit else { return };
    let chance = |value: f64, error: f64| {
        let range = error * RANGE_ERRORS;
        let decimals = if range > 0.0 { decimals_for(range * 100.0).max(2) } else { 2 };
        (
            percent(value, decimals),
            if range > 0.0 {
                format!("\u{00b1} {}", grouped(range * 100.0, decimals))
            } else {
                String::new()
            },
        )
    };
    for (label, value, error) in [
        ("Passed at the line", limit.at_horizon, limit.at_horizon_error),
        ("Touched before it", limit.by_horizon, limit.by_horizon_error),
    ] {
        let (figure, error) = chance(value, error);
        row_ui(ui, &widths(ui, [56.0, 46.0]), 20.0, |ui, column| match column {
            0 => {
                ui.add(Label::new(label).truncate());
            }
            1 => {
                ui.label(&figure);
            }
            _ => {
                ui.label(theme::soft(ui, &error));
            }
        });
    }
}

/// The expected change, and the dispersion round it.
fn split_ui(ui: &mut Ui, money: &Money<'_>, reading: &Reading) {
    let change = reading.moments.expected_change;
    let share = money.share(change, 0.0).map(|share| signed(change, share)).unwrap_or_default();
    line_ui(ui, "Pull", [&money.change(change, 0.0), &share, ""]);
    if let Some(sd) = reading.moments.sd.exact.or(reading.moments.sd.sampled) {
        let share = money.share(sd, 0.0).unwrap_or_default();
        line_ui(ui, "Dispersion", [&money.figure(sd, 0.0), &share, ""]);
    }
}

/// Exact moments beside sampled ones, and the difference in standard errors.
fn check_ui(ui: &mut Ui, money: &Money<'_>, reading: &Reading) {
    let moments = &reading.moments;
    moment_row_ui(ui, |ui, column| {
        ui.label(theme::soft(ui, ["", "exact", "sampled", "z"][column]));
    });
    moment_ui(ui, "Mean", &moments.mean, |value, error| money.figure(value, error));
    moment_ui(ui, "Std. deviation", &moments.sd, |value, error| money.figure(value, error));
    moment_ui(ui, "Skewness", &moments.skewness, |value, error| {
        grouped(value, decimals_for(if error > 0.0 { error } else { 0.001 }))
    });
}

fn moment_row_ui(ui: &mut Ui, cell: impl FnMut(&mut Ui, usize)) {
    row_ui(ui, &widths(ui, [56.0, 58.0, 36.0]), 18.0, cell);
}

fn moment_ui(ui: &mut Ui, label: &str, row: &MomentRow, words: impl Fn(f64, f64) -> String) {
    let error = row.standard_error.unwrap_or(0.0);
    let figure =
        |value: Option<f64>| value.map_or_else(|| "\u{2013}".to_owned(), |value| words(value, error));
    let z = match (row.exact, row.sampled, row.standard_error) {
        (Some(exact), Some(sampled), Some(error)) if error > 0.0 => grouped((sampled - exact) / error, 1),
        _ => "\u{2013}".to_owned(),
    };
    let figures = [label.to_owned(), figure(row.exact), figure(row.sampled), z];
    moment_row_ui(ui, |ui, column| {
        ui.add(Label::new(&figures[column]).truncate());
    });
}

fn percent_words(fraction: f64) -> String {
    confidence_words((fraction * 1e9).round() / 1e9)
}
