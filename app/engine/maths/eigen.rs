//! Eigenvalues of symmetric matrices, by the linear algebra library. They decide and diagnose; no path depends on them.

use faer::{Mat, Side};

/// Eigenvalues of an `n x n` row-major symmetric matrix, ascending; NaN, n of them, where the matrix is not finite.
pub fn symmetric_eigenvalues(n: usize, matrix: &[f64]) -> Vec<f64> {
    let dense = Mat::from_fn(n, n, |row, column| matrix[row * n + column]);
    dense.self_adjoint_eigenvalues(Side::Lower).unwrap_or_else(|_| vec![f64::NAN; n])
}
