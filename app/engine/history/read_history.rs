//! From a table of dated prices to a history: every bad cell at its place. Whether the prices make sense is told elsewhere,
//! and which factors a book needs is not asked.

use super::{History, Series};
use crate::tables::{Cells, Columns, Fault, Faults, Notice, NoticeLevel, Row, Table};
use jiff::civil::Date;

const DATE: &str = "date";

/// Reads `history.csv`: `date` and a column per factor, dates strictly increasing, a blank cell where nothing was quoted.
/// Rows that are blank throughout are left out, with a notice that counts them.
///
/// # Errors
/// Every cell that is no plain finite number, every date that is none or not later than the one before; a column given
/// twice or without a name; a file without a date column, without a price column or without a price.
pub fn read_history(table: &Table) -> Result<(History, Vec<Notice>), Faults> {
    let columns = Columns::find(table, &[DATE], &[DATE])?;
    let prices = price_columns(table)?;
    let mut reading = Reading::of(table, &prices);
    for row in &table.rows {
        reading.read_row(&columns, row);
    }
    reading.finish()
}

/// Where the prices stand: every column but the date.
fn price_columns(table: &Table) -> Result<Vec<usize>, Faults> {
    let is_price = |at: &usize| !table.header[*at].eq_ignore_ascii_case(DATE);
    let prices: Vec<usize> = (0..table.header.len()).filter(is_price).collect();
    let unnamed = prices.iter().filter(|at| table.header[**at].is_empty());
    let mut faults: Vec<Fault> = unnamed
        .map(|at| header_fault(table, &format!("no name over column {}", at + 1), "the name of a factor"))
        .collect();
    if prices.is_empty() {
        faults.push(header_fault(table, "no column but the date", "a column of prices per factor"));
    }
    Faults::unless_any(faults, prices)
}

fn header_fault(table: &Table, found: &str, expected: &str) -> Fault {
    let place = table.place(Some(table.header_line), None);
    Fault { place, found: found.to_owned(), expected: expected.to_owned() }
}

/// What has been read so far.
struct Reading<'a> {
    table: &'a Table,
    prices: &'a [usize],
    history: History,
    /// The date above and its line.
    above: Option<(Date, usize)>,
    blank_rows: usize,
    faults: Vec<Fault>,
}

impl<'a> Reading<'a> {
    fn of(table: &'a Table, prices: &'a [usize]) -> Self {
        let empty = |at: &usize| Series { name: table.header[*at].clone(), values: Vec::new() };
        let series = prices.iter().map(empty).collect();
        let history = History { label: table.label.clone(), dates: Vec::new(), lines: Vec::new(), series };
        Self { table, prices, history, above: None, blank_rows: 0, faults: table.faults.clone() }
    }

    fn read_row(&mut self, columns: &Columns, row: &Row) {
        let is_blank = self.prices.iter().all(|at| row.cells[*at].is_empty());
        let date = self.read_date(columns, row, is_blank);
        if is_blank {
            self.blank_rows += 1;
            return;
        }
        for index in 0..self.prices.len() {
            let value = self.read_price(row, self.prices[index]);
            self.history.series[index].values.push(value);
        }
        // A row without a date is a fault, and its history is never handed out.
        self.history.dates.extend(date);
        self.history.lines.push(row.line);
    }

    /// The date of a row, which may only be missing where all else is.
    fn read_date(&mut self, columns: &Columns, row: &Row, is_blank: bool) -> Option<Date> {
        let mut cells = Cells::of(self.table, columns, row, &mut self.faults);
        if !is_blank {
            cells.needed_text(DATE, "a date like 2026-03-31");
        }
        let date = cells.date(DATE)?;
        match self.above {
            Some((above, line)) if above == date => {
                cells.fault(DATE, format!("{date} as in line {line}"), "each date once");
            }
            Some((above, line)) if above > date => {
                let found = format!("{date} after {above} in line {line}");
                cells.fault(DATE, found, "rows in order of date, the oldest first");
            }
            _ => {}
        }
        self.above = Some((date, row.line));
        Some(date)
    }

    fn read_price(&mut self, row: &Row, at: usize) -> Option<f64> {
        let text = row.cells[at].as_str();
        if text.is_empty() {
            return None;
        }
        let fault = |expected: &str| Fault {
            place: self.table.place(Some(row.line), Some(&self.table.header[at])),
            found: format!("`{text}`"),
            expected: format!("{expected}, or nothing where there is no price"),
        };
        self.table.number(text).map_err(|expected| self.faults.push(fault(expected))).ok()
    }

    fn finish(mut self) -> Result<(History, Vec<Notice>), Faults> {
        if self.history.dates.is_empty() && self.faults.is_empty() {
            let found = if self.blank_rows == 0 { "no row below the header" } else { "no price in any row" };
            self.faults.push(header_fault(self.table, found, "a date and prices in each row"));
        }
        let notices = notice_of_blank_rows(&self.table.label, self.blank_rows).into_iter().collect();
        Faults::unless_any(self.faults, (self.history, notices))
    }
}

fn notice_of_blank_rows(label: &str, count: usize) -> Option<Notice> {
    let rows = if count == 1 {
        "1 row has no price and is".to_owned()
    } else {
        format!("{count} rows have no price and are")
    };
    let text = format!("{label}: {rows} left out.");
    (count > 0).then_some(Notice { level: NoticeLevel::Info, text })
}
