//! Products of the columns of a tall matrix with each other, by the linear algebra library.

use faer::linalg::matmul::matmul;
use faer::{Accum, Mat, Par};

/// `sum_t w_t x_ti x_tj` for every pair of columns, n x n, row per column; weights of 1 where there are none. Columns are
/// equally long; what is to be taken off their means is taken off before.
pub fn gram(columns: &[Vec<f64>], weights: Option<&[f64]>) -> Vec<f64> {
    let (rows, n) = (columns.first().map_or(0, Vec::len), columns.len());
    let root = |row: usize| weights.map_or(1.0, |weights| weights[row].sqrt());
    let tall = Mat::from_fn(rows, n, |row, column| columns[column][row] * root(row));
    let mut product = Mat::<f64>::zeros(n, n);
    // One thread: a sum split by threads would depend on their number.
    matmul(&mut product, Accum::Replace, tall.transpose(), &tall, 1.0, Par::Seq);
    (0..n * n).map(|cell| product[(cell / n, cell % n)]).collect()
}
