//! The thread that opens, saves and exports. One after the other, so that a file opened after it was saved is the saved one.

use super::export;
use super::open::open;
use super::post::Post;
use super::request::{Answer, ExportRequest};
use crate::desk::notices::Refusal;
use crate::workspace::{self, Document, Workspace};
use std::path::{Path, PathBuf};
use std::sync::Arc;
use std::sync::mpsc::Receiver;

/// Something to be done with files.
#[derive(Debug)]
pub(super) enum Task {
    Open { paths: Vec<PathBuf>, current: Arc<Document> },
    Save { path: PathBuf, workspace: Box<Workspace> },
    Export(Box<ExportRequest>),
}

/// Works with files until the program closes.
pub(super) fn serve(asked: &Receiver<Task>, post: &Post) {
    while let Ok(task) = asked.recv() {
        post.answer(match task {
            Task::Open { paths, current } => open_all(&paths, &current),
            Task::Save { path, workspace } => save(&path, *workspace),
            Task::Export(request) => export(*request),
        });
    }
}

fn open_all(paths: &[PathBuf], current: &Document) -> Answer {
    let paths: Vec<PathBuf> = paths.iter().map(|path| whole_path(path)).collect();
    match open(&paths, current) {
        Ok(opened) => Answer::Opened(Box::new(opened)),
        Err(faults) => Answer::Refused(Refusal { paths, faults: faults.0 }),
    }
}

fn export(request: ExportRequest) -> Answer {
    let request = ExportRequest { path: whole_path(&request.path), ..request };
    match export::write(&request) {
        Ok(()) => Answer::Exported(request.path),
        Err(error) => Answer::Failed(not_written("Not exported", &request.path, &error)),
    }
}

fn save(path: &Path, workspace: Workspace) -> Answer {
    let path = with_extension(whole_path(path));
    match workspace::write(&path, &workspace) {
        Ok(()) => Answer::Saved { path, document: Arc::new(workspace.document) },
        Err(error) => Answer::Failed(format!("Not saved ({error}): choose another place")),
    }
}

/// A path as it was typed, from the root on: what is kept of it holds wherever the program is started next. A leading
/// `~` is the home folder.
pub fn whole_path(typed: &Path) -> PathBuf {
    let home = std::env::var_os("HOME").map(PathBuf::from);
    let path = match (typed.strip_prefix("~"), home) {
        (Ok(rest), Some(home)) => home.join(rest),
        _ => typed.to_path_buf(),
    };
    std::path::absolute(&path).unwrap_or(path)
}

/// A path without an extension is given the workspace's, so that it is told apart when it is opened again.
fn with_extension(path: PathBuf) -> PathBuf {
    if path.extension().is_none() { path.with_extension(workspace::EXTENSION) } else { path }
}

fn not_written(what: &str, path: &Path, error: &impl std::fmt::Display) -> String {
    format!("{what} to {} ({error}): choose another place", path.display())
}
