//! The Correlation view: the matrix as a heat map with numbers, its chosen cell to be edited, whether the whole is possible
//! and how it could be made so, and how it is estimated. What an edit does is the session's business.

/// The chosen cell: its value, and what it may be.
pub mod cell;
/// How fitted correlations are estimated.
pub mod estimator;
/// The map, with pointer and keys.
pub mod map;
/// The matrix as the document has it.
pub mod matrix;
/// The nearest valid matrix.
pub mod repair;
/// What the chosen pair did in the history.
pub mod scatter;

use crate::desk::commands::{Command, Queue};
use crate::desk::session::Session;
use crate::desk::theme::{self, Palette};
use crate::workspace::MatrixOrder;
use ebbmark_engine::figures::grouped;
use egui::{Align, Layout, Ui};
use matrix::Matrix;

/// Draws the view.
pub fn correlation_ui(ui: &mut Ui, session: &Session, queue: &mut Queue) {
    let matrix = Matrix::of(ui, session);
    let words = match &matrix {
        None => "The factors stand here once the book can be read",
        Some(_) => "Fewer than two risk factors: nothing to correlate",
    };
    let Some(matrix) = matrix.filter(|matrix| matrix.size() > 1) else {
        ui.centered_and_justified(|ui| ui.label(theme::soft(ui, words)));
        return;
    };
    let chosen = chosen_cell(session, &matrix);
    title_ui(ui, session, &matrix);
    repair::repair_ui(ui, session, queue);
    ui.horizontal_top(|ui| {
        scatter::scatter_ui(ui, session, [matrix.names[chosen.0], matrix.names[chosen.1]]);
        ui.vertical(|ui| {
            order_ui(ui, session, queue);
            estimator::estimator_ui(ui, session, queue);
            cell::cell_ui(ui, queue, &matrix, chosen);
        });
    });
    ui.add_space(4.0);
    map::map_ui(ui, queue, &matrix, chosen);
}

/// Row and column of the chosen cell; the first off the diagonal where none is.
fn chosen_cell(session: &Session, matrix: &Matrix<'_>) -> (usize, usize) {
    let place = |name: &String| matrix.names.iter().position(|known| *known == name);
    let chosen = session.view().cell.as_ref().and_then(|(row, column)| place(row).zip(place(column)));
    chosen.unwrap_or((1, 0))
}

fn title_ui(ui: &mut Ui, session: &Session, matrix: &Matrix<'_>) {
    ui.horizontal(|ui| {
        ui.label(theme::strong("Correlation of the factors' shocks"));
        let model = session.live().model.as_deref();
        if let Some(history) = model.and_then(|model| model.history.as_ref()?.estimator.as_ref()) {
            ui.label(theme::soft(ui, "fitted where not typed")).on_hover_text(history);
        }
        ui.with_layout(Layout::right_to_left(Align::Center), |ui| {
            let (smallest, largest) = matrix.eigenvalue_ends(ui);
            let is_possible = smallest >= matrix::LEAST_EIGENVALUE;
            let condition = if smallest > 0.0 { grouped(largest / smallest, 0) } else { "none".to_owned() };
            let words =
                format!("smallest eigenvalue {}, condition {condition}", matrix::eigenvalue_words(smallest));
            let text = theme::soft(ui, words);
            ui.label(if is_possible { text } else { text.color(Palette::of(ui).loss) }).on_hover_text(
                "Below zero the correlations can't hold together; a large condition number means that some mix of factors \
                 hardly moves",
            );
        });
    });
}

fn order_ui(ui: &mut Ui, session: &Session, queue: &mut Queue) {
    ui.horizontal(|ui| {
        ui.label(theme::soft(ui, "Order"));
        for order in [MatrixOrder::Book, MatrixOrder::Group, MatrixOrder::Closeness] {
            let command = Command::OrderMatrix(order);
            if ui.selectable_label(session.view().matrix_order == order, command.text()).clicked() {
                queue.push(command);
            }
        }
    });
}
