//! What is drawn inside a chart: bands, lines, levels and labels. Colours come from the caller's palette.

use super::Frame;
use crate::desk::theme;
use egui::epaint::Mesh;
use egui::{Align2, Color32, FontFamily, FontId, Painter, Pos2, Rect, Shape, Stroke};

/// Length of a dash and of the gap after it, in points.
const DASH: f32 = 5.0;

/// The strip between two edges, each `(across, low, high)`.
pub fn band(painter: &Painter, frame: &Frame, edges: &[[f64; 3]], color: Color32) {
    let mut mesh = Mesh::default();
    for [across, low, high] in finite(edges) {
        mesh.colored_vertex(frame.at(across, low), color);
        mesh.colored_vertex(frame.at(across, high), color);
    }
    for first in (0..(mesh.vertices.len() as u32).saturating_sub(2)).step_by(2) {
        mesh.add_triangle(first, first + 1, first + 2);
        mesh.add_triangle(first + 1, first + 2, first + 3);
    }
    painter.add(Shape::mesh(mesh));
}

/// The strip between the side and a curve over the side's axis, each `(up, length)`; for distributions on their side.
pub fn side_band(painter: &Painter, frame: &Frame, curve: &[[f64; 2]], color: Color32) {
    let mut mesh = Mesh::default();
    for [up, length] in finite(curve) {
        mesh.colored_vertex(frame.at(frame.across.from, up), color);
        mesh.colored_vertex(frame.at(length, up), color);
    }
    for first in (0..(mesh.vertices.len() as u32).saturating_sub(2)).step_by(2) {
        mesh.add_triangle(first, first + 1, first + 2);
        mesh.add_triangle(first + 1, first + 2, first + 3);
    }
    painter.add(Shape::mesh(mesh));
}

/// A line through `(across, up)`.
pub fn line(painter: &Painter, frame: &Frame, points: &[[f64; 2]], stroke: Stroke) {
    let points: Vec<Pos2> = finite(points).map(|[across, up]| frame.at(across, up)).collect();
    painter.add(Shape::line(points, stroke));
}

/// Points of which every value is a number.
fn finite<const N: usize>(points: &[[f64; N]]) -> impl Iterator<Item = [f64; N]> + '_ {
    points.iter().copied().filter(|point| point.iter().all(|value| value.is_finite()))
}

/// A dashed line along a value of the side's axis; nothing where it lies outside.
pub fn dashed_level(painter: &Painter, frame: &Frame, up: f64, stroke: Stroke) {
    if frame.up.holds(up) {
        let y = painter.round_to_pixel_center(frame.y(up));
        let ends = [egui::pos2(frame.rect.left(), y), egui::pos2(frame.rect.right(), y)];
        painter.extend(Shape::dashed_line(&ends, stroke, DASH, DASH * 0.8));
    }
}

/// A whole line along a value of the side's axis; nothing where it lies outside.
pub fn level(painter: &Painter, frame: &Frame, up: f64, stroke: Stroke) {
    if frame.up.holds(up) {
        painter.hline(frame.rect.x_range(), painter.round_to_pixel_center(frame.y(up)), stroke);
    }
}

/// A label on its own ground, so that it reads over whatever lies below; moved to stay inside `bounds`.
pub fn label(
    painter: &Painter,
    bounds: Rect,
    at: Pos2,
    anchor: Align2,
    text: &str,
    ink: Color32,
    ground: Color32,
) -> Rect {
    let font = FontId::new(theme::SMALL_POINTS, FontFamily::Proportional);
    let galley = painter.layout_no_wrap(text.to_owned(), font, ink);
    let rect = anchor.anchor_size(at, galley.size());
    let shift = egui::vec2(
        (bounds.left() - rect.left()).max(0.0) - (rect.right() - bounds.right()).max(0.0),
        (bounds.top() - rect.top()).max(0.0) - (rect.bottom() - bounds.bottom()).max(0.0),
    );
    let rect = rect.translate(shift);
    painter.rect_filled(rect.expand2(egui::vec2(2.0, 0.0)), 2.0, ground.gamma_multiply(0.8));
    painter.galley(rect.min, galley, ink);
    rect
}
