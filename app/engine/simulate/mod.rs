//! Paths of the book: random numbers by address, the exact joint transition, the block loop.

/// What is to be run.
pub mod plan;
/// What a run leaves behind.
pub mod run;
/// The exact joint transition of all factors over a step.
pub mod transition;

pub use plan::Plan;
pub use run::{DaySample, Run, SimulateError, Watcher};
pub use transition::Transition;
