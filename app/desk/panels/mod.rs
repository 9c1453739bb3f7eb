//! Everything that is drawn: panels read the session and push commands. They do not use each other.

use super::commands::Queue;
use super::session::Session;

/// Draws the whole window.
pub fn window_ui(ui: &mut egui::Ui, session: &Session, queue: &mut Queue) {
    let _ = (ui, session, queue);
}
