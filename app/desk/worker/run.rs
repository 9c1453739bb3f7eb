//! The thread that runs a job. Its paths are handed to the reader as they arrive; a newer job stops an older one.

use super::board::{Board, End, Job};
use super::post::Post;
use super::request::Figures;
use ebbmark_engine::simulate::{self, Run, SimulateError, Watcher};
use std::sync::{Mutex, PoisonError};
use std::time::{Duration, Instant};

/// Shortest time between two looks at a growing run.
const BETWEEN_LOOKS: Duration = Duration::from_millis(60);

/// Runs what is asked for until the program closes.
pub(super) fn serve(board: &Board, post: &Post) {
    while let Some(job) = board.wait_for(|state| state.to_run.take_if(|_| !state.is_being_read)) {
        board.forget_stop();
        let watch = Watch { board, post, job: &job, began: Instant::now(), looked: Mutex::new(None) };
        let result = simulate::run(&job.model, &job.plan, &watch);
        let seconds = watch.began.elapsed().as_secs_f64();
        match result {
            Ok(run) => watch.end(Some(run), End::Finished { seconds }),
            Err(SimulateError::Stopped) => watch.end(None, End::Stopped),
            Err(error) => post.figures(job.generation, Figures::Failed(format!("The run failed: {error}"))),
        }
    }
}

struct Watch<'a> {
    board: &'a Board,
    post: &'a Post,
    job: &'a Job,
    began: Instant,
    looked: Mutex<Option<Instant>>,
}

impl Watch<'_> {
    /// Leaves what has arrived with the reader, unless another run is shown by now.
    fn leave(&self, run: Option<Run>, end: Option<End>) {
        self.board.change(|state| {
            let shown = state.shown.as_mut().filter(|shown| shown.job.generation == self.job.generation);
            if let Some(shown) = shown {
                shown.run = run.or_else(|| shown.run.take());
                shown.end = end;
            }
        });
    }

    fn end(&self, run: Option<Run>, end: End) {
        self.leave(run, Some(end));
    }

    fn is_time_to_look(&self) -> bool {
        let mut looked = self.looked.lock().unwrap_or_else(PoisonError::into_inner);
        let is_time = looked.is_none_or(|last| last.elapsed() >= BETWEEN_LOOKS);
        if is_time {
            *looked = Some(Instant::now());
        }
        is_time
    }
}

impl Watcher for Watch<'_> {
    fn progress(&self, run: &Run) {
        if self.is_time_to_look() {
            self.leave(Some(run.clone()), None);
            let seconds = self.began.elapsed().as_secs_f64();
            self.post.figures(self.job.generation, Figures::Progress { paths: run.paths(), seconds });
        }
    }

    fn is_stopped(&self) -> bool {
        self.board.is_stopped(self.job.generation)
    }
}
