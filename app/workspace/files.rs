//! Workspaces as files: told by their extension, read with their faults, written whole. Their text is made next door.

use super::Workspace;
use super::format::{FORMAT, FormatError, text_of_workspace, workspace_of_text};
use super::whole::write_whole;
use ebbmark_engine::tables::{Fault, Place};
use std::path::Path;

/// Extension of workspaces, without the point.
pub const EXTENSION: &str = "ron";

/// Why a workspace could not be read or written.
#[derive(Debug, thiserror::Error)]
pub enum WorkspaceError {
    /// Its text is no workspace this program can use.
    #[error("{path}: {error}")]
    Format {
        /// The file.
        path: String,
        /// Why.
        error: FormatError,
    },
    /// The file can't be read or written.
    #[error("{path}: {error}")]
    File {
        /// The file.
        path: String,
        /// What the operating system said.
        error: std::io::Error,
    },
}

/// Reads a workspace and the history it names; the files are never changed by it.
///
/// # Errors
/// [`WorkspaceError`].
pub fn read(path: &Path) -> Result<Workspace, WorkspaceError> {
    let text = std::fs::read_to_string(path)
        .map_err(|error| WorkspaceError::File { path: path.display().to_string(), error })?;
    let mut workspace = workspace_of_text(&text)
        .map_err(|error| WorkspaceError::Format { path: path.display().to_string(), error })?;
    if let Some(history) = &mut workspace.document.history {
        history.read_again(path.parent());
    }
    Ok(workspace)
}

/// Writes a workspace whole.
///
/// # Errors
/// [`WorkspaceError`]; the old file stands as it was.
pub fn write(path: &Path, workspace: &Workspace) -> Result<(), WorkspaceError> {
    let name = || path.display().to_string();
    let text =
        text_of_workspace(workspace).map_err(|error| WorkspaceError::Format { path: name(), error })?;
    write_whole(path, text.as_bytes()).map_err(|error| WorkspaceError::File { path: name(), error })
}

/// Whether a path is a workspace by its extension.
pub fn is_workspace(path: &Path) -> bool {
    path.extension().is_some_and(|extension| extension.eq_ignore_ascii_case(EXTENSION))
}

impl WorkspaceError {
    /// The error as a fault with its place, as other files' faults are listed.
    pub fn into_fault(self) -> Fault {
        let (path, line, found, expected) = match self {
            Self::File { path, error } => {
                (path, None, error.to_string(), "a file that can be read".to_owned())
            }
            Self::Format { path, error: FormatError::Newer { found } } => {
                let expected =
                    format!("format {FORMAT} or older; open it with the newer program that wrote it");
                (path, None, format!("format {found}"), expected)
            }
            Self::Format { path, error: FormatError::Unreadable { reason, line } } => {
                (path, Some(line), reason, "a workspace as this program writes it".to_owned())
            }
            Self::Format { path, error: FormatError::Value { found, expected } } => {
                (path, None, found, expected)
            }
        };
        Fault { place: Place { file: path, line, column: None }, found, expected }
    }
}
