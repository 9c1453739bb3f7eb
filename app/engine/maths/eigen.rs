//! Eigenvalues of symmetric matrices, by the linear algebra library. They decide and diagnose; no path depends on them.

use faer::{Mat, Side};

/// Eigenvalues of an `n x n` row-major symmetric matrix, ascending; NaN, n of them, where the matrix is not finite.
pub fn symmetric_eigenvalues(n: usize, matrix: &[f64]) -> Vec<f64> {
    dense(n, matrix).self_adjoint_eigenvalues(Side::Lower).unwrap_or_else(|_| vec![f64::NAN; n])
}

/// A symmetric matrix as `U diag(s) U'`.
#[derive(Debug, Clone)]
pub struct Symmetric {
    vectors: Mat<f64>,
    values: Vec<f64>,
}

impl Symmetric {
    /// Of an `n x n` row-major symmetric matrix; eigenvalues NaN where it is not finite.
    pub fn of(n: usize, matrix: &[f64]) -> Self {
        match dense(n, matrix).self_adjoint_eigen(Side::Lower) {
            Ok(eigen) => {
                let values = (0..n).map(|at| eigen.S()[at]).collect();
                Self { vectors: eigen.U().to_owned(), values }
            }
            Err(_) => Self { vectors: Mat::identity(n, n), values: vec![f64::NAN; n] },
        }
    }

    /// The matrix with other eigenvalues on the same vectors, row-major.
    pub fn with_eigenvalues(&self, of: impl Fn(f64) -> f64) -> Vec<f64> {
        let n = self.values.len();
        let roots: Vec<f64> = self.values.iter().map(|value| of(*value)).collect();
        let scaled = Mat::from_fn(n, n, |row, column| self.vectors[(row, column)] * roots[column]);
        let product = scaled * self.vectors.transpose();
        (0..n * n).map(|cell| (product[(cell / n, cell % n)] + product[(cell % n, cell / n)]) / 2.0).collect()
    }
}

fn dense(n: usize, matrix: &[f64]) -> Mat<f64> {
    Mat::from_fn(n, n, |row, column| matrix[row * n + column])
}
