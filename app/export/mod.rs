//! What leaves the program for paper, and the fonts that screen and paper share. Numbers come finished from the engine.

/// The shipped fonts.
pub mod fonts;
