//! The numbers of Ebbmark. Rooms stand in the order in which a figure flows through them;
//! a room uses only rooms named above it. No screen, no clock, no files: readers take text
//! and a label, and the caller opens files and starts threads.

/// Pure arithmetic: linear algebra, quantiles, moments, roots, special functions. No trade words.
pub mod maths;
/// Delimited text with places, and the faults and notices that point at them.
pub mod tables;
/// Dates: trading days, holidays, and levels by date.
pub mod history;
/// What is held: holdings and sensitivities as they were written.
pub mod book;
/// What moves the book: risk factors, their diffusions, their correlation; the checked model.
pub mod factors;
/// From dated levels to diffusions and correlations, with errors and evidence.
pub mod fit;
/// Paths of the book: random numbers by address, exact transition, block loop.
pub mod simulate;
/// What the paths say: VaR, ES, drawdown, limit, moments; and the closed forms beside them.
pub mod measures;
/// Every chart as a finished description that screen and paper draw alike.
pub mod figures;
