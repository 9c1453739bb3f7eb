//! What the window shows and how commands change it. Starts no thread, touches no file, paints nothing:
//! a command that needs those leaves a request for the worker.

/// The worker's answers.
mod answers;
/// Commands.
mod apply;
/// Edits as functions from document to document.
pub mod edits;
/// Figures of the current inputs, as far as they have arrived.
pub mod live;
/// Losses over the fit's parameters.
mod ranging;
/// Edits that can be taken back.
pub mod undo;

use super::commands::{ExportKind, PathPurpose};
use super::notices::{Notices, Refusal};
use crate::workspace::{Document, Kept, View};
use ebbmark_engine::factors::Repair;
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
    repair_offered: Option<Arc<Repair>>,
    notices: Notices,
    refusal: Option<Refusal>,
    path_field: Option<PathPurpose>,
    waiting_exports: Vec<(ExportKind, PathBuf)>,
    asked_generation: u64,
    asked_range: u64,
}

impl Session {
    /// A session with a document that was kept, opened or built in.
    pub fn new(kept: Kept) -> Self {
        let Kept { workspace, file, has_unsaved_edits } = kept;
        let document = Arc::new(workspace.document);
        Self {
            saved: (!has_unsaved_edits).then(|| Arc::clone(&document)),
            document,
            view: workspace.view,
            file,
            undo: UndoStack::default(),
            live: Live::default(),
            faults: Vec::new(),
            repair_offered: None,
            notices: Notices::default(),
            refusal: None,
            path_field: None,
            waiting_exports: Vec::new(),
            asked_generation: 0,
            asked_range: 0,
        }
    }

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

    /// The repair that would make the inputs valid, where their correlation is all that is wrong.
    pub fn repair_offered(&self) -> Option<&Repair> {
        self.repair_offered.as_deref()
    }

    /// Where the reading line stands: the day nearest to the one set at which the paths can be read.
    pub fn reading_day(&self) -> u32 {
        self.live.nearest_day(self.document.settings.reading_day)
    }

    /// Messages.
    pub fn notices(&self) -> &Notices {
        &self.notices
    }

    /// Messages, to tell something from outside the session.
    pub fn notices_mut(&mut self) -> &mut Notices {
        &mut self.notices
    }

    /// Refuses files, with everything wrong with them.
    pub fn refuse(&mut self, refusal: Refusal) {
        self.refusal = Some(refusal);
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
