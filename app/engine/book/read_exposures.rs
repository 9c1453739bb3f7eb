//! From a table of exposures to sensitivities. Whether their holdings and factors exist is asked when the model is made.

use super::{Exposure, Per};
use crate::tables::{Cells, Columns, Faults, Notice, Table};

const COLUMNS: [&str; 4] = ["holding", "factor", "money", "per"];
const MOVES: [(&str, Per); 3] =
    [("+1%", Per::OnePercent), ("+1bp", Per::OneBasisPoint), ("+1.00", Per::OneUnit)];

/// Reads `exposures.csv`.
///
/// # Errors
/// Every bad cell of every row.
pub fn read_exposures(table: &Table) -> Result<(Vec<Exposure>, Vec<Notice>), Faults> {
    let columns = Columns::find(table, &COLUMNS, &COLUMNS)?;
    let mut faults = table.faults.clone();
    let mut exposures = Vec::new();
    for row in &table.rows {
        let mut cells = Cells::of(table, &columns, row, &mut faults);
        let holding = cells.needed_text("holding", "the name of an exposure holding");
        let factor = cells.needed_text("factor", "the name of a factor");
        let money = cells.needed_number("money", "money per move");
        let per = cells.needed_text("per", "+1%, +1bp or +1.00").and_then(|_| read_move(&mut cells));
        if let (Some(holding), Some(factor), Some(money), Some(per)) = (holding, factor, money, per) {
            let (holding, factor) = (holding.to_owned(), factor.to_owned());
            exposures.push(Exposure { holding, factor, money, per, line: Some(row.line) });
        }
    }
    let notices = columns.notice_of_unknown(table).into_iter().collect();
    Faults::unless_any(faults, (exposures, notices))
}

/// The words of the page, and `+1,00` where a comma is the decimal sign.
fn read_move(cells: &mut Cells<'_, '_>) -> Option<Per> {
    if cells.text("per") == Some("+1,00") { Some(Per::OneUnit) } else { cells.word("per", &MOVES) }
}
