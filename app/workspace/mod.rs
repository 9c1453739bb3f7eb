//! What is kept on disk: a book with its settings and view as RON, and the session that survives a crash.
//! Nothing here draws, computes or starts a thread; this is the only room that knows RON.

/// The book and its settings: what undo covers and a workspace saves.
pub mod document;
/// How the window looks at a document.
pub mod view;

pub use document::{Document, Settings};
pub use view::{BookColumn, BookOrder, Tab, Theme, View};
