//! What is to be run: how many paths, how far, what is kept; and what can keep it from being run.

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

/// Why a run gave no answer.
#[derive(Debug, Clone, PartialEq, thiserror::Error)]
pub enum SimulateError {
    /// The watcher stopped it.
    #[error("the run was stopped")]
    Stopped,
    /// The covariance of one step could not be factored.
    #[error("the covariance is not positive semi-definite at factor {factor} (pivot {pivot})")]
    NotSemiDefinite {
        /// Name of the factor where it shows.
        factor: String,
        /// The pivot or residual that failed.
        pivot: f64,
    },
    /// The operating system gave no threads.
    #[error("no threads to work on: {reason}")]
    NoThreads {
        /// What it said.
        reason: String,
    },
}
