//! What some files hold, part by part, until a book can be made of them.

use super::{OpenedHistory, Source};
use ebbmark_engine::book::{Exposure, Holding, read_exposures, read_positions};
use ebbmark_engine::factors::{
    CorrelationTable, FactorRow, FileLabels, Inputs, read_correlation, read_factors,
};
use ebbmark_engine::history::{read_history, read_holidays};
use ebbmark_engine::tables::{Fault, Faults, FileKind, Notice, Place, Table};
use jiff::civil::Date;

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
    /// Levels by date.
    pub history: Option<OpenedHistory>,
    /// Days without trading, ascending.
    pub holidays: Option<Vec<Date>>,
    /// Labels of the files.
    pub files: FileLabels,
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
    /// Levels of its factors by date.
    pub history: Option<OpenedHistory>,
    /// Days without trading, ascending; none where trading days are weekdays.
    pub holidays: Option<Vec<Date>>,
    /// The book's currency, where it is known beside the files: the built-in example's.
    pub book_currency: Option<String>,
    /// Date of the prices, where it is known beside the files: the built-in example's.
    pub as_of: Option<Date>,
    /// What the readers want told.
    pub notices: Vec<Notice>,
}

impl Parts {
    /// Takes in one file.
    ///
    /// # Errors
    /// Every fault of the file, or that there is one of its kind already, or that its kind is not read yet.
    pub(super) fn take(&mut self, kind: FileKind, source: &Source, table: &Table) -> Result<(), Faults> {
        let label = table.label.clone();
        let is_second =
            || Err(one_fault(table, &format!("a second file of {}", kind.word()), "one of each kind"));
        match kind {
            FileKind::Positions if self.holdings.is_some() => return is_second(),
            FileKind::Exposures if self.exposures.is_some() => return is_second(),
            FileKind::Factors if self.factors.is_some() => return is_second(),
            FileKind::Correlation if self.correlation.is_some() => return is_second(),
            FileKind::History if self.history.is_some() => return is_second(),
            FileKind::Holidays if self.holidays.is_some() => return is_second(),
            FileKind::Positions => {
                self.holdings = Some(self.told(read_positions(table)?));
                self.name = Some(source.stem.clone());
                self.files.positions = label;
            }
            FileKind::Exposures => {
                self.exposures = Some(self.told(read_exposures(table)?));
                self.files.exposures = label;
            }
            FileKind::Factors => {
                self.factors = Some(self.told(read_factors(table)?));
                self.files.factors = label;
            }
            FileKind::Correlation => {
                self.correlation = Some(read_correlation(table)?);
                self.files.correlation = label;
            }
            FileKind::Holidays => self.holidays = Some(self.told(read_holidays(table)?)),
            FileKind::History => {
                let history = self.told(read_history(table)?);
                let (path, hash) = (source.path.clone(), source.hash.clone());
                self.history = Some(OpenedHistory { path, hash, history });
            }
            FileKind::Limits => {
                let found = format!("a file of {}", kind.word());
                return Err(one_fault(
                    table,
                    &found,
                    "positions, exposures, factors, correlation, history or holidays: not yet",
                ));
            }
        }
        Ok(())
    }

    fn told<Rows>(&mut self, (rows, notices): (Rows, Vec<Notice>)) -> Rows {
        self.notices.extend(notices);
        rows
    }

    /// The book of these parts.
    ///
    /// # Errors
    /// A fault where there are no positions.
    pub fn into_book(self) -> Result<Opened, Faults> {
        let (Some(name), Some(holdings)) = (self.name, self.holdings) else {
            let place = Place::default();
            let expected = "a file of positions (name, quantity, price)".to_owned();
            return Err(Faults(vec![Fault { place, found: "no positions".to_owned(), expected }]));
        };
        let inputs = Inputs {
            holdings,
            exposures: self.exposures.unwrap_or_default(),
            factors: self.factors.unwrap_or_default(),
            correlation: self.correlation,
            files: self.files,
        };
        let (history, holidays, notices) = (self.history, self.holidays, self.notices);
        Ok(Opened { name, inputs, history, holidays, book_currency: None, as_of: None, notices })
    }
}

fn one_fault(table: &Table, found: &str, expected: &str) -> Faults {
    let place = table.place(Some(table.header_line), None);
    Faults(vec![Fault { place, found: found.to_owned(), expected: expected.to_owned() }])
}
