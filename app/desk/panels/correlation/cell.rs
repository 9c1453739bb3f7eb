//! The chosen cell: which two factors, their correlation to be set, and the interval it may lie in while all other
//! cells stay as they are.

use super::matrix::Matrix;
use crate::desk::commands::{Command, Queue};
use crate::desk::inputs::NumberField;
use crate::desk::theme::{self, Palette};
use egui::{ComboBox, Rect, Sense, Stroke, Ui, pos2, vec2};
use std::ops::RangeInclusive;

/// Width of the picture of the legal interval.
const PICTURE_POINTS: f32 = 120.0;

/// An end this close to a round number is that number.
const SLACK: f64 = 1e-9;

/// Draws the editor of the cell.
pub fn cell_ui(ui: &mut Ui, queue: &mut Queue, matrix: &Matrix<'_>, (row, column): (usize, usize)) {
    ui.horizontal_wrapped(|ui| {
        let width = ((ui.available_width() - 400.0) / 2.0).clamp(90.0, 170.0);
        factor_ui(ui, queue, matrix, "First factor", width, row, |row| (row, column));
        ui.label(theme::soft(ui, "and"));
        factor_ui(ui, queue, matrix, "Second factor", width, column, |column| (row, column));
        if row == column {
            ui.label(theme::soft(ui, "a factor with itself: always 1"));
            return;
        }
        let name = format!("Correlation of {} and {}", matrix.names[row], matrix.names[column]);
        let value = matrix.at(row, column);
        if let Some(value) = NumberField::new(&name, "").range(-1.0..=1.0).pulled(0.002).ui(ui, value) {
            queue.push(set(matrix, row, column, value));
        }
        legal_ui(ui, value, matrix.legal(row, column));
    });
}

/// Sets a cell, and its mirror with it.
pub fn set(matrix: &Matrix<'_>, row: usize, column: usize, value: f64) -> Command {
    Command::SetCorrelation { row: matrix.names[row].clone(), column: matrix.names[column].clone(), value }
}

/// Chooses a cell.
pub fn choose(matrix: &Matrix<'_>, row: usize, column: usize) -> Command {
    Command::ChooseCell { row: matrix.names[row].clone(), column: matrix.names[column].clone() }
}

fn factor_ui(
    ui: &mut Ui,
    queue: &mut Queue,
    matrix: &Matrix<'_>,
    name: &str,
    width: f32,
    chosen: usize,
    cell: impl Fn(usize) -> (usize, usize),
) {
    let combo = ComboBox::from_id_salt(name).selected_text(matrix.names[chosen]).width(width).truncate();
    let response = combo.show_ui(ui, |ui| {
        for (place, factor) in matrix.names.iter().enumerate() {
            if ui.selectable_label(place == chosen, factor.as_str()).clicked() {
                let (row, column) = cell(place);
                queue.push(choose(matrix, row, column));
            }
        }
    });
    response.response.accessible_name(name).on_hover_text(matrix.names[chosen]);
}

fn legal_ui(ui: &mut Ui, value: f64, legal: Option<RangeInclusive<f64>>) {
    let palette = Palette::of(ui);
    let Some(legal) = legal else {
        let words = "the other cells are impossible by themselves: no value will do";
        ui.label(theme::soft(ui, words).color(palette.loss));
        return;
    };
    let is_legal = (legal.start() - SLACK..=legal.end() + SLACK).contains(&value);
    let (rect, response) = ui.allocate_exact_size(vec2(PICTURE_POINTS, 18.0), Sense::hover());
    picture_ui(ui, rect, value, &legal, is_legal);
    let words = format!(
        "may be {} to {}",
        inwards(legal.start() - SLACK, f64::ceil),
        inwards(legal.end() + SLACK, f64::floor)
    );
    let text = theme::soft(ui, words);
    ui.label(if is_legal { text } else { text.color(palette.loss) });
    response.on_hover_text(
        "The interval in which this correlation is possible while all others stay as they are",
    );
}

/// Two decimals, rounded into the interval.
fn inwards(end: f64, round: impl Fn(f64) -> f64) -> String {
    format!("{:.2}", round(end * 100.0) / 100.0 + 0.0)
}

/// From -1 to 1, the legal part thick, the value a mark on it.
fn picture_ui(ui: &Ui, rect: Rect, value: f64, legal: &RangeInclusive<f64>, is_legal: bool) {
    let palette = Palette::of(ui);
    let inside = rect.shrink2(vec2(4.0, 0.0));
    let x = |value: f64| inside.left() + (value as f32 + 1.0) / 2.0 * inside.width();
    let y = rect.center().y;
    let painter = ui.painter();
    painter.hline(inside.x_range(), y, Stroke::new(1.0, palette.hairline));
    painter.vline(x(0.0), y - 3.0..=y + 3.0, Stroke::new(1.0, palette.hairline));
    painter.hline(
        x(*legal.start())..=x(*legal.end()).max(x(*legal.start()) + 1.0),
        y,
        Stroke::new(4.0, palette.accent),
    );
    let color = if is_legal { palette.ink } else { palette.loss };
    painter.circle(pos2(x(value), y), 5.0, color, Stroke::new(1.5, palette.panel));
}
