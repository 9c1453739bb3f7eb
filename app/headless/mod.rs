//! Commands without a screen: one file each, beside the command line they are typed on and the streams they answer on.
//! Nothing here computes a figure, and nothing here knows the window.

/// The answer, field by field.
pub mod answer;
/// The command line.
pub mod arguments;
mod columns;
/// Why there is no answer.
pub mod failure;
mod progress;
/// `ebbmark fit`.
pub mod fit;
/// What it answers.
pub mod fit_answer;
mod fit_table;
/// `ebbmark read`.
pub mod read;
mod source;
/// Standard output and standard error.
pub mod streams;
mod table;
mod writer;

pub use arguments::{Arguments, Command};
pub use failure::Failure;
