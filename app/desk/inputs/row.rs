//! Rows of fixed columns: cells that never push each other about, however long their words are.

use crate::desk::theme::{self, Palette};
use egui::text::{LayoutJob, TextWrapping};
use egui::{Align, FontId, Layout, Rect, Sense, Ui, UiBuilder, pos2, vec2};

/// Draws a row of cells `widths` wide, the first from its left edge, all others from their right edge.
pub fn row_ui(ui: &mut Ui, widths: &[f32], height: f32, mut cell: impl FnMut(&mut Ui, usize)) {
    let (rect, _) = ui.allocate_exact_size(vec2(widths.iter().sum(), height), Sense::hover());
    let mut left = rect.left();
    for (place, width) in widths.iter().enumerate() {
        let room = Rect::from_min_max(pos2(left, rect.top()), pos2(left + width, rect.bottom()));
        let layout = if place == 0 {
            Layout::left_to_right(Align::Center)
        } else {
            Layout::right_to_left(Align::Center)
        };
        let mut child = ui.new_child(UiBuilder::new().id_salt(place).max_rect(room).layout(layout));
        child.shrink_clip_rect(room.expand2(vec2(2.0, 2.0)));
        cell(&mut child, place);
        left += width;
    }
}

/// Widths of columns: the first takes what the others leave.
pub fn widths<const COUNT: usize>(ui: &Ui, others: [f32; COUNT]) -> Vec<f32> {
    let first = (ui.available_width() - others.iter().sum::<f32>()).max(0.0);
    [first].into_iter().chain(others).collect()
}

/// A row of a form: its label on the left, its field on the right. The label is painted only: the field has a name of
/// its own for those who cannot see it.
pub fn field_row_ui(ui: &mut Ui, label: &str, field: impl FnOnce(&mut Ui)) {
    let size = vec2(ui.available_width(), ui.spacing().interact_size.y);
    ui.allocate_ui_with_layout(size, Layout::right_to_left(Align::Center), |ui| {
        field(ui);
        let ink = Palette::of(ui).soft_ink;
        let mut job =
            LayoutJob::simple_singleline(label.to_owned(), FontId::proportional(theme::SMALL_POINTS), ink);
        job.wrap = TextWrapping::truncate_at_width(ui.available_width());
        let galley = ui.painter().layout_job(job);
        let room = ui.max_rect();
        ui.painter().galley(pos2(room.left(), room.center().y - galley.size().y / 2.0), galley, ink);
    });
}
