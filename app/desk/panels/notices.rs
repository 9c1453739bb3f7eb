//! Messages that stay until they are put away: what the files and the model want told, and what was not done.

use crate::desk::commands::{Command, Queue};
use crate::desk::notices::Note;
use crate::desk::session::Session;
use crate::desk::theme::{self, Palette, section_ui};
use ebbmark_engine::tables::NoticeLevel;
use egui::{Align, Label, Layout, Ui};

/// Draws them, newest first; nothing where there are none.
pub fn notices_ui(ui: &mut Ui, session: &Session, queue: &mut Queue) {
    let notes = session.notices().all();
    if notes.is_empty() {
        return;
    }
    section_ui(ui, "Notices");
    for note in notes.iter().rev() {
        note_ui(ui, queue, note);
    }
}

fn note_ui(ui: &mut Ui, queue: &mut Queue, note: &Note) {
    ui.horizontal_top(|ui| {
        ui.with_layout(Layout::right_to_left(Align::Min), |ui| {
            let close =
                ui.small_button("\u{00d7}").accessible_name(format!("Put away: {}", note.notice.text));
            if close.on_hover_text("Put away").clicked() {
                queue.push(Command::DismissNotice(note.id));
            }
            ui.with_layout(Layout::top_down(Align::Min), |ui| {
                let is_warning = note.is_failure || note.notice.level == NoticeLevel::Warning;
                let mark = if is_warning { "\u{26a0} " } else { "" };
                let text = theme::soft(ui, format!("{mark}{}", note.notice.text));
                let text = if note.is_failure { text.color(Palette::of(ui).loss) } else { text };
                ui.add(Label::new(text).wrap());
            });
        });
    });
}
