//! From the text of files to a model: what is read, what is refused and where, and what two ways of writing the same
//! book have in common.

mod blemishes;
mod cells;
mod currencies;
mod correlations;
mod factors;
mod history;
mod holdings;
mod sensitivities;

use ebbmark_engine::book::{read_exposures, read_positions};
use ebbmark_engine::factors::{FileLabels, Inputs, Model, ModelSettings, read_correlation, read_factors};
use ebbmark_engine::tables::{Faults, Table};

/// Texts of the files of a book; empty where there is no such file.
#[derive(Debug, Clone, Copy, Default)]
struct Texts<'a> {
    positions: &'a str,
    exposures: &'a str,
    factors: &'a str,
    correlation: &'a str,
    currency: Option<&'a str>,
}

fn inputs(texts: Texts<'_>) -> Result<Inputs, Faults> {
    let table = |text: &str, label: &str| (!text.is_empty()).then(|| Table::read(text, label)).transpose();
    let exposures =
        table(texts.exposures, "exposures.csv")?.map(|table| read_exposures(&table)).transpose()?;
    let factors = table(texts.factors, "factors.csv")?.map(|table| read_factors(&table)).transpose()?;
    let correlation = table(texts.correlation, "correlation.csv")?.map(|table| read_correlation(&table));
    Ok(Inputs {
        holdings: read_positions(&Table::read(texts.positions, "positions.csv")?)?.0,
        exposures: exposures.unwrap_or_default().0,
        factors: factors.unwrap_or_default().0,
        correlation: correlation.transpose()?,
        files: FileLabels {
            positions: "positions.csv".into(),
            exposures: "exposures.csv".into(),
            factors: "factors.csv".into(),
            correlation: "correlation.csv".into(),
        },
    })
}

fn model(texts: Texts<'_>) -> Result<Model, Faults> {
    let book_currency = texts.currency.map(str::to_owned);
    Model::assemble(
        &inputs(texts)?,
        &ModelSettings { book_currency, days_per_year: 252.0, repairs_correlation: false },
    )
}

/// A book of positions alone.
fn positions(text: &str) -> Texts<'_> {
    Texts { positions: text, ..Texts::default() }
}

/// Asserts that a book is refused with these words, a line each, in this order.
#[track_caller]
fn refused(texts: Texts<'_>, expected: &[&str]) {
    let faults = model(texts).err().unwrap_or_else(|| panic!("{} is not refused", texts.positions));
    let lines: Vec<String> = faults.0.iter().map(ToString::to_string).collect();
    assert_eq!(lines.len(), expected.len(), "{faults}");
    for (line, words) in lines.iter().zip(expected) {
        assert!(line.contains(words), "{line}\ndoes not say\n{words}");
    }
}
