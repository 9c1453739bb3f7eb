//! Covariance matrices drawn towards a simple target, as far as the sample's own noise asks for.

use super::gram;

/// A shrunk covariance matrix.
#[derive(Debug, Clone, PartialEq)]
pub struct Shrunk {
    /// `(1 - intensity) S + intensity target`, n x n.
    pub covariance: Vec<f64>,
    /// Weight of the target, 0 to 1.
    pub intensity: f64,
}

/// Towards `m I`, with `m` the mean variance:
///
/// ```text
/// intensity = min(d2, b2) / d2,    d2 = ||S - m I||^2 / d,    b2 = sum_t ||y_t y_t' - S||^2 / (d T^2)
/// ```
///
/// `columns` are d equally long columns of T values with mean 0; S has divisor T.
/// Source: Ledoit and Wolf (2004), A well-conditioned estimator for large-dimensional covariance matrices, J.
/// Multivariate Analysis 88.
pub fn shrink_to_identity(columns: &[Vec<f64>]) -> Shrunk {
    let (covariance, count) = covariance(columns);
    let n = columns.len();
    let mean_variance = (0..n).map(|at| covariance[at * n + at]).sum::<f64>() / n.max(1) as f64;
    let target: Vec<f64> =
        (0..n * n).map(|cell| if cell % (n + 1) == 0 { mean_variance } else { 0.0 }).collect();
    // sum_t ||y_t y_t' - S||^2 = sum_t |y_t|^4 - T ||S||^2
    let lengths = (0..columns.first().map_or(0, Vec::len))
        .map(|row| columns.iter().map(|column| column[row] * column[row]).sum::<f64>());
    let fourth: f64 = lengths.map(|length| length * length).sum();
    let noise = (fourth / count - squares(&covariance)) / count;
    mixed(covariance, &target, noise)
}

/// Towards one correlation for all pairs, their mean, with the sample's variances:
///
/// ```text
/// F_ij      = rbar sqrt(s_ii s_jj)
/// intensity = (pi - rho) / gamma / T
/// pi        = sum_ij pi_ij,    pi_ij = mean((y_i y_j - s_ij)^2),    gamma = ||F - S||^2
/// rho       = sum_i pi_ii + sum_{i != j} (rbar / 2) (sqrt(s_jj / s_ii) theta_ij + sqrt(s_ii / s_jj) theta_ji)
/// theta_ij  = mean((y_i^2 - s_ii) (y_i y_j - s_ij))
/// ```
///
/// `columns` as in [`shrink_to_identity`]. Source: Ledoit and Wolf (2004), Honey, I shrunk the sample covariance matrix,
/// J. Portfolio Management 30.
pub fn shrink_to_constant_correlation(columns: &[Vec<f64>]) -> Shrunk {
    let (covariance, count) = covariance(columns);
    let n = columns.len();
    let deviations: Vec<f64> = (0..n).map(|at| covariance[at * n + at].sqrt()).collect();
    let pairs = (n * n - n) as f64;
    let correlations = (0..n * n).filter(|cell| cell % (n + 1) != 0).map(|cell| {
        let scale = deviations[cell / n] * deviations[cell % n];
        if scale > 0.0 { covariance[cell] / scale } else { 0.0 }
    });
    let mean_correlation = if n > 1 { correlations.sum::<f64>() / pairs } else { 0.0 };
    let target: Vec<f64> = (0..n * n)
        .map(|cell| match cell % (n + 1) {
            0 => covariance[cell],
            _ => mean_correlation * deviations[cell / n] * deviations[cell % n],
        })
        .collect();
    let power = |power: i32| -> Vec<Vec<f64>> {
        columns.iter().map(|column| column.iter().map(|value| value.powi(power)).collect()).collect()
    };
    let of_squares = gram(&power(2), None);
    let of_cubes = cross(&power(3), columns);
    let mut noise = 0.0;
    for row in 0..n {
        for column in 0..n {
            let (cell, variance) = (row * n + column, covariance[row * n + row]);
            noise += of_squares[cell] / count - covariance[cell] * covariance[cell];
            if row == column {
                noise -= of_squares[cell] / count - covariance[cell] * covariance[cell];
            } else if deviations[row] > 0.0 {
                let theta = of_cubes[cell] / count - variance * covariance[cell];
                // Both halves of the sum over i != j are this one, i and j exchanged.
                noise -= mean_correlation * deviations[column] / deviations[row] * theta;
            }
        }
    }
    mixed(covariance, &target, noise / count)
}

/// `S` with divisor T, and T.
fn covariance(columns: &[Vec<f64>]) -> (Vec<f64>, f64) {
    let count = columns.first().map_or(0, Vec::len).max(1) as f64;
    (gram(columns, None).into_iter().map(|sum| sum / count).collect(), count)
}

/// `sum_t x_ti y_tj`, from the products of both sets with each other.
fn cross(one: &[Vec<f64>], other: &[Vec<f64>]) -> Vec<f64> {
    let n = one.len();
    let all = gram(&[one, other].concat(), None);
    (0..n * n).map(|cell| all[(cell / n) * 2 * n + n + cell % n]).collect()
}

/// The mixture whose weight is the noise over the squared distance from the target, kept within 0 and 1.
fn mixed(covariance: Vec<f64>, target: &[f64], noise: f64) -> Shrunk {
    let gaps: Vec<f64> = covariance.iter().zip(target).map(|(sample, target)| target - sample).collect();
    let distance = squares(&gaps);
    let intensity = if distance > 0.0 { (noise / distance).clamp(0.0, 1.0) } else { 0.0 };
    let covariance = covariance.iter().zip(&gaps).map(|(sample, gap)| sample + intensity * gap).collect();
    Shrunk { covariance, intensity }
}

fn squares(cells: &[f64]) -> f64 {
    cells.iter().map(|cell| cell * cell).sum()
}
