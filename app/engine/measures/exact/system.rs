//! The matrices behind the exact moments: covariances `E` of the exponentials and blocks `K` that read them.
//! What a product is, is decided next door.

use super::exponents::FactorMoves;
use super::products::{Moves, Product, income, products};
use crate::factors::Model;
use crate::maths::Multidual;

/// `E`, `K` and the change of the mean for one model after some years.
pub(super) struct System {
    /// Mean of the book's value less today's value.
    pub(super) change: f64,
    /// Number of rows: a product with b level moves has 2^b.
    size: usize,
    /// size x size, symmetric.
    covariance: Vec<f64>,
    blocks: Vec<Block>,
}

/// The rows of one product.
struct Block {
    first: usize,
    size: usize,
    /// Mean of the product's exponential, coefficient and all.
    mean: Multidual,
}

impl System {
    pub(super) fn of(model: &Model, years: f64) -> Self {
        let moves = FactorMoves::over(model, years);
        let products: Vec<Product> = products(model, years)
            .into_iter()
            .filter(|product| product.moves != Moves::default() && product.coefficient != 0.0)
            .collect();
        let mut change = income(model, years);
        let mut blocks: Vec<Block> = Vec::with_capacity(products.len());
        for product in &products {
            let exponent = moves.exponent(&product.moves);
            change += product.coefficient * exponent.exp_m1().top();
            let first = blocks.last().map_or(0, |block| block.first + block.size);
            let mean = exponent.exp().scaled(product.coefficient);
            blocks.push(Block { first, size: 1 << product.moves.levels.len(), mean });
        }
        let size = blocks.last().map_or(0, |block| block.first + block.size);
        let mut system = Self { change, size, covariance: vec![0.0; size * size], blocks };
        system.fill(&products, &moves);
        system
    }

    /// Variance, and the sum of the rows' own standard deviations.
    pub(super) fn variance(&self) -> (f64, f64) {
        let weights = self.weights();
        let spread = self.spread(&weights);
        let variance = weights.iter().zip(&spread).map(|(k, s)| k * s).sum();
        let own = |row: usize| self.covariance[row * self.size + row].abs().sqrt();
        (variance, weights.iter().enumerate().map(|(row, k)| k.abs() * own(row)).sum())
    }

    /// Third central moment.
    pub(super) fn third_central(&self) -> f64 {
        3.0 * self.met_twice() + self.trace_of_cube()
    }

    /// `s' K s`.
    fn met_twice(&self) -> f64 {
        let spread = self.spread(&self.weights());
        let mut sum = 0.0;
        for block in &self.blocks {
            let spread = &spread[block.first..block.first + block.size];
            for (row, left) in spread.iter().enumerate() {
                for (column, right) in spread.iter().enumerate() {
                    sum += block.at(row, column) * left * right;
                }
            }
        }
        sum
    }

    /// `trace((E K)^3)`: the sum over all cells of `(E K) E` times `K (E K)`, both symmetric, so that one triangle is
    /// enough.
    fn trace_of_cube(&self) -> f64 {
        let right = self.covariance_times_blocks();
        let both = self.blocks_times(&right);
        let mut cells = vec![0.0; self.size];
        let mut sum = 0.0;
        for row in 0..self.size {
            let cells = &mut cells[..=row];
            cells.fill(0.0);
            self.add_rows(&right[row * self.size..(row + 1) * self.size], cells);
            let partner = &both[row * self.size..row * self.size + row];
            let off_diagonal: f64 = cells.iter().zip(partner).map(|(left, right)| left * right).sum();
            sum += 2.0 * off_diagonal + cells[row] * both[row * self.size + row];
        }
        sum
    }

    /// `cells += sum over l of weights_l E_l`, the first columns of each row of `E`, four rows at a time.
    fn add_rows(&self, weights: &[f64], cells: &mut [f64]) {
        let width = cells.len();
        let row = |number: usize| &self.covariance[number * self.size..number * self.size + width];
        let (fours, rest) = weights.as_chunks::<4>();
        for (group, [a, b, c, d]) in fours.iter().enumerate() {
            let rows =
                row(4 * group).iter().zip(row(4 * group + 1)).zip(row(4 * group + 2)).zip(row(4 * group + 3));
            for (cell, (((p, q), r), s)) in cells.iter_mut().zip(rows) {
                *cell += (a * p + b * q) + (c * r + d * s);
            }
        }
        for (offset, weight) in rest.iter().enumerate() {
            for (cell, entry) in cells.iter_mut().zip(row(4 * fours.len() + offset)) {
                *cell += weight * entry;
            }
        }
    }

    fn fill(&mut self, products: &[Product], moves: &FactorMoves) {
        for (left, left_block) in products.iter().zip(&self.blocks) {
            for (right, right_block) in products.iter().zip(&self.blocks) {
                if right_block.first > left_block.first {
                    break;
                }
                let joint = moves.joint_exponent(&left.moves, &right.moves).exp_m1();
                for a in 0..left_block.size {
                    for b in 0..right_block.size {
                        let entry = joint.at(a + b * left_block.size);
                        let (row, column) = (left_block.first + a, right_block.first + b);
                        self.covariance[row * self.size + column] = entry;
                        self.covariance[column * self.size + row] = entry;
                    }
                }
            }
        }
    }

    /// `k = K 1`.
    fn weights(&self) -> Vec<f64> {
        self.blocks.iter().flat_map(|block| (0..block.size).map(|row| block.at(row, 0))).collect()
    }

    /// `s = E k`.
    fn spread(&self, weights: &[f64]) -> Vec<f64> {
        let mut spread = vec![0.0; self.size];
        self.add_rows(weights, &mut spread);
        spread
    }

    /// `E K`, size x size.
    fn covariance_times_blocks(&self) -> Vec<f64> {
        let mut product = vec![0.0; self.size * self.size];
        for (to, from) in product.chunks_exact_mut(self.size).zip(self.covariance.chunks_exact(self.size)) {
            for block in &self.blocks {
                for column in 0..block.size {
                    to[block.first + column] =
                        (0..block.size).map(|row| from[block.first + row] * block.at(row, column)).sum();
                }
            }
        }
        product
    }

    /// `K matrix`, size x size.
    fn blocks_times(&self, matrix: &[f64]) -> Vec<f64> {
        let mut product = vec![0.0; self.size * self.size];
        for block in &self.blocks {
            for row in 0..block.size {
                let to = &mut product[(block.first + row) * self.size..][..self.size];
                for column in 0..block.size {
                    let from = &matrix[(block.first + column) * self.size..][..self.size];
                    let weight = block.at(row, column);
                    to.iter_mut().zip(from).for_each(|(cell, entry)| *cell += weight * entry);
                }
            }
        }
        product
    }
}

impl Block {
    /// `K` of the product: the top coefficient of `mean e_row e_column`.
    fn at(&self, row: usize, column: usize) -> f64 {
        if row & column == 0 { self.mean.at((self.size - 1) ^ (row | column)) } else { 0.0 }
    }
}
