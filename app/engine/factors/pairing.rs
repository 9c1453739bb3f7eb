//! From a correlation file to the correlation of a model's factors: names found, rates turned, what is missing told.

use super::currencies::inverse_rate;
use super::{Correlation, CorrelationTable, Fitted, Inputs, Repair, RiskFactor};
use crate::tables::{Fault, Notice, NoticeLevel, Place};

/// The correlation of these factors, in their order, and the repair that made it where one did: typed pairs, else fitted
/// ones. Where fitted pairs don't go with typed ones the fitted give way; typed ones only where `is_repaired` says so.
pub(super) fn pair_up(
    inputs: &Inputs,
    fitted: Option<&Fitted>,
    factors: &[RiskFactor],
    is_repaired: bool,
    notices: &mut Vec<Notice>,
) -> Result<(Correlation, Option<Repair>), Vec<Fault>> {
    let typed = inputs.correlation.as_ref();
    let fitted = fitted.and_then(|fitted| fitted.correlation.as_ref());
    if let Some(table) = typed {
        let faults = [strangers(inputs, table, factors), both_ways(inputs, table, factors)].concat();
        if !faults.is_empty() {
            return Err(faults);
        }
    }
    let [typed, fitted] = [typed, fitted].map(|table| table.map(|table| Source::of(table, factors)));
    notices.extend(unpaired(factors, &[typed.as_ref(), fitted.as_ref()]));
    let n = factors.len();
    let of =
        |source: &Option<Source<'_>>, row, column| source.as_ref().and_then(|source| source.at(row, column));
    let known = |row: usize, column: usize| of(&typed, row, column).or_else(|| of(&fitted, row, column));
    let cells: Vec<f64> = (0..n * n)
        .map(|cell| if cell % (n + 1) == 0 { 1.0 } else { known(cell / n, cell % n).unwrap_or(0.0) })
        .collect();
    let error = match Correlation::new(n, cells.clone()) {
        Ok(correlation) => return Ok((correlation, None)),
        Err(error) => error,
    };
    let held: Vec<(usize, usize)> = (0..n)
        .flat_map(|row| (0..row).map(move |column| (row, column)))
        .filter(|(row, column)| of(&typed, *row, *column).is_some())
        .collect();
    let names: Vec<&str> = factors.iter().map(|factor| factor.name.as_str()).collect();
    let repair =
        |held: &[(usize, usize)]| Repair::of(&names, &cells, error.smallest_eigenvalue, None, held).ok();
    let has_fitted_pairs = fitted.is_some() && held.len() < n * (n - 1) / 2;
    let by_fitted = if has_fitted_pairs { repair(&held) } else { None };
    match by_fitted.or_else(|| if is_repaired { repair(&[]) } else { None }) {
        Some(repair) => {
            notices.push(Notice { level: NoticeLevel::Warning, text: repair.words() });
            Ok((repair.correlation.clone(), Some(repair)))
        }
        None => Err(vec![impossible(inputs, &factors[error.factor].name, error.smallest_eigenvalue)]),
    }
}

fn impossible(inputs: &Inputs, factor: &str, smallest_eigenvalue: f64) -> Fault {
    let eigenvalue = plain_decimal(smallest_eigenvalue);
    Fault {
        place: Place { file: inputs.files.correlation.clone(), line: None, column: Some(factor.to_owned()) },
        found: format!("a matrix that is not positive semi-definite (smallest eigenvalue {eigenvalue})"),
        expected: format!(
            "correlations that can hold together; it shows at {factor}; --repair takes the nearest valid matrix"
        ),
    }
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
fn unpaired(factors: &[RiskFactor], sources: &[Option<&Source<'_>>; 2]) -> Option<Notice> {
    let is_lacking = |at: usize| sources.iter().flatten().all(|source| source.rows[at].is_none());
    let missing = factors.iter().enumerate().filter(|(at, _)| is_lacking(*at));
    let names: Vec<&str> = missing.map(|(_, factor)| factor.name.as_str()).collect();
    let names = names.join(", ");
    let text = match sources {
        [None, None] if factors.len() > 1 => {
            "No correlation is given: all factors are taken as uncorrelated.".to_owned()
        }
        [None, None] => return None,
        _ if names.is_empty() => return None,
        [Some(_), None] => format!("Not in the correlation file, so taken as uncorrelated: {names}."),
        _ => {
            format!("Neither in the correlation file nor in the history, so taken as uncorrelated: {names}.")
        }
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
