//! Two roads to one number: the engine against scripts in numpy and scipy, and against itself by another way.

mod libraries;
mod reference;
mod transition;

/// Rows of a small table in `tests/engine/data`, after the header; commas inside quotes belong to the cell.
fn rows(table: &str) -> Vec<Vec<String>> {
    let mut reader = csv::Reader::from_reader(table.as_bytes());
    reader.records().map(|row| row.unwrap().iter().map(str::to_owned).collect()).collect()
}

fn number(cell: &str) -> f64 {
    cell.parse().unwrap()
}
