//! The correlation matrix as the document has it, possible or not, in the order of the model's factors. Draws nothing.

use crate::desk::session::Session;
use ebbmark_engine::factors::{CorrelationTable, RiskFactor};
use ebbmark_engine::maths::eigen::symmetric_eigenvalues;
use ebbmark_engine::maths::entry_range;
use egui::{Id, Ui};
use std::ops::RangeInclusive;

/// A matrix whose smallest eigenvalue lies below this is impossible.
pub const LEAST_EIGENVALUE: f64 = -1e-9;

/// Names and correlations, both triangles.
#[derive(Debug, Clone, PartialEq)]
pub struct Matrix<'a> {
    /// Factors, in the model's order.
    pub names: Vec<&'a String>,
    /// n x n, row per factor.
    pub cells: Vec<f64>,
}

impl<'a> Matrix<'a> {
    /// The document's matrix over the factors of the last valid model.
    pub fn of(session: &'a Session) -> Option<Self> {
        let factors = &session.live().model.as_deref()?.factors;
        let table = session.document().inputs.correlation.as_ref();
        let places: Vec<Option<Place>> = factors.iter().map(|factor| place(table, factor)).collect();
        let size = factors.len();
        let cells = (0..size * size).map(|at| entry(table, &places, at / size, at % size)).collect();
        Some(Self { names: factors.iter().map(|factor| &factor.name).collect(), cells })
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

    /// Smallest eigenvalue, worked out once for a matrix.
    pub fn smallest_eigenvalue(&self, ui: &Ui) -> f64 {
        let key = Id::unique("smallest eigenvalue");
        let known =
            ui.data(|data| data.get_temp::<(Vec<f64>, f64)>(key)).filter(|(cells, _)| *cells == self.cells);
        known.map_or_else(
            || {
                let eigenvalues = symmetric_eigenvalues(self.size(), &self.cells);
                let smallest = eigenvalues.first().copied().unwrap_or(f64::NAN);
                ui.data_mut(|data| data.insert_temp(key, (self.cells.clone(), smallest)));
                smallest
            },
            |(_, smallest)| smallest,
        )
    }
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

fn entry(table: Option<&CorrelationTable>, places: &[Option<Place>], row: usize, column: usize) -> f64 {
    if row == column {
        return 1.0;
    }
    match (table, places[row], places[column]) {
        (Some(table), Some(row), Some(column)) => {
            row.sign * column.sign * table.cells[row.row * table.names.len() + column.row]
        }
        _ => 0.0,
    }
}

/// Four decimals; more where it would round to zero.
pub fn eigenvalue_words(value: f64) -> String {
    let decimals = (4..12).find(|decimals| (value * 10f64.powi(*decimals)).round() != 0.0).unwrap_or(4);
    format!("{value:.*}", decimals as usize)
}
