//! Charts as finished descriptions: axes, marks, roles, words. No colours, no pixels.

/// Amounts in words and figures.
pub mod amounts;

pub use amounts::{Scale, grouped, percent};
