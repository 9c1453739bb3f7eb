//! What a file is, told by its header and never by its name.

use super::{Fault, Table};

/// The files that a book is made of.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Hash, PartialOrd, Ord)]
pub enum FileKind {
    /// What is held.
    Positions,
    /// Holdings known by their sensitivities.
    Exposures,
    /// Factors described once.
    Factors,
    /// Correlations of the factors.
    Correlation,
    /// Dated prices.
    History,
    /// Days without trading.
    Holidays,
    /// Limits on the figures.
    Limits,
}

impl FileKind {
    /// Tells the kind of a table.
    ///
    /// # Errors
    /// A fault at the header where it is none of them.
    pub fn of(table: &Table) -> Result<Self, Fault> {
        let names: Vec<String> = table.header.iter().map(|name| name.to_lowercase()).collect();
        let has = |name: &str| names.iter().any(|known| known == name);
        if has("measure") && has("limit") {
            Ok(Self::Limits)
        } else if has("holding") && (has("money") || has("per")) {
            Ok(Self::Exposures)
        } else if has("name") && (has("quantity") || has("price")) {
            Ok(Self::Positions)
        } else if is_square(table) {
            Ok(Self::Correlation)
        } else if has("factor") {
            Ok(Self::Factors)
        } else if has("date") {
            Ok(if names.len() == 1 { Self::Holidays } else { Self::History })
        } else {
            let found = format!("the columns {}", table.header.join(", "));
            let expected = "positions (name, quantity, price), exposures (holding, factor, money, per), factors (factor), a \
                            square correlation, a history (date and a column per factor), or holidays (date)";
            let place = table.place(Some(table.header_line), None);
            Err(Fault { place, found, expected: expected.to_owned() })
        }
    }

    /// As it is called in words.
    pub fn word(self) -> &'static str {
        match self {
            Self::Positions => "positions",
            Self::Exposures => "exposures",
            Self::Factors => "factors",
            Self::Correlation => "correlation",
            Self::History => "history",
            Self::Holidays => "holidays",
            Self::Limits => "limits",
        }
    }
}

/// A header without a word for its first column, or one that names the rows: a matrix.
fn is_square(table: &Table) -> bool {
    let (first, rest) = table.header.split_first().map_or(("", [].as_slice()), |(first, rest)| (first, rest));
    let names_rows = table.rows.iter().any(|row| rest.contains(&row.cells[0]));
    !rest.is_empty() && (first.is_empty() || names_rows)
}
