//! Pure arithmetic, free of trade words: everything here could serve another program.

/// Eigenvalues of symmetric matrices.
pub mod eigen;
/// Cholesky factor of a semi-definite matrix.
pub mod cholesky;
/// Largest fall of a Brownian motion.
pub mod drawdown_law;
/// What one entry of a correlation matrix may be.
pub mod entry_range;
/// Estimates with their standard errors.
pub mod estimate;
/// Moments of a sample.
pub mod moments;
/// Numbers with nilpotent parts.
pub mod multidual;
/// Ranks that hold a quantile.
pub mod rank_range;
/// Roots of functions of one variable.
pub mod roots;
/// Shifted lognormal law by its moments.
pub mod shifted_lognormal;
/// Normal law and decay integral.
pub mod special;
/// The largest values of a sample.
pub mod tail;

pub use drawdown_law::{drawdown_cdf, drawdown_mean_beyond, drawdown_quantile};
pub use entry_range::entry_range;
pub use estimate::Estimate;
pub use moments::{SampleMoments, sample_moments};
pub use multidual::Multidual;
pub use rank_range::{RankRange, rank_range};
pub use roots::root;
pub use shifted_lognormal::ShiftedLognormal;
pub use special::{decay_integral, normal_cdf, normal_density, normal_quantile};
pub use tail::{TWO_SIDED_95, UpperTail};
