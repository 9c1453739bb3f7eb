//! Where the chosen factor is headed by itself, its exact mean and its 50 and 90 % bands, and where it came from, as a
//! small chart.

use crate::desk::plot::{Span, Tick, settled, ticks};
use crate::desk::session::Session;
use crate::desk::theme::{self, Palette};
use ebbmark_engine::book::HalfLife;
use ebbmark_engine::factors::{Diffusion, Model, RiskFactor};
use ebbmark_engine::figures::grouped;
use ebbmark_engine::measures::{FactorAhead, factor_ahead};
use egui::{Align2, Id, Response, RichText, Ui, Vec2, vec2};
use egui_plot::{FilledArea, GridMark, HLine, Line, LineStyle, Plot, PlotBounds, PlotPoint, PlotUi, Text};
use std::sync::Arc;

/// Points of the time axis that are worked out.
const POINTS: u32 = 60;
/// Room for the words of the left axis.
const LEFT_POINTS: f32 = 50.0;
/// Room for half of the last day's words.
const RIGHT_POINTS: f32 = 12.0;
/// Points between ticks, at least.
const DAY_TICK_POINTS: f32 = 56.0;
const LEVEL_TICK_POINTS: f32 = 20.0;
/// Smallest height worth a chart.
const LEAST_HEIGHT: f32 = 80.0;

/// Draws the chart in the room that is left.
pub fn ahead_ui(ui: &mut Ui, session: &Session, model: &Model, factor: &RiskFactor) {
    if ui.available_height() < LEAST_HEIGHT {
        return;
    }
    ui.label(theme::soft(ui, "By itself: mean, half and 90 % of outcomes on each day"));
    let horizon = session.document().settings.horizon_days;
    let ahead = worked_out(ui, factor, model.days_per_year, horizon);
    let behind = behind(session, factor, horizon);
    let (low, high) = range(&ahead, factor, &behind);
    let key = ui.scope_id().with(("factor range", &factor.name));
    let chart = Chart {
        palette: Palette::of(ui),
        across: Span::new(behind.first().map_or(0.0, |[day, _]| *day), f64::from(horizon)),
        ahead_days: Span::new(0.0, f64::from(horizon)),
        up: settled(ui, key, low, high),
        today: today(factor),
        long_run: long_run(factor),
        ahead: &ahead,
        behind,
    };
    let response = chart.ui(ui);
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

/// The last rows of a daily history, days counted back from today; half as many as are shown ahead.
fn behind(session: &Session, factor: &RiskFactor, horizon: u32) -> Vec<[f64; 2]> {
    let is_daily = session.live().fit.as_ref().is_some_and(|fit| fit.spacing.row_days() == Some(1));
    let history = session.document().history.as_ref().and_then(|history| history.history());
    let Some((history, series)) = history.and_then(|history| Some((history, history.series(&factor.name)?)))
    else {
        return Vec::new();
    };
    let rows = history.dates.len();
    let first = rows.saturating_sub(horizon as usize / 2);
    let points = series.quoted().filter(|(row, _)| *row >= first && is_daily);
    points.map(|(row, level)| [row as f64 + 1.0 - rows as f64, level]).collect()
}

fn range(ahead: &FactorAhead, factor: &RiskFactor, behind: &[[f64; 2]]) -> (f64, f64) {
    let ends = ahead.ninety.iter().copied().flatten();
    let shown = ends
        .chain(behind.iter().map(|[_, level]| *level))
        .chain([today(factor)])
        .chain(long_run(factor))
        .filter(|value| value.is_finite());
    shown.fold((f64::INFINITY, f64::NEG_INFINITY), |(low, high): (f64, f64), value| {
        (low.min(value), high.max(value))
    })
}

/// What is drawn: bands round the mean from today on, and the level that it is drawn to.
struct Chart<'a> {
    palette: &'a Palette,
    across: Span,
    /// From today on.
    ahead_days: Span,
    up: Span,
    today: f64,
    long_run: Option<f64>,
    ahead: &'a FactorAhead,
    /// `[day, level]` of the history, days negative.
    behind: Vec<[f64; 2]>,
}

impl Chart<'_> {
    fn ui(&self, ui: &mut Ui) -> Response {
        // The words under the last day reach half their width beyond the chart.
        let size = ui.available_size() - vec2(RIGHT_POINTS, 0.0);
        let share = self.ahead_days.to / (self.across.to - self.across.from);
        let room = f64::from((size.x - LEFT_POINTS) / DAY_TICK_POINTS) * share;
        let day_ticks = ticks::days(self.ahead_days, room as usize);
        let level_step = ticks::step(self.up, (size.y / LEVEL_TICK_POINTS) as usize);
        let decimals = ticks::decimals(level_step);
        let level_ticks = ticks::along(self.up, level_step, 0.0, |level| grouped(level, decimals));
        let (day_marks, level_marks) = (marks(&day_ticks), marks(&level_ticks));
        let plot = Plot::new("factor ahead")
            .width(size.x)
            .height(size.y)
            .allow_drag(false)
            .allow_zoom(false)
            .allow_scroll(false)
            .allow_boxed_zoom(false)
            .allow_double_click_reset(false)
            .show_background(false)
            .show_crosshair(false)
            .grid_color(self.palette.grid)
            .set_margin_fraction(Vec2::ZERO)
            .y_axis_min_width(LEFT_POINTS)
            .x_grid_spacer(move |_| day_marks.clone())
            .y_grid_spacer(move |_| level_marks.clone())
            .x_axis_formatter(move |mark, _| words(&day_ticks, mark))
            .y_axis_formatter(move |mark, _| words(&level_ticks, mark))
            .label_formatter(|_| None);
        plot.show(ui, |plot| self.draw(plot)).response
    }

    fn draw(&self, plot: &mut PlotUi<'_>) {
        let ((left, right), (bottom, top)) = (self.across.ends(), self.up.ends());
        plot.set_plot_bounds(PlotBounds::from_min_max([left, bottom], [right, top]));
        let from_today = |later: &mut dyn Iterator<Item = f64>| -> Vec<f64> {
            [self.today].into_iter().chain(later).collect()
        };
        let days: Vec<f64> =
            [0.0].into_iter().chain(self.ahead.days.iter().map(|day| f64::from(*day))).collect();
        for (name, ends, weight) in [("90 %", &self.ahead.ninety, 0.2), ("50 %", &self.ahead.half, 0.3)] {
            let low = from_today(&mut ends.iter().map(|ends| ends[0]));
            let high = from_today(&mut ends.iter().map(|ends| ends[1]));
            let fill = self.palette.neutral.gamma_multiply(weight);
            plot.add(FilledArea::new(name, &days, &low, &high).fill_color(fill));
        }
        plot.line(Line::new("history", self.behind.clone()).color(self.palette.ink).width(1.0));
        let mean = from_today(&mut self.ahead.mean.iter().copied());
        let mean: Vec<[f64; 2]> = days.iter().zip(mean).map(|(day, level)| [*day, level]).collect();
        plot.line(Line::new("mean", mean).color(self.palette.neutral).width(1.8));
        if let Some(level) = self.long_run {
            let line = HLine::new("long run", level).color(self.palette.ink).width(1.0);
            plot.hline(line.style(LineStyle::dashed_dense()));
            let words = RichText::new("long run").size(theme::SMALL_POINTS).color(self.palette.ink);
            let at = PlotPoint::new(right, level);
            plot.text(Text::new("long run", at, words).anchor(Align2::RIGHT_BOTTOM));
        }
    }
}

/// Grid lines at ticks, all of one weight.
fn marks(ticks: &[Tick]) -> Vec<GridMark> {
    let step_size = ticks.windows(2).map(|pair| pair[1].value - pair[0].value).next().unwrap_or(1.0);
    ticks.iter().map(|tick| GridMark { value: tick.value, step_size }).collect()
}

fn words(ticks: &[Tick], mark: GridMark) -> String {
    let tick = ticks.iter().find(|tick| tick.value == mark.value);
    tick.map_or_else(String::new, |tick| tick.words.clone())
}
