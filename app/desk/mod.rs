//! The window. Panels read the session and push commands; the session applies them; the worker computes and answers.

/// The loop of a frame.
pub mod app;
/// Everything that can be done in the window.
pub mod commands;
/// Widgets that edit in place.
pub mod inputs;
/// Short messages that stay until put away.
pub mod notices;
/// Everything that is drawn.
pub mod panels;
/// Charts on screen.
pub mod plot;
/// What the panels say about the reading.
pub mod readout;
/// What the window shows, and how commands change it.
pub mod session;
/// Fonts and colours.
pub mod theme;
/// Threads.
pub mod worker;

/// The window, and what it begins with.
pub mod start;
/// Why no window can be had.
pub mod window_error;

pub use app::App;
pub use start::open;
pub use window_error::WindowError;
