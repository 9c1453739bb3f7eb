//! Cholesky factor of a positive semi-definite matrix in its own order, without pivoting.
//! Never adds jitter: what is not semi-definite is refused with the pivot where it shows.

/// A scaled pivot this close to zero is zero.
const ZERO_PIVOT: f64 = 1e-9;
/// A scaled residual below a zero pivot may not exceed this: the column of a semi-definite matrix vanishes with its
/// pivot, up to the square root of the pivot's own rounding.
const ZERO_COLUMN: f64 = 1e-4;

/// The matrix is not positive semi-definite.
#[derive(Debug, Clone, Copy, PartialEq, thiserror::Error)]
#[error("pivot {pivot} is {value}")]
pub struct PivotFailure {
    /// Row at which it shows, from 0.
    pub pivot: usize,
    /// The negative pivot, or the residual that a zero pivot leaves, of the matrix scaled to unit diagonal.
    pub value: f64,
}

/// Lower triangular `C` with `C C' = matrix`, `n x n` row-major, for a symmetric `matrix` of the same shape.
///
/// The matrix is scaled to unit diagonal, factored row by row, and scaled back, so that the limits mean the same
/// whatever the units of the rows. A pivot within 1e-9 of zero is zero and so is its column. A row whose diagonal is
/// zero has no variance and stays zero.
///
/// # Errors
/// [`PivotFailure`] where a pivot lies below -1e-9 or a zero pivot leaves a residual above 1e-4 in its column.
pub fn factor(n: usize, matrix: &[f64]) -> Result<Vec<f64>, PivotFailure> {
    let scales: Vec<f64> = (0..n).map(|row| matrix[row * n + row].max(0.0).sqrt()).collect();
    let unit = |row: usize, column: usize| {
        let scale = scales[row] * scales[column];
        if scale > 0.0 { matrix[row * n + column] / scale } else { 0.0 }
    };
    let mut lower = vec![0.0; n * n];
    for column in 0..n {
        let residual = |lower: &[f64], row: usize| {
            let (left, right) = (&lower[row * n..row * n + column], &lower[column * n..column * n + column]);
            unit(row, column) - left.iter().zip(right).map(|(a, b)| a * b).sum::<f64>()
        };
        let pivot = residual(&lower, column);
        if pivot < -ZERO_PIVOT {
            return Err(PivotFailure { pivot: column, value: pivot });
        }
        if pivot <= ZERO_PIVOT {
            check_zero_column(column, (column + 1..n).map(|row| residual(&lower, row)))?;
            continue;
        }
        let root = pivot.sqrt();
        lower[column * n + column] = root;
        for row in column + 1..n {
            lower[row * n + column] = residual(&lower, row) / root;
        }
    }
    for (row, scale) in scales.iter().enumerate() {
        lower[row * n..(row + 1) * n].iter_mut().for_each(|entry| *entry *= scale);
    }
    Ok(lower)
}

fn check_zero_column(pivot: usize, residuals: impl Iterator<Item = f64>) -> Result<(), PivotFailure> {
    let largest = residuals.fold(0.0, |most: f64, residual| most.max(residual.abs()));
    if largest > ZERO_COLUMN { Err(PivotFailure { pivot, value: largest }) } else { Ok(()) }
}
