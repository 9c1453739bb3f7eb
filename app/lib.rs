//! The program around the numbers. Each room's own words say what it does; none is used by the engine.

/// Files become a book.
pub mod opening;
