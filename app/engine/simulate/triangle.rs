//! A triangular matrix packed for multiplying many paths at once, and that multiplication. Each entry of a product is
//! summed in ascending order of its columns by fused multiply-adds, so the digits don't depend on the instruction set.

use super::elementary::{LANES, Lanes};
use pulp::Simd;

/// Rows worked at once: their sums fit the registers beside one column of paths.
const ROWS: usize = 4;
/// Vectors of paths worked at once.
const VECTORS: usize = 2;

/// A triangular matrix cut into strips of [`ROWS`] rows; a strip holds its nonzero columns one after another.
#[derive(Debug, Clone)]
pub(super) struct Triangle {
    strips: Vec<Strip>,
}

#[derive(Debug, Clone)]
struct Strip {
    first_column: usize,
    columns: Vec<[f64; ROWS]>,
}

impl Triangle {
    /// Of a lower triangular `n x n` row-major matrix.
    pub(super) fn lower(n: usize, matrix: &[f64]) -> Self {
        Self::pack(n, |first_row| 0..(first_row + ROWS).min(n), |row, column| matrix[row * n + column])
    }

    /// Of the transpose of a lower triangular `n x n` row-major matrix.
    pub(super) fn transposed(n: usize, matrix: &[f64]) -> Self {
        Self::pack(n, |first_row| first_row..n, |row, column| matrix[column * n + row])
    }

    fn pack(
        n: usize,
        columns: impl Fn(usize) -> std::ops::Range<usize>,
        at: impl Fn(usize, usize) -> f64,
    ) -> Self {
        let entry = |row: usize, column| if row < n { at(row, column) } else { 0.0 };
        let strip = |first_row: usize| Strip {
            first_column: columns(first_row).start,
            columns: columns(first_row)
                .map(|column| std::array::from_fn(|row| entry(first_row + row, column)))
                .collect(),
        };
        Self { strips: (0..n).step_by(ROWS).map(strip).collect() }
    }

    /// `rows = matrix x rows` for a lower triangle, from the last strip up: what a strip overwrites, no strip above it
    /// needs. `rows` has room for whole strips.
    #[inline(always)]
    pub(super) fn multiply_in_place<S: Simd>(&self, simd: S, rows: &mut [Lanes]) {
        for (number, strip) in self.strips.iter().enumerate().rev() {
            for first in (0..LANES / S::F64_LANES).step_by(VECTORS) {
                let sums = strip.product(simd, rows, first);
                for (row, sum) in rows[number * ROWS..].iter_mut().zip(sums) {
                    let vectors = S::as_mut_simd_f64s(&mut row.0).0;
                    vectors[first..first + VECTORS].copy_from_slice(&sum);
                }
            }
        }
    }

    /// `|matrix x input|^2` of each path.
    #[inline(always)]
    pub(super) fn square_norm<S: Simd>(&self, simd: S, input: &[Lanes]) -> Lanes {
        let mut norm = Lanes::splat(0.0);
        for first in (0..LANES / S::F64_LANES).step_by(VECTORS) {
            let mut total = [simd.splat_f64s(0.0); VECTORS];
            for strip in &self.strips {
                for sum in strip.product(simd, input, first) {
                    for (total, entry) in total.iter_mut().zip(sum) {
                        *total = simd.mul_add_f64s(entry, entry, *total);
                    }
                }
            }
            S::as_mut_simd_f64s(&mut norm.0).0[first..first + VECTORS].copy_from_slice(&total);
        }
        norm
    }

    /// Rows that a product needs room for.
    pub(super) fn padded_rows(&self) -> usize {
        self.strips.len() * ROWS
    }
}

impl Strip {
    #[inline(always)]
    fn product<S: Simd>(&self, simd: S, input: &[Lanes], first: usize) -> [[S::f64s; VECTORS]; ROWS] {
        let mut sums = [[simd.splat_f64s(0.0); VECTORS]; ROWS];
        for (column, entries) in input[self.first_column..].iter().zip(&self.columns) {
            let vectors = S::as_simd_f64s(&column.0).0;
            let (left, right) = (vectors[first], vectors[first + 1]);
            for (sum, entry) in sums.iter_mut().zip(entries) {
                let entry = simd.splat_f64s(*entry);
                sum[0] = simd.mul_add_f64s(entry, left, sum[0]);
                sum[1] = simd.mul_add_f64s(entry, right, sum[1]);
            }
        }
        sums
    }
}
