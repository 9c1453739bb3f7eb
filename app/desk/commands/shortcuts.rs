//! Keys of the commands. What a command does is decided elsewhere.

use super::{Command, PathPurpose};
use crate::workspace::Tab;
use egui::{Key, KeyboardShortcut, Modifiers};

const COMMAND_SHIFT: Modifiers = Modifiers::COMMAND.plus(Modifiers::SHIFT);

/// Commands that have a key of their own. Where one key contains another, the longer stands first.
pub fn bindings() -> Vec<(KeyboardShortcut, Command)> {
    let with = |modifiers, key| KeyboardShortcut::new(modifiers, key);
    vec![
        (with(COMMAND_SHIFT, Key::Z), Command::Redo),
        (with(Modifiers::COMMAND, Key::Z), Command::Undo),
        (with(Modifiers::COMMAND, Key::Y), Command::Redo),
        (with(COMMAND_SHIFT, Key::O), Command::TypePath(PathPurpose::Open)),
        (with(Modifiers::COMMAND, Key::O), Command::AskPath(PathPurpose::Open)),
        (with(COMMAND_SHIFT, Key::S), Command::AskPath(PathPurpose::SaveAs)),
        (with(Modifiers::COMMAND, Key::S), Command::Save),
        (with(Modifiers::COMMAND, Key::D), Command::ToggleTheme),
        (with(Modifiers::COMMAND, Key::R), Command::RunAgain),
        (with(Modifiers::COMMAND, Key::Num1), Command::ShowTab(Tab::Horizon)),
        (with(Modifiers::COMMAND, Key::Num2), Command::ShowTab(Tab::Correlation)),
    ]
}

/// The key of a command, for its tooltip.
pub fn shortcut_of(command: &Command) -> Option<KeyboardShortcut> {
    bindings().into_iter().find(|(_, bound)| bound == command).map(|(shortcut, _)| shortcut)
}

/// Takes the pressed keys out of this frame's input and gives their commands. A text field that is being typed in has
/// an undo of its own.
pub fn pressed(ctx: &egui::Context) -> Vec<Command> {
    let is_typing = ctx.text_edit_focused();
    let is_heard = |command: &Command| !(is_typing && matches!(command, Command::Undo | Command::Redo));
    ctx.input_mut(|input| {
        bindings()
            .into_iter()
            .filter(|(shortcut, command)| is_heard(command) && input.consume_shortcut(shortcut))
            .map(|(_, command)| command)
            .collect()
    })
}
