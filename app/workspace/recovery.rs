//! The session that survives a crash: one file a running program in the user's state folder, locked while it runs.
//!
//! Each program takes a slot, `session-N.ron` with `session-N.lock` beside it. The lock falls with its program, however
//! that ends, so a slot without a lock is a session to be found again. Two programs never write the same slot.

use super::Kept;
use super::format::{kept_of_text, text_of_kept};
use super::whole::write_whole;
use std::fs::{self, File};
use std::io;
use std::path::{Path, PathBuf};
use std::time::SystemTime;

/// Names the state folder for tests and for those who keep it elsewhere.
pub const STATE_VARIABLE: &str = "EBBMARK_STATE";
/// Most programs at once whose sessions are kept.
const MOST_SLOTS: u32 = 64;

/// A place to keep this program's session; free for others when dropped.
#[derive(Debug)]
pub struct Slot {
    path: PathBuf,
    _lock: File,
}

/// What a program is about to show.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum Beginning {
    /// What it showed last.
    Last,
    /// Something else; a kept session with unsaved edits is left alone.
    Other,
}

/// The folder where sessions are kept: `EBBMARK_STATE`, else `ebbmark` in `XDG_STATE_HOME` or `~/.local/state`.
pub fn state_folder() -> Option<PathBuf> {
    let path = |name| std::env::var_os(name).filter(|value| !value.is_empty()).map(PathBuf::from);
    path(STATE_VARIABLE)
        .or_else(|| path("XDG_STATE_HOME").map(|state| state.join("ebbmark")))
        .or_else(|| path("HOME").map(|home| home.join(".local/state/ebbmark")))
}

impl Slot {
    /// Takes a slot in `folder`, and with [`Beginning::Last`] the newest session that no running program holds.
    ///
    /// # Errors
    /// Where the folder can't be made or written, or all slots are taken.
    pub fn take(folder: &Path, beginning: Beginning) -> io::Result<(Self, Option<Kept>)> {
        fs::create_dir_all(folder)?;
        let free = free_slots(folder);
        let chosen = match beginning {
            Beginning::Last => free.into_iter().max_by_key(|candidate| candidate.changed),
            Beginning::Other => free.into_iter().find(Candidate::can_be_replaced),
        };
        let Candidate { slot, kept, .. } =
            chosen.ok_or_else(|| io::Error::other("too many programs keep their sessions there"))?;
        let mut kept = kept.filter(|_| beginning == Beginning::Last);
        if let Some(history) = kept.as_mut().and_then(|kept| kept.workspace.document.history.as_mut()) {
            history.read_again(None);
        }
        Ok((slot, kept))
    }

    /// Keeps a session, whole.
    ///
    /// # Errors
    /// What the operating system said; the session kept before stands.
    pub fn keep(&self, kept: &Kept) -> io::Result<()> {
        let text = text_of_kept(kept).map_err(io::Error::other)?;
        write_whole(&self.path, text.as_bytes())
    }
}

/// A slot that no running program holds, while it is held to be chosen from.
struct Candidate {
    slot: Slot,
    kept: Option<Kept>,
    changed: Option<SystemTime>,
}

/// All free slots up to the first that was never used. One whose session can't be read (a newer program wrote it, or it
/// is damaged) is left as it is.
fn free_slots(folder: &Path) -> Vec<Candidate> {
    let mut free = Vec::new();
    for number in 1..=MOST_SLOTS {
        let Some(lock) = lock(&folder.join(format!("session-{number}.lock"))) else { continue };
        let path = folder.join(format!("session-{number}.ron"));
        let is_unused = !path.exists();
        let changed = fs::metadata(&path).and_then(|data| data.modified()).ok();
        let kept = fs::read_to_string(&path).ok().and_then(|text| kept_of_text(&text).ok());
        if is_unused || kept.is_some() {
            free.push(Candidate { slot: Slot { path, _lock: lock }, kept, changed });
        }
        if is_unused {
            break;
        }
    }
    free
}

fn lock(path: &Path) -> Option<File> {
    let file = File::create(path).ok()?;
    file.try_lock().ok()?;
    Some(file)
}

impl Candidate {
    fn can_be_replaced(&self) -> bool {
        self.kept.as_ref().is_none_or(|kept| !kept.has_unsaved_edits)
    }
}
