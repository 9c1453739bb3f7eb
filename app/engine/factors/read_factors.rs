//! From a table of factors to what it says about each.

use super::FactorRow;
use crate::book::description::{DESCRIPTION_COLUMNS, read_description, read_unit};
use crate::tables::{Cells, Columns, Faults, Notice, Table};

/// Reads `factors.csv`.
///
/// # Errors
/// Every bad cell of every row.
pub fn read_factors(table: &Table) -> Result<(Vec<FactorRow>, Vec<Notice>), Faults> {
    let known = [["factor", "level", "unit"].as_slice(), &DESCRIPTION_COLUMNS].concat();
    let columns = Columns::find(table, &known, &["factor"])?;
    let mut faults = table.faults.clone();
    let mut factors = Vec::new();
    for row in &table.rows {
        let mut cells = Cells::of(table, &columns, row, &mut faults);
        let name = cells.needed_text("factor", "the name of a factor");
        let level = cells.number("level");
        let unit = read_unit(&mut cells);
        let description = read_description(&mut cells);
        factors.extend(name.map(|name| FactorRow {
            name: name.to_owned(),
            level,
            unit,
            description,
            line: Some(row.line),
        }));
    }
    let notices = columns.notice_of_unknown(table).into_iter().collect();
    Faults::unless_any(faults, (factors, notices))
}
