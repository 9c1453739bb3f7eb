//! Exponents of products: mean, variance and covariance of `y`, where a product is a coefficient of `exp(y)`.

use super::products::Moves;
use crate::factors::Model;
use crate::maths::Multidual;
use crate::simulate::{move_covariance, move_means};

/// Mean and covariance of the factors' moves.
pub(super) struct FactorMoves {
    mean: Vec<f64>,
    covariance: Vec<f64>,
}

impl FactorMoves {
    pub(super) fn over(model: &Model, years: f64) -> Self {
        Self { mean: move_means(model, years), covariance: move_covariance(model, years) }
    }

    fn covariance(&self, left: &[usize], right: &[usize]) -> f64 {
        let n = self.mean.len();
        left.iter().flat_map(|row| right.iter().map(move |column| self.covariance[row * n + column])).sum()
    }

    /// `E[y] + Var(y) / 2` for `y = sum of log moves + sum over level moves of e_i x_i`.
    pub(super) fn exponent(&self, moves: &Moves) -> Multidual {
        let mut exponent = Multidual::zero(moves.levels.len() as u32);
        let mean: f64 = moves.logs.iter().map(|log| self.mean[*log]).sum();
        exponent.add(0, mean + self.covariance(&moves.logs, &moves.logs) / 2.0);
        for (symbol, level) in moves.levels.iter().enumerate() {
            exponent.add(1 << symbol, self.mean[*level] + self.covariance(&moves.logs, &[*level]));
        }
        if let [first, second] = moves.levels[..] {
            exponent.add(3, self.covariance(&[first], &[second]));
        }
        exponent
    }

    /// `Cov(y_left, y_right)`, the symbols of the right one standing above those of the left.
    pub(super) fn joint_exponent(&self, left: &Moves, right: &Moves) -> Multidual {
        let symbols_of_left = left.levels.len();
        let mut exponent = Multidual::zero((symbols_of_left + right.levels.len()) as u32);
        for (left_set, left_factors) in components(left) {
            for (right_set, right_factors) in components(right) {
                exponent.add(
                    left_set | (right_set << symbols_of_left),
                    self.covariance(left_factors, right_factors),
                );
            }
        }
        exponent
    }
}

/// The real part and each nilpotent part of a product's exponent: its set of symbols and the factors in it.
fn components(moves: &Moves) -> impl Iterator<Item = (usize, &[usize])> {
    let levels = moves.levels.iter().enumerate();
    [(0, &moves.logs[..])]
        .into_iter()
        .chain(levels.map(|(symbol, level)| (1 << symbol, std::slice::from_ref(level))))
}
