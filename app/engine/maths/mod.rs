//! Pure arithmetic, free of trade words: everything here could serve another program.

/// Cholesky factor of a semi-definite matrix.
pub mod cholesky;
/// Estimates with their standard errors.
pub mod estimate;

pub use estimate::Estimate;
