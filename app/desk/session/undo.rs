//! Edits that can be taken back: states of the document before and after. What an edit does is not decided here.
//!
//! Every change of the document is a step, moves of the reading line among them; consecutive changes of the same
//! thing within one gesture (while the pointer is held down) are one step.

use crate::desk::commands::Command;
use crate::workspace::Document;
use std::mem::Discriminant;
use std::path::PathBuf;
use std::sync::Arc;

/// Most steps kept.
const MOST_STEPS: usize = 400;

/// What a document was at one time, and the file it belonged to.
#[derive(Debug, Clone)]
pub struct State {
    /// The document.
    pub document: Arc<Document>,
    /// Where it was saved or opened from.
    pub file: Option<PathBuf>,
}

/// What an edit changes, whatever it sets it to: two edits of one gesture with the same target are one step.
#[derive(Debug, Clone, PartialEq, Eq)]
pub struct Target {
    command: Discriminant<Command>,
    row: Option<usize>,
    words: String,
}

impl Target {
    /// The target of a command.
    pub fn of(command: &Command) -> Self {
        let row = match command {
            Command::RemoveHolding { row }
            | Command::ChangeHolding { row, .. }
            | Command::SetExposure { row, .. } => Some(*row),
            _ => None,
        };
        Self { command: std::mem::discriminant(command), row, words: command.text() }
    }
}

#[derive(Debug, Clone)]
struct Step {
    text: String,
    state: State,
}

/// Steps back and forth.
#[derive(Debug, Default)]
pub struct UndoStack {
    before: Vec<Step>,
    after: Vec<Step>,
    gesture: Option<Target>,
}

impl UndoStack {
    /// Remembers the state before an edit, unless the edit goes on with the gesture of the last one.
    pub fn remember(&mut self, text: String, target: Target, before: State) {
        self.after.clear();
        if self.gesture.as_ref() == Some(&target) {
            return;
        }
        self.gesture = Some(target);
        self.before.push(Step { text, state: before });
        let excess = self.before.len().saturating_sub(MOST_STEPS);
        self.before.drain(..excess);
    }

    /// Ends a gesture: the next edit is a step of its own.
    pub fn end_gesture(&mut self) {
        self.gesture = None;
    }

    /// The state before the last edit; `now` is kept for redo.
    pub fn undo(&mut self, now: State) -> Option<State> {
        Self::go(&mut self.before, &mut self.after, now, &mut self.gesture)
    }

    /// The state after the edit last taken back.
    pub fn redo(&mut self, now: State) -> Option<State> {
        Self::go(&mut self.after, &mut self.before, now, &mut self.gesture)
    }

    fn go(
        from: &mut Vec<Step>,
        to: &mut Vec<Step>,
        now: State,
        gesture: &mut Option<Target>,
    ) -> Option<State> {
        *gesture = None;
        let Step { text, state } = from.pop()?;
        to.push(Step { text, state: now });
        Some(state)
    }

    /// What undo would take back.
    pub fn undo_text(&self) -> Option<&str> {
        self.before.last().map(|step| step.text.as_str())
    }

    /// What redo would do again.
    pub fn redo_text(&self) -> Option<&str> {
        self.after.last().map(|step| step.text.as_str())
    }
}
