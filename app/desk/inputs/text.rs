//! Texts that are typed: committed when Enter is pressed or the field is left, given back with Escape.

use super::{read_figure, shown_figure};
use egui::{FontId, Frame, Id, Key, Response, TextEdit, Ui};

/// A text field that reports what was typed only when it is meant.
#[derive(Debug, Clone)]
pub struct CommittedText<'a> {
    /// Accessible name, unique in the window.
    pub name: &'a str,
    /// What to show while it is empty.
    pub hint: &'a str,
    /// Width in points.
    pub width: f32,
}

/// Frameless text that can be typed over where it stands, in a font of its own.
pub fn title_ui(ui: &mut Ui, field: CommittedText<'_>, font: FontId, text: &str) -> Option<String> {
    field.edit_ui(ui, text, |edit| edit.frame(Frame::NONE).font(font)).1
}

impl CommittedText<'_> {
    /// Draws it over `text`; what was typed comes back once Enter is pressed or the field is left.
    pub fn ui(self, ui: &mut Ui, text: &str) -> (Response, Option<String>) {
        self.edit_ui(ui, text, |edit| edit)
    }

    fn edit_ui(
        self,
        ui: &mut Ui,
        text: &str,
        shape: impl FnOnce(TextEdit<'_>) -> TextEdit<'_>,
    ) -> (Response, Option<String>) {
        let draft_id = ui.next_auto_id().with("draft");
        let mut draft = ui.data(|data| data.get_temp::<String>(draft_id)).unwrap_or_else(|| text.to_owned());
        let field = TextEdit::singleline(&mut draft).hint_text(self.hint).desired_width(self.width);
        let response = ui.add(shape(field)).accessible_name(self.name);
        let typed = settle(ui, draft_id, &response, draft, text);
        (response, typed)
    }
}

/// Keeps the draft while the field has focus; on leaving, gives it back unless Escape was pressed.
fn settle(ui: &Ui, draft_id: Id, response: &Response, draft: String, text: &str) -> Option<String> {
    if response.has_focus() {
        ui.data_mut(|data| data.insert_temp(draft_id, draft));
        return None;
    }
    ui.data_mut(|data| data.remove_temp::<String>(draft_id));
    let is_meant = response.lost_focus() && !ui.input(|input| input.key_pressed(Key::Escape));
    (is_meant && draft != text).then_some(draft)
}

/// A field to narrow a list by; every keystroke counts.
pub fn search_ui(ui: &mut Ui, name: &str, hint: &str, width: f32, text: &str) -> Option<String> {
    let mut draft = text.to_owned();
    let field = TextEdit::singleline(&mut draft).hint_text(hint).desired_width(width);
    let response = ui.add(field).accessible_name(name);
    response.changed().then_some(draft)
}

/// An amount that may be left empty, as text: an empty field is none. Gives the new amount once it is meant, and
/// nothing where what was typed is no number.
pub fn optional_figure_ui(ui: &mut Ui, field: CommittedText<'_>, value: Option<f64>) -> Option<Option<f64>> {
    let text = value.map(shown_figure).unwrap_or_default();
    let typed = field.ui(ui, &text).1?;
    if typed.trim().is_empty() {
        return Some(None);
    }
    read_figure(&typed).map(Some)
}
