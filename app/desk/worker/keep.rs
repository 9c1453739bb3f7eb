//! The thread that keeps the session against a crash, about a second after the last edit and at once when closing.

use super::post::Post;
use super::request::Answer;
use crate::workspace::{Kept, Slot};
use std::sync::mpsc::{Receiver, RecvTimeoutError};
use std::time::{Duration, Instant};

/// Longest time between an edit and its being kept, apart from the writing itself.
const LONGEST_WAIT: Duration = Duration::from_millis(1_000);

/// Keeps sessions until the program closes; what came last is written in any case.
pub(super) fn serve(slot: &Slot, asked: &Receiver<Box<Kept>>, post: &Post) {
    let mut last_failure = None;
    while let Ok(first) = asked.recv() {
        let kept = latest(first, asked);
        let failure = slot.keep(&kept).err().map(|error| error.to_string());
        if failure != last_failure
            && let Some(reason) = &failure
        {
            let sentence =
                format!("The session can't be kept against a crash ({reason}): save the workspace");
            post.answer(Answer::Failed(sentence));
        }
        last_failure = failure;
    }
}

/// The last session that comes within the wait.
fn latest(first: Box<Kept>, asked: &Receiver<Box<Kept>>) -> Box<Kept> {
    let due = Instant::now() + LONGEST_WAIT;
    let mut latest = first;
    loop {
        match asked.recv_timeout(due.saturating_duration_since(Instant::now())) {
            Ok(newer) => latest = newer,
            Err(RecvTimeoutError::Timeout | RecvTimeoutError::Disconnected) => return latest,
        }
    }
}
