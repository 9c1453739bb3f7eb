//! Widgets that change a number or a text in place: named for those who cannot see them, with their unit,
//! and reporting a change only when it is meant. They know no session: panels turn changes into commands.

/// Numbers with units.
pub mod number;
/// Rows of fixed columns.
pub mod row;
/// Text, names and paths.
pub mod text;

pub use number::{NumberField, Shown};
pub use number::{read_figure, shown_figure};
pub use row::{field_row_ui, row_ui, widths};
pub use text::{CommittedText, optional_figure_ui, search_ui, title_ui};
