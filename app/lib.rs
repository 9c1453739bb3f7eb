//! Ebbmark, the program: how much a book of positions can lose, at every horizon at once.
//! Only names the rooms; `main.rs` picks between a window and a command without a screen.

/// Paper: figures and numbers that leave the program.
pub mod export;
/// The window.
pub mod desk;
/// Commands without a screen.
pub mod headless;
/// Files become a book.
pub mod opening;
/// What is kept on disk: workspaces, and the session that survives a crash.
pub mod workspace;
