//! Text cut into lines and cells: the separator and the decimal comma recognised, the header apart, every row as long as
//! the header. What the columns mean is the reader's business.

use super::number;
use super::{Fault, Faults, ParsedNumber, Place};

/// A delimited file.
#[derive(Debug, Clone, PartialEq)]
pub struct Table {
    /// The reader's name for the file.
    pub label: String,
    /// Column names as written, surrounding blanks taken off; at least one.
    pub header: Vec<String>,
    /// Rows below the header, each with as many cells as the header.
    pub rows: Vec<Row>,
    /// Line of the header.
    pub header_line: usize,
    /// Rows that are longer or shorter than the header, for a reader to report beside its own faults.
    pub faults: Vec<Fault>,
    has_decimal_comma: bool,
}

/// One row.
#[derive(Debug, Clone, PartialEq)]
pub struct Row {
    /// Line in the file, from 1.
    pub line: usize,
    /// Cells, surrounding blanks taken off.
    pub cells: Vec<String>,
}

impl Table {
    /// Cuts UTF-8 text, a byte-order mark tolerated. The separator is the one of comma, semicolon and tab that the header
    /// line has most of. With the other two a comma is a decimal one, provided no number in the file has a point.
    ///
    /// # Errors
    /// An empty file, or one that is no delimited text. A row with fewer or more cells than the header (empty cells at
    /// the end excepted) is among [`Table::faults`] instead of the rows.
    pub fn read(text: &str, label: &str) -> Result<Self, Faults> {
        let text = text.strip_prefix('\u{feff}').unwrap_or(text);
        let separator = separator(text);
        let mut rows = cut(text, separator, label)?.into_iter();
        let Some(first) = rows.next() else {
            return Err(Faults(vec![fault(label, None, "an empty file", "a header row and rows below it")]));
        };
        let mut header = first.cells;
        drop_empty_end(&mut header, 1);
        let (mut kept, mut faults) = (Vec::new(), Vec::new());
        for mut row in rows {
            drop_empty_end(&mut row.cells, header.len());
            if row.cells.len() == header.len() {
                kept.push(row);
            } else {
                let found = format!("{} cells", row.cells.len());
                let expected = format!("{} as in the header", header.len());
                faults.push(fault(label, Some(row.line), &found, &expected));
            }
        }
        let has_point = kept.iter().flat_map(|row| &row.cells).any(|cell| number::has_point(cell));
        let has_decimal_comma = separator != b',' && !has_point;
        let label = label.to_owned();
        Ok(Self { label, header, rows: kept, header_line: first.line, faults, has_decimal_comma })
    }

    /// [`Table::read`] for bytes.
    ///
    /// # Errors
    /// As [`Table::read`], and bytes that are not UTF-8, with the line where it shows.
    pub fn from_bytes(bytes: &[u8], label: &str) -> Result<Self, Faults> {
        match std::str::from_utf8(bytes) {
            Ok(text) => Self::read(text, label),
            Err(error) => {
                let line = 1 + bytes[..error.valid_up_to()].iter().filter(|byte| **byte == b'\n').count();
                let expected = "UTF-8 text: save the file again with that encoding";
                Err(Faults(vec![fault(label, Some(line), "bytes that are not UTF-8", expected)]))
            }
        }
    }

    /// Reads a cell as a plain number.
    ///
    /// # Errors
    /// What was expected instead.
    pub fn number(&self, text: &str) -> Result<f64, &'static str> {
        let number = self.figure(text)?;
        if number.has_percent_sign { Err("a number without %") } else { Ok(number.value) }
    }

    /// Reads a cell as a number that may carry a `%`.
    ///
    /// # Errors
    /// What was expected instead.
    pub fn figure(&self, text: &str) -> Result<ParsedNumber, &'static str> {
        number::parse(text, self.has_decimal_comma)
    }

    /// A place in this file.
    pub fn place(&self, line: Option<usize>, column: Option<&str>) -> Place {
        Place { file: self.label.clone(), line, column: column.map(str::to_owned) }
    }
}

/// Lines and cells; lines that are blank throughout are no rows.
fn cut(text: &str, separator: u8, label: &str) -> Result<Vec<Row>, Faults> {
    let mut reader = csv::ReaderBuilder::new()
        .has_headers(false)
        .flexible(true)
        .delimiter(separator)
        .from_reader(text.as_bytes());
    let (mut rows, mut faults) = (Vec::new(), Vec::new());
    let mut lines = Lines { text: text.as_bytes(), at: 0, line: 1 };
    for record in reader.records() {
        match record {
            Ok(record) => {
                let line = lines.of(record.position().map_or(0, |position| position.byte() as usize));
                let cells: Vec<String> = record.iter().map(|cell| cell.trim().to_owned()).collect();
                if !(cells.len() == 1 && cells[0].is_empty()) {
                    rows.push(Row { line, cells });
                }
            }
            Err(error) => faults.push(fault(label, None, &error.to_string(), "delimited text")),
        }
    }
    if faults.is_empty() { Ok(rows) } else { Err(Faults(faults)) }
}

/// Counts lines up to ever later places.
struct Lines<'a> {
    text: &'a [u8],
    at: usize,
    line: usize,
}

impl Lines<'_> {
    /// Line of the record that begins at or after `place`: line ends before it, of the record before or of blank lines,
    /// belong to none.
    fn of(&mut self, place: usize) -> usize {
        while let Some(byte) =
            self.text.get(self.at).filter(|byte| self.at < place || matches!(byte, b'\r' | b'\n'))
        {
            self.line += usize::from(*byte == b'\n');
            self.at += 1;
        }
        self.line
    }
}

fn separator(text: &str) -> u8 {
    let line = text.lines().find(|line| !line.trim().is_empty()).unwrap_or_default();
    let mut is_quoted = false;
    let mut counts = [(b',', 0), (b';', 0), (b'\t', 0)];
    for byte in line.bytes() {
        is_quoted ^= byte == b'"';
        for (separator, count) in &mut counts {
            *count += usize::from(!is_quoted && byte == *separator);
        }
    }
    // The first of equals wins: a comma where nothing separates.
    counts.iter().rev().max_by_key(|(_, count)| *count).map_or(b',', |(separator, _)| *separator)
}

fn drop_empty_end(cells: &mut Vec<String>, least: usize) {
    while cells.len() > least && cells.last().is_some_and(String::is_empty) {
        cells.pop();
    }
}

fn fault(label: &str, line: Option<usize>, found: &str, expected: &str) -> Fault {
    let place = Place { file: label.to_owned(), line, column: None };
    Fault { place, found: found.to_owned(), expected: expected.to_owned() }
}
