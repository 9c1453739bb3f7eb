//! Opening and what can go wrong with it: the path field, the list of faults of files that were refused with the way
//! back, the question which currency the book is in, and the hint while files hover over the window.

use crate::desk::commands::{Command, PathPurpose, Queue, SettingChange};
use crate::desk::inputs::CommittedText;
use crate::desk::notices::Refusal;
use crate::desk::session::Session;
use crate::desk::theme::{self, Palette};
use ebbmark_engine::tables::Fault;
use egui::{Align2, Area, Frame, Grid, Id, Key, Label, Modal, Order, ScrollArea, Stroke, TextEdit, Ui, vec2};
use std::collections::BTreeSet;
use std::path::PathBuf;

/// Width of the overlays.
const WIDTH_POINTS: f32 = 620.0;

/// Draws whichever of them is due.
pub fn opening_ui(ui: &mut Ui, session: &Session, queue: &mut Queue) {
    if let Some(purpose) = session.path_field() {
        path_ui(ui, queue, purpose);
    }
    if let Some(refusal) = session.refusal() {
        refusal_ui(ui, session, queue, refusal);
    }
    drop_hint_ui(ui);
}

fn path_ui(ui: &Ui, queue: &mut Queue, purpose: PathPurpose) {
    let modal = overlay(ui, "path field").show(ui.ctx(), |ui| {
        ui.set_width(WIDTH_POINTS);
        ui.label(theme::heading(path_title(purpose)));
        ui.label(theme::soft(ui, path_explanation(purpose)));
        let draft_id = Id::unique("path draft");
        let mut draft = ui.data(|data| data.get_temp::<String>(draft_id)).unwrap_or_default();
        let field = TextEdit::singleline(&mut draft).hint_text("/folder/file").desired_width(f32::INFINITY);
        let response = ui.add(field).accessible_name("Path");
        if !response.has_focus() && !response.lost_focus() {
            response.request_focus();
        }
        let is_entered = response.lost_focus() && ui.input(|input| input.key_pressed(Key::Enter));
        ui.data_mut(|data| data.insert_temp(draft_id, draft.clone()));
        ui.horizontal(|ui| {
            let command = path_command(purpose, &draft);
            let is_pressed =
                ui.add_enabled(command.is_some(), egui::Button::new(path_verb(purpose))).clicked();
            if let Some(command) = command.filter(|_| is_pressed || is_entered) {
                ui.data_mut(|data| data.remove_temp::<String>(draft_id));
                queue.push(command);
            }
            if matches!(purpose, PathPurpose::Open) && ui.button(Command::OpenExample.text()).clicked() {
                queue.push(Command::OpenExample);
            }
            if ui.button("Cancel").clicked() {
                queue.push(Command::ClosePathField);
            }
        });
    });
    if modal.should_close() {
        queue.push(Command::ClosePathField);
    }
}

fn overlay(ui: &Ui, name: &str) -> Modal {
    Modal::new(Id::unique(name)).frame(Frame::popup(ui.style()).inner_margin(16.0))
}

fn path_title(purpose: PathPurpose) -> String {
    match purpose {
        PathPurpose::Open => "Open by path".to_owned(),
        PathPurpose::SaveAs => "Save the workspace".to_owned(),
        PathPurpose::Export(kind) => kind.title(),
    }
}

fn path_explanation(purpose: PathPurpose) -> &'static str {
    match purpose {
        PathPurpose::Open => {
            "A workspace, or positions with the files that go with them; several paths go between semicolons"
        }
        PathPurpose::SaveAs => "Path of the workspace, ending in .ron",
        PathPurpose::Export(_) => "Path of the file to write",
    }
}

fn path_verb(purpose: PathPurpose) -> &'static str {
    match purpose {
        PathPurpose::Open => "Open",
        PathPurpose::SaveAs => "Save here",
        PathPurpose::Export(_) => "Export here",
    }
}

fn path_command(purpose: PathPurpose, typed: &str) -> Option<Command> {
    let clean = |path: &str| path.trim().trim_matches(['"', '\'']).to_owned();
    let paths: Vec<PathBuf> =
        typed.split(';').map(clean).filter(|path| !path.is_empty()).map(PathBuf::from).collect();
    let only = || paths.first().cloned();
    match purpose {
        PathPurpose::Open if paths.is_empty() => None,
        PathPurpose::Open => Some(Command::Open(paths)),
        PathPurpose::SaveAs => only().map(Command::SaveAs),
        PathPurpose::Export(kind) => only().map(|path| Command::Export(kind, path)),
    }
}

/// Every fault with its place; the book shown before is still there.
fn refusal_ui(ui: &Ui, session: &Session, queue: &mut Queue, refusal: &Refusal) {
    let modal = overlay(ui, "refusal").show(ui.ctx(), |ui| {
        ui.set_width((ui.ctx().content_rect().width() - 120.0).min(860.0));
        let count = refusal.faults.len();
        let title = if count == 1 {
            "Not opened: 1 thing to mend".to_owned()
        } else {
            format!("Not opened: {count} things to mend")
        };
        ui.label(theme::heading(title));
        let names: Vec<String> = refusal.paths.iter().map(|path| path.display().to_string()).collect();
        ui.add(Label::new(theme::soft(ui, names.join("; "))).wrap());
        ui.add_space(6.0);
        faults_ui(ui, &refusal.faults);
        ui.add_space(6.0);
        ui.horizontal(|ui| {
            let back = format!("Keep {}", session.document().name);
            if ui.button(back).on_hover_text("Go on with the book shown before").clicked() {
                queue.push(Command::DismissRefusal);
            }
            if ui.button("Try again").on_hover_text("Read the same files once they are mended").clicked() {
                queue.push(Command::Open(refusal.paths.clone()));
            }
            if ui.button(Command::AskPath(PathPurpose::Open).text()).clicked() {
                queue.push(Command::DismissRefusal);
                queue.push(Command::AskPath(PathPurpose::Open));
            }
        });
    });
    if modal.should_close() {
        queue.push(Command::DismissRefusal);
    }
}

/// A table of faults: file, line, column, what was found, what is expected.
pub fn faults_ui(ui: &mut Ui, faults: &[Fault]) {
    let most = ui.ctx().content_rect().height() * 0.55;
    ScrollArea::both().id_salt("faults").max_height(most).auto_shrink([false, true]).show(ui, |ui| {
        Grid::new("faults").num_columns(5).spacing([16.0, 6.0]).striped(true).show(ui, |ui| {
            for title in ["File", "Line", "Column", "Found", "Expected"] {
                ui.label(theme::soft(ui, title));
            }
            ui.end_row();
            for fault in faults {
                ui.label(&fault.place.file);
                ui.label(fault.place.line.map(|line| line.to_string()).unwrap_or_default());
                ui.label(fault.place.column.as_deref().unwrap_or(""));
                ui.label(theme::strong(&fault.found).color(Palette::of(ui).loss));
                ui.label(&fault.expected);
                ui.end_row();
            }
        });
    });
}

/// Most faults listed above the view; the rows of the book show their own.
const MOST_LISTED: usize = 6;

/// The inputs as they stand can't be read: why, and, where it is the currency, the question that settles it.
pub fn invalid_ui(ui: &mut Ui, session: &Session, queue: &mut Queue) {
    let (currency, others): (Vec<&Fault>, Vec<&Fault>) =
        session.faults().iter().partition(|fault| asks_for_currency(fault));
    let palette = Palette::of(ui);
    let edge = Frame::new().stroke(Stroke::new(1.0, palette.loss)).inner_margin(8.0).corner_radius(6.0);
    edge.show(ui, |ui| {
        ui.set_width(ui.available_width());
        if !others.is_empty() {
            faulty_ui(ui, session, queue, &others);
        }
        if !currency.is_empty() {
            currency_ui(ui, session, queue);
        }
    });
    ui.add_space(4.0);
}

fn faulty_ui(ui: &mut Ui, session: &Session, queue: &mut Queue, faults: &[&Fault]) {
    let figures = if session.live().is_before_edit {
        "the figures are from before the edit"
    } else {
        "nothing can be read yet"
    };
    let title = theme::strong(format!("\u{26a0} The book has to be mended; {figures}"));
    ui.label(title.color(Palette::of(ui).loss));
    for fault in faults.iter().take(MOST_LISTED) {
        ui.add(Label::new(fault.to_string()).wrap());
    }
    ui.horizontal(|ui| {
        if faults.len() > MOST_LISTED {
            ui.label(theme::soft(ui, format!("and {} more", faults.len() - MOST_LISTED)));
        }
        if session.undo_text().is_some() && ui.button("Undo the edit").clicked() {
            queue.push(Command::Undo);
        }
    });
}

/// Which currency the book is in: one of those its rows name, or another.
fn currency_ui(ui: &mut Ui, session: &Session, queue: &mut Queue) {
    ui.label(theme::strong("Which currency is the book in?"));
    ui.label(theme::soft(
        ui,
        "Its rows name more than one, or leave some empty; everything is read in the book's own",
    ));
    let holdings = &session.document().inputs.holdings;
    let named: BTreeSet<&String> = holdings.iter().filter_map(|holding| holding.currency.as_ref()).collect();
    let mut settle = |code: String| {
        queue.push(Command::ChangeSetting(SettingChange::BookCurrency(Some(code))));
    };
    ui.horizontal_wrapped(|ui| {
        for code in named {
            if ui.button(code).clicked() {
                settle(code.clone());
            }
        }
        let field = CommittedText { name: "Book currency asked for", hint: "another", width: 76.0 };
        if let Some(code) = field.ui(ui, "").1 {
            settle(code);
        }
    });
}

fn asks_for_currency(fault: &Fault) -> bool {
    fault.expected.contains("--book-currency")
}

/// While files hover over the window: what dropping them does.
fn drop_hint_ui(ui: &Ui) {
    let files = ui.input(|input| input.raw.hovered_files.len());
    if files == 0 {
        return;
    }
    let palette = Palette::of(ui);
    let rect = ui.ctx().content_rect();
    Area::new(Id::unique("drop hint")).order(Order::Foreground).fixed_pos(rect.min).interactable(false).show(
        ui.ctx(),
        |ui| {
            ui.painter().rect_filled(rect, 0.0, palette.window.gamma_multiply(0.8));
            let inside = rect.shrink(40.0);
            ui.painter().rect_stroke(
                inside,
                12.0,
                Stroke::new(2.0, palette.accent),
                egui::StrokeKind::Inside,
            );
            let font = egui::FontId::new(theme::HEADLINE_POINTS, theme::heavy());
            let what = if files == 1 {
                "Drop the file to open it".to_owned()
            } else {
                format!("Drop {files} files to open them as one book")
            };
            ui.painter().text(inside.center(), Align2::CENTER_CENTER, what, font, palette.accent);
            let below = inside.center() + vec2(0.0, 30.0);
            let words =
                "Positions, exposures, factors, correlation and holidays are told apart by their headers";
            ui.painter().text(
                below,
                Align2::CENTER_CENTER,
                words,
                egui::FontId::proportional(theme::BODY_POINTS),
                palette.ink,
            );
        },
    );
}
