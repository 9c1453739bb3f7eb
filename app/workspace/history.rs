//! The history of a book: where its file is and what it held, how it is fitted, and, should the file be gone one day, the
//! figures that it gave.

use crate::opening::{self, OpenedHistory};
use ebbmark_engine::factors::Fitted;
use ebbmark_engine::fit::FitSettings;
use ebbmark_engine::history::History;
use jiff::civil::Date;
use std::path::{Path, PathBuf};
use std::sync::Arc;

/// A book's history. Saved by path and hash; its levels are read again when a workspace is opened.
#[derive(Debug, Clone)]
pub struct BookHistory {
    /// The file.
    pub path: PathBuf,
    /// SHA-256 of its bytes, in hexadecimal.
    pub hash: String,
    /// How it is fitted.
    pub settings: FitSettings,
    /// Its levels, or why there are none.
    pub levels: Result<Arc<History>, String>,
    /// What it last gave the book: taken where the levels are lost. No edit, and not compared.
    pub fitted: Option<Arc<Fitted>>,
}

impl BookHistory {
    /// A history that was just opened.
    pub fn of(opened: OpenedHistory, settings: FitSettings) -> Self {
        let OpenedHistory { path, hash, history } = opened;
        Self { path, hash, settings, levels: Ok(Arc::new(history)), fitted: None }
    }

    /// Its levels, where they could be read.
    pub fn history(&self) -> Option<&Arc<History>> {
        self.levels.as_ref().ok()
    }

    /// The last date of its levels; of the figures kept where those are lost.
    pub fn last_date(&self) -> Option<Date> {
        let kept = || self.fitted.as_ref().map(|fitted| fitted.dates.1);
        self.history().map_or_else(kept, |history| history.dates.last().copied())
    }

    /// Reads the levels again after the rest came from a workspace in `folder`: the file must be what it was.
    pub fn read_again(&mut self, folder: Option<&Path>) {
        let beside = folder.zip(self.path.file_name()).map(|(folder, name)| folder.join(name));
        let places = [Some(self.path.clone()), beside].into_iter().flatten();
        let mut why = format!("{} can't be read", self.path.display());
        for path in places {
            match opening::read_history_file(&path) {
                Ok(opened) if opened.hash == self.hash => {
                    self.levels = Ok(Arc::new(opened.history));
                    return;
                }
                Ok(_) => why = format!("{} has changed since", path.display()),
                Err(_) => {}
            }
        }
        self.levels = Err(why);
    }
}

impl PartialEq for BookHistory {
    /// The hash stands for the levels.
    fn eq(&self, other: &Self) -> bool {
        let parts = |history: &Self| (history.path.clone(), history.hash.clone(), history.settings.clone());
        parts(self) == parts(other) && self.levels.is_ok() == other.levels.is_ok()
    }
}
