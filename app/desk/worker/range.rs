//! The thread that ranges losses over the fit's parameters. A newer wish, or none, stops an older one.

use super::post::Post;
use super::request::Answer;
use crate::workspace::Document;
use ebbmark_engine::measures::parameter_range::{RangeError, USUAL_DRAWS, USUAL_PATHS};
use ebbmark_engine::measures::{Conventions, ParameterRange, RangeRequest, RangeWatcher, parameter_range};
use ebbmark_engine::simulate::SimulateError;
use std::sync::Arc;
use std::sync::atomic::{AtomicU64, Ordering};
use std::sync::mpsc::Receiver;

/// A range asked for.
#[derive(Debug)]
pub struct RangeTask {
    /// Number of the wish; only the newest is worked.
    pub number: u64,
    /// The book with its history.
    pub document: Arc<Document>,
    /// Day that is read.
    pub day: u32,
    /// How it is read.
    pub conventions: Conventions,
    /// VaR and ES of the reading at hand, one pair a confidence.
    pub losses: Vec<(f64, f64)>,
}

/// How far a range is.
#[derive(Debug, Clone)]
pub enum Ranging {
    /// So many histories are done.
    Running {
        /// Done.
        done: usize,
        /// Of so many.
        whole: usize,
    },
    /// Everything is done.
    Done(Arc<ParameterRange>),
    /// There is none; a sentence.
    Failed(String),
}

/// Ranges what is asked for until the program closes.
pub(super) fn serve(asked: &Receiver<RangeTask>, newest: &AtomicU64, post: &Post) {
    while let Ok(task) = asked.recv() {
        let watch = Watch { number: task.number, newest, post };
        if watch.is_stopped() {
            continue;
        }
        match range(&task, &watch) {
            Ok(range) => watch.tell(Ranging::Done(Arc::new(range))),
            Err(RangeError::Simulate(SimulateError::Stopped)) => {}
            Err(error) => watch.tell(Ranging::Failed(format!("No parameter range: {error}"))),
        }
    }
}

fn range(task: &RangeTask, watch: &Watch<'_>) -> Result<ParameterRange, RangeError> {
    let Document { inputs, settings, history, .. } = &*task.document;
    // Without levels nothing is asked for; a document that lost them since has nothing to be ranged.
    let Some((history, levels)) = history.as_ref().and_then(|history| Some((history, history.history()?)))
    else {
        return Err(SimulateError::Stopped.into());
    };
    let request = RangeRequest {
        inputs,
        history: levels,
        fit: &history.settings,
        model: &settings.model_settings(),
        day: task.day,
        conventions: &task.conventions,
        draws: USUAL_DRAWS,
        paths: USUAL_PATHS,
        seed: settings.seed,
    };
    parameter_range(request, &task.losses, watch)
}

struct Watch<'a> {
    number: u64,
    newest: &'a AtomicU64,
    post: &'a Post,
}

impl Watch<'_> {
    fn tell(&self, ranging: Ranging) {
        self.post.answer(Answer::Ranging { number: self.number, ranging });
    }
}

impl RangeWatcher for Watch<'_> {
    fn progress(&self, draws: usize) {
        // Every tenth is often enough to be seen moving.
        if draws.is_multiple_of(10) {
            self.tell(Ranging::Running { done: draws, whole: USUAL_DRAWS });
        }
    }

    fn is_stopped(&self) -> bool {
        self.newest.load(Ordering::Acquire) != self.number
    }
}
