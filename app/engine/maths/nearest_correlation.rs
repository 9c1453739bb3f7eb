//! The correlation matrix nearest to a symmetric matrix of unit diagonal that is none.

use super::eigen::{Symmetric, symmetric_eigenvalues};

/// Sweeps after which the search is given up.
const MOST_SWEEPS: usize = 5_000;
/// Largest change of a cell in a sweep at which the search ends.
const TOLERANCE: f64 = 1e-10;
/// Eigenvalues of the answer are lifted to this: it is singular by construction, and rounding must not make it less.
const FLOOR: f64 = 1e-10;
/// The same where cells are held, which can't be lifted afterwards: well above the tolerance of the search.
const FLOOR_WITH_HELD: f64 = 1e-8;
/// What rounding may leave below zero.
const ROUNDING: f64 = -1e-9;

/// A valid matrix near an impossible one.
#[derive(Debug, Clone, PartialEq)]
pub struct Nearest {
    /// n x n: symmetric, unit diagonal, positive semi-definite; cells that were held are as they were.
    pub cells: Vec<f64>,
    /// Frobenius norm of the change, `sqrt(sum (after - before)^2)` over all cells, unweighted.
    pub distance: f64,
    /// Sweeps that it took; 0 where the matrix was valid.
    pub sweeps: usize,
}

/// Why there is no valid matrix.
#[derive(Debug, Clone, Copy, PartialEq, Eq, thiserror::Error)]
pub enum NearestError {
    /// A cell or a weight is no finite number, or a weight is not above 0.
    #[error("a cell or weight that is not finite")]
    NotFinite,
    /// The held cells can't hold together, or only just.
    #[error("the cells that are held can't hold together")]
    Held,
}

/// The nearest correlation matrix by alternating projections with Dykstra's correction, in the norm
/// `sum w_i w_j (x_ij - a_ij)^2` where `weights` are given (one a row, above 0: a dear row moves less). `held` cells, and
/// their mirrors, stay as they are. A valid matrix comes back to the bit.
///
/// # Errors
/// [`NearestError`].
///
/// Sources: Higham (2002), Computing the nearest correlation matrix, IMA J. Numerical Analysis 22; held cells after Higham
/// and Strabic (2016), Anderson acceleration of the alternating projections method, Numerical Algorithms 72.
pub fn nearest_correlation(
    n: usize,
    matrix: &[f64],
    weights: Option<&[f64]>,
    held: &[(usize, usize)],
) -> Result<Nearest, NearestError> {
    let is_weight = |weight: &f64| weight.is_finite() && *weight > 0.0;
    let are_weights = weights.is_none_or(|weights| weights.iter().all(is_weight));
    if !are_weights || matrix.iter().any(|cell| !cell.is_finite()) {
        return Err(NearestError::NotFinite);
    }
    let has_unit_diagonal = (0..n).all(|at| matrix[at * n + at] == 1.0);
    if has_unit_diagonal && symmetric_eigenvalues(n, matrix).first().is_none_or(|smallest| *smallest >= 0.0) {
        return Ok(Nearest { cells: matrix.to_vec(), distance: 0.0, sweeps: 0 });
    }
    let search = Search { n, matrix, roots: roots(n, weights), held: cells_of(n, held) };
    let (cells, sweeps) = search.alternate();
    let cells = search.lifted(cells)?;
    let squares: f64 = cells.iter().zip(matrix).map(|(after, before)| (after - before).powi(2)).sum();
    Ok(Nearest { cells, distance: squares.sqrt(), sweeps })
}

/// `sqrt(w_i)`.
fn roots(n: usize, weights: Option<&[f64]>) -> Vec<f64> {
    weights.map_or_else(|| vec![1.0; n], |weights| weights.iter().map(|weight| weight.sqrt()).collect())
}

/// Places of the held cells, both triangles.
fn cells_of(n: usize, held: &[(usize, usize)]) -> Vec<usize> {
    held.iter().flat_map(|(row, column)| [row * n + column, column * n + row]).collect()
}

struct Search<'a> {
    n: usize,
    matrix: &'a [f64],
    roots: Vec<f64>,
    held: Vec<usize>,
}

impl Search<'_> {
    fn alternate(&self) -> (Vec<f64>, usize) {
        let mut correction = vec![0.0; self.n * self.n];
        let mut cells = self.matrix.to_vec();
        for sweep in 1..=MOST_SWEEPS {
            let shifted: Vec<f64> = cells.iter().zip(&correction).map(|(cell, off)| cell - off).collect();
            let definite = self.onto_semi_definite(&shifted);
            for ((off, after), before) in correction.iter_mut().zip(&definite).zip(&shifted) {
                *off = after - before;
            }
            let next = self.onto_fixed(definite);
            let change = cells.iter().zip(&next).map(|(old, new)| (old - new).abs()).fold(0.0, f64::max);
            cells = next;
            if change < TOLERANCE {
                return (cells, sweep);
            }
        }
        (cells, MOST_SWEEPS)
    }

    /// Nearest semi-definite matrix in the weighted norm: eigenvalues of `W^(1/2) A W^(1/2)` below zero are dropped.
    fn onto_semi_definite(&self, matrix: &[f64]) -> Vec<f64> {
        let n = self.n;
        let scale = |cell: usize| self.roots[cell / n] * self.roots[cell % n];
        let scaled: Vec<f64> = matrix.iter().enumerate().map(|(at, cell)| cell * scale(at)).collect();
        let floor = if self.held.is_empty() { 0.0 } else { FLOOR_WITH_HELD };
        let positive = Symmetric::of(n, &scaled).with_eigenvalues(|value| value.max(floor));
        positive.iter().enumerate().map(|(at, cell)| cell / scale(at)).collect()
    }

    /// Nearest matrix with unit diagonal and the held cells as they were.
    fn onto_fixed(&self, mut cells: Vec<f64>) -> Vec<f64> {
        (0..self.n).for_each(|at| cells[at * self.n + at] = 1.0);
        self.held.iter().for_each(|at| cells[*at] = self.matrix[*at]);
        cells
    }

    /// Lifts what rounding left below zero: a floor under the eigenvalues and a new unit diagonal. Where cells are held
    /// the search itself kept above a floor, or the held cells allow no valid matrix.
    fn lifted(&self, cells: Vec<f64>) -> Result<Vec<f64>, NearestError> {
        let n = self.n;
        if !self.held.is_empty() {
            let smallest = symmetric_eigenvalues(n, &cells).first().copied().unwrap_or(0.0);
            return if smallest >= ROUNDING { Ok(cells) } else { Err(NearestError::Held) };
        }
        let lifted = Symmetric::of(n, &cells).with_eigenvalues(|value| value.max(FLOOR));
        let cell = |at: usize| {
            let (row, column) = (at / n, at % n);
            let scale = (lifted[row * n + row] * lifted[column * n + column]).sqrt();
            if row == column { 1.0 } else { (lifted[at] / scale).clamp(-1.0, 1.0) }
        };
        Ok((0..n * n).map(cell).collect())
    }
}
