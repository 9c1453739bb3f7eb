//! The reading line: dragged with the pointer, moved with the keys, placed by a press anywhere in the charts. It only
//! asks for another day; what is read there is the session's business.

use crate::desk::commands::{Command, Queue, SettingChange};
use crate::desk::plot::{Frame, axes};
use crate::desk::session::Session;
use crate::desk::theme::Palette;
use egui::accesskit::Action;
use egui::{
    Align2, CursorIcon, EventFilter, Id, Key, Modifiers, Rect, Response, Sense, Shape, Stroke, Ui,
    WidgetInfo, pos2,
};

/// Points either side of the line that take hold of it.
const GRIP_POINTS: f32 = 6.0;
/// Days of a step with Page up and Page down.
const PAGE_DAYS: i64 = 21;

/// Draws the line over both charts and hears pointer and keys.
pub fn line_ui(ui: &mut Ui, session: &Session, queue: &mut Queue, upper: &Frame, lower: &Frame) {
    let day = session.reading_day();
    let placed = [upper, lower].map(|frame| place_ui(ui, frame));
    let x = upper.x(f64::from(day));
    let grip =
        Rect::from_x_y_ranges(x - GRIP_POINTS..=x + GRIP_POINTS, upper.rect.top()..=lower.rect.bottom());
    let response = ui
        .interact(grip, id(ui), Sense::click_and_drag())
        .on_hover_and_drag_cursor(CursorIcon::ResizeHorizontal);
    response.widget_info(|| WidgetInfo::slider(true, f64::from(day), "Reading line"));
    let last = session.document().settings.horizon_days;
    describe(ui, &response, last);
    if response.clicked() {
        response.request_focus();
    }
    let pulled = response.dragged().then(|| response.interact_pointer_pos()).flatten();
    let pointed = pulled.map(|at| upper.across_at(at.x)).or(placed.into_iter().flatten().next());
    let stepped = i64::from(day) + steps(ui, &response, last, day);
    let wanted = pointed.map_or(stepped, |at| at.round() as i64).clamp(1, i64::from(last));
    draw(ui, &response, upper, lower, day);
    if wanted != i64::from(day) {
        queue.push(Command::ChangeSetting(SettingChange::ReadingDay(wanted as u32)));
    }
}

fn id(ui: &Ui) -> Id {
    ui.scope_id().with("reading line")
}

/// A press or a drag inside a chart puts the line there.
fn place_ui(ui: &Ui, frame: &Frame) -> Option<f64> {
    let id = ui.scope_id().with(("place the line", frame.rect.top() as i32));
    let response = ui.interact(frame.rect, id, Sense::click_and_drag());
    let is_held = response.is_pointer_button_down_on();
    is_held.then(|| response.interact_pointer_pos()).flatten().map(|at| frame.across_at(at.x))
}

/// Days asked for with keys while the line has focus, or by an assistive tool.
fn steps(ui: &Ui, response: &Response, last: u32, day: u32) -> i64 {
    let by_tool = ui.input(|input| {
        let count = |action| input.num_accesskit_action_requests(response.id, action) as i64;
        count(Action::Increment) - count(Action::Decrement)
    });
    if !response.has_focus() {
        return by_tool;
    }
    let arrows = EventFilter { horizontal_arrows: true, vertical_arrows: true, ..EventFilter::default() };
    ui.memory_mut(|memory| memory.set_focus_lock_filter(response.id, arrows));
    let to_last = i64::from(last) - i64::from(day);
    let keys = [
        (Key::ArrowRight, 1),
        (Key::ArrowUp, 1),
        (Key::ArrowLeft, -1),
        (Key::ArrowDown, -1),
        (Key::PageUp, PAGE_DAYS),
        (Key::PageDown, -PAGE_DAYS),
        (Key::End, to_last),
        (Key::Home, 1 - i64::from(day)),
    ];
    let pressed = ui.input_mut(|input| {
        keys.iter()
            .map(|(key, days)| input.count_and_consume_key(Modifiers::NONE, *key) as i64 * days)
            .sum::<i64>()
    });
    by_tool + pressed
}

fn describe(ui: &Ui, response: &Response, last: u32) {
    ui.ctx().accesskit_node_builder(response.id, |node| {
        node.set_min_numeric_value(1.0);
        node.set_max_numeric_value(f64::from(last));
        node.set_numeric_value_step(1.0);
        node.add_action(Action::Increment);
        node.add_action(Action::Decrement);
    });
}

fn draw(ui: &Ui, response: &Response, upper: &Frame, lower: &Frame, day: u32) {
    let palette = Palette::of(ui);
    let is_held = response.dragged() || response.hovered() || response.has_focus();
    let painter = ui.painter();
    let stroke = Stroke::new(if is_held { 3.0 } else { 2.0 }, palette.accent);
    let x = upper.x(f64::from(day));
    for frame in [upper, lower] {
        painter.vline(x, frame.rect.y_range(), stroke);
    }
    let top = upper.rect.top();
    let handle = vec![pos2(x - 7.0, top - 1.0), pos2(x + 7.0, top - 1.0), pos2(x, top + 10.0)];
    painter.add(Shape::convex_polygon(handle, palette.accent, Stroke::NONE));
    let (anchor, aside) =
        if x > upper.rect.center().x { (Align2::RIGHT_TOP, -10.0) } else { (Align2::LEFT_TOP, 10.0) };
    let words = if day == 1 { "1 day".to_owned() } else { format!("{day} days") };
    painter.text(pos2(x + aside, top + 3.0), anchor, words, axes::font(), palette.accent);
    if response.has_focus() {
        painter.rect_stroke(response.rect, 3.0, Stroke::new(1.0, palette.accent), egui::StrokeKind::Outside);
    }
}
