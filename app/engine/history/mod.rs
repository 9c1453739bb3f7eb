//! Dates and what was quoted on them: trading days, holidays, and prices by date as they were written. What moves a price is
//! the business of the rooms below.

/// Trading days and holidays.
pub mod calendar;
/// Prices by date, a series per factor.
pub mod prices;
/// From a table of dated prices to a history.
pub mod read_history;
/// How much time lies between the rows of a history.
pub mod spacing;
/// What looks odd in a history.
pub mod blemishes;

pub use blemishes::{Blemish, BlemishKind, Jump, blemishes};
pub use calendar::{date_after, read_holidays};
pub use prices::{History, Series};
pub use read_history::read_history;
pub use spacing::Spacing;
