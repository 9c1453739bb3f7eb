//! The strip at the top: which book, what is read, how much can be lost, how far the run is, and what can be done.
//! The figures' words are made in `readout`.

use crate::desk::commands::{Command, ExportKind, PathPurpose, Queue};
use crate::desk::inputs::{CommittedText, title_ui};
use crate::desk::readout::{
    Money, Verdict, chosen_row, confidence_words, date_words, half_range, money_of, reading_words, verdict,
};
use crate::desk::session::{AtLine, RunState, Session};
use crate::desk::theme::{self, Palette};
use crate::workspace::Theme;
use ebbmark_engine::figures::{grouped, percent};
use ebbmark_engine::measures::reading::LossRow;
use egui::{Align, Button, FontId, Label, Layout, ProgressBar, Rect, RichText, Sense, Ui, vec2};

/// Height of the strip, margins left out.
pub const HEIGHT_POINTS: f32 = 46.0;

/// Below this width the buttons stand in two rows.
const NARROW_POINTS: f32 = 1280.0;

/// Width of the buttons in two rows.
const NARROW_BUTTONS_POINTS: f32 = 184.0;

/// Draws the strip.
pub fn strip_ui(ui: &mut Ui, session: &Session, queue: &mut Queue) {
    let is_narrow = ui.available_width() < NARROW_POINTS;
    ui.horizontal_centered(|ui| {
        ui.with_layout(Layout::right_to_left(Align::Center), |ui| {
            buttons_ui(ui, session, queue, is_narrow);
            ui.with_layout(Layout::left_to_right(Align::Center), |ui| blocks_ui(ui, session, queue));
        });
    });
}

fn blocks_ui(ui: &mut Ui, session: &Session, queue: &mut Queue) {
    ui.spacing_mut().item_spacing.x = 16.0;
    let room = ui.available_width();
    block_ui(ui, (room * 0.2).clamp(150.0, 210.0), |ui| book_ui(ui, session, queue));
    let Some((money, at_line)) = money_of(session).zip(session.live().at_line.as_deref()) else {
        let words =
            if session.faults().is_empty() { "Reading…" } else { "The book has faults and can't be read" };
        ui.label(words);
        return;
    };
    let Some(row) = chosen_row(session, at_line) else { return };
    block_ui(ui, (room * 0.37).clamp(250.0, 340.0), |ui| headline_ui(ui, session, &money, at_line, row));
    if let Some(limit) = session.document().settings.loss_limit {
        block_ui(ui, (room * 0.15).clamp(116.0, 150.0), |ui| limit_ui(ui, at_line, row, limit));
    }
    block_ui(ui, ui.available_width().clamp(80.0, 190.0), |ui| run_ui(ui, session, queue, at_line, row));
}

/// Two lines of a fixed width, so that nothing moves when figures change.
fn block_ui(ui: &mut Ui, width: f32, add: impl FnOnce(&mut Ui)) {
    ui.allocate_ui_with_layout(vec2(width, HEIGHT_POINTS), Layout::top_down(Align::Min), |ui| {
        ui.set_width(width);
        ui.spacing_mut().item_spacing = vec2(8.0, 3.0);
        ui.add_space(3.0);
        add(ui);
    });
}

fn book_ui(ui: &mut Ui, session: &Session, queue: &mut Queue) {
    let document = session.document();
    let field =
        CommittedText { name: "Name of the book", hint: "Name of the book", width: ui.available_width() };
    let font = FontId::new(theme::HEADING_POINTS, theme::heavy());
    if let Some(name) = title_ui(ui, field, font, &document.name) {
        queue.push(Command::RenameBook(name));
    }
    let Some(model) = session.live().model.as_deref() else { return };
    let currency = model.currency.as_deref().map(|code| format!("{code} ")).unwrap_or_default();
    let at = document
        .settings
        .as_of
        .map(|date| format!(" \u{00b7} {}", date_words(date, ui.available_width() > 190.0)))
        .unwrap_or_default();
    let value = Label::new(format!("{currency}{}{at}", grouped(model.value, 0))).truncate();
    ui.add(value).on_hover_text("Value of the book today, at the prices of this date");
}

/// The chosen VaR in money and per cent, with its range.
fn headline_ui(ui: &mut Ui, session: &Session, money: &Money<'_>, at_line: &AtLine, row: &LossRow) {
    let palette = Palette::of(ui);
    ui.add(
        Label::new(RichText::new(reading_words(session, ui.available_width() > 300.0)).color(palette.accent))
            .truncate(),
    );
    let error = half_range(row.var_low, row.var_high);
    ui.horizontal(|ui| {
        ui.spacing_mut().item_spacing.x = 6.0;
        ui.label(format!("{} VaR", confidence_words(row.confidence)));
        ui.label(
            theme::strong(money.amount(row.var, error))
                .size(theme::HEADING_POINTS)
                .color(palette.change(-row.var)),
        );
        ui.label(money.share(row.var, error).unwrap_or_default());
        let range = if at_line.paths.is_none() {
            "closed form".to_owned()
        } else if row.var < 0.0 {
            "a gain".to_owned()
        } else {
            money.range(row.var_low, row.var_high, error).unwrap_or_default()
        };
        ui.add(Label::new(theme::soft(ui, range)).truncate());
    })
    .response
    .on_hover_text(
        "Loss that is not passed with this confidence at the reading line, with its 95 % simulation range",
    );
}

/// How much of the limit is used, in words and as a gauge.
fn limit_ui(ui: &mut Ui, at_line: &AtLine, row: &LossRow, limit: f64) {
    let palette = Palette::of(ui);
    let share = row.var / limit;
    let verdict = verdict(row, limit);
    let color = if verdict == Verdict::Inside { palette.neutral } else { palette.loss };
    let word = if at_line.paths.is_none() { "so far" } else { verdict.word() };
    ui.horizontal(|ui| {
        ui.spacing_mut().item_spacing.x = 5.0;
        ui.label(format!("{} of limit", percent(share, 0)));
        ui.label(theme::strong(word).color(color));
    });
    ui.add_space(5.0);
    let (rect, response) = ui.allocate_exact_size(vec2(ui.available_width(), 7.0), Sense::hover());
    gauge_ui(ui, rect, share as f32, color);
    response.on_hover_text(
        "The chosen VaR as a share of the loss limit; undecided while the limit lies in its range",
    );
}

fn gauge_ui(ui: &Ui, rect: Rect, share: f32, color: egui::Color32) {
    let palette = Palette::of(ui);
    let filled = Rect::from_min_size(rect.min, vec2(rect.width() * share.clamp(0.0, 1.0), rect.height()));
    ui.painter().rect_filled(rect, 3.0, palette.grid);
    ui.painter().rect_filled(filled, 3.0, color);
}

/// Paths, time, error of the chosen VaR; a bar while paths arrive.
fn run_ui(ui: &mut Ui, session: &Session, queue: &mut Queue, at_line: &AtLine, row: &LossRow) {
    let live = session.live();
    let paths = session.document().settings.paths;
    if live.state == RunState::Running {
        ui.horizontal(|ui| {
            let bar = ProgressBar::new(live.share_done(paths))
                .desired_width(ui.available_width() - 52.0)
                .desired_height(8.0);
            ui.add(bar).accessible_name("Paths done");
            small_ui(ui, queue, Command::StopRun);
        });
    } else {
        let done = grouped(at_line.paths.unwrap_or(0) as f64, 0);
        ui.add(Label::new(format!("{done} paths \u{00b7} {:.1} s", live.seconds)).truncate());
    }
    ui.horizontal(|ui| {
        ui.add(Label::new(theme::soft(ui, state_words(session, at_line, row))).truncate());
        if live.state == RunState::Stopped {
            small_ui(ui, queue, Command::RunAgain);
        }
    });
}

fn state_words(session: &Session, at_line: &AtLine, row: &LossRow) -> String {
    let live = session.live();
    if live.is_before_edit {
        return "\u{26a0} from before the edit".to_owned();
    }
    let Some(paths) = at_line.paths else { return "closed form, paths to come".to_owned() };
    let error = match (row.var_low, row.var_high) {
        (Some(low), Some(high)) if row.var.abs() > 0.0 => {
            let share = (high - low) / 2.0 / row.var.abs();
            format!("{} VaR \u{00b1} {}", confidence_words(row.confidence), percent(share, 1))
        }
        (Some(_), Some(_)) => String::new(),
        _ => "too few paths for a range".to_owned(),
    };
    match live.state {
        RunState::Running => format!("{} paths, {error}", grouped(paths as f64, 0)),
        RunState::Stopped => format!("stopped, {error}"),
        _ => error,
    }
}

/// All buttons in one row, or in two where room is short.
fn buttons_ui(ui: &mut Ui, session: &Session, queue: &mut Queue, is_narrow: bool) {
    ui.spacing_mut().item_spacing = vec2(4.0, 3.0);
    let wear = Command::WearTheme(match session.view().theme {
        Theme::Light => Theme::Dark,
        Theme::Dark => Theme::Light,
    });
    let open = Command::AskPath(PathPurpose::Open);
    if !is_narrow {
        // Drawn from right to left.
        command_ui(ui, queue, wear);
        undo_ui(ui, queue, Command::Redo, session.redo_text());
        undo_ui(ui, queue, Command::Undo, session.undo_text());
        export_ui(ui, queue);
        command_ui(ui, queue, Command::Save);
        command_ui(ui, queue, open);
        return;
    }
    let row = vec2(NARROW_BUTTONS_POINTS, 22.0);
    ui.allocate_ui_with_layout(vec2(row.x, HEIGHT_POINTS), Layout::top_down(Align::Min), |ui| {
        ui.allocate_ui_with_layout(row, Layout::left_to_right(Align::Center), |ui| {
            command_ui(ui, queue, open);
            command_ui(ui, queue, Command::Save);
            export_ui(ui, queue);
        });
        ui.allocate_ui_with_layout(row, Layout::left_to_right(Align::Center), |ui| {
            undo_ui(ui, queue, Command::Undo, session.undo_text());
            undo_ui(ui, queue, Command::Redo, session.redo_text());
            command_ui(ui, queue, wear);
        });
    });
}

fn command_ui(ui: &mut Ui, queue: &mut Queue, command: Command) {
    let tooltip = command.tooltip(ui.ctx());
    if ui.button(command.text()).on_hover_text(tooltip).clicked() {
        queue.push(command);
    }
}

/// A button that is no taller than a line of text.
fn small_ui(ui: &mut Ui, queue: &mut Queue, command: Command) {
    ui.spacing_mut().interact_size.y = 16.0;
    if ui.small_button(command.text()).on_hover_text(command.tooltip(ui.ctx())).clicked() {
        queue.push(command);
    }
}

fn undo_ui(ui: &mut Ui, queue: &mut Queue, command: Command, step: Option<&str>) {
    let response = ui.add_enabled(step.is_some(), Button::new(command.text()));
    let what = step.map(|step| format!(": {step}")).unwrap_or_default();
    if response.on_hover_text(format!("{}{what}", command.tooltip(ui.ctx()))).clicked() {
        queue.push(command);
    }
}

fn export_ui(ui: &mut Ui, queue: &mut Queue) {
    let menu = ui.menu_button("Export…", |ui| {
        for kind in ExportKind::ALL {
            let command = Command::AskPath(PathPurpose::Export(kind));
            if ui.button(command.text()).clicked() {
                queue.push(command);
            }
        }
        ui.separator();
        command_ui(ui, queue, Command::AskPath(PathPurpose::SaveAs));
    });
    menu.response.on_hover_text("A figure for a deck, its numbers, or the workspace");
}
