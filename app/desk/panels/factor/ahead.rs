//! Where the chosen factor is headed by itself: its exact mean and its 50 and 90 % bands, as a small chart.

use crate::desk::plot::{Frame, Span, Tick, axes, marks, settled, ticks};
use crate::desk::session::Session;
use crate::desk::theme::{self, Palette};
use ebbmark_engine::book::HalfLife;
use ebbmark_engine::factors::{Diffusion, Model, RiskFactor};
use ebbmark_engine::figures::grouped;
use ebbmark_engine::measures::{FactorAhead, factor_ahead};
use egui::{Align2, Id, Painter, Rect, Sense, Stroke, Ui, pos2};
use std::sync::Arc;

/// Points of the time axis that are worked out.
const POINTS: u32 = 60;
/// Room for the words of the left axis.
const LEFT_POINTS: f32 = 50.0;
/// Room for the words below.
const BELOW_POINTS: f32 = 18.0;
/// Smallest height worth a chart.
const LEAST_HEIGHT: f32 = 60.0;

/// Draws the chart in the room that is left.
pub fn ahead_ui(ui: &mut Ui, session: &Session, model: &Model, factor: &RiskFactor) {
    if ui.available_height() < LEAST_HEIGHT + BELOW_POINTS {
        return;
    }
    ui.label(theme::soft(ui, "Ahead by itself: mean, 50 and 90 % bands"));
    let horizon = session.document().settings.horizon_days;
    let ahead = worked_out(ui, factor, model.days_per_year, horizon);
    let size = ui.available_size();
    let (rect, response) = ui.allocate_exact_size(size, Sense::hover());
    let inside = Rect::from_min_max(
        pos2(rect.left() + LEFT_POINTS, rect.top() + 4.0),
        pos2(rect.right() - 14.0, rect.bottom() - BELOW_POINTS),
    );
    let (low, high) = range(&ahead, factor);
    let key = ui.scope_id().with(("factor range", &factor.name));
    let frame =
        Frame { rect: inside, across: Span::new(0.0, f64::from(horizon)), up: settled(ui, key, low, high) };
    draw(ui.painter(), &frame, Palette::of(ui), &ahead, factor);
    response.on_hover_text("Exact mean, and the quantiles 5, 25, 75 and 95 %, of the factor alone");
}

/// The figures of a factor, kept until it changes.
fn worked_out(ui: &Ui, factor: &RiskFactor, days_per_year: f64, horizon: u32) -> Arc<FactorAhead> {
    type Known = (RiskFactor, f64, u32, Arc<FactorAhead>);
    let key = Id::unique("factor ahead");
    let known = ui.data(|data| data.get_temp::<Known>(key));
    let same = known.filter(|known| (&known.0, known.1, known.2) == (factor, days_per_year, horizon));
    same.map_or_else(
        || {
            let step = horizon.div_ceil(POINTS).max(1);
            let days: Vec<u32> = (1..horizon).step_by(step as usize).chain([horizon]).collect();
            let ahead = Arc::new(factor_ahead(factor, days_per_year, &days));
            let known: Known = (factor.clone(), days_per_year, horizon, Arc::clone(&ahead));
            ui.data_mut(|data| data.insert_temp(key, known));
            ahead
        },
        |known| known.3,
    )
}

/// Level today; 1, or 0 for a level, where the factor has none, as the figures ahead have it.
fn today(factor: &RiskFactor) -> f64 {
    factor.level.unwrap_or(if factor.diffusion.is_log() { 1.0 } else { 0.0 })
}

/// The level that a reverting factor is drawn to.
fn long_run(factor: &RiskFactor) -> Option<f64> {
    match factor.diffusion {
        Diffusion::RevertingLog { long_run, half_life: HalfLife::Days(_), .. }
        | Diffusion::RevertingLevel { long_run, half_life: HalfLife::Days(_), .. } => Some(long_run),
        _ => None,
    }
}

fn range(ahead: &FactorAhead, factor: &RiskFactor) -> (f64, f64) {
    let ends = ahead.ninety.iter().copied().flatten();
    let shown = ends.chain([today(factor)]).chain(long_run(factor)).filter(|value| value.is_finite());
    shown.fold((f64::INFINITY, f64::NEG_INFINITY), |(low, high): (f64, f64), value| {
        (low.min(value), high.max(value))
    })
}

fn draw(painter: &Painter, frame: &Frame, palette: &Palette, ahead: &FactorAhead, factor: &RiskFactor) {
    axes::ground(painter, frame, palette);
    axes::left(painter, frame, palette, &level_ticks(frame), true);
    axes::bottom(painter, frame, palette, &day_ticks(frame), true);
    let inside = painter.with_clip_rect(frame.rect.intersect(painter.clip_rect()));
    let days = || ahead.days.iter().map(|day| f64::from(*day));
    let start = today(factor);
    for (ends, weight) in [(&ahead.ninety, 0.2), (&ahead.half, 0.3)] {
        let edges = days().zip(ends).map(|(day, ends)| [day, ends[0], ends[1]]);
        let edges: Vec<[f64; 3]> = [[0.0, start, start]].into_iter().chain(edges).collect();
        marks::band(&inside, frame, &edges, palette.neutral.gamma_multiply(weight));
    }
    let mean = days().zip(&ahead.mean).map(|(day, mean)| [day, *mean]);
    let mean: Vec<[f64; 2]> = [[0.0, start]].into_iter().chain(mean).collect();
    marks::line(&inside, frame, &mean, Stroke::new(1.8, palette.neutral));
    if let Some(level) = long_run(factor) {
        marks::dashed_level(&inside, frame, level, Stroke::new(1.0, palette.ink));
        let at = pos2(frame.rect.right() - 4.0, frame.y(level) - 1.0);
        marks::label(&inside, frame.rect, at, Align2::RIGHT_BOTTOM, "long run", palette.ink, palette.panel);
    }
}

fn level_ticks(frame: &Frame) -> Vec<Tick> {
    let step = ticks::step(frame.up, (frame.rect.height() / 24.0) as usize);
    let decimals = ticks::decimals(step);
    ticks::along(frame.up, step, 0.0, |value| grouped(value, decimals))
}

fn day_ticks(frame: &Frame) -> Vec<Tick> {
    ticks::days(frame.across, (frame.rect.width() / 56.0) as usize)
}
