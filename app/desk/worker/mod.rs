//! Threads: assembling, running, reading, files, dialogs, keeping the session. Nothing of it paints;
//! the session decides what is asked for, and shows what comes back.

/// What is asked and what comes back.
pub mod request;

pub use request::{Answer, ExportRequest, Figures, LineRequest, Opened, Request};
use std::sync::mpsc::{Receiver, Sender, channel};

/// The worker's threads, seen from the paint thread. None of its functions waits.
#[derive(Debug)]
pub struct Worker {
    requests: Sender<Request>,
    answers: Receiver<Answer>,
}

impl Worker {
    /// Starts the threads. `wake` is called from them whenever an answer is there to be taken.
    pub fn start(wake: impl Fn() + Send + Sync + 'static) -> Self {
        let (requests, _asked) = channel();
        let (_answer, answers) = channel();
        let _ = wake;
        Self { requests, answers }
    }

    /// Asks for something.
    pub fn ask(&self, request: Request) {
        // A worker that has ended answers nothing more; there is nobody left to tell.
        let _ = self.requests.send(request);
    }

    /// The next answer, if one is there.
    pub fn answer(&self) -> Option<Answer> {
        self.answers.try_recv().ok()
    }
}
