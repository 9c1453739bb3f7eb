//! What one entry of a correlation matrix may be while all others stay: the true interval, not a triple's.
//! Whether the matrix as it stands is semi-definite is not asked here.

use super::cholesky::factor;
use std::ops::RangeInclusive;

/// The values of entry (`row`, `column`) for which an `n x n` row-major symmetric matrix of unit diagonal is positive
/// semi-definite, all other entries as they are; none where no value will do, or on the diagonal.
///
/// With `S` the other rows, and `u`, `v` the rows of the Cholesky factor that `row` and `column` have over `S`,
///
/// ```text
/// u v - sqrt((1 - u u)(1 - v v))  <=  entry  <=  u v + sqrt((1 - u u)(1 - v v))
/// ```
///
/// since the last pivot is what `u`, `v` and the entry leave. Source: Schur complement of a 2 x 2 block (Horn and
/// Johnson, Matrix Analysis, section 7.7; from memory).
pub fn entry_range(n: usize, matrix: &[f64], row: usize, column: usize) -> Option<RangeInclusive<f64>> {
    if row == column || row >= n || column >= n {
        return None;
    }
    let others: Vec<usize> = (0..n).filter(|&other| other != row && other != column).collect();
    let over_others = |last: usize| {
        let order: Vec<usize> = others.iter().copied().chain([last]).collect();
        let size = order.len();
        let cells: Vec<f64> =
            order.iter().flat_map(|&r| order.iter().map(move |&c| matrix[r * n + c])).collect();
        factor(size, &cells).ok().map(|lower| lower[(size - 1) * size..size * size - 1].to_vec())
    };
    let (u, v) = (over_others(row)?, over_others(column)?);
    let dot = |a: &[f64], b: &[f64]| a.iter().zip(b).map(|(x, y)| x * y).sum::<f64>();
    let left = |a: &[f64]| (1.0 - dot(a, a)).max(0.0);
    let (middle, reach) = (dot(&u, &v), (left(&u) * left(&v)).sqrt());
    Some((middle - reach).clamp(-1.0, 1.0)..=(middle + reach).clamp(-1.0, 1.0))
}

#[cfg(test)]
mod tests {
    use super::*;

    fn check(matrix: &[f64], n: usize, row: usize, column: usize, expected: Option<(f64, f64)>) {
        let range = entry_range(n, matrix, row, column);
        match (range, expected) {
            (Some(range), Some((low, high))) => {
                assert!(
                    (range.start() - low).abs() < 1e-12 && (range.end() - high).abs() < 1e-12,
                    "{range:?}"
                );
            }
            (range, expected) => assert_eq!(range.is_some(), expected.is_some(), "{range:?}"),
        }
    }

    #[test]
    fn exact_range_of_a_triple() {
        // r12 r23 -/+ sqrt((1 - r12^2)(1 - r23^2)); (.9, .9) gives [.62, 1].
        let r = 0.9;
        check(&[1.0, r, -0.5, r, 1.0, r, -0.5, r, 1.0], 3, 0, 2, Some((0.62, 1.0)));
    }

    #[test]
    fn exact_range_without_others_is_everything() {
        check(&[1.0, 0.3, 0.3, 1.0], 2, 0, 1, Some((-1.0, 1.0)));
    }

    #[test]
    fn exact_range_beside_a_duplicate_is_a_point() {
        // The first two are one factor: the third correlates alike with both.
        check(&[1.0, 1.0, 0.9, 1.0, 1.0, 0.4, 0.9, 0.4, 1.0], 3, 0, 2, Some((0.4, 0.4)));
    }

    #[test]
    fn always_none_where_the_others_are_impossible() {
        let n = 4;
        let mut matrix = vec![0.0; n * n];
        let mut set = |r: usize, c: usize, value: f64| {
            matrix[r * n + c] = value;
            matrix[c * n + r] = value;
        };
        (0..n).for_each(|i| set(i, i, 1.0));
        set(0, 1, 0.95);
        set(1, 2, -0.9);
        set(0, 2, 0.2);
        check(&matrix, n, 0, 3, None);
    }

    #[test]
    fn always_none_on_the_diagonal() {
        check(&[1.0, 0.3, 0.3, 1.0], 2, 1, 1, None);
    }
}
