//! From a square table to a symmetric matrix of unit diagonal. Whether it is semi-definite, and whether its names are
//! factors of the book, is asked when the model is made.

use super::CorrelationTable;
use crate::tables::{Fault, Faults, Table};

/// Two cells of one pair may differ by this: rounding of the program that wrote them.
const SYMMETRY: f64 = 1e-12;

/// Reads `correlation.csv`: factor names in the first column and the header row, in any order; one triangle may be
/// blank. The matrix comes back in the order of the rows.
///
/// # Errors
/// Every cell that is no number, lies outside [-1, 1], differs from its mirror or misses with it, a diagonal other than
/// 1, a name given twice, and names that stand only in the header or only in the first column.
pub fn read_correlation(table: &Table) -> Result<CorrelationTable, Faults> {
    let mut reading = Reading { table, faults: table.faults.clone() };
    reading.check_names();
    if !reading.faults.is_empty() {
        return Err(Faults(reading.faults));
    }
    let names: Vec<String> = table.rows.iter().map(|row| row.cells[0].clone()).collect();
    let columns: Vec<usize> = names.iter().filter_map(|name| reading.column_of(name)).collect();
    let written: Vec<Option<f64>> = (0..names.len())
        .flat_map(|row| columns.iter().map(move |column| (row, *column)))
        .map(|(row, column)| reading.entry(row, column))
        .collect();
    if !reading.faults.is_empty() {
        return Err(Faults(reading.faults));
    }
    let cells = reading.mirror(&names, &written);
    let lines = table.rows.iter().map(|row| row.line).collect();
    if reading.faults.is_empty() {
        Ok(CorrelationTable { names, cells, lines })
    } else {
        Err(Faults(reading.faults))
    }
}

struct Reading<'a> {
    table: &'a Table,
    faults: Vec<Fault>,
}

impl Reading<'_> {
    fn fault(&mut self, line: usize, column: Option<&str>, found: String, expected: &str) {
        let place = self.table.place(Some(line), column);
        self.faults.push(Fault { place, found, expected: expected.to_owned() });
    }

    fn column_of(&self, name: &str) -> Option<usize> {
        self.table.header.iter().skip(1).position(|known| known == name).map(|at| at + 1)
    }

    fn check_names(&mut self) {
        let table = self.table;
        for (at, name) in table.header.iter().enumerate().skip(1) {
            let line = table.header_line;
            if name.is_empty() {
                self.fault(line, None, format!("no name over column {}", at + 1), "the name of a factor");
            } else if table.header[1..at].contains(name) {
                self.fault(line, Some(name), format!("`{name}` a second time"), "each factor once");
            } else if !table.rows.iter().any(|row| row.cells[0] == *name) {
                self.fault(line, Some(name), format!("`{name}` without a row"), "a square of factors");
            }
        }
        for (at, row) in table.rows.iter().enumerate() {
            let name = &row.cells[0];
            if name.is_empty() {
                self.fault(row.line, None, "no name".to_owned(), "the name of a factor");
            } else if table.rows[..at].iter().any(|other| other.cells[0] == *name) {
                self.fault(row.line, Some(name), format!("`{name}` a second time"), "each factor once");
            } else if self.column_of(name).is_none() {
                self.fault(row.line, Some(name), format!("`{name}` without a column"), "a square of factors");
            }
        }
        if table.rows.is_empty() {
            self.fault(table.header_line, None, "no row".to_owned(), "a square of factors");
        }
    }

    fn entry(&mut self, row: usize, column: usize) -> Option<f64> {
        let (row, name) = (&self.table.rows[row], &self.table.header[column]);
        let text = row.cells[column].as_str();
        if text.is_empty() {
            return None;
        }
        let value = match self.table.number(text) {
            Ok(value) => value,
            Err(expected) => {
                self.fault(row.line, Some(name), format!("`{text}`"), expected);
                return None;
            }
        };
        let is_diagonal = row.cells[0] == *name;
        if is_diagonal && value != 1.0 {
            self.fault(row.line, Some(name), format!("`{text}` on the diagonal"), "1");
        } else if !(-1.0..=1.0).contains(&value) {
            self.fault(row.line, Some(name), format!("`{text}`"), "a correlation from -1 to 1");
        }
        Some(value)
    }

    /// Fills blank cells from their mirrors.
    fn mirror(&mut self, names: &[String], written: &[Option<f64>]) -> Vec<f64> {
        let n = names.len();
        let mut cells = vec![0.0; n * n];
        for row in 0..n {
            cells[row * n + row] = 1.0;
            for column in 0..row {
                let line = self.table.rows[row].line;
                let pair = (written[row * n + column], written[column * n + row]);
                let value = match pair {
                    (Some(value), None) | (None, Some(value)) => value,
                    (Some(value), Some(other)) => {
                        if (value - other).abs() > SYMMETRY {
                            let found =
                                format!("{value} against {other} for {} and {}", names[row], names[column]);
                            self.fault(line, Some(&names[column]), found, "the same in both triangles");
                        }
                        value
                    }
                    (None, None) => {
                        let found = format!("nothing for {} and {}", names[row], names[column]);
                        self.fault(
                            line,
                            Some(&names[column]),
                            found,
                            "their correlation, in one of the triangles",
                        );
                        0.0
                    }
                };
                cells[row * n + column] = value;
                cells[column * n + row] = value;
            }
        }
        cells
    }
}
