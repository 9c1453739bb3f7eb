//! What is to be run: how many paths, how far, what is kept.

/// A run to be made.
#[derive(Debug, Clone, PartialEq)]
pub struct Plan {
    /// Number of paths, 1 or more.
    pub paths: usize,
    /// Seed of the random numbers.
    pub seed: u64,
    /// Days at which the book's value and running drawdown are kept, ascending, each 1 or more; the last is the horizon.
    pub kept_days: Vec<u32>,
    /// Loss from today's value whose touching is watched, in money.
    pub loss_limit: Option<f64>,
    /// Threads; all cores when none.
    pub threads: Option<usize>,
}
