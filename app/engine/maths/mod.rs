//! Pure arithmetic, free of trade words: everything here could serve another program.

/// Eigenvalues of symmetric matrices.
pub mod eigen;
/// Cholesky factor of a semi-definite matrix.
pub mod cholesky;
/// Like beside like.
pub mod clustering;
/// Products of columns.
pub mod gram;
/// The nearest correlation matrix.
pub mod nearest_correlation;
/// Covariances drawn towards a target.
pub mod shrinkage;
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
/// Where a function of one variable is largest.
pub mod maximum;
/// Shifted lognormal law by its moments.
pub mod shifted_lognormal;
/// Normal law and decay integral.
pub mod special;
/// The largest values of a sample.
pub mod tail;

pub use clustering::leaf_order;
pub use drawdown_law::{drawdown_cdf, drawdown_mean_beyond, drawdown_quantile};
pub use eigen::symmetric_eigenvalues;
pub use entry_range::entry_range;
pub use estimate::{Estimate, RangedEstimate};
pub use gram::gram;
pub use maximum::maximum;
pub use moments::{SampleMoments, sample_moments};
pub use multidual::Multidual;
pub use nearest_correlation::{Nearest, NearestError, nearest_correlation};
pub use rank_range::{RankRange, rank_range};
pub use roots::root;
pub use shifted_lognormal::ShiftedLognormal;
pub use shrinkage::{Shrunk, shrink_to_constant_correlation, shrink_to_identity};
pub use special::{decay_integral, normal_cdf, normal_density, normal_quantile};
pub use tail::{TWO_SIDED_95, UpperTail};
