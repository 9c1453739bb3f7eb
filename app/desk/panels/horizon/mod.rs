//! The Horizon view: the book's value ahead with the reading line, its distribution at the line, and below them the
//! largest fall so far with its own. Places the four charts that the engine's figures describe.

/// Horizons at one press, and how far ahead the window looks.
pub mod choices;
/// The reading line.
pub mod line;

use crate::desk::commands::Queue;
use crate::desk::plot::{Frame, Span, axes, paint, settled};
use crate::desk::readout::subject;
use crate::desk::session::Session;
use crate::desk::theme::{self, Palette};
use ebbmark_engine::figures::{Mark, Panel, Place, Room, Subject, Tick, fall, value};
use egui::{Align, Label, Layout, Painter, Rect, Role, Sense, Ui, WidgetInfo, pos2, vec2};

/// Least room for the words of the left axis, and for the change from today, between a chart and its distribution.
const LEAST_MARGINS: Margins = Margins { left: 52.0, change: 98.0 };
/// Room for the words below.
const BELOW_POINTS: f32 = 20.0;
/// Height of a chart's title.
const TITLE_POINTS: f32 = 22.0;
/// Points between ticks, at least: of days, of values, of falls.
const DAY_TICK_POINTS: f32 = 58.0;
const VALUE_TICK_POINTS: f32 = 34.0;
const FALL_TICK_POINTS: f32 = 28.0;
/// On screen each panel has a room of its own.
const WHOLE: Place = Place { left: 0.0, top: 0.0, right: 1.0, bottom: 1.0 };
/// Share of the height that the upper chart has.
const UPPER_SHARE: f32 = 0.62;

/// Draws the view.
pub fn horizon_ui(ui: &mut Ui, session: &Session, queue: &mut Queue) {
    let live = session.live();
    let shown = live.model.as_deref().zip(live.bands.as_deref()).zip(live.at_line.as_deref());
    let Some(((model, bands), at_line)) = shown else {
        ui.centered_and_justified(|ui| ui.label(theme::soft(ui, "No figures yet")));
        return;
    };
    let subject = subject(session.document(), model, bands, at_line);
    let choices_height = choices::height(ui.available_width());
    let room = ui.available_size() - vec2(0.0, choices_height);
    let (rect, response) = ui.allocate_exact_size(room, Sense::hover());
    let drafted = Charts::of(ui, &Places::within(rect, LEAST_MARGINS), &subject);
    let margins = Margins::of(ui.painter(), &drafted);
    let places = Places::within(rect, margins);
    let charts = if margins == LEAST_MARGINS { drafted } else { Charts::of(ui, &places, &subject) };
    response.widget_info(|| WidgetInfo::labeled(Role::Image, true, charts.words()));
    let note = if live.is_before_edit { "\u{26a0} from before the edit" } else { &charts.ahead.1.note };
    title_ui(ui, places.upper_title, &charts.ahead.1.title, note);
    title_ui(ui, places.lower_title, &charts.falls.1.title, &charts.falls.1.note);
    let palette = Palette::of(ui);
    for (frame, panel) in [&charts.ahead, &charts.values, &charts.falls, &charts.fall_sizes] {
        paint::panel(ui.painter(), frame, palette, panel, margins.change - 10.0);
    }
    line::line_ui(ui, session, queue, &charts.ahead.0, &charts.falls.0);
    choices::choices_ui(ui, session, queue);
}

/// Room for words beside the charts.
#[derive(Debug, Clone, Copy, PartialEq)]
struct Margins {
    left: f32,
    change: f32,
}

impl Margins {
    /// What the words of the charts need.
    fn of(painter: &Painter, charts: &Charts) -> Self {
        let widest =
            |ticks: &[Tick]| ticks.iter().map(|tick| axes::width(painter, &tick.words)).fold(0.0, f32::max);
        let (ahead, falls) = (&charts.ahead.1, &charts.falls.1);
        Self {
            left: LEAST_MARGINS.left.max(widest(&ahead.up.ticks).max(widest(&falls.up.ticks)) + 8.0),
            change: LEAST_MARGINS.change.max(widest(&ahead.beside) + 20.0),
        }
    }
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
    fn within(rect: Rect, margins: Margins) -> Self {
        let beside = (rect.width() * 0.2).clamp(84.0, 190.0);
        let left = rect.left() + margins.left;
        let right = rect.right() - beside - margins.change;
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

/// The four charts with their scales.
struct Charts {
    ahead: (Frame, Panel),
    values: (Frame, Panel),
    falls: (Frame, Panel),
    fall_sizes: (Frame, Panel),
}

impl Charts {
    /// Titles and labels, for those who cannot see the charts.
    fn words(&self) -> String {
        let words = |(_, panel): &(Frame, Panel)| {
            let labels = panel.marks.iter().filter_map(|mark| match mark {
                Mark::Label { words, .. } => Some(words.as_str()),
                _ => None,
            });
            [panel.title.as_str()].into_iter().chain(labels).collect::<Vec<_>>().join(", ")
        };
        [words(&self.ahead), words(&self.falls)].join("; ")
    }

    /// The charts in the room they have; their ranges stand still while figures arrive.
    fn of(ui: &Ui, places: &Places, subject: &Subject<'_>) -> Self {
        let key = |name: &str| ui.scope_id().with(name);
        let (low, high) = subject.value_range();
        let values = settled(ui, key("values"), low, high);
        let deepest = settled(ui, key("falls"), 0.0, subject.deepest_fall());
        let falls = Span::new(deepest.to, 0.0);
        let (upper, lower) = (room(places.ahead, VALUE_TICK_POINTS), room(places.falls, FALL_TICK_POINTS));
        Self {
            ahead: chart(places.ahead, value::ahead(subject, values, upper, WHOLE)),
            values: chart(places.values, value::beside(subject, values, upper, WHOLE)),
            falls: chart(places.falls, fall::so_far(subject, falls, lower, WHOLE)),
            fall_sizes: chart(places.fall_sizes, fall::beside(subject, falls, lower, WHOLE)),
        }
    }
}

fn chart(rect: Rect, panel: Panel) -> (Frame, Panel) {
    (Frame { rect, across: panel.across.span, up: panel.up.span }, panel)
}

fn room(rect: Rect, tick_points: f32) -> Room {
    Room { across: (rect.width() / DAY_TICK_POINTS) as usize, up: (rect.height() / tick_points) as usize }
}

fn title_ui(ui: &mut Ui, rect: Rect, title: &str, explanation: &str) {
    let mut child =
        ui.new_child(egui::UiBuilder::new().max_rect(rect).layout(Layout::left_to_right(Align::Center)));
    child.label(theme::strong(title));
    child.with_layout(Layout::right_to_left(Align::Center), |ui| {
        ui.add(Label::new(theme::soft(ui, explanation)).truncate());
    });
}
