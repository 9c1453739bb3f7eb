//! The book: its holdings by group with subtotals, edited in place, sorted, filtered, with what is wrong on the row.
//! What a line says is built in `lines`; what an edit does is the session's business.

/// The list's lines as data.
pub mod lines;

use crate::desk::commands::{Command, HoldingChange, Queue};
use crate::desk::inputs::{NumberField, search_ui, shown_figure};
use crate::desk::session::Session;
use crate::desk::theme::{self, Palette};
use crate::workspace::BookColumn;
use ebbmark_engine::book::{Description, DiffusionKind, Holding, Kind, LevelUnit, TypedFigure};
use egui::{Align, Button, Label, Layout, Response, Role, Sense, Ui, WidgetInfo, vec2};
use egui_extras::{Column, TableBody, TableBuilder};
use lines::{BookLine, HoldingLine, book_lines};

/// Height of a holding's two lines.
const HOLDING_POINTS: f32 = 38.0;
/// Height of a group's line.
const GROUP_POINTS: f32 = 24.0;

/// Draws heading, filter and list.
pub fn book_ui(ui: &mut Ui, session: &Session, queue: &mut Queue) {
    heading_ui(ui, session, queue);
    let lines = book_lines(session);
    if lines.is_empty() {
        ui.label(theme::soft(ui, "No holding's name or group contains this text"));
        return;
    }
    ui.spacing_mut().item_spacing.y = 0.0;
    TableBuilder::new(ui)
        .id_salt("book")
        .sense(Sense::click())
        .auto_shrink(false)
        .cell_layout(Layout::left_to_right(Align::Center))
        .column(Column::remainder().clip(true))
        .header(22.0, |mut header| {
            header.col(|ui| {
                sort_ui(ui, session, queue, "Holding", BookColumn::Holding);
                right(ui, |ui| {
                    sort_ui(ui, session, queue, "Diffusion", BookColumn::Diffusion);
                    sort_ui(ui, session, queue, "Value", BookColumn::Value);
                });
            });
        })
        .body(|body| lines_ui(body, session, queue, &lines));
}

fn heading_ui(ui: &mut Ui, session: &Session, queue: &mut Queue) {
    ui.horizontal(|ui| {
        ui.label(theme::heading("Book"));
        let count = session.document().inputs.holdings.len();
        ui.label(theme::soft(
            ui,
            if count == 1 { "1 holding".to_owned() } else { format!("{count} holdings") },
        ));
        ui.with_layout(Layout::right_to_left(Align::Center), |ui| {
            let add = Command::AddHolding(Box::new(new_holding(&session.document().inputs.holdings)));
            let tooltip = add.tooltip(ui.ctx());
            if ui.button("Add").on_hover_text(tooltip).accessible_name("Add holding").clicked() {
                if let Command::AddHolding(holding) = &add {
                    queue.push(Command::ChooseHolding(holding.name.clone()));
                }
                queue.push(add);
            }
            let width = (ui.available_width() - 18.0).clamp(60.0, 120.0);
            if let Some(text) = search_ui(ui, "Filter the book", "Filter", width, &session.view().filter) {
                queue.push(Command::FilterBook(text));
            }
        });
    });
}

/// A holding that moves nothing until it is given a quantity.
fn new_holding(holdings: &[Holding]) -> Holding {
    let is_free = |name: &String| holdings.iter().all(|holding| holding.name != *name);
    let names = (1..)
        .map(|number| if number == 1 { "New holding".to_owned() } else { format!("New holding {number}") });
    Holding {
        name: names.into_iter().find(is_free).unwrap_or_default(),
        kind: Kind::Spot,
        quantity: 0.0,
        price: 100.0,
        group: String::new(),
        currency: None,
        factor: None,
        multiplier: 1.0,
        unit: None,
        carry: 0.0,
        description: Description {
            diffusion: Some(DiffusionKind::Geometric),
            volatility: Some(TypedFigure { value: 0.2, has_percent_sign: true }),
            ..Description::default()
        },
        line: None,
        other_columns: Vec::new(),
    }
}

fn sort_ui(ui: &mut Ui, session: &Session, queue: &mut Queue, name: &str, column: BookColumn) {
    let order = session.view().order.filter(|order| order.column == column);
    let arrow = order.map_or("", |order| if order.is_ascending { " \u{25b2}" } else { " \u{25bc}" });
    let button = Button::new(theme::soft(ui, format!("{name}{arrow}"))).frame(false);
    let response = ui.add(button).accessible_name(format!("Sort by {}", name.to_lowercase()));
    if response.on_hover_text("Sort: smallest first, largest first, by group").clicked() {
        queue.push(Command::SortBook(column));
    }
}

fn lines_ui(body: TableBody<'_>, session: &Session, queue: &mut Queue, lines: &[BookLine]) {
    let heights = lines.iter().map(|line| match line {
        BookLine::Group { .. } => GROUP_POINTS,
        BookLine::Holding(_) => HOLDING_POINTS,
    });
    body.heterogeneous_rows(heights, |mut row| match &lines[row.index()] {
        BookLine::Group { name, depth, value } => {
            row.col(|ui| group_ui(ui, name, *depth, *value));
        }
        BookLine::Holding(line) => {
            let Some(holding) = session.document().inputs.holdings.get(line.row) else { return };
            let is_chosen = session.view().holding.as_ref() == Some(&holding.name);
            row.set_selected(is_chosen);
            row.col(|ui| holding_ui(ui, queue, line, holding));
            hear_row(row.response(), queue, holding, line, is_chosen);
        }
    });
}

fn group_ui(ui: &mut Ui, name: &str, depth: usize, value: f64) {
    let text = |text: String| theme::strong(text).size(theme::SMALL_POINTS + 1.0);
    right(ui, |ui| {
        let subtotal = if value == 0.0 { String::new() } else { shown_figure(value.round()) };
        ui.label(text(subtotal).color(Palette::of(ui).soft_ink));
        ui.with_layout(Layout::left_to_right(Align::Center), |ui| {
            ui.add_space(depth as f32 * 10.0);
            ui.add(Label::new(text(name.to_owned())).truncate());
        });
    });
}

fn right(ui: &mut Ui, add: impl FnOnce(&mut Ui)) {
    ui.with_layout(Layout::right_to_left(Align::Center), add);
}

/// Name and worth; under them quantity and price, edited in place, and the diffusion or what is wrong.
fn holding_ui(ui: &mut Ui, queue: &mut Queue, line: &HoldingLine, holding: &Holding) {
    let half = vec2(ui.available_width(), 17.0);
    ui.vertical(|ui| {
        ui.add_space(2.0);
        ui.allocate_ui_with_layout(half, Layout::right_to_left(Align::Center), |ui| {
            ui.label(&line.worth);
            ui.with_layout(Layout::left_to_right(Align::Center), |ui| {
                ui.add(Label::new(&holding.name).truncate());
            });
        });
        ui.allocate_ui_with_layout(half, Layout::left_to_right(Align::Center), |ui| {
            ui.scope(|ui| held_ui(ui, queue, line.row, holding));
            right(ui, |ui| driven_ui(ui, line));
        });
    });
}

/// Quantity and price.
fn held_ui(ui: &mut Ui, queue: &mut Queue, row: usize, holding: &Holding) {
    ui.spacing_mut().item_spacing.x = 2.0;
    ui.spacing_mut().interact_size.y = 16.0;
    ui.style_mut().drag_value_text_style = egui::TextStyle::Small;
    ui.style_mut().override_text_style = Some(egui::TextStyle::Small);
    for (change, word) in fields(holding) {
        if let Some(word) = word {
            ui.label(theme::soft(ui, word));
        }
        field_ui(ui, queue, row, &holding.name, change, holding);
    }
}

/// The diffusion, or what is wrong.
fn driven_ui(ui: &mut Ui, line: &HoldingLine) {
    let text = match line.faults.first() {
        Some(fault) => theme::soft(ui, format!("\u{26a0} {fault}")).color(Palette::of(ui).loss),
        None => theme::soft(ui, &line.diffusion),
    };
    ui.add(Label::new(text).truncate());
}

/// The figures of a holding that its line shows, each with the word before it.
fn fields(holding: &Holding) -> Vec<(HoldingChange, Option<&'static str>)> {
    let (quantity, price) = (HoldingChange::Quantity(holding.quantity), HoldingChange::Price(holding.price));
    match holding.kind {
        Kind::Spot | Kind::Level => vec![(quantity, None), (price, Some("at"))],
        Kind::Cash => vec![(quantity, None)],
        Kind::Exposure => vec![(price, Some("worth"))],
    }
}

fn field_ui(
    ui: &mut Ui,
    queue: &mut Queue,
    row: usize,
    name: &str,
    change: HoldingChange,
    holding: &Holding,
) {
    let accessible = format!("{} of {name}", change.text());
    let (value, unit, decimals) = match change {
        HoldingChange::Quantity(value) if holding.kind == Kind::Cash => {
            (value, holding.currency.as_deref().unwrap_or(""), 0)
        }
        HoldingChange::Quantity(value) => (value, "", 0),
        HoldingChange::Price(value) => (value, price_unit(holding), price_decimals(holding)),
        _ => return,
    };
    if let Some(value) = NumberField::new(&accessible, unit).decimals(decimals).quiet().ui(ui, value) {
        let change = match change {
            HoldingChange::Price(_) => HoldingChange::Price(value),
            _ => HoldingChange::Quantity(value),
        };
        queue.push(Command::ChangeHolding { row, change });
    }
}

fn price_unit(holding: &Holding) -> &str {
    match (holding.kind, holding.unit.unwrap_or_default()) {
        (Kind::Level, LevelUnit::Percent) => "%",
        (Kind::Level, LevelUnit::Bp) => "bp",
        (Kind::Level, LevelUnit::Points) => "",
        _ => holding.currency.as_deref().unwrap_or(""),
    }
}

fn price_decimals(holding: &Holding) -> usize {
    match (holding.kind, holding.unit.unwrap_or_default()) {
        (Kind::Spot, _) | (Kind::Level, LevelUnit::Percent) => 2,
        _ => 0,
    }
}

fn hear_row(response: Response, queue: &mut Queue, holding: &Holding, line: &HoldingLine, is_chosen: bool) {
    let info = || WidgetInfo::selected(Role::ListItem, true, is_chosen, format!("Holding {}", holding.name));
    response.widget_info(info);
    if response.clicked() {
        queue.push(Command::ChooseHolding(holding.name.clone()));
    }
    response.on_hover_ui(|ui| {
        ui.label(theme::strong(&holding.name));
        for fault in &line.faults {
            ui.colored_label(Palette::of(ui).loss, fault);
        }
        ui.label(format!("{} \u{00b7} {}", line.worth, line.diffusion));
    });
}
