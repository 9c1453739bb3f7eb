//! Where the threads leave their answers: each one wakes the window.

use super::request::{Answer, Figures};
use std::sync::Arc;
use std::sync::mpsc::Sender;

/// A way to the session, one for each thread.
#[derive(Clone)]
pub(super) struct Post {
    answers: Sender<Answer>,
    wake: Arc<dyn Fn() + Send + Sync>,
}

impl Post {
    pub(super) fn new(answers: Sender<Answer>, wake: impl Fn() + Send + Sync + 'static) -> Self {
        Self { answers, wake: Arc::new(wake) }
    }

    /// Leaves an answer. When the window is gone, so is whoever would have read it.
    pub(super) fn answer(&self, answer: Answer) {
        if self.answers.send(answer).is_ok() {
            (self.wake)();
        }
    }

    /// Leaves figures of a run.
    pub(super) fn figures(&self, generation: u64, figures: Figures) {
        self.answer(Answer::Figures { generation, figures });
    }
}
