//! Distributions at the reading line, on the axis of the chart beside them: the book's value with the tail beyond VaR,
//! and the largest fall so far.

use super::ahead::value_ticks;
use super::falls::fall_ticks;
use super::scene::Scene;
use crate::desk::plot::{Frame, axes, marks};
use crate::desk::readout::{confidence_words, half_range};
use crate::desk::theme::Palette;
use ebbmark_engine::measures::Density;
use egui::{Align2, Color32, Painter, Stroke, pos2};

/// Draws the distribution of the book's value.
pub fn draw_values(painter: &Painter, frame: &Frame, palette: &Palette, scene: &Scene<'_>) {
    axes::ground(painter, frame, palette);
    axes::grid_across(painter, frame, palette, &value_ticks(frame, scene));
    let inside = painter.with_clip_rect(frame.rect.intersect(painter.clip_rect()));
    let density = &scene.at_line.values;
    let (var, es) = (scene.var_value(), scene.es_value());
    marks::side_band(
        &inside,
        frame,
        curve(density, var, f64::INFINITY),
        palette.neutral.gamma_multiply(0.22),
    );
    marks::side_band(
        &inside,
        frame,
        curve(density, f64::NEG_INFINITY, var),
        palette.loss.gamma_multiply(0.75),
    );
    outline(&inside, frame, density, palette.neutral);
    marks::dashed_level(&inside, frame, scene.today, Stroke::new(1.0, palette.soft_ink));
    marks::level(&inside, frame, var, Stroke::new(1.5, palette.loss));
    marks::dashed_level(&inside, frame, es, Stroke::new(1.5, palette.loss));
    let right = frame.rect.right() - 4.0;
    let words = [
        (var, Align2::RIGHT_BOTTOM, -2.0, scene.var_words()),
        (es, Align2::RIGHT_TOP, 2.0, scene.es_words()),
    ];
    for (value, anchor, aside, words) in words {
        let at = pos2(right, frame.y(value) + aside);
        marks::label(&inside, frame.rect.shrink(2.0), at, anchor, &words, palette.loss, palette.panel);
    }
}

/// Draws the distribution of the largest fall.
pub fn draw_falls(painter: &Painter, frame: &Frame, palette: &Palette, scene: &Scene<'_>) {
    axes::ground(painter, frame, palette);
    axes::grid_across(painter, frame, palette, &fall_ticks(frame, scene));
    let inside = painter.with_clip_rect(frame.rect.intersect(painter.clip_rect()));
    let density = &scene.at_line.falls;
    let Some(fall) = scene.fall else { return };
    marks::side_band(&inside, frame, curve(density, 0.0, fall.value), palette.loss.gamma_multiply(0.18));
    marks::side_band(
        &inside,
        frame,
        curve(density, fall.value, f64::INFINITY),
        palette.loss.gamma_multiply(0.75),
    );
    outline(&inside, frame, density, palette.loss);
    marks::level(&inside, frame, fall.value, Stroke::new(1.5, palette.loss));
    let error = half_range(fall.value_low, fall.value_high);
    let words = format!("{} {}", confidence_words(fall.confidence), scene.money.figure(fall.value, error));
    let at = pos2(frame.rect.right() - 4.0, frame.y(fall.value) + 2.0);
    marks::label(&inside, frame.rect.shrink(2.0), at, Align2::RIGHT_TOP, &words, palette.loss, palette.panel);
}

/// The curve between two values, cut exactly there.
fn curve(density: &Density, low: f64, high: f64) -> impl Iterator<Item = (f64, f64)> + '_ {
    let pairs = density.at.windows(2).zip(density.density.windows(2));
    pairs.flat_map(move |(at, height)| {
        let cut = |value: f64| {
            let share = if at[1] > at[0] { (value - at[0]) / (at[1] - at[0]) } else { 0.0 };
            (value, height[0] + share * (height[1] - height[0]))
        };
        let (from, to) = (at[0].max(low), at[1].min(high));
        (from <= to).then(|| [cut(from), cut(to)]).into_iter().flatten()
    })
}

fn outline(painter: &Painter, frame: &Frame, density: &Density, color: Color32) {
    let points = density.at.iter().zip(&density.density).map(|(at, height)| (*height, *at));
    marks::line(painter, frame, points, Stroke::new(1.5, color));
}
