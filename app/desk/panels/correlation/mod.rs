//! The Correlation view: the matrix as a heat map with numbers, its chosen cell to be edited, and whether the whole is
//! possible. The matrix stays symmetric; what an edit does is the session's business.

/// The chosen cell: its value, and what it may be.
pub mod cell;
/// The map, with pointer and keys.
pub mod map;
/// The matrix as the document has it, in the model's order.
pub mod matrix;

use crate::desk::commands::Queue;
use crate::desk::session::Session;
use crate::desk::theme::{self, Palette};
use egui::{Align, Layout, Ui};
use matrix::Matrix;

/// Draws the view.
pub fn correlation_ui(ui: &mut Ui, session: &Session, queue: &mut Queue) {
    let Some(matrix) = Matrix::of(session).filter(|matrix| matrix.size() > 1) else {
        ui.centered_and_justified(|ui| {
            ui.label(theme::soft(ui, "Fewer than two risk factors: nothing to correlate"))
        });
        return;
    };
    let chosen = chosen_cell(session, &matrix);
    title_ui(ui, &matrix);
    cell::cell_ui(ui, queue, &matrix, chosen);
    ui.add_space(4.0);
    map::map_ui(ui, queue, &matrix, chosen);
}

/// Row and column of the chosen cell; the first off the diagonal where none is.
fn chosen_cell(session: &Session, matrix: &Matrix<'_>) -> (usize, usize) {
    let place = |name: &String| matrix.names.iter().position(|known| *known == name);
    let chosen = session.view().cell.as_ref().and_then(|(row, column)| place(row).zip(place(column)));
    chosen.unwrap_or((1, 0))
}

fn title_ui(ui: &mut Ui, matrix: &Matrix<'_>) {
    ui.horizontal(|ui| {
        ui.label(theme::strong("Correlation of the factors' shocks"));
        ui.with_layout(Layout::right_to_left(Align::Center), |ui| {
            let smallest = matrix.smallest_eigenvalue(ui);
            let words = format!("smallest eigenvalue {}", matrix::eigenvalue_words(smallest));
            let is_possible = smallest >= matrix::LEAST_EIGENVALUE;
            let text = theme::soft(ui, words);
            ui.label(if is_possible { text } else { text.color(Palette::of(ui).loss) });
        });
    });
}
