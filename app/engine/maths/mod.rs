//! Pure arithmetic, free of trade words: everything here could serve another program.

/// Estimates with their standard errors.
pub mod estimate;

pub use estimate::Estimate;
