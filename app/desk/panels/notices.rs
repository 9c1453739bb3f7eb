//! Messages that stay until they are put away: what the files and the model want told, and what was not done.

use crate::desk::commands::{Command, Queue};
use crate::desk::notices::Note;
use crate::desk::session::Session;
use crate::desk::theme::{self, Palette, section_ui};
use ebbmark_engine::tables::NoticeLevel;
use egui::{Align, Align2, Area, Frame, Id, Label, Layout, Order, Ui, vec2};

/// Width of an answer.
const ANSWER_POINTS: f32 = 272.0;
/// Most answers shown at once.
const MOST_ANSWERS: usize = 2;
/// Distance of the answers from the lower edge, clear of the foot.
const ABOVE_FOOT: f32 = 34.0;

/// Draws what holds of the model, newest first; nothing where there is none.
pub fn notices_ui(ui: &mut Ui, session: &Session, queue: &mut Queue) {
    let notices = session.notices();
    let mut standing = notices.all().iter().rev().filter(|note| notices.is_standing(note)).peekable();
    if standing.peek().is_some() {
        section_ui(ui, "Notices");
    }
    standing.for_each(|note| note_ui(ui, queue, note));
}

/// Draws the newest answers to what was asked for - saved, exported, or why not - over the lower right corner, where
/// least is pressed.
pub fn answers_ui(ui: &Ui, session: &Session, queue: &mut Queue) {
    let notices = session.notices();
    let answers: Vec<&Note> =
        notices.all().iter().rev().filter(|note| !notices.is_standing(note)).take(MOST_ANSWERS).collect();
    if answers.is_empty() {
        return;
    }
    let area = Area::new(Id::unique("answers")).order(Order::Foreground);
    area.anchor(Align2::RIGHT_BOTTOM, vec2(-14.0, -ABOVE_FOOT)).show(ui.ctx(), |ui| {
        for note in answers {
            Frame::popup(ui.style()).show(ui, |ui| {
                ui.set_width(ANSWER_POINTS);
                note_ui(ui, queue, note);
            });
        }
    });
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
