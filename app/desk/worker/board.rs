//! What the threads that make figures share: what is to be assembled, what is being run, what is read where.
//! Every wish stands alone: a newer one replaces an older that has not been taken up.

use super::request::LineRequest;
use crate::workspace::Document;
use ebbmark_engine::factors::Model;
use ebbmark_engine::simulate::{Plan, Run};
use std::sync::atomic::{AtomicBool, AtomicU64, Ordering};
use std::sync::{Arc, Condvar, Mutex, MutexGuard, PoisonError};

/// A run to be made, or being made.
#[derive(Debug)]
pub(super) struct Job {
    pub(super) generation: u64,
    pub(super) model: Arc<Model>,
    pub(super) plan: Plan,
}

/// How a run ended.
#[derive(Debug, Clone, Copy, PartialEq)]
pub(super) enum End {
    Finished { seconds: f64 },
    Stopped,
}

/// The run whose figures are shown, as far as its paths have arrived.
#[derive(Debug, Clone)]
pub(super) struct Shown {
    pub(super) job: Arc<Job>,
    pub(super) run: Option<Run>,
    pub(super) end: Option<End>,
}

/// The shared state; only ever locked for moments.
#[derive(Debug, Default)]
pub(super) struct State {
    pub(super) to_assemble: Option<(u64, Arc<Document>)>,
    pub(super) to_run: Option<Arc<Job>>,
    pub(super) shown: Option<Shown>,
    pub(super) line: Option<LineRequest>,
    /// Whether the reader holds a copy of a run; a new run waits for it, so that two never fill the memory.
    pub(super) is_being_read: bool,
}

#[derive(Debug, Default)]
pub(super) struct Board {
    state: Mutex<State>,
    changed: Condvar,
    /// Number of the newest job, for the running one to see that it is out of date.
    newest_job: AtomicU64,
    stop: AtomicBool,
    is_closing: AtomicBool,
}

impl Board {
    /// Changes the state and tells every thread.
    pub(super) fn change<T>(&self, change: impl FnOnce(&mut State) -> T) -> T {
        let result = change(&mut self.lock());
        self.changed.notify_all();
        result
    }

    /// Waits until `ready` finds something in the state; none when the program is closing.
    pub(super) fn wait_for<T>(&self, mut ready: impl FnMut(&mut State) -> Option<T>) -> Option<T> {
        let mut state = self.lock();
        loop {
            if self.is_closing.load(Ordering::Acquire) {
                return None;
            }
            if let Some(found) = ready(&mut state) {
                return Some(found);
            }
            state = self.changed.wait(state).unwrap_or_else(PoisonError::into_inner);
        }
    }

    /// Looks at the state without waiting.
    pub(super) fn look<T>(&self, look: impl FnOnce(&State) -> T) -> T {
        look(&self.lock())
    }

    /// Hands a job to the runner and shows it from now on.
    pub(super) fn begin(&self, job: &Arc<Job>) {
        self.newest_job.store(job.generation, Ordering::Release);
        self.change(|state| {
            state.to_run = Some(Arc::clone(job));
            state.shown = Some(Shown { job: Arc::clone(job), run: None, end: None });
        });
    }

    /// Stops the job that is running.
    pub(super) fn stop(&self) {
        self.stop.store(true, Ordering::Release);
    }

    /// Forgets that a job was to be stopped, when the next begins.
    pub(super) fn forget_stop(&self) {
        self.stop.store(false, Ordering::Release);
    }

    /// Whether a job should end now.
    pub(super) fn is_stopped(&self, generation: u64) -> bool {
        self.stop.load(Ordering::Acquire)
            || self.is_closing.load(Ordering::Acquire)
            || self.newest_job.load(Ordering::Acquire) != generation
    }

    /// Lets all threads end.
    pub(super) fn close(&self) {
        self.is_closing.store(true, Ordering::Release);
        self.change(|_| ());
    }

    fn lock(&self) -> MutexGuard<'_, State> {
        self.state.lock().unwrap_or_else(PoisonError::into_inner)
    }
}
