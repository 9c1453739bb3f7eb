//! What is kept on disk: a book with its settings and view as RON, and the session that survives a crash.
//! Nothing here draws, computes or starts a thread; this is the only room that knows RON.

/// The book and its settings: what undo covers and a workspace saves.
pub mod document;
/// The book's history.
pub mod history;
/// From a document to its model.
pub mod assembling;
/// How the window looks at a document.
pub mod view;
/// Workspaces and kept sessions as text.
pub mod format;
/// Rows that a hand may have been at.
pub mod soundness;
/// Files that are never half written.
pub mod whole;
/// Workspaces as files.
pub mod files;
/// The session that survives a crash.
pub mod recovery;

pub use assembling::{Assembled, Assembler};
pub use document::{Document, LONGEST_HORIZON_DAYS, Settings};
pub use files::{EXTENSION, WorkspaceError, is_workspace, read, write};
pub use format::{FORMAT, FormatError};
pub use history::BookHistory;
pub use recovery::{Beginning, Slot, state_folder};
pub use soundness::{check_fitted, check_rows};
use std::path::PathBuf;
pub use view::{BookColumn, BookOrder, MatrixOrder, Tab, Theme, View};
pub use whole::write_whole;

/// Everything needed to see the same figures again.
#[derive(Debug, Clone, PartialEq)]
pub struct Workspace {
    /// The book and its settings.
    pub document: Document,
    /// How it was looked at.
    pub view: View,
}

/// A session as it is kept against a crash.
#[derive(Debug, Clone, PartialEq)]
pub struct Kept {
    /// What it was about.
    pub workspace: Workspace,
    /// Where it was last saved or opened from.
    pub file: Option<PathBuf>,
    /// Whether it differs from what stands there.
    pub has_unsaved_edits: bool,
}
