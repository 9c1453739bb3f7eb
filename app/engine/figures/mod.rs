//! Charts as finished descriptions: axes, marks, roles, words. No colours, no pixels.

/// Amounts in words and figures.
pub mod amounts;
/// Amounts of one book, with the digits that their errors allow.
pub mod money;
/// What a figure is made of.
pub mod figure;
/// Round numbers along an axis.
pub mod ticks;
/// What a book's charts are drawn from.
pub mod subject;
/// The book's value ahead and its distribution at the reading line.
pub mod value;
/// The largest fall so far and its distribution.
pub mod fall;
/// The loss distribution at the reading line.
pub mod loss;
/// Whole figures for the page.
pub mod page;
/// Where a parameter range comes from.
pub mod sources;

pub use amounts::{Scale, grouped, percent};
pub use figure::{Anchor, Axis, Figure, Mark, Panel, Place, Role, Span, Tick};
pub use money::{Money, confidence_words, half_range, row_at, signed};
pub use page::{CAUTION, distribution_figure, horizon_figure};
pub use sources::source_words;
pub use subject::Subject;

/// Ticks that a panel has room for.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub struct Room {
    /// Along the bottom.
    pub across: usize,
    /// Along a side.
    pub up: usize,
}

/// "Book value ahead, EUR m".
fn with_unit(title: &str, unit: &str) -> String {
    if unit.is_empty() { title.to_owned() } else { format!("{title}, {unit}") }
}

/// "21 trading days".
fn days_words(day: u32) -> String {
    if day == 1 { "1 trading day".to_owned() } else { format!("{day} trading days") }
}
