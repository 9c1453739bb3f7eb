//! The line dragged to a day shows the figures of `ebbmark read` at that day, to the last digit.

use crate::crash::open_book;
use crate::screen::Window;
use crate::twin::Twin;
use crate::{Outcome, wait_for_file, write_book};
use serde_json::Value;
use std::path::Path;
use std::process::Command;

/// How far the line is dragged, points.
const DRAGGED: f32 = 170.0;

pub(crate) fn check(program: &Path, folder: &Path) -> Outcome<()> {
    let book = write_book(folder)?;
    let exported = export_by_hand(program, folder, &book)?;
    let rows = rows(&exported)?;
    let day = rows.iter().find(|row| row.measure == "horizon_days").ok_or("no day is exported")?.figures[0];
    let day = day.ok_or("no day is exported")?;
    let read = read(program, &book, day)?;
    let mut compared = 0;
    for row in &rows {
        let expected =
            expected(&read, row).ok_or_else(|| format!("{} is not in the reading", row.measure))?;
        if row.figures != expected {
            return Err(format!("{row:?} is exported, the reading has {expected:?}").into());
        }
        compared += row.figures.iter().flatten().count();
    }
    if compared < count_numbers(&read) {
        return Err(format!("only {compared} numbers of the reading are exported").into());
    }
    eprintln!("line: {compared} numbers at day {day} equal those of `ebbmark read` to the last digit");
    Ok(())
}

/// Opens the book, drags the line with the mouse, and exports the reading by the window's own button.
fn export_by_hand(program: &Path, folder: &Path, book: &Path) -> Outcome<String> {
    let twin = Twin::open();
    twin.open_book(book)?;
    let window = Window::open(program, &folder.join("line-state"))?;
    open_book(&window, book)?;
    let line = twin.place("Reading line");
    window.drag(line, line + egui::vec2(DRAGGED, 0.0))?;
    window.click(twin.place("Export…"))?;
    twin.click("Export…");
    window.click(twin.place("Reading as CSV…"))?;
    let path = folder.join("reading.csv");
    window.enter_path(&path)?;
    wait_for_file(&path)
}

/// A row of the exported CSV: value, low, high, standard error.
#[derive(Debug)]
struct Row {
    measure: String,
    confidence: Option<f64>,
    figures: [Option<f64>; 4],
}

fn rows(text: &str) -> Outcome<Vec<Row>> {
    let mut rows = Vec::new();
    for record in csv::Reader::from_reader(text.as_bytes()).records() {
        let record = record?;
        let cell = |at: usize| match record.get(at) {
            Some("") | None => Ok(None),
            Some(text) => text.parse::<f64>().map(Some),
        };
        let figures = [cell(2)?, cell(3)?, cell(4)?, cell(5)?];
        rows.push(Row { measure: record[0].to_owned(), confidence: cell(1)?, figures });
    }
    Ok(rows)
}

/// What the command answers for the book at a day.
fn read(program: &Path, book: &Path, day: f64) -> Outcome<Value> {
    let output = Command::new(program)
        .args(["read", "--json", "--quiet", "--horizon", &day.to_string(), "--positions"])
        .arg(book)
        .output()?;
    if !output.status.success() {
        return Err(String::from_utf8_lossy(&output.stderr).into_owned().into());
    }
    Ok(serde_json::from_slice(&output.stdout)?)
}

/// The same figures in the answer of the command.
fn expected(read: &Value, row: &Row) -> Option<[Option<f64>; 4]> {
    let at = |list: &Value| {
        let rows = list.as_array()?.iter();
        rows.clone().find(|found| found["confidence"].as_f64() == row.confidence).cloned()
    };
    let figures = |from: &Value, names: [&str; 4]| names.map(|name| from.get(name).and_then(Value::as_f64));
    let drawdown = &read["drawdown"];
    Some(match row.measure.as_str() {
        "horizon_days" => figures(&read["horizon"], ["days", "", "", ""]),
        "var" => figures(&at(&read["loss"])?, ["var", "var_low", "var_high", ""]),
        "es" => figures(&at(&read["loss"])?, ["es", "es_low", "es_high", ""]),
        "drawdown_mean" => figures(drawdown, ["mean", "", "", "mean_error"]),
        "drawdown" => figures(&at(&drawdown["quantiles"])?, ["value", "value_low", "value_high", ""]),
        "drawdown_mean_beyond" => {
            figures(&at(&drawdown["quantiles"])?, ["mean_beyond", "", "", "mean_beyond_error"])
        }
        "expected_change" => figures(&read["moments"], ["expected_change", "", "", ""]),
        moment => match moment.split_once('_')? {
            (name, "exact") => figures(read["moments"].get(name)?, ["exact", "", "", ""]),
            (name, "sampled") => figures(read["moments"].get(name)?, ["sampled", "", "", "standard_error"]),
            _ => return None,
        },
    })
}

/// Numbers of the parts that the export covers, confidences aside.
fn count_numbers(read: &Value) -> usize {
    fn count(value: &Value) -> usize {
        match value {
            Value::Number(_) => 1,
            Value::Array(items) => items.iter().map(count).sum(),
            Value::Object(fields) => {
                fields.iter().filter(|(name, _)| *name != "confidence").map(|(_, value)| count(value)).sum()
            }
            _ => 0,
        }
    }
    ["moments", "loss", "drawdown"].iter().map(|part| count(&read[*part])).sum()
}
