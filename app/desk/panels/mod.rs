//! Everything that is drawn: panels read the session and push commands. They do not use each other; only this file
//! knows where each of them stands.

/// What is held, by group.
pub mod book;
/// The correlation matrix.
pub mod correlation;
/// The chosen risk factor.
pub mod factor;
/// The chosen holding.
pub mod holding;
/// The bands ahead.
pub mod horizon;
/// Messages.
pub mod notices;
/// Files, faults and questions.
pub mod opening;
/// Every figure at the reading line.
pub mod reading;
/// Book, headline, run and buttons.
pub mod strip;

use super::commands::{Command, Queue};
use super::session::Session;
use super::theme::{self, Palette};
use crate::workspace::Tab;
use ebbmark_engine::figures::CAUTION;
use egui::{CentralPanel, Frame, Margin, Panel, ScrollArea, Stroke, Ui};

/// Draws the whole window.
pub fn window_ui(ui: &mut Ui, session: &Session, queue: &mut Queue) {
    let width = ui.available_width();
    let bare = Frame::new().fill(Palette::of(ui).window);
    let strip = bare.inner_margin(Margin::symmetric(14, 4));
    Panel::top("strip").frame(strip).exact_size(strip::HEIGHT_POINTS + 10.0).show_separator_line(true).show(
        ui,
        |ui| {
            ui.set_height(strip::HEIGHT_POINTS);
            strip::strip_ui(ui, session, queue);
        },
    );
    Panel::bottom("foot").frame(bare.inner_margin(Margin::symmetric(14, 3))).show_separator_line(false).show(
        ui,
        |ui| {
            ui.add(egui::Label::new(theme::soft(ui, CAUTION)).truncate());
        },
    );
    let side = |share: f32, least: f32, most: f32| (width * share).clamp(least, most);
    Panel::left("left")
        .frame(bare.inner_margin(Margin { left: 8, right: 4, top: 8, bottom: 0 }))
        .default_size(side(0.26, 290.0, 380.0))
        .size_range(260.0..=(width * 0.28).max(290.0))
        .show_separator_line(false)
        .show(ui, |ui| left_ui(ui, session, queue));
    Panel::right("right")
        .frame(bare.inner_margin(Margin { left: 4, right: 8, top: 8, bottom: 0 }))
        .default_size(side(0.25, 290.0, 350.0))
        .size_range(260.0..=(width * 0.275).max(290.0))
        .show_separator_line(false)
        .show(ui, |ui| {
            card_ui(ui, |ui| {
                ScrollArea::vertical().id_salt("reading").auto_shrink(false).show(ui, |ui| {
                    ui.set_max_width(ui.available_width() - theme::SCROLL_POINTS);
                    reading::reading_ui(ui, session, queue);
                    notices::notices_ui(ui, session, queue);
                });
            });
        });
    CentralPanel::default().frame(bare.inner_margin(Margin { left: 4, right: 4, top: 8, bottom: 0 })).show(
        ui,
        |ui| {
            card_ui(ui, |ui| centre_ui(ui, session, queue));
        },
    );
    notices::answers_ui(ui, session, queue);
    opening::opening_ui(ui, session, queue);
}

fn left_ui(ui: &mut Ui, session: &Session, queue: &mut Queue) {
    let height = ui.available_height();
    let bare = Frame::new().inner_margin(Margin { top: 8, ..Margin::ZERO });
    Panel::bottom("factor")
        .frame(bare)
        .default_size((height * 0.4).clamp(240.0, 350.0))
        .size_range(150.0..=(height - 160.0).max(160.0))
        .resizable(true)
        .show_separator_line(false)
        .show(ui, |ui| {
            card_ui(ui, |ui| {
                if holding::switch_ui(ui) {
                    holding::holding_ui(ui, session, queue);
                } else {
                    factor::factor_ui(ui, session, queue);
                }
            });
        });
    card_ui(ui, |ui| book::book_ui(ui, session, queue));
}

fn centre_ui(ui: &mut Ui, session: &Session, queue: &mut Queue) {
    let tab = session.view().tab;
    ui.horizontal(|ui| {
        for other in [Tab::Horizon, Tab::Correlation] {
            let command = Command::ShowTab(other);
            let tooltip = command.tooltip(ui.ctx());
            if ui.selectable_label(tab == other, command.text()).on_hover_text(tooltip).clicked() {
                queue.push(command);
            }
        }
    });
    ui.add_space(2.0);
    if !session.faults().is_empty() {
        opening::invalid_ui(ui, session, queue);
    }
    match tab {
        Tab::Horizon => horizon::horizon_ui(ui, session, queue),
        Tab::Correlation | Tab::Fit => correlation::correlation_ui(ui, session, queue),
    }
}

/// A panel's ground, filling what is left.
fn card_ui(ui: &mut Ui, add: impl FnOnce(&mut Ui)) {
    let palette = Palette::of(ui);
    let card = Frame::new()
        .fill(palette.panel)
        .stroke(Stroke::new(1.0, palette.hairline))
        .corner_radius(8.0)
        .inner_margin(Margin::symmetric(12, 9));
    card.show(ui, |ui| {
        ui.set_min_size(ui.available_size());
        add(ui);
    });
}
