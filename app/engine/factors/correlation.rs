//! A correlation matrix of Brownian motions, valid once built. Whose motions they are is the model's business.

use crate::maths::{cholesky, eigen};

/// An eigenvalue this far below zero is rounding of the file's digits, not an impossible matrix.
const SMALLEST_EIGENVALUE: f64 = -1e-9;

/// Positive semi-definite (smallest eigenvalue at least -1e-9), symmetric, unit diagonal.
#[derive(Debug, Clone, PartialEq)]
pub struct Correlation {
    size: usize,
    cells: Vec<f64>,
    smallest_eigenvalue: f64,
    largest_eigenvalue: f64,
}

/// No set of Brownian motions has these correlations.
#[derive(Debug, Clone, Copy, PartialEq, thiserror::Error)]
#[error("the smallest eigenvalue is {smallest_eigenvalue}")]
pub struct CorrelationError {
    /// Smallest eigenvalue, below zero.
    pub smallest_eigenvalue: f64,
    /// Factor at which it shows: the first whose pivot fails in the factors' own order.
    pub factor: usize,
}

impl Correlation {
    /// Of `size` factors, from `cells`: size x size, row per factor, symmetric with unit diagonal.
    ///
    /// # Errors
    /// [`CorrelationError`] where the smallest eigenvalue lies below -1e-9.
    pub fn new(size: usize, cells: Vec<f64>) -> Result<Self, CorrelationError> {
        let eigenvalues = eigen::symmetric_eigenvalues(size, &cells);
        let smallest_eigenvalue = eigenvalues.first().copied().unwrap_or(1.0);
        let largest_eigenvalue = eigenvalues.last().copied().unwrap_or(1.0);
        if smallest_eigenvalue < SMALLEST_EIGENVALUE {
            let failed = cholesky::factor(size, &cells).err();
            let factor = failed.map_or(size.saturating_sub(1), |failure| failure.pivot);
            return Err(CorrelationError { smallest_eigenvalue, factor });
        }
        Ok(Self { size, cells, smallest_eigenvalue, largest_eigenvalue })
    }

    /// No correlation between `size` factors.
    pub fn identity(size: usize) -> Self {
        let cells = (0..size * size).map(|cell| if cell % (size + 1) == 0 { 1.0 } else { 0.0 }).collect();
        Self { size, cells, smallest_eigenvalue: 1.0, largest_eigenvalue: 1.0 }
    }

    /// Number of factors.
    pub fn size(&self) -> usize {
        self.size
    }

    /// Correlation of factors `row` and `column`.
    pub fn at(&self, row: usize, column: usize) -> f64 {
        self.cells[row * self.size + column]
    }

    /// size x size, row per factor.
    pub fn cells(&self) -> &[f64] {
        &self.cells
    }

    /// Smallest eigenvalue; 1 where there is no factor.
    pub fn smallest_eigenvalue(&self) -> f64 {
        self.smallest_eigenvalue
    }

    /// Largest eigenvalue over the smallest; none where the smallest is not above zero.
    pub fn condition_number(&self) -> Option<f64> {
        (self.smallest_eigenvalue > 0.0).then(|| self.largest_eigenvalue / self.smallest_eigenvalue)
    }
}
