//! Paths of the book: random numbers by address, the exact joint transition, the block loop.

/// What is to be run.
pub mod plan;
/// What a run leaves behind.
pub mod run;

pub use plan::Plan;
pub use run::{DaySample, Run, SimulateError, Watcher};
