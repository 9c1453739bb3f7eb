//! What a run leaves behind: the book's value and running drawdown of every path on the kept days.

use crate::maths::Estimate;

/// The paths on one day.
#[derive(Debug, Clone, PartialEq)]
pub struct DaySample {
    /// Day, counted from today.
    pub day: u32,
    /// Book value of each path, in path order.
    pub values: Vec<f64>,
    /// Largest fall from a running peak up to the day, of each path, in path order.
    pub falls: Vec<f64>,
    /// Probability that the loss limit was touched up to the day; none without a limit.
    pub touched: Option<Estimate>,
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
}

/// Told of a run's progress; may stop it. Called from the run's own threads.
pub trait Watcher: Sync {
    /// The finished prefix has grown; `run` holds it.
    fn progress(&self, run: &Run);
    /// Whether the run should end now.
    fn is_stopped(&self) -> bool;
}

/// A finished run, or the finished prefix of one.
#[derive(Debug, Clone)]
pub struct Run {}

impl Run {
    /// Number of paths in it.
    pub fn paths(&self) -> usize {
        0
    }

    /// The sample on a kept day; none for a day that was not kept.
    pub fn sample(&self, _day: u32) -> Option<DaySample> {
        None
    }
}
