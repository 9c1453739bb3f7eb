//! The Horizon view: the book's value ahead with the reading line, its distribution at the line, and below them the
//! largest fall so far with its own. Places the four charts; each is drawn in a file of its own.

/// The book's value ahead.
pub mod ahead;
/// Distributions at the line, beside the charts they belong to.
pub mod beside;
/// Horizons at one press, and how far ahead the window looks.
pub mod choices;
/// The largest fall so far.
pub mod falls;
/// The reading line.
pub mod line;
/// What the charts show, as plain data.
pub mod scene;

use crate::desk::commands::Queue;
use crate::desk::plot::{Frame, Span, settled};
use crate::desk::session::Session;
use crate::desk::theme::{self, Palette};
use egui::{Align, Label, Layout, Rect, Sense, Ui, pos2, vec2};
use scene::Scene;

/// Room for the words of the left axis.
const LEFT_POINTS: f32 = 52.0;
/// Room for the change from today, between a chart and its distribution.
const CHANGE_POINTS: f32 = 98.0;
/// Room for the words below.
const BELOW_POINTS: f32 = 20.0;
/// Height of a chart's title.
const TITLE_POINTS: f32 = 22.0;
/// Share of the height that the upper chart has.
const UPPER_SHARE: f32 = 0.62;

/// Draws the view.
pub fn horizon_ui(ui: &mut Ui, session: &Session, queue: &mut Queue) {
    let Some(scene) = Scene::of(session) else {
        ui.centered_and_justified(|ui| ui.label(theme::soft(ui, "No figures yet")));
        return;
    };
    let choices_height = choices::height(ui.available_width());
    let (rect, _) = ui.allocate_exact_size(ui.available_size() - vec2(0.0, choices_height), Sense::hover());
    let places = Places::within(rect);
    let frames = frames(ui, &places, &scene);
    title_ui(ui, places.upper_title, &scene.upper_title(), scene.legend());
    title_ui(ui, places.lower_title, &scene.lower_title(), "not passed by 50, 90, 99 %");
    let palette = Palette::of(ui);
    ahead::draw(ui.painter(), &frames.ahead, palette, &scene, CHANGE_POINTS);
    beside::draw_values(ui.painter(), &frames.values, palette, &scene);
    falls::draw(ui.painter(), &frames.falls, palette, &scene);
    beside::draw_falls(ui.painter(), &frames.fall_sizes, palette, &scene);
    line::line_ui(ui, session, queue, &frames.ahead, &frames.falls);
    choices::choices_ui(ui, session, queue);
}

/// Where the parts stand.
struct Places {
    upper_title: Rect,
    ahead: Rect,
    values: Rect,
    lower_title: Rect,
    falls: Rect,
    fall_sizes: Rect,
}

impl Places {
    fn within(rect: Rect) -> Self {
        let beside = (rect.width() * 0.2).clamp(84.0, 190.0);
        let left = rect.left() + LEFT_POINTS;
        let right = rect.right() - beside - CHANGE_POINTS;
        let charts = rect.height() - 2.0 * TITLE_POINTS - BELOW_POINTS - 10.0;
        let upper_top = rect.top() + TITLE_POINTS;
        let upper_bottom = upper_top + charts * UPPER_SHARE;
        let lower_title = upper_bottom + 10.0;
        let lower_top = lower_title + TITLE_POINTS;
        let lower_bottom = rect.bottom() - BELOW_POINTS;
        let part = |left: f32, top: f32, right: f32, bottom: f32| {
            Rect::from_min_max(pos2(left.round(), top.round()), pos2(right.round(), bottom.round()))
        };
        Self {
            upper_title: part(rect.left(), rect.top(), rect.right(), upper_top),
            ahead: part(left, upper_top, right, upper_bottom),
            values: part(rect.right() - beside, upper_top, rect.right(), upper_bottom),
            lower_title: part(rect.left(), lower_title, rect.right(), lower_top),
            falls: part(left, lower_top, right, lower_bottom),
            fall_sizes: part(rect.right() - beside, lower_top, rect.right(), lower_bottom),
        }
    }
}

/// The scales of the four charts.
struct Frames {
    ahead: Frame,
    values: Frame,
    falls: Frame,
    fall_sizes: Frame,
}

fn frames(ui: &Ui, places: &Places, scene: &Scene<'_>) -> Frames {
    let key = |name: &str| ui.scope_id().with(name);
    let days = Span::new(0.0, f64::from(scene.last_day));
    let (low, high) = scene.value_range();
    let values = settled(ui, key("values"), low, high);
    let deepest = settled(ui, key("falls"), 0.0, scene.deepest_fall());
    let falls = Span::new(deepest.to, 0.0);
    let most = |curve: &[f64]| curve.iter().copied().fold(0.0, f64::max) * 1.08;
    Frames {
        ahead: Frame { rect: places.ahead, across: days, up: values },
        values: Frame {
            rect: places.values,
            across: Span::new(0.0, most(&scene.at_line.values.density)),
            up: values,
        },
        falls: Frame { rect: places.falls, across: days, up: falls },
        fall_sizes: Frame {
            rect: places.fall_sizes,
            across: Span::new(0.0, most(&scene.at_line.falls.density)),
            up: falls,
        },
    }
}

fn title_ui(ui: &mut Ui, rect: Rect, title: &str, explanation: &str) {
    let mut child =
        ui.new_child(egui::UiBuilder::new().max_rect(rect).layout(Layout::left_to_right(Align::Center)));
    child.label(theme::strong(title));
    child.with_layout(Layout::right_to_left(Align::Center), |ui| {
        ui.add(Label::new(theme::soft(ui, explanation)).truncate());
    });
}
