//! The window. Panels read the session and push commands; the session applies them; the worker computes and answers.

/// Everything that can be done in the window.
pub mod commands;
/// Short messages that stay until put away.
pub mod notices;
/// What the window shows, and how commands change it.
pub mod session;
