//! What the paths say about losses, and the closed forms beside them.

/// Confidence as the decimal it was written as.
pub mod confidence;
/// Everything read on one day.
pub mod reading;

pub use confidence::Confidence;
pub use reading::{Conventions, LossFrom, Reading};
