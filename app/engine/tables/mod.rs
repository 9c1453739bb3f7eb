//! Delimited text with places. Knows cells, lines and columns; knows nothing of what they mean.

/// Where something went wrong in the input, and what is worth telling.
pub mod fault;
/// Text cut into lines and cells.
pub mod table;
/// What a file is, told by its header.
pub mod kind;
/// The cells of one row by column name, each read as what it should be.
pub mod cells;
mod number;

pub use cells::{Cells, Columns};
pub use fault::{Fault, Faults, Notice, NoticeLevel, Place};
pub use kind::FileKind;
pub use number::ParsedNumber;
pub use table::{Row, Table};
