//! A correlation matrix of Brownian motions, valid once built.

/// Positive semi-definite (smallest eigenvalue at least -1e-9), symmetric, unit diagonal.
#[derive(Debug, Clone, PartialEq)]
pub struct Correlation {
    size: usize,
    cells: Vec<f64>,
}

impl Correlation {
    /// No correlation between `size` factors.
    pub fn identity(size: usize) -> Self {
        let cells = (0..size * size).map(|cell| if cell % (size + 1) == 0 { 1.0 } else { 0.0 }).collect();
        Self { size, cells }
    }

    /// Number of factors.
    pub fn size(&self) -> usize {
        self.size
    }

    /// Correlation of factors `row` and `column`.
    pub fn at(&self, row: usize, column: usize) -> f64 {
        self.cells[row * self.size + column]
    }
}
