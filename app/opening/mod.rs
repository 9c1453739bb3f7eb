//! Files become a book: bytes to text, text to tables, tables to inputs. Knows paths and roles;
//! knows no screen, no command line and no workspace.

use ebbmark_engine::book::{Exposure, Holding};
use ebbmark_engine::factors::{CorrelationTable, FactorRow, Inputs};
use ebbmark_engine::tables::{Faults, Notice};
use jiff::civil::Date;
use std::path::PathBuf;

/// What a file is read as.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum Role {
    /// `positions.csv`.
    Positions,
    /// `exposures.csv`.
    Exposures,
    /// `factors.csv`.
    Factors,
    /// `correlation.csv`.
    Correlation,
    /// `holidays.csv`.
    Holidays,
}

/// What some files hold; a part without a file is none.
#[derive(Debug, Clone, PartialEq, Default)]
pub struct Parts {
    /// Stem of the positions file.
    pub name: Option<String>,
    /// Rows of the positions file.
    pub holdings: Option<Vec<Holding>>,
    /// Rows of the exposures file.
    pub exposures: Option<Vec<Exposure>>,
    /// Rows of the factors file.
    pub factors: Option<Vec<FactorRow>>,
    /// The correlation file.
    pub correlation: Option<CorrelationTable>,
    /// Days without trading, ascending.
    pub holidays: Option<Vec<Date>>,
    /// What the readers want told.
    pub notices: Vec<Notice>,
}

/// A book as it was opened, before it is checked as a whole.
#[derive(Debug, Clone, PartialEq)]
pub struct Opened {
    /// Stem of the positions file.
    pub name: String,
    /// Everything that makes a model.
    pub inputs: Inputs,
    /// Days without trading, ascending; none where trading days are weekdays.
    pub holidays: Option<Vec<Date>>,
    /// The book's currency, where it is known beside the files: the built-in example's.
    pub book_currency: Option<String>,
    /// Date of the prices, where it is known beside the files: the built-in example's.
    pub as_of: Option<Date>,
    /// What the readers want told.
    pub notices: Vec<Notice>,
}

/// Reads files whose roles are told by their headers; two of one role are a fault.
///
/// # Errors
/// Every fault of every file.
pub fn read_files(_paths: &[PathBuf]) -> Result<Parts, Faults> {
    Ok(Parts::default())
}

/// Reads files whose roles the caller names.
///
/// # Errors
/// Every fault of every file.
pub fn read_named(_files: &[(Role, PathBuf)]) -> Result<Parts, Faults> {
    Ok(Parts::default())
}

impl Parts {
    /// The book of these parts.
    ///
    /// # Errors
    /// A fault where there are no positions.
    pub fn into_book(self) -> Result<Opened, Faults> {
        Ok(Opened {
            name: self.name.unwrap_or_default(),
            inputs: Inputs {
                holdings: self.holdings.unwrap_or_default(),
                exposures: self.exposures.unwrap_or_default(),
                factors: self.factors.unwrap_or_default(),
                correlation: self.correlation,
                files: Default::default(),
            },
            holidays: self.holidays,
            book_currency: None,
            as_of: None,
            notices: self.notices,
        })
    }
}

/// The book that is compiled in.
///
/// # Errors
/// None in a released program; a test reads it.
pub fn built_in_example() -> Result<Opened, Faults> {
    Parts::default().into_book()
}
