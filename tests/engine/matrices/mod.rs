//! Matrices: nearest correlation, shrinkage, products; against printed matrices and other programs' figures.

use crate::support::*;
use ebbmark_engine::maths::{
    NearestError, gram, nearest_correlation, shrink_to_constant_correlation, shrink_to_identity,
    symmetric_eigenvalues,
};
use proptest::prelude::*;

/// Ones on the three middle diagonals.
const NEIGHBOURS: [f64; 9] = [1.0, 1.0, 0.0, 1.0, 1.0, 1.0, 0.0, 1.0, 1.0];

#[track_caller]
fn check(cells: &[f64], n: usize, expected: &[(usize, usize, f64)], tolerance: f64) {
    for (row, column, value) in expected {
        near(cells[row * n + column], *value, tolerance);
        near(cells[column * n + row], *value, tolerance);
    }
}

#[test]
fn table_higham_three_by_three() {
    // Higham (2002), IMA J. Numerical Analysis 22: printed 0.7607, 0.1573, distance 0.5278; more digits by numpy.
    let nearest = nearest_correlation(3, &NEIGHBOURS, None, &[]).unwrap();
    check(&nearest.cells, 3, &[(0, 1, 0.760_689_85), (0, 2, 0.157_298_11), (1, 2, 0.760_689_85)], 5e-9);
    near(nearest.distance, 0.527_790_46, 5e-9);
}

#[test]
fn table_higham_four_by_four() {
    // The second matrix of the same paper, diagonal 2; digits by numpy. The diagonal's own move is part of the distance.
    let matrix = [2.0, -1.0, 0.0, 0.0, -1.0, 2.0, -1.0, 0.0, 0.0, -1.0, 2.0, -1.0, 0.0, 0.0, -1.0, 2.0];
    let nearest = nearest_correlation(4, &matrix, None, &[]).unwrap();
    let expected = [(0, 1, -0.808_412_5), (0, 2, 0.191_587_5), (0, 3, 0.106_775_05), (1, 2, -0.656_232_69)];
    check(&nearest.cells, 4, &expected, 5e-8);
    near(nearest.distance, 2.133_729_11, 5e-8);
}

#[test]
fn agree_weights_with_numpy() {
    // The same search in numpy with W = diag(1, 4, 1).
    let nearest = nearest_correlation(3, &NEIGHBOURS, Some(&[1.0, 4.0, 1.0]), &[]).unwrap();
    check(&nearest.cells, 3, &[(0, 1, 0.835_122_35), (0, 2, 0.394_858_67)], 5e-9);
}

#[test]
fn exact_held_cell() {
    // With the corner held at 0 the best that is left is 1 / sqrt(2) on both sides.
    let nearest = nearest_correlation(3, &NEIGHBOURS, None, &[(0, 2)]).unwrap();
    check(&nearest.cells, 3, &[(0, 1, 0.5_f64.sqrt()), (1, 2, 0.5_f64.sqrt())], 1e-7);
    assert_eq!(nearest.cells[2], 0.0);
}

#[test]
fn always_refuses_what_cannot_be() {
    let held = nearest_correlation(
        3,
        &[1.0, 0.95, -0.9, 0.95, 1.0, 0.2, -0.9, 0.2, 1.0],
        None,
        &[(0, 1), (0, 2), (1, 2)],
    );
    assert_eq!(held, Err(NearestError::Held));
    let nan = nearest_correlation(2, &[1.0, f64::NAN, f64::NAN, 1.0], None, &[]);
    assert_eq!(nan, Err(NearestError::NotFinite));
    assert_eq!(
        nearest_correlation(2, &[1.0, 0.5, 0.5, 1.0], Some(&[1.0, 0.0]), &[]),
        Err(NearestError::NotFinite)
    );
    assert_eq!(nearest_correlation(0, &[], None, &[]).unwrap().cells, Vec::<f64>::new());
    assert_eq!(nearest_correlation(1, &[1.0], None, &[]).unwrap().cells, [1.0]);
}

/// Eight rows of three columns.
const ROWS: [[f64; 3]; 8] = [
    [0.8, -0.2, 1.1],
    [-0.5, 0.4, -0.3],
    [1.2, 0.9, 0.1],
    [-1.1, -0.6, -0.9],
    [0.3, -0.8, 0.7],
    [-0.4, 0.5, -1.2],
    [0.6, 0.2, 0.4],
    [-0.9, -0.7, 0.3],
];

fn demeaned() -> Vec<Vec<f64>> {
    let column = |at: usize| {
        let mean = ROWS.iter().map(|row| row[at]).sum::<f64>() / 8.0;
        ROWS.iter().map(|row| row[at] - mean).collect()
    };
    (0..3).map(column).collect()
}

#[test]
fn agree_shrinkage_with_scikit_learn() {
    // sklearn.covariance.ledoit_wolf (1.9) for the identity; the other formula written out in numpy.
    let shrunk = shrink_to_identity(&demeaned());
    near(shrunk.intensity, 0.485_869_022_648, 1e-12);
    near(shrunk.covariance[1], 0.108_610_17, 5e-9);
    let shrunk = shrink_to_constant_correlation(&demeaned());
    near(shrunk.intensity, 0.537_512_938_426, 1e-12);
    check(&shrunk.covariance, 3, &[(0, 1, 0.162_103_38), (1, 2, 0.002_553_04)], 5e-9);
}

#[test]
fn exact_products_with_weights() {
    assert_eq!(gram(&[vec![1.0, 2.0], vec![3.0, 5.0]], Some(&[1.0, 4.0])), [17.0, 43.0, 43.0, 109.0]);
    assert_eq!(gram(&[], None), Vec::<f64>::new());
}

proptest! {
    #![proptest_config(ProptestConfig { cases: 64, rng_seed: proptest::test_runner::RngSeed::Fixed(7), ..ProptestConfig::default() })]

    #[test]
    fn always_nearest_is_valid_and_no_farther_than_shrinking(upper in proptest::collection::vec(-1.0..1.0_f64, 15)) {
        let n = 6;
        let mut cells = vec![0.0; n * n];
        let mut next = upper.into_iter();
        for row in 0..n {
            cells[row * n + row] = 1.0;
            for column in 0..row {
                cells[row * n + column] = next.next().unwrap();
                cells[column * n + row] = cells[row * n + column];
            }
        }
        let smallest = symmetric_eigenvalues(n, &cells)[0];
        let nearest = nearest_correlation(n, &cells, None, &[]).unwrap();
        prop_assert!(symmetric_eigenvalues(n, &nearest.cells)[0] >= -1e-9);
        prop_assert!((0..n).all(|at| nearest.cells[at * n + at] == 1.0));
        // Shrinking every cell by 1 - t is valid once the smallest eigenvalue reaches 0.
        let t = (-smallest / (1.0 - smallest)).max(0.0);
        let shrunk: f64 = cells.iter().enumerate().filter(|(at, _)| at % (n + 1) != 0).map(|(_, cell)| (t * cell).powi(2)).sum();
        prop_assert!(nearest.distance <= shrunk.sqrt() + 1e-6);
    }
}
