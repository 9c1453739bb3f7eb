//! The chart of the book's value ahead: nested bands, median, today's value, loss limit and the chosen VaR. The
//! reading line itself is drawn, and dragged, in `line`.

use super::scene::Scene;
use crate::desk::plot::axes::{self, Tick};
use crate::desk::plot::{Frame, Span, marks, ticks};
use crate::desk::readout::signed;
use crate::desk::theme::Palette;
use ebbmark_engine::figures::percent;
use egui::{Align2, Painter, Stroke, pos2, vec2};

/// Points between ticks of the side's axis, at least.
const TICK_POINTS: f32 = 34.0;
/// A band's label needs this much height.
const LABEL_POINTS: f32 = 12.0;

/// Draws the chart; the words of the change from today stand in a column `change_width` wide on its right.
pub fn draw(painter: &Painter, frame: &Frame, palette: &Palette, scene: &Scene<'_>, change_width: f32) {
    axes::ground(painter, frame, palette);
    axes::bottom(painter, frame, palette, &day_ticks(frame), false);
    axes::left(painter, frame, palette, &value_ticks(frame, scene));
    axes::right(painter, frame, palette, &change_ticks(frame, scene), change_width - 10.0);
    let inside = painter.with_clip_rect(frame.rect.intersect(painter.clip_rect()));
    bands(&inside, frame, palette, scene);
    marks::dashed_level(&inside, frame, scene.today, Stroke::new(1.0, palette.soft_ink));
    limit(&inside, frame, palette, scene);
    var(&inside, frame, palette, scene);
}

/// Shades from the widest to the narrowest, then the median.
fn bands(painter: &Painter, frame: &Frame, palette: &Palette, scene: &Scene<'_>) {
    for (low, high, weight) in [(0, 6, 0.16), (1, 5, 0.22), (2, 4, 0.30)] {
        let edges = scene.values().map(|(day, values)| (day, values[low], values[high]));
        marks::band(painter, frame, edges, palette.neutral.gamma_multiply(weight));
    }
    let median = scene.values().map(|(day, values)| (day, values[3]));
    marks::line(painter, frame, median, Stroke::new(1.5, palette.neutral));
    let Some((day, last)) = scene.values().last() else { return };
    for (low, high, words) in [(5, 6, "98 %"), (4, 5, "90 %"), (3, 4, "50 %")] {
        let (bottom, top) = (frame.y(last[low]), frame.y(last[high]));
        if bottom - top >= LABEL_POINTS {
            let at = pos2(frame.x(day) - 6.0, (bottom + top) / 2.0);
            painter.text(at, Align2::RIGHT_CENTER, words, axes::font(), palette.ink);
        }
    }
}

fn limit(painter: &Painter, frame: &Frame, palette: &Palette, scene: &Scene<'_>) {
    let (Some(value), Some(limit)) = (scene.limit_value(), scene.loss_limit) else { return };
    marks::dashed_level(painter, frame, value, Stroke::new(1.5, palette.ink));
    if frame.up.holds(value) {
        let words = format!("loss limit {}", scene.money.figure(limit, 0.0));
        let at = pos2(frame.rect.right() - 44.0, frame.y(value) - 3.0);
        marks::label(painter, frame.rect, at, Align2::RIGHT_BOTTOM, &words, palette.ink, palette.panel);
    }
}

/// The chosen VaR: a point on the reading line with its words beside it.
fn var(painter: &Painter, frame: &Frame, palette: &Palette, scene: &Scene<'_>) {
    let at = frame.at(f64::from(scene.at_line.day), scene.var_value());
    let is_left = at.x > frame.rect.center().x;
    let (anchor, aside) = if is_left { (Align2::RIGHT_TOP, -9.0) } else { (Align2::LEFT_TOP, 9.0) };
    painter.circle(at, 4.5, palette.loss, Stroke::new(1.5, palette.panel));
    let rect = frame.rect.shrink(4.0);
    marks::label(
        painter,
        rect,
        at + vec2(aside, 4.0),
        anchor,
        &scene.var_words(),
        palette.loss,
        palette.panel,
    );
}

/// Ticks of the time axis, today among them.
pub fn day_ticks(frame: &Frame) -> Vec<Tick> {
    let last = frame.across.to;
    let step = ticks::day_step(last, (frame.rect.width() / 58.0) as usize);
    ticks::multiples(frame.across, step, 0.0)
        .into_iter()
        .map(|day| Tick { value: day, words: if day == 0.0 { "today".to_owned() } else { format!("{day}") } })
        .collect()
}

/// Ticks in money of the book's size.
pub fn value_ticks(frame: &Frame, scene: &Scene<'_>) -> Vec<Tick> {
    let step = ticks::step(frame.up, (frame.rect.height() / TICK_POINTS) as usize);
    let decimals = ticks::decimals(step / scene.money.scale.size);
    ticks::multiples(frame.up, step, 0.0)
        .into_iter()
        .map(|value| Tick { value, words: scene.money.scale.figure(value, decimals) })
        .collect()
}

/// Round changes from today, in money and in per cent.
fn change_ticks(frame: &Frame, scene: &Scene<'_>) -> Vec<Tick> {
    let change = Span::new(frame.up.from - scene.today, frame.up.to - scene.today);
    let step = ticks::step(change, (frame.rect.height() / TICK_POINTS) as usize);
    let decimals = ticks::decimals(step / scene.money.scale.size);
    let share = |change: f64| {
        let base = scene.money.base?;
        let decimals = ticks::decimals(step / base * 100.0).max(1);
        Some(signed(change, percent(change / base, decimals)))
    };
    ticks::multiples(change, step, 0.0)
        .into_iter()
        .map(|change| {
            let money = signed(change, scene.money.scale.figure(change, decimals));
            let words = share(change).map_or(money.clone(), |share| format!("{money}  {share}"));
            Tick { value: scene.today + change, words }
        })
        .collect()
}
