//! The heat map: one coloured square a pair, its number where there is room. The pointer chooses, arrow keys walk,
//! figures typed replace the chosen cell.

use super::cell::{choose, set};
use super::matrix::Matrix;
use crate::desk::commands::Queue;
use crate::desk::inputs::read_figure;
use crate::desk::plot::axes;
use crate::desk::theme::{self, Palette};
use ebbmark_engine::figures::grouped;
use egui::epaint::{Mesh, TextShape};
use egui::text::{LayoutJob, TextWrapping};
use egui::{
    Align2, Event, EventFilter, FontFamily, FontId, Id, Key, Label, Modifiers, Painter, Pos2, Rect, Response,
    Role, ScrollArea, Sense, Shape, Stroke, StrokeKind, TextEdit, Ui, WidgetInfo, pos2, vec2,
};

/// Smallest square that holds a number.
const NUMBER_POINTS: f32 = 30.0;
/// Smallest square beside which a name can stand.
const NAMED_POINTS: f32 = 11.0;
/// Largest square.
const LARGEST_POINTS: f32 = 54.0;
/// Room for names before the rows and above the columns.
const NAMES_POINTS: f32 = 118.0;

/// Draws the map; a large one whole, or scrolled with its numbers.
pub fn map_ui(ui: &mut Ui, queue: &mut Queue, matrix: &Matrix<'_>, chosen: (usize, usize)) {
    let zoom_id = ui.scope_id().with("numbers");
    let is_zoomed = ui.data(|data| data.get_temp::<bool>(zoom_id)).unwrap_or(false);
    let size = matrix.size() as f32;
    let whole = |ui: &Ui| {
        ((ui.available_width() - NAMES_POINTS).min(ui.available_height() - NAMES_POINTS) / size)
            .min(LARGEST_POINTS)
    };
    if whole(ui) >= NUMBER_POINTS {
        squares_ui(ui, queue, matrix, chosen, whole(ui));
        return;
    }
    ui.horizontal(|ui| {
        for (words, zoomed) in [("Whole", false), ("With numbers", true)] {
            if ui.selectable_label(is_zoomed == zoomed, words).clicked() {
                ui.data_mut(|data| data.insert_temp(zoom_id, zoomed));
            }
        }
        let words = "Point or walk with the arrow keys to read a cell, type to set it";
        ui.add(Label::new(theme::soft(ui, words)).truncate());
    });
    if is_zoomed {
        ScrollArea::both().id_salt("map").auto_shrink(false).show(ui, |ui| {
            squares_ui(ui, queue, matrix, chosen, NUMBER_POINTS + 2.0);
        });
    } else {
        let square = whole(ui).max(3.0);
        squares_ui(ui, queue, matrix, chosen, square);
    }
}

fn squares_ui(ui: &mut Ui, queue: &mut Queue, matrix: &Matrix<'_>, chosen: (usize, usize), square: f32) {
    let side = square * matrix.size() as f32;
    let (rect, _) =
        ui.allocate_exact_size(vec2(NAMES_POINTS + side + 2.0, NAMES_POINTS + side + 2.0), Sense::hover());
    let grid = Grid { origin: rect.min + vec2(NAMES_POINTS, NAMES_POINTS), square, size: matrix.size() };
    let response = ui.interact(grid.rect(), id(ui), Sense::click_and_drag());
    response.widget_info(|| WidgetInfo::labeled(Role::Grid, true, "Correlation matrix"));
    let pointed = response.hover_pos().and_then(|at| grid.cell_at(at));
    paint(ui, matrix, &grid, chosen, pointed);
    if let Some((row, column)) =
        pointed.filter(|_| response.is_pointer_button_down_on() || response.clicked())
    {
        response.request_focus();
        if (row, column) != chosen {
            queue.push(choose(matrix, row, column));
        }
    }
    walk_ui(ui, queue, matrix, &response, &grid, chosen);
    type_ui(ui, queue, matrix, &response, &grid, chosen);
    if let Some((row, column)) = pointed {
        response.on_hover_ui_at_pointer(|ui| {
            ui.label(theme::strong(format!("{:.3}", matrix.at(row, column))));
            ui.label(format!("{} and {}", matrix.names[row], matrix.names[column]));
        });
    }
}

fn id(ui: &Ui) -> Id {
    ui.scope_id().with("correlation matrix")
}

/// Where the squares stand.
struct Grid {
    origin: Pos2,
    square: f32,
    size: usize,
}

impl Grid {
    fn rect(&self) -> Rect {
        let side = self.square * self.size as f32;
        Rect::from_min_size(self.origin, vec2(side, side))
    }

    fn cell(&self, row: usize, column: usize) -> Rect {
        let at = self.origin + vec2(column as f32, row as f32) * self.square;
        Rect::from_min_size(at, vec2(self.square, self.square))
    }

    fn cell_at(&self, at: Pos2) -> Option<(usize, usize)> {
        let from_origin = (at - self.origin) / self.square;
        let inside = |part: f32| (part >= 0.0 && part < self.size as f32).then_some(part as usize);
        inside(from_origin.y).zip(inside(from_origin.x))
    }
}

fn paint(ui: &Ui, matrix: &Matrix<'_>, grid: &Grid, chosen: (usize, usize), pointed: Option<(usize, usize)>) {
    let palette = Palette::of(ui);
    let painter = ui.painter();
    let gap = if grid.square >= 14.0 { 0.5 } else { 0.0 };
    let mut mesh = Mesh::default();
    for row in 0..grid.size {
        for column in 0..grid.size {
            let fill =
                if row == column { palette.hairline } else { palette.correlation(matrix.at(row, column)) };
            mesh.add_colored_rect(grid.cell(row, column).shrink(gap), fill);
        }
    }
    painter.add(Shape::mesh(mesh));
    if grid.square >= NUMBER_POINTS {
        numbers(ui, painter, palette, matrix, grid);
    }
    let outline = |(row, column): (usize, usize), width: f32| {
        painter.rect_stroke(
            grid.cell(row, column),
            0.0,
            Stroke::new(width, palette.ink),
            StrokeKind::Outside,
        );
    };
    pointed.into_iter().for_each(|cell| outline(cell, 1.0));
    outline(chosen, 2.0);
    outline((chosen.1, chosen.0), 1.0);
    names(painter, palette, matrix, grid, chosen, pointed);
}

/// "0.45" in every square that is seen.
fn numbers(ui: &Ui, painter: &Painter, palette: &Palette, matrix: &Matrix<'_>, grid: &Grid) {
    let font = FontId::new((grid.square * 0.36).clamp(10.0, 13.0), FontFamily::Proportional);
    for row in 0..grid.size {
        for column in (0..grid.size).filter(|column| *column != row) {
            let cell = grid.cell(row, column);
            if ui.is_rect_visible(cell) {
                let value = matrix.at(row, column);
                let ink = palette.on_correlation(value);
                painter.text(cell.center(), Align2::CENTER_CENTER, grouped(value, 2), font.clone(), ink);
            }
        }
    }
}

/// Names of all rows and columns where squares are large enough, else of the chosen and the pointed ones. They stay in
/// sight when the map is scrolled.
fn names(
    painter: &Painter,
    palette: &Palette,
    matrix: &Matrix<'_>,
    grid: &Grid,
    chosen: (usize, usize),
    pointed: Option<(usize, usize)>,
) {
    let marked = pointed.unwrap_or(chosen);
    let whole = Rect::from_min_max(grid.origin - vec2(NAMES_POINTS, NAMES_POINTS), grid.rect().max);
    let seen = whole.intersect(painter.clip_rect());
    let left = grid.origin.x.max(seen.left() + NAMES_POINTS);
    let top = grid.origin.y.max(seen.top() + NAMES_POINTS);
    let ground = |from: Pos2, to: Pos2| painter.rect_filled(Rect::from_min_max(from, to), 0.0, palette.panel);
    ground(pos2(seen.left(), seen.top()), pos2(seen.right(), top));
    for place in 0..grid.size {
        let is_marked = place == marked.1;
        if grid.square >= NAMED_POINTS || is_marked {
            let end = pos2(grid.cell(0, place).center().x, top - 6.0);
            name(painter, palette, matrix.names[place], is_marked, end, -std::f32::consts::FRAC_PI_2);
        }
    }
    ground(pos2(seen.left(), seen.top()), pos2(left, seen.bottom()));
    let beside = painter.with_clip_rect(Rect::from_min_max(pos2(seen.left(), top), seen.max));
    for place in 0..grid.size {
        let is_marked = place == marked.0;
        if grid.square >= NAMED_POINTS || is_marked {
            let end = pos2(left - 6.0, grid.cell(place, 0).center().y);
            name(&beside, palette, matrix.names[place], is_marked, end, 0.0);
        }
    }
}

/// A name that ends at `end`, across or upwards.
fn name(painter: &Painter, palette: &Palette, text: &str, is_marked: bool, end: Pos2, angle: f32) {
    let mut font = axes::font();
    if is_marked {
        font.family = theme::heavy();
    }
    let ink = if is_marked { palette.ink } else { palette.soft_ink };
    let mut job = LayoutJob::simple_singleline(text.to_owned(), font, ink);
    job.wrap = TextWrapping::truncate_at_width(NAMES_POINTS - 10.0);
    let galley = painter.layout_job(job);
    let size = galley.size();
    let at = if angle == 0.0 { end - vec2(size.x, size.y / 2.0) } else { end - vec2(size.y / 2.0, 0.0) };
    painter.add(TextShape { angle, ..TextShape::new(at, galley, ink) });
}

/// Arrow keys walk from cell to cell while the map has focus.
fn walk_ui(
    ui: &Ui,
    queue: &mut Queue,
    matrix: &Matrix<'_>,
    response: &Response,
    grid: &Grid,
    chosen: (usize, usize),
) {
    if !response.has_focus() {
        return;
    }
    let arrows = EventFilter { horizontal_arrows: true, vertical_arrows: true, ..EventFilter::default() };
    ui.memory_mut(|memory| memory.set_focus_lock_filter(response.id, arrows));
    ui.painter().rect_stroke(
        grid.rect().expand(2.0),
        2.0,
        Stroke::new(1.0, Palette::of(ui).accent),
        StrokeKind::Outside,
    );
    let pressed = |key| ui.input_mut(|input| input.count_and_consume_key(Modifiers::NONE, key)) as i64;
    let down = pressed(Key::ArrowDown) - pressed(Key::ArrowUp);
    let right = pressed(Key::ArrowRight) - pressed(Key::ArrowLeft);
    let moved = |place: usize, by: i64| (place as i64 + by).clamp(0, grid.size as i64 - 1) as usize;
    let next = (moved(chosen.0, down), moved(chosen.1, right));
    if next != chosen {
        queue.push(choose(matrix, next.0, next.1));
        ui.scroll_to_rect(grid.cell(next.0, next.1), None);
    }
}

/// A field over the chosen cell opens with the first figure typed; Enter sets it, Escape gives it up.
fn type_ui(
    ui: &mut Ui,
    queue: &mut Queue,
    matrix: &Matrix<'_>,
    response: &Response,
    grid: &Grid,
    chosen: (usize, usize),
) {
    let draft_id = response.id.with("draft");
    let field_id = response.id.with("field");
    let mut draft: Option<String> = ui.data(|data| data.get_temp(draft_id));
    if draft.is_none() && response.has_focus() && chosen.0 != chosen.1 {
        draft = first_figure(ui);
        if draft.is_some() {
            ui.memory_mut(|memory| memory.request_focus(field_id));
        }
    }
    let Some(mut text) = draft else { return };
    let rect =
        Rect::from_center_size(grid.cell(chosen.0, chosen.1).center(), vec2(grid.square.max(56.0), 24.0));
    let field = ui.put(rect, TextEdit::singleline(&mut text).id(field_id).desired_width(rect.width()));
    let field = field.accessible_name("Correlation typed");
    if field.lost_focus() {
        let is_meant = ui.input(|input| input.key_pressed(Key::Enter));
        if let Some(value) = read_figure(&text).filter(|value| is_meant && (-1.0..=1.0).contains(value)) {
            queue.push(set(matrix, chosen.0, chosen.1, value));
        }
        ui.data_mut(|data| data.remove_temp::<String>(draft_id));
        response.request_focus();
    } else {
        ui.data_mut(|data| data.insert_temp(draft_id, text));
    }
}

/// What was typed in this frame, if it begins a figure; taken, so that the field does not hear it again.
fn first_figure(ui: &Ui) -> Option<String> {
    ui.input_mut(|input| {
        let begun = input.events.iter().find_map(|event| match event {
            Event::Text(text)
                if text.starts_with(|sign: char| sign.is_ascii_digit() || "-.".contains(sign)) =>
            {
                Some(text.clone())
            }
            _ => None,
        });
        if begun.is_some() {
            input.events.retain(|event| !matches!(event, Event::Text(_)));
        }
        begun
    })
}
