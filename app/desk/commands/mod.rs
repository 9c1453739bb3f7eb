//! Everything that can be done in the window, as one closed list. What a command does to a session lives in
//! `session`; its words and keys live beside it here. Panels push commands and change nothing themselves.

/// What an edit sets about a holding, a factor or the settings.
pub mod change;
/// The list itself.
pub mod command;
/// What leaves the window, and what a path is asked for.
pub mod export;
/// Commands waiting for the end of the frame.
pub mod queue;
/// Keys.
pub mod shortcuts;
/// Words on buttons, in tooltips and in the undo list.
pub mod words;

pub use change::{FitChange, HoldingChange, Parameter, SettingChange};
pub use command::Command;
pub use export::{ExportFigure, ExportKind, PathPurpose, file_stem};
pub use queue::Queue;
