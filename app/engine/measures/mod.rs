//! What the paths say about losses, and the closed forms beside them.

/// Confidence as the decimal it was written as.
pub mod confidence;
/// Everything read on one day, as plain data.
pub mod reading;
/// The book's moments in closed form.
pub mod exact;
/// Sampled figures with their errors.
pub mod read;
/// Quantiles of value and fall, day by day.
pub mod bands;
/// The shape of a sample, for a chart.
pub mod density;
/// The first answer, before paths arrive.
pub mod first;
/// A single factor ahead.
pub mod factor_ahead;
/// What a history's own errors make of the figures.
pub mod parameter_range;

pub use bands::{Bands, FALL_PERCENTS, VALUE_PERCENTS, bands};
pub use confidence::{Confidence, ConfidenceError};
pub use density::{Density, density};
pub use exact::{ExactMoments, exact_moments};
pub use factor_ahead::{FactorAhead, factor_ahead};
pub use first::{first_bands, first_densities, first_reading};
pub use parameter_range::{ParameterRange, RangeRequest, RangeWatcher, parameter_range};
pub use read::reading;
pub use reading::{Conventions, LossFrom, Reading};
