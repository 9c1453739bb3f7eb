//! A run: blocks worked in parallel, reduced and published in block order; and what it leaves behind, the book's value
//! and running drawdown of every path on the kept days.

use super::block::{BLOCK_PATHS, Block, InstructionSet};
use super::program::Program;
use super::{Plan, SimulateError};
use crate::factors::Model;
use crate::maths::Estimate;
use std::collections::BTreeMap;
use std::sync::atomic::{AtomicUsize, Ordering};
use std::sync::{Arc, Mutex, PoisonError};

/// Told of a run's progress; may stop it. Called from the run's own threads.
pub trait Watcher: Sync {
    /// The finished prefix has grown; `run` holds it. Other threads of the run may wait meanwhile: clone and return.
    fn progress(&self, run: &Run);
    /// Whether the run should end now.
    fn is_stopped(&self) -> bool;
}

/// Watches nothing and never stops.
#[derive(Debug, Clone, Copy)]
pub struct Unwatched;

impl Watcher for Unwatched {
    fn progress(&self, _run: &Run) {}

    fn is_stopped(&self) -> bool {
        false
    }
}

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

/// A finished run, or the finished prefix of one: always whole blocks from the first on. Cheap to clone.
#[derive(Debug, Clone)]
pub struct Run {
    kept_days: Arc<[u32]>,
    has_limit: bool,
    blocks: Vec<Arc<Block>>,
    paths: usize,
}

/// Works the plan, with as many threads as it says. The answer does not depend on their number.
///
/// # Errors
/// [`SimulateError::Stopped`] when the watcher stopped it, [`SimulateError::NotSemiDefinite`] when a day's covariance
/// can't be factored, [`SimulateError::NoThreads`] when threads can't be had.
pub fn run(model: &Model, plan: &Plan, watcher: &dyn Watcher) -> Result<Run, SimulateError> {
    run_with(model, plan, watcher, InstructionSet::Best)
}

/// [`run`] with a given instruction set, which changes the speed and not the answer.
///
/// # Errors
/// As [`run`].
pub fn run_with(
    model: &Model,
    plan: &Plan,
    watcher: &dyn Watcher,
    set: InstructionSet,
) -> Result<Run, SimulateError> {
    let program = Program::prepare(model, plan)?;
    let threads = rayon::ThreadPoolBuilder::new()
        .num_threads(plan.threads.unwrap_or(0))
        .build()
        .map_err(|error| SimulateError::NoThreads { reason: error.to_string() })?;
    let count = plan.paths.div_ceil(BLOCK_PATHS);
    let next = AtomicUsize::new(0);
    let finished = Mutex::new(Finished { waiting: BTreeMap::new(), run: Run::empty(plan) });
    threads.broadcast(|_| {
        while !watcher.is_stopped() {
            let number = next.fetch_add(1, Ordering::Relaxed);
            if number >= count {
                break;
            }
            let first = number * BLOCK_PATHS;
            let paths: Vec<u64> =
                (first..plan.paths.min(first + BLOCK_PATHS)).map(|path| path as u64).collect();
            let block = Block::work(&program, &paths, set);
            finished.lock().unwrap_or_else(PoisonError::into_inner).take(number, block, watcher);
        }
    });
    let run = finished.into_inner().unwrap_or_else(PoisonError::into_inner).run;
    if run.paths == plan.paths { Ok(run) } else { Err(SimulateError::Stopped) }
}

/// Draws single paths again from their addresses: the same digits as in a run of the same model and plan.
///
/// # Errors
/// [`SimulateError::NotSemiDefinite`] as [`run`].
pub fn draw_again(model: &Model, plan: &Plan, paths: &[u64]) -> Result<Run, SimulateError> {
    let program = Program::prepare(model, plan)?;
    let mut run = Run::empty(plan);
    if !paths.is_empty() {
        run.push(Arc::new(Block::work(&program, paths, InstructionSet::Best)));
    }
    Ok(run)
}

/// Finished blocks; those that wait for an earlier one are not part of the prefix yet.
struct Finished {
    waiting: BTreeMap<usize, Block>,
    run: Run,
}

impl Finished {
    fn take(&mut self, number: usize, block: Block, watcher: &dyn Watcher) {
        self.waiting.insert(number, block);
        let before = self.run.blocks.len();
        while let Some(block) = self.waiting.remove(&self.run.blocks.len()) {
            self.run.push(Arc::new(block));
        }
        if self.run.blocks.len() > before {
            watcher.progress(&self.run);
        }
    }
}

impl Run {
    fn empty(plan: &Plan) -> Self {
        let kept_days = plan.kept_days.as_slice().into();
        Self { kept_days, has_limit: plan.loss_limit.is_some(), blocks: Vec::new(), paths: 0 }
    }

    fn push(&mut self, block: Arc<Block>) {
        self.paths += block.paths;
        self.blocks.push(block);
    }

    /// Number of paths in it.
    pub fn paths(&self) -> usize {
        self.paths
    }

    /// The days at which its paths can be read, ascending.
    pub fn kept_days(&self) -> &[u32] {
        &self.kept_days
    }

    /// The sample on a kept day; none for a day that was not kept, or before the first block is finished.
    pub fn sample(&self, day: u32) -> Option<DaySample> {
        let row = self.kept_days.binary_search(&day).ok()?;
        let touched = (self.has_limit && self.paths > 0).then(|| self.touched(row));
        (self.paths > 0).then(|| DaySample {
            day,
            values: self.gather(|block| &block.values, row),
            falls: self.gather(|block| &block.falls, row),
            touched,
        })
    }

    /// Book values on a kept day alone, in path order.
    pub fn values(&self, day: u32) -> Option<Vec<f64>> {
        self.kept_days.binary_search(&day).ok().map(|row| self.gather(|block| &block.values, row))
    }

    /// Largest falls up to a kept day alone, in path order.
    pub fn falls(&self, day: u32) -> Option<Vec<f64>> {
        self.kept_days.binary_search(&day).ok().map(|row| self.gather(|block| &block.falls, row))
    }

    fn gather(&self, of: impl Fn(&Block) -> &[f64], row: usize) -> Vec<f64> {
        let mut column = Vec::with_capacity(self.paths);
        for block in &self.blocks {
            column.extend_from_slice(&of(block)[row * block.paths..(row + 1) * block.paths]);
        }
        column
    }

    fn touched(&self, row: usize) -> Estimate {
        let n = self.paths as f64;
        let mean = self.blocks.iter().map(|block| block.touched[row]).sum::<f64>() / n;
        let square = self.blocks.iter().map(|block| block.touched_squares[row]).sum::<f64>() / n;
        let variance = (square - mean * mean).max(0.0);
        Estimate { value: mean, standard_error: (variance / n).sqrt() }
    }
}
