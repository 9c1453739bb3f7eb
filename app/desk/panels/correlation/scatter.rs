//! What moved the chosen pair on the same dates of the history, one dot a date, with the correlation and its interval.

use crate::desk::session::Session;
use crate::desk::theme::{self, Palette};
use ebbmark_engine::maths::TWO_SIDED_95;
use egui::{Align2, FontId, Id, Rect, Role, Sense, Stroke, Ui, WidgetInfo, pos2, vec2};
use std::sync::Arc;

/// Side of the picture, in points.
const SIDE_POINTS: f32 = 92.0;
/// Standard deviations from the middle to its edge.
const REACH: f64 = 4.0;

/// Points of a pair, and what they belong to.
#[derive(Clone)]
struct Shocks {
    fit: usize,
    pair: [String; 2],
    points: Arc<Vec<[f64; 2]>>,
}

/// Draws the dots, what they say when pointed at; nothing without a history that has both.
pub fn scatter_ui(ui: &mut Ui, session: &Session, pair: [&String; 2]) {
    if pair[0] == pair[1] {
        return;
    }
    let Some(points) = shocks(ui, session, pair).filter(|points| points.len() > 3) else { return };
    let (rect, response) = ui.allocate_exact_size(vec2(SIDE_POINTS, SIDE_POINTS), Sense::hover());
    dots_ui(ui, rect, &points);
    let (correlation, low, high) = interval(&points);
    let words = format!("{correlation:.2} ({low:.2} to {high:.2})");
    let font = FontId::proportional(theme::SMALL_POINTS);
    let at = rect.left_bottom() + vec2(4.0, -2.0);
    ui.painter().text(at, Align2::LEFT_BOTTOM, words, font, Palette::of(ui).ink);
    response.widget_info(|| WidgetInfo::labeled(Role::Image, true, "Shocks of the chosen pair"));
    response.on_hover_ui(|ui| {
        ui.label(format!(
            "Each dot one of {} dates that both have: the shock of {} across, of {} upwards, in standard deviations up to \
             {REACH}",
            points.len(),
            pair[0],
            pair[1]
        ));
        ui.label("Below: their correlation, every date counting the same, with its 95 % range by Fisher's transform");
    });
}

/// Correlation of points of unit spread, and its range by Fisher's transform: `atanh r -/+ 1.96 / sqrt(n - 3)`.
fn interval(points: &[[f64; 2]]) -> (f64, f64, f64) {
    let n = points.len() as f64;
    let correlation = points.iter().map(|[one, other]| one * other).sum::<f64>() / n;
    let reach = TWO_SIDED_95 / (n - 3.0).max(1.0).sqrt();
    let middle = correlation.clamp(-1.0 + f64::EPSILON, 1.0 - f64::EPSILON).atanh();
    (correlation, (middle - reach).tanh(), (middle + reach).tanh())
}

fn dots_ui(ui: &Ui, rect: Rect, points: &[[f64; 2]]) {
    let palette = Palette::of(ui);
    let painter = ui.painter_at(rect.expand(1.0));
    painter.rect_filled(rect, 2.0, palette.field);
    let hairline = Stroke::new(1.0, palette.hairline);
    painter.hline(rect.x_range(), rect.center().y, hairline);
    painter.vline(rect.center().x, rect.y_range(), hairline);
    let half = SIDE_POINTS / 2.0 - 2.0;
    for point in points {
        let [x, y] = point.map(|value| (value.clamp(-REACH, REACH) / REACH) as f32 * half);
        let at = pos2(rect.center().x + x, rect.center().y - y);
        painter.circle_filled(at, 1.2, palette.neutral.gamma_multiply(0.55));
    }
}

/// The pair's shocks, worked out once for a fit.
fn shocks(ui: &Ui, session: &Session, pair: [&String; 2]) -> Option<Arc<Vec<[f64; 2]>>> {
    let fit = session.live().fit.as_ref()?;
    let history = session.document().history.as_ref()?;
    let key = Id::unique("shocks of a pair");
    let mark = Arc::as_ptr(fit) as usize;
    let is_same =
        |known: &Shocks| known.fit == mark && pair.iter().zip(&known.pair).all(|(one, other)| *one == other);
    if let Some(known) = ui.data(|data| data.get_temp::<Shocks>(key)).filter(is_same) {
        return Some(known.points);
    }
    let days_per_year = session.document().settings.days_per_year;
    let levels = history.history()?;
    let used = levels.between(history.settings.since, history.settings.until);
    let points = fit.shocks_of(&used, &history.settings, days_per_year, pair.map(String::as_str));
    let points = Arc::new(points);
    let made = Shocks { fit: mark, pair: pair.map(String::clone), points: Arc::clone(&points) };
    ui.data_mut(|data| data.insert_temp(key, made));
    Some(points)
}
