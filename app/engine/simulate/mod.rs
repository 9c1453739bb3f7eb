//! Paths of the book: random numbers by address, the exact joint transition, the block loop.

mod block;
mod elementary;
mod falls;
/// One horizon in a single step.
pub mod one_step;
/// What is to be run.
pub mod plan;
mod program;
/// Random numbers by address.
pub mod random;
/// A run and what it leaves behind.
pub mod run;
mod tile;
/// The exact joint transition of all factors over a step.
pub mod transition;
mod triangle;

pub use block::InstructionSet;
pub use one_step::values_in_one_step;
pub use plan::{Plan, SimulateError};
pub use random::Stream;
pub use run::{DaySample, Run, Unwatched, Watcher, draw_again, run, run_with};
pub use transition::{Transition, factor_move, move_covariance, move_means};
