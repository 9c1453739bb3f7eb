//! The thread that shows file dialogs. It may wait as long as a dialog is open; nothing else waits for it.

use super::Dialogs;
use super::post::Post;
use super::request::Answer;
use crate::desk::commands::PathPurpose;
use std::path::PathBuf;
use std::sync::mpsc::Receiver;
use std::time::{Duration, Instant};

/// Nobody cancels a dialog faster than this: an answer that comes sooner means that there is none on this machine.
const SOONEST_CANCEL: Duration = Duration::from_millis(400);

/// A dialog asked for.
#[derive(Debug)]
pub(super) struct Asked {
    pub(super) purpose: PathPurpose,
    pub(super) file_name: String,
}

/// Shows dialogs until the program closes. Of those asked for while one was open, none is shown.
pub(super) fn serve(asked: &Receiver<Asked>, shown: Dialogs, post: &Post) {
    while let Ok(Asked { purpose, file_name }) = asked.recv() {
        let began = Instant::now();
        let paths = match shown {
            Dialogs::OfTheDesktop => pick(purpose, &file_name),
            Dialogs::None => Vec::new(),
        };
        if !paths.is_empty() {
            post.answer(Answer::Picked { purpose, paths });
        } else if began.elapsed() < SOONEST_CANCEL {
            post.answer(Answer::NoDialog(purpose));
        }
        while asked.try_recv().is_ok() {}
    }
}

fn pick(purpose: PathPurpose, file_name: &str) -> Vec<PathBuf> {
    let dialog = rfd::FileDialog::new();
    match purpose {
        PathPurpose::Open => {
            let dialog =
                dialog.set_title("Open").add_filter("Books and workspaces", &["csv", "ron", "txt", "tsv"]);
            dialog.pick_files().unwrap_or_default()
        }
        PathPurpose::SaveAs => save(dialog.set_title("Save as"), file_name, "ron"),
        PathPurpose::Export(kind) => save(dialog.set_title(kind.title()), file_name, kind.extension()),
    }
}

fn save(dialog: rfd::FileDialog, file_name: &str, extension: &str) -> Vec<PathBuf> {
    let chosen = dialog.set_file_name(file_name).add_filter(extension, &[extension]).save_file();
    chosen.into_iter().collect()
}
