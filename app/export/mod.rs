//! What leaves the program for paper, and the fonts that screen and paper share. Figures and numbers come finished from
//! the engine.

/// The shipped fonts.
pub mod fonts;
/// Page size and colours of paper.
pub mod look;
/// Figures as SVG: the only drawer for paper.
pub mod svg;
mod text;
/// Figures as PNG.
pub mod png;
/// Numbers as CSV.
pub mod csv;

pub use look::{Look, Tone};
pub use png::{pixels, png};
pub use svg::svg;
