//! Pure arithmetic, free of trade words: everything here could serve another program.

/// Cholesky factor of a semi-definite matrix.
pub mod cholesky;
/// What one entry of a correlation matrix may be.
pub mod entry_range;
/// Estimates with their standard errors.
pub mod estimate;

pub use entry_range::entry_range;
pub use estimate::Estimate;
