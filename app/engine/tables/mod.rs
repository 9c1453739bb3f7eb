//! Delimited text with places. Knows cells, lines and columns; knows nothing of what they mean.

/// Where something went wrong in the input, and what is worth telling.
pub mod fault;

pub use fault::{Fault, Faults, Notice, NoticeLevel, Place};
