//! What the window shows and how commands change it. Starts no thread, touches no file, paints nothing:
//! a command that needs those leaves a request for the worker.

/// Figures of the current inputs, as far as they have arrived.
pub mod live;
/// Edits that can be taken back.
pub mod undo;

use super::commands::PathPurpose;
use super::notices::{Notices, Refusal};
use crate::workspace::{Document, View};
use ebbmark_engine::tables::Fault;
pub use live::{AtLine, Live, RunState};
use std::path::PathBuf;
use std::sync::Arc;
pub use undo::UndoStack;

/// Everything the window shows.
#[derive(Debug)]
pub struct Session {
    document: Arc<Document>,
    view: View,
    file: Option<PathBuf>,
    saved: Option<Arc<Document>>,
    undo: UndoStack,
    live: Live,
    faults: Vec<Fault>,
    notices: Notices,
    refusal: Option<Refusal>,
    path_field: Option<PathPurpose>,
}

impl Session {
    /// The book and its settings.
    pub fn document(&self) -> &Document {
        &self.document
    }

    /// How it is looked at.
    pub fn view(&self) -> &View {
        &self.view
    }

    /// Figures, as far as they have arrived.
    pub fn live(&self) -> &Live {
        &self.live
    }

    /// What is wrong with the inputs as they stand; then the live figures are from before the edit.
    pub fn faults(&self) -> &[Fault] {
        &self.faults
    }

    /// Messages.
    pub fn notices(&self) -> &Notices {
        &self.notices
    }

    /// Files that were last refused.
    pub fn refusal(&self) -> Option<&Refusal> {
        self.refusal.as_ref()
    }

    /// What a path is to be typed for, while the path field is shown.
    pub fn path_field(&self) -> Option<PathPurpose> {
        self.path_field
    }

    /// Where the session was last saved or opened from.
    pub fn file(&self) -> Option<&PathBuf> {
        self.file.as_ref()
    }

    /// Whether the document differs from what was last saved or opened.
    pub fn has_unsaved_edits(&self) -> bool {
        self.saved.as_ref() != Some(&self.document)
    }

    /// What undo would take back, in words.
    pub fn undo_text(&self) -> Option<&str> {
        self.undo.undo_text()
    }

    /// What redo would do again, in words.
    pub fn redo_text(&self) -> Option<&str> {
        self.undo.redo_text()
    }
}
