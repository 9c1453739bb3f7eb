//! Short messages that stay until put away, and the list of what was wrong with files that were not opened.

use ebbmark_engine::tables::{Fault, Notice, NoticeLevel};
use std::path::PathBuf;

/// A message in the window.
#[derive(Debug, Clone, PartialEq, Eq)]
pub struct Note {
    /// Its number, never used again.
    pub id: u64,
    /// How much it matters, and its sentence.
    pub notice: Notice,
    /// Whether it tells that something asked for was not done.
    pub is_failure: bool,
}

/// Messages, oldest first.
#[derive(Debug, Clone, PartialEq, Eq, Default)]
pub struct Notices {
    notes: Vec<Note>,
    /// What holds of the model at hand, shown or put away.
    standing: Vec<Notice>,
    next: u64,
}

/// Files that were not opened. The session is as it was before; the list is the way back.
#[derive(Debug, Clone, PartialEq, Eq)]
pub struct Refusal {
    /// What was to be opened.
    pub paths: Vec<PathBuf>,
    /// Everything wrong with it, in order of place.
    pub faults: Vec<Fault>,
}

impl Notices {
    /// Most messages kept; older ones go first.
    const MOST: usize = 20;

    /// All of them, oldest first.
    pub fn all(&self) -> &[Note] {
        &self.notes
    }

    /// Tells something.
    pub fn tell(&mut self, level: NoticeLevel, text: impl Into<String>) {
        self.add(Notice { level, text: text.into() }, false);
    }

    /// Tells that something asked for was not done, and why.
    pub fn tell_failure(&mut self, text: impl Into<String>) {
        self.add(Notice { level: NoticeLevel::Warning, text: text.into() }, true);
    }

    /// Tells what holds of the model at hand. What held before and no longer does goes; what still holds is not told
    /// again, so that it stays away once it was put away.
    pub fn stand(&mut self, standing: Vec<Notice>) {
        let gone: Vec<Notice> =
            self.standing.iter().filter(|notice| !standing.contains(notice)).cloned().collect();
        self.notes.retain(|note| !gone.contains(&note.notice));
        let old = std::mem::replace(&mut self.standing, standing.clone());
        standing
            .into_iter()
            .filter(|notice| !old.contains(notice))
            .for_each(|notice| self.add(notice, false));
    }

    /// Whether a message holds of the model at hand; the others answer something that was asked for.
    pub fn is_standing(&self, note: &Note) -> bool {
        self.standing.contains(&note.notice)
    }

    /// Puts one away.
    pub fn dismiss(&mut self, id: u64) {
        self.notes.retain(|note| note.id != id);
    }

    fn add(&mut self, notice: Notice, is_failure: bool) {
        self.notes.push(Note { id: self.next, notice, is_failure });
        self.next += 1;
        let excess = self.notes.len().saturating_sub(Self::MOST);
        self.notes.drain(..excess);
    }
}
