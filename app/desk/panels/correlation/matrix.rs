//! The correlation matrix as the document has it, possible or not, its factors in the order that the view asks for. Typed
//! cells stand as typed, the others as the model has them; a repaired matrix as repaired. Draws nothing.

use crate::desk::session::Session;
use crate::workspace::MatrixOrder;
use ebbmark_engine::factors::{CorrelationTable, Model, RiskFactor};
use ebbmark_engine::maths::{entry_range, leaf_order, symmetric_eigenvalues};
use egui::{Id, Ui};
use std::ops::RangeInclusive;

/// A matrix whose smallest eigenvalue lies below this is impossible.
pub const LEAST_EIGENVALUE: f64 = -1e-9;

/// Names and correlations, both triangles.
#[derive(Debug, Clone, PartialEq)]
pub struct Matrix<'a> {
    /// Factors, in the order of the view.
    pub names: Vec<&'a String>,
    /// n x n, row per factor.
    pub cells: Vec<f64>,
}

impl<'a> Matrix<'a> {
    /// The matrix over the factors of the last valid model.
    pub fn of(ui: &Ui, session: &'a Session) -> Option<Self> {
        let model = session.live().model.as_deref()?;
        let is_repaired = model.repair.is_some() && !session.live().is_before_edit;
        let table = session.document().inputs.correlation.as_ref().filter(|_| !is_repaired);
        let places: Vec<Option<Place>> = model.factors.iter().map(|factor| place(table, factor)).collect();
        let size = model.factors.len();
        let entry = |row, column| entry(table, &places, model, row, column);
        let cells = (0..size * size).map(|at| entry(at / size, at % size)).collect();
        let matrix = Self { names: model.factors.iter().map(|factor| &factor.name).collect(), cells };
        Some(match session.view().matrix_order {
            MatrixOrder::Book => matrix,
            MatrixOrder::Group => matrix.in_order(&by_group(session, model)),
            MatrixOrder::Closeness => {
                let order = matrix.by_closeness(ui);
                matrix.in_order(&order)
            }
        })
    }

    fn in_order(self, order: &[usize]) -> Self {
        let size = self.size();
        let cell = |at: usize| self.cells[order[at / size] * size + order[at % size]];
        let cells = (0..size * size).map(cell).collect();
        Self { names: order.iter().map(|at| self.names[*at]).collect(), cells }
    }

    /// Like beside like: distances `sqrt(2 (1 - rho))`, worked out once for a matrix.
    fn by_closeness(&self, ui: &Ui) -> Vec<usize> {
        remembered(ui, "order by closeness", &self.cells, || {
            let distances: Vec<f64> =
                self.cells.iter().map(|rho| (2.0 * (1.0 - rho)).max(0.0).sqrt()).collect();
            leaf_order(self.size(), &distances)
        })
    }

    /// Number of factors.
    pub fn size(&self) -> usize {
        self.names.len()
    }

    /// Correlation of two factors.
    pub fn at(&self, row: usize, column: usize) -> f64 {
        self.cells[row * self.size() + column]
    }

    /// What a cell may be while all others stay.
    pub fn legal(&self, row: usize, column: usize) -> Option<RangeInclusive<f64>> {
        entry_range(self.size(), &self.cells, row, column)
    }

    /// Smallest and largest eigenvalue, worked out once for a matrix.
    pub fn eigenvalue_ends(&self, ui: &Ui) -> (f64, f64) {
        remembered(ui, "ends of the eigenvalues", &self.cells, || {
            let eigenvalues = symmetric_eigenvalues(self.size(), &self.cells);
            let end = |value: Option<&f64>| value.copied().unwrap_or(f64::NAN);
            (end(eigenvalues.first()), end(eigenvalues.last()))
        })
    }
}

/// What was worked out for these cells before, else what `work` makes of them.
fn remembered<T: Clone + Send + Sync + 'static>(
    ui: &Ui,
    what: &str,
    cells: &[f64],
    work: impl FnOnce() -> T,
) -> T {
    let key = Id::unique(what);
    let known = ui.data(|data| data.get_temp::<(Vec<f64>, T)>(key)).filter(|(known, _)| known == cells);
    known.map_or_else(
        || {
            let made = work();
            ui.data_mut(|data| data.insert_temp(key, (cells.to_vec(), made.clone())));
            made
        },
        |(_, made)| made,
    )
}

/// Factors by the group of the first holding that each drives, those of one group as in the book.
fn by_group(session: &Session, model: &Model) -> Vec<usize> {
    let holdings = &session.document().inputs.holdings;
    let group = |factor: &RiskFactor| {
        let driven =
            holdings.iter().find(|holding| holding.factor.as_ref().unwrap_or(&holding.name) == &factor.name);
        // Factors without a group of their own, currency rates among them, come last.
        driven.map_or_else(|| "\u{10ffff}".to_owned(), |holding| holding.group.clone())
    };
    let groups: Vec<String> = model.factors.iter().map(group).collect();
    let mut order: Vec<usize> = (0..groups.len()).collect();
    order.sort_by(|one, other| groups[*one].cmp(&groups[*other]));
    order
}

/// A factor's row in the table, and the sign of its shocks there.
#[derive(Clone, Copy)]
struct Place {
    row: usize,
    sign: f64,
}

/// A currency rate may be described the other way round; its correlations then change sign.
fn place(table: Option<&CorrelationTable>, factor: &RiskFactor) -> Option<Place> {
    let row = |name: &str| table?.names.iter().position(|known| known == name);
    let turned = || {
        let (foreign, own) = factor.name.split_once('/').filter(|_| factor.is_inverted)?;
        row(&format!("{own}/{foreign}"))
    };
    let straight = row(&factor.name).map(|row| Place { row, sign: 1.0 });
    straight.or_else(|| turned().map(|row| Place { row, sign: -1.0 }))
}

fn entry(
    table: Option<&CorrelationTable>,
    places: &[Option<Place>],
    model: &Model,
    row: usize,
    column: usize,
) -> f64 {
    match (table, places[row], places[column]) {
        _ if row == column => 1.0,
        (Some(table), Some(row), Some(column)) => {
            row.sign * column.sign * table.cells[row.row * table.names.len() + column.row]
        }
        _ => model.correlation.at(row, column),
    }
}

/// Four decimals; more where it would round to zero.
pub fn eigenvalue_words(value: f64) -> String {
    let decimals = (4..12).find(|decimals| (value * 10f64.powi(*decimals)).round() != 0.0).unwrap_or(4);
    format!("{value:.*}", decimals as usize)
}
