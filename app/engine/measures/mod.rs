//! What the paths say about losses, and the closed forms beside them.

/// Quantiles of value and fall, day by day.
pub mod bands;
/// Confidence as the decimal it was written as.
pub mod confidence;
/// The shape of a sample, for a chart.
pub mod density;
/// Everything read on one day.
pub mod reading;

pub use bands::Bands;
pub use confidence::Confidence;
pub use density::Density;
pub use reading::{Conventions, LossFrom, Reading};
