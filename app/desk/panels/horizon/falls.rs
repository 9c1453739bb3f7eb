//! The chart of the largest fall from a running peak so far, day by day, drawn downwards from zero.

use super::ahead::day_ticks;
use super::scene::Scene;
use crate::desk::plot::axes::{self, Tick};
use crate::desk::plot::{Frame, marks, ticks};
use crate::desk::theme::Palette;
use egui::{Align2, Painter, Stroke, pos2};

/// Points between ticks of the side's axis, at least.
const TICK_POINTS: f32 = 28.0;
/// Lines and their labels: place in the bands, words, weight of the line.
const LINES: [(usize, &str, f32); 3] = [(0, "50 %", 1.8), (2, "90 %", 1.0), (4, "99 %", 1.0)];

/// Draws the chart with the words of the time axis below.
pub fn draw(painter: &Painter, frame: &Frame, palette: &Palette, scene: &Scene<'_>) {
    axes::ground(painter, frame, palette);
    axes::bottom(painter, frame, palette, &day_ticks(frame), true);
    axes::left(painter, frame, palette, &fall_ticks(frame, scene));
    let words = "trading days";
    let at = pos2(frame.rect.right() + 20.0, frame.rect.bottom() + 5.0);
    painter.text(at, Align2::LEFT_TOP, words, axes::font(), palette.soft_ink);
    let inside = painter.with_clip_rect(frame.rect.intersect(painter.clip_rect()));
    for (shallow, deep, weight) in [(0, 2, 0.30), (2, 4, 0.15)] {
        let edges = scene.falls().map(|(day, falls)| (day, falls[shallow], falls[deep]));
        marks::band(&inside, frame, edges, palette.loss.gamma_multiply(weight));
    }
    for (place, words, width) in LINES {
        marks::line(
            &inside,
            frame,
            scene.falls().map(|(day, falls)| (day, falls[place])),
            Stroke::new(width, palette.loss),
        );
        label(&inside, frame, palette, scene, place, words);
    }
    chosen(&inside, frame, palette, scene);
}

/// Beside the end of a line.
fn label(painter: &Painter, frame: &Frame, palette: &Palette, scene: &Scene<'_>, place: usize, words: &str) {
    let Some((day, falls)) = scene.falls().last() else { return };
    let at = pos2(frame.x(day) - 6.0, frame.y(falls[place]) - 2.0);
    marks::label(
        painter,
        frame.rect.shrink(2.0),
        at,
        Align2::RIGHT_BOTTOM,
        words,
        palette.ink,
        palette.panel,
    );
}

/// The chosen confidence's fall, a point on the reading line.
fn chosen(painter: &Painter, frame: &Frame, palette: &Palette, scene: &Scene<'_>) {
    if let Some(fall) = scene.fall {
        let at = frame.at(f64::from(scene.at_line.day), fall.value);
        painter.circle(at, 4.5, palette.loss, Stroke::new(1.5, palette.panel));
    }
}

/// Ticks in money of the book's size.
pub fn fall_ticks(frame: &Frame, scene: &Scene<'_>) -> Vec<Tick> {
    let step = ticks::step(frame.up, (frame.rect.height() / TICK_POINTS) as usize);
    let decimals = ticks::decimals(step / scene.money.scale.size);
    ticks::multiples(frame.up, step, 0.0)
        .into_iter()
        .map(|fall| Tick { value: fall, words: scene.money.scale.figure(fall, decimals) })
        .collect()
}
