//! The window. Panels read the session and push commands; the session applies them; the worker computes and answers.

/// The loop of a frame.
pub mod app;
/// Everything that can be done in the window.
pub mod commands;
/// Short messages that stay until put away.
pub mod notices;
/// Everything that is drawn.
pub mod panels;
/// What the window shows, and how commands change it.
pub mod session;
/// Fonts and colours.
pub mod theme;
/// Threads.
pub mod worker;

pub use app::App;
