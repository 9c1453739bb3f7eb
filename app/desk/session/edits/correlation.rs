//! Edits of the correlation table, which stays symmetric. Whether it is semi-definite is for the engine to say.

use super::{factors, holdings};
use ebbmark_engine::factors::{CorrelationTable, Inputs, Model};

/// Sets the correlation of two different factors, -1 to 1; factors the table did not have join it as the model has them,
/// so that nothing else moves.
pub fn set(inputs: &mut Inputs, model: Option<&Model>, pair: [&String; 2], value: f64) -> Option<()> {
    if pair[0] == pair[1] || !(-1.0..=1.0).contains(&value) {
        return None;
    }
    pair.into_iter().for_each(|factor| factors::straighten(inputs, model, factor));
    let table = inputs.correlation.get_or_insert_with(|| CorrelationTable {
        names: Vec::new(),
        cells: Vec::new(),
        lines: Vec::new(),
    });
    let [row, column] = pair.map(|name| place(table, model, name));
    let size = table.names.len();
    table.cells[row * size + column] = value;
    table.cells[column * size + row] = value;
    Some(())
}

/// Row of a factor, added where it has none.
fn place(table: &mut CorrelationTable, model: Option<&Model>, name: &str) -> usize {
    if let Some(row) = table.names.iter().position(|known| known == name) {
        return row;
    }
    let old = table.names.len();
    let size = old + 1;
    let cell = |row: usize, column: usize| match (row < old, column < old) {
        (true, true) => table.cells[row * old + column],
        _ if row == column => 1.0,
        _ => in_model(model, name, &table.names[row.min(column)]),
    };
    let cells = (0..size * size).map(|at| cell(at / size, at % size)).collect();
    table.cells = cells;
    table.names.push(name.to_owned());
    // A table with a row that no file has is no file's any more.
    table.lines.clear();
    old
}

/// Correlation of two factors in the last valid model; 0 where it lacks one of them.
fn in_model(model: Option<&Model>, one: &str, other: &str) -> f64 {
    let place = |model: &Model, name: &str| model.factors.iter().position(|factor| factor.name == name);
    let known = model.and_then(|model| Some(model.correlation.at(place(model, one)?, place(model, other)?)));
    known.unwrap_or(0.0)
}

/// Takes factors out of the table that nothing else names any more.
pub fn forget_unnamed(inputs: &mut Inputs, names: &[String]) {
    for name in names {
        if !holdings::is_factor_known(inputs, name)
            && let Some(table) = &mut inputs.correlation
        {
            remove(table, name);
        }
    }
}

fn remove(table: &mut CorrelationTable, name: &str) {
    let Some(gone) = table.names.iter().position(|known| known == name) else { return };
    let size = table.names.len();
    let mut at = 0;
    table.cells.retain(|_| {
        let kept = at / size != gone && at % size != gone;
        at += 1;
        kept
    });
    table.names.remove(gone);
    if gone < table.lines.len() {
        table.lines.remove(gone);
    }
}

/// Renames a factor whose shocks are now counted the other way round: its correlations change sign.
pub fn turn(table: &mut CorrelationTable, old: &str, new: &str) {
    let Some(turned) = table.names.iter().position(|known| known == old) else { return };
    let size = table.names.len();
    new.clone_into(&mut table.names[turned]);
    for other in (0..size).filter(|other| *other != turned) {
        table.cells[turned * size + other] *= -1.0;
        table.cells[other * size + turned] *= -1.0;
    }
}
