//! The window without a screen: sessions, commands, undo, the worker, workspaces; then the window by its labels.
#![allow(clippy::unwrap_used, reason = "a test that finds nothing fails there")]

/// A small book, and ways to wait for the worker.
mod support;
/// A hand on the window.
mod hand;
/// Edits of holdings, factors, correlations and settings.
mod edits;
/// Any edits in any order.
mod any;
/// A history and what it fills.
mod history;
/// Messages.
mod notices;
/// Steps back and forth.
mod undo;
/// Workspaces and kept sessions.
mod kept;
/// The window by its labels.
mod window;
/// Every panel by its labels.
mod click_panels;
/// Runs, readings, files.
mod worker;
