//! The cells of one row by column name, each read as what it should be: a value, nothing, or a fault with its place.

use super::{Fault, Faults, Notice, NoticeLevel, ParsedNumber, Row, Table};
use jiff::civil::Date;

/// Where the known columns stand in a table, whatever their order and case.
#[derive(Debug, Clone)]
pub struct Columns {
    at: Vec<(&'static str, usize)>,
    unknown: Vec<usize>,
}

impl Columns {
    /// Finds `known` columns in a header.
    ///
    /// # Errors
    /// A column given twice, or one of `needed` that is missing.
    pub fn find(table: &Table, known: &[&'static str], needed: &[&str]) -> Result<Self, Faults> {
        let place = |column: &str| table.place(Some(table.header_line), Some(column));
        let names: Vec<String> = table.header.iter().map(|name| name.to_lowercase()).collect();
        let mut faults = Vec::new();
        for (at, name) in names.iter().enumerate() {
            if !name.is_empty() && names[..at].contains(name) {
                let found = format!("the column `{}` a second time", table.header[at]);
                faults.push(Fault { place: place(&table.header[at]), found, expected: "it once".to_owned() });
            }
        }
        for name in needed.iter().filter(|name| !names.iter().any(|known| known == *name)) {
            let found = format!("no column `{name}`");
            faults.push(Fault {
                place: place(name),
                found,
                expected: format!("a column `{name}` in the header"),
            });
        }
        if !faults.is_empty() {
            return Err(Faults(faults));
        }
        let find =
            |column: &&'static str| names.iter().position(|name| name == column).map(|at| (*column, at));
        let unknown = (0..names.len()).filter(|at| !known.contains(&names[*at].as_str())).collect();
        Ok(Self { at: known.iter().filter_map(find).collect(), unknown })
    }

    /// Names the columns that are not known, where there are any.
    pub fn notice_of_unknown(&self, table: &Table) -> Option<Notice> {
        let names: Vec<String> = self.unknown.iter().map(|at| format!("`{}`", table.header[*at])).collect();
        let (columns, are) = if names.len() == 1 { ("column", "is") } else { ("columns", "are") };
        (!names.is_empty()).then(|| Notice {
            level: NoticeLevel::Info,
            text: format!(
                "{}: the {columns} {} {are} not known; kept, not used.",
                table.label,
                names.join(", ")
            ),
        })
    }

    /// Names and cells of the unknown columns of a row, empty ones left out.
    pub fn unknown_cells(&self, table: &Table, row: &Row) -> Vec<(String, String)> {
        let filled = self.unknown.iter().filter(|at| !row.cells[**at].is_empty());
        filled.map(|at| (table.header[*at].clone(), row.cells[*at].clone())).collect()
    }
}

/// One row of a table; what is wrong with its cells is gathered.
#[derive(Debug)]
pub struct Cells<'table, 'faults> {
    table: &'table Table,
    columns: &'table Columns,
    row: &'table Row,
    faults: &'faults mut Vec<Fault>,
}

impl<'table, 'faults> Cells<'table, 'faults> {
    /// The cells of `row`.
    pub fn of(
        table: &'table Table,
        columns: &'table Columns,
        row: &'table Row,
        faults: &'faults mut Vec<Fault>,
    ) -> Self {
        Self { table, columns, row, faults }
    }

    /// Line of the row.
    pub fn line(&self) -> usize {
        self.row.line
    }

    /// Notes that `found` stands in `column` where `expected` should.
    pub fn fault(&mut self, column: &str, found: impl Into<String>, expected: impl Into<String>) {
        let place = self.table.place(Some(self.row.line), Some(column));
        self.faults.push(Fault { place, found: found.into(), expected: expected.into() });
    }

    /// What stands in a column; none where it is empty or there is no such column.
    pub fn text(&self, column: &str) -> Option<&'table str> {
        let (_, at) = self.columns.at.iter().find(|(name, _)| *name == column)?;
        Some(self.row.cells[*at].as_str()).filter(|cell| !cell.is_empty())
    }

    /// What must stand in a column.
    pub fn needed_text(&mut self, column: &str, expected: &str) -> Option<&'table str> {
        let text = self.text(column);
        if text.is_none() {
            self.fault(column, "nothing", expected);
        }
        text
    }

    /// A number that may carry a `%`.
    pub fn figure(&mut self, column: &str) -> Option<ParsedNumber> {
        self.read(column, Table::figure)
    }

    /// A number without a `%`.
    pub fn number(&mut self, column: &str) -> Option<f64> {
        self.read(column, Table::number)
    }

    fn read<T>(&mut self, column: &str, read: fn(&Table, &str) -> Result<T, &'static str>) -> Option<T> {
        let text = self.text(column)?;
        read(self.table, text).map_err(|expected| self.fault(column, format!("`{text}`"), expected)).ok()
    }

    /// A number that must be there.
    pub fn needed_number(&mut self, column: &str, expected: &str) -> Option<f64> {
        self.needed_text(column, expected)?;
        self.number(column)
    }

    /// One of some words, in any case.
    pub fn word<T: Copy>(&mut self, column: &str, words: &[(&str, T)]) -> Option<T> {
        let text = self.text(column)?;
        let found = words.iter().find(|(word, _)| word.eq_ignore_ascii_case(text));
        if found.is_none() {
            let known: Vec<&str> = words.iter().map(|(word, _)| *word).collect();
            self.fault(column, format!("`{text}`"), format!("one of {}", known.join(", ")));
        }
        found.map(|(_, value)| *value)
    }

    /// A date like 2026-03-31.
    pub fn date(&mut self, column: &str) -> Option<Date> {
        let text = self.text(column)?;
        let date = text.parse::<Date>().ok().filter(|_| text.len() == 10);
        if date.is_none() {
            self.fault(column, format!("`{text}`"), "a date like 2026-03-31");
        }
        date
    }
}
