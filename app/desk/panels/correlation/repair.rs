//! An impossible matrix beside the nearest valid one: how far, which pairs move most, and the press that takes it, or takes
//! it back.

use crate::desk::commands::{Command, Queue, SettingChange};
use crate::desk::session::Session;
use crate::desk::theme::{self, Palette};
use ebbmark_engine::factors::Repair;
use egui::{Grid, ScrollArea, Ui};

/// Height of the list of pairs, in points.
const LIST_POINTS: f32 = 96.0;

/// Draws what is to be decided, or was; nothing where the matrix is valid by itself.
pub fn repair_ui(ui: &mut Ui, session: &Session, queue: &mut Queue) {
    let taken = session.live().model.as_deref().and_then(|model| model.repair.as_ref());
    if let Some(repair) = session.repair_offered() {
        let words = "These correlations can't hold together. The nearest valid matrix";
        told_ui(ui, repair, words, &Command::ChangeSetting(SettingChange::RepairsCorrelation(true)), queue);
    } else if let Some(repair) = taken {
        let words = "The matrix shown is the nearest valid one in place of the one given";
        let back = Command::ChangeSetting(SettingChange::RepairsCorrelation(false));
        if session.document().settings.repairs_correlation {
            told_ui(ui, repair, words, &back, queue);
        } else {
            list_ui(ui, repair, words);
        }
    }
}

fn told_ui(ui: &mut Ui, repair: &Repair, words: &str, command: &Command, queue: &mut Queue) {
    ui.horizontal(|ui| {
        if ui.button(command.text()).clicked() {
            queue.push(command.clone());
        }
    });
    list_ui(ui, repair, words);
}

fn list_ui(ui: &mut Ui, repair: &Repair, words: &str) {
    let before = repair.smallest_eigenvalue_before;
    let after = repair.correlation.smallest_eigenvalue();
    ui.label(theme::soft(
        ui,
        format!(
            "{words}: {:.3} away; smallest eigenvalue {before:.4} before, {after:.4} after",
            repair.distance
        ),
    ));
    ScrollArea::vertical().id_salt("most changed pairs").max_height(LIST_POINTS).show(ui, |ui| {
        Grid::new("most changed pairs").num_columns(4).spacing([14.0, 2.0]).show(ui, |ui| {
            ["Most changed pairs", "before", "after", "change"].into_iter().for_each(|title| {
                ui.label(theme::soft(ui, title));
            });
            ui.end_row();
            for change in &repair.changes {
                ui.label(format!("{} and {}", change.one, change.other));
                ui.label(format!("{:.3}", change.before));
                ui.label(format!("{:.3}", change.after));
                let moved = change.after - change.before;
                ui.label(theme::soft(ui, format!("{moved:+.3}")).color(Palette::of(ui).soft_ink));
                ui.end_row();
            }
        });
    });
}
