//! Commands waiting for the end of the frame. They are applied before the next paint, in order.

use super::Command;

/// What the panels have pushed in this frame.
///
/// A panel need not say where a drag begins and ends: edits of the same thing that come while the pointer is held
/// down are one undo step, and the step ends with the frame in which it is up again.
#[derive(Debug, Default)]
pub struct Queue {
    commands: Vec<Command>,
}

impl Queue {
    /// Asks for a command.
    pub fn push(&mut self, command: Command) {
        self.commands.push(command);
    }

    /// Takes what has been asked for.
    pub fn take(&mut self) -> Vec<Command> {
        std::mem::take(&mut self.commands)
    }
}
