//! Dates. Trading days and holidays live here; prices by date join them with the fits.

/// Trading days and holidays.
pub mod calendar;

pub use calendar::{date_after, read_holidays};
