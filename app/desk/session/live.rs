//! Figures of the current inputs, as far as they have arrived: closed form first, then from more and more paths.
//! Filled by the worker's answers; panels only read.

use crate::desk::worker::Ranging;
use ebbmark_engine::factors::Model;
use ebbmark_engine::fit::Fit;
use ebbmark_engine::measures::{Bands, Conventions, Density, Reading};
use std::sync::Arc;

/// Where the run stands.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Default)]
pub enum RunState {
    /// Nothing has been asked yet, or the inputs can't be run.
    #[default]
    Idle,
    /// Paths are arriving.
    Running,
    /// All paths are done.
    Finished,
    /// Stopped by the user; what had arrived stands.
    Stopped,
}

/// Everything read at the reading line.
#[derive(Debug, Clone)]
pub struct AtLine {
    /// The day read.
    pub day: u32,
    /// How it was read.
    pub conventions: Conventions,
    /// All figures.
    pub reading: Reading,
    /// Distribution of the book's value.
    pub values: Density,
    /// Distribution of the largest fall so far.
    pub falls: Density,
    /// Paths behind it; none while it is the closed form.
    pub paths: Option<usize>,
}

/// Figures, each the newest that has arrived.
#[derive(Debug, Default)]
pub struct Live {
    /// Number of the current run; answers of older runs are dropped.
    pub generation: u64,
    /// The last valid model.
    pub model: Option<Arc<Model>>,
    /// The fit of the history behind it; none without one.
    pub fit: Option<Arc<Fit>>,
    /// Whether model and figures are from before the last edit, which made the inputs invalid.
    pub is_before_edit: bool,
    /// Days on which the line can stop, ascending; the last is the horizon.
    pub days: Arc<Vec<u32>>,
    /// Bands ahead.
    pub bands: Option<Arc<Bands>>,
    /// Everything at the reading line.
    pub at_line: Option<Arc<AtLine>>,
    /// The losses at the line over the fit's parameters, where that was asked for.
    pub ranging: Option<Ranging>,
    /// Where the run stands.
    pub state: RunState,
    /// Paths done so far.
    pub paths_done: usize,
    /// Seconds since the run began, or that it took.
    pub seconds: f64,
}

impl Live {
    /// The day nearest to `day` on which the line can stop; the earlier of two. Before a model is known, `day` itself.
    pub fn nearest_day(&self, day: u32) -> u32 {
        self.days.iter().copied().min_by_key(|kept| kept.abs_diff(day)).unwrap_or(day)
    }

    /// How much of the run is done, 0 to 1.
    pub fn share_done(&self, paths: usize) -> f32 {
        (self.paths_done as f32 / paths.max(1) as f32).min(1.0)
    }
}
