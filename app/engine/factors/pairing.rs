//! From a correlation file to the correlation of a model's factors: names found, rates turned, what is missing told.

use super::currencies::inverse_rate;
use super::{Correlation, CorrelationTable, Fitted, Inputs, RiskFactor};
use crate::tables::{Fault, Notice, NoticeLevel, Place};

/// The correlation of these factors, in their order.
pub(super) fn pair_up(
    inputs: &Inputs,
    fitted: Option<&Fitted>,
    factors: &[RiskFactor],
    notices: &mut Vec<Notice>,
) -> Result<Correlation, Vec<Fault>> {
    let typed = inputs.correlation.as_ref();
    let fitted = fitted.and_then(|fitted| fitted.correlation.as_ref());
    if let Some(table) = typed {
        let faults = [strangers(inputs, table, factors), both_ways(inputs, table, factors)].concat();
        if !faults.is_empty() {
            return Err(faults);
        }
    }
    let sources: Vec<Source<'_>> =
        [typed, fitted].into_iter().flatten().map(|table| Source::of(table, factors)).collect();
    notices.extend(unpaired(factors, &sources));
    let n = factors.len();
    let cells = (0..n * n).map(|cell| {
        let (row, column) = (cell / n, cell % n);
        let known = sources.iter().find_map(|source| source.at(row, column));
        if row == column { 1.0 } else { known.unwrap_or(0.0) }
    });
    Correlation::new(n, cells.collect()).map_err(|error| {
        let factor = &factors[error.factor].name;
        let place =
            Place { file: inputs.files.correlation.clone(), line: None, column: Some(factor.clone()) };
        let eigenvalue = plain_decimal(error.smallest_eigenvalue);
        let found = format!("a matrix that is not positive semi-definite (smallest eigenvalue {eigenvalue})");
        let expected = format!("correlations that can hold together; it shows at {factor}");
        vec![Fault { place, found, expected }]
    })
}

/// A table of correlations, and where each factor of the model stands in it.
struct Source<'a> {
    table: &'a CorrelationTable,
    rows: Vec<Option<(usize, f64)>>,
}

impl<'a> Source<'a> {
    fn of(table: &'a CorrelationTable, factors: &[RiskFactor]) -> Self {
        Self { table, rows: factors.iter().map(|factor| row_of(table, &factor.name)).collect() }
    }

    /// Correlation of two factors; none where the table lacks one of them.
    fn at(&self, row: usize, column: usize) -> Option<f64> {
        let ((r, sign), (c, other)) = (self.rows[row]?, self.rows[column]?);
        Some(sign * other * self.table.cells[r * self.table.names.len() + c])
    }
}

/// Row of a factor in the table and the sign that it is read with: -1 for a rate given the other way round.
fn row_of(table: &CorrelationTable, name: &str) -> Option<(usize, f64)> {
    let find = |name: &str| table.names.iter().position(|known| known == name);
    find(name).map(|row| (row, 1.0)).or_else(|| Some((find(&inverse_rate(name)?)?, -1.0)))
}

/// Names of the table that nothing in the inputs knows.
fn strangers(inputs: &Inputs, table: &CorrelationTable, factors: &[RiskFactor]) -> Vec<Fault> {
    let is_known = |name: &str| {
        let is_factor = |name: &str| factors.iter().any(|factor| factor.name == name);
        let is_row = inputs.factors.iter().any(|row| row.name == name);
        is_factor(name) || is_row || inverse_rate(name).is_some_and(|other| is_factor(&other))
    };
    let unknown = table.names.iter().enumerate().filter(|(_, name)| !is_known(name));
    unknown
        .map(|(row, name)| Fault {
            place: cell_place(inputs, table, row),
            found: format!("`{name}`"),
            expected: "the name of a factor of the book".to_owned(),
        })
        .collect()
}

/// Rates that the table has both ways round.
fn both_ways(inputs: &Inputs, table: &CorrelationTable, factors: &[RiskFactor]) -> Vec<Fault> {
    let find = |name: &str| table.names.iter().position(|known| known == name);
    let is_factor = |name: &str| factors.iter().any(|factor| factor.name == name);
    factors
        .iter()
        .filter(|factor| find(&factor.name).is_some())
        .filter_map(|factor| inverse_rate(&factor.name).filter(|other| !is_factor(other)))
        .filter_map(|other| find(&other).map(|row| (row, other)))
        .map(|(row, other)| Fault {
            place: cell_place(inputs, table, row),
            found: format!("`{other}` beside the same rate the other way round"),
            expected: "the rate one way".to_owned(),
        })
        .collect()
}

fn cell_place(inputs: &Inputs, table: &CorrelationTable, row: usize) -> Place {
    Place {
        file: inputs.files.correlation.clone(),
        line: table.lines.get(row).copied(),
        column: table.names.get(row).cloned(),
    }
}

/// Factors that no source pairs with any other.
fn unpaired(factors: &[RiskFactor], sources: &[Source<'_>]) -> Option<Notice> {
    let missing =
        factors.iter().enumerate().filter(|(at, _)| sources.iter().all(|source| source.rows[*at].is_none()));
    let names: Vec<&str> = missing.map(|(_, factor)| factor.name.as_str()).collect();
    let text = match sources {
        [] if factors.len() > 1 => {
            "No correlation is given: all factors are taken as uncorrelated.".to_owned()
        }
        [] => return None,
        _ if names.is_empty() => return None,
        _ => format!(
            "Neither in the correlation file nor fitted, so taken as uncorrelated: {}.",
            names.join(", ")
        ),
    };
    Some(Notice { level: NoticeLevel::Warning, text })
}

/// A small number with four places, more where it would round to zero.
fn plain_decimal(number: f64) -> String {
    (4..=12)
        .map(|places| format!("{number:.places$}"))
        .find(|text| text.bytes().any(|digit| (b'1'..=b'9').contains(&digit)))
        .unwrap_or_else(|| format!("{number:.12}"))
}
