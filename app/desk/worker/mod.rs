//! Threads: assembling, running, reading, files, dialogs, keeping the session. Nothing of it paints;
//! the session decides what is asked for, and shows what comes back.

/// What is asked and what comes back.
pub mod request;
/// Inputs into a model and a plan.
pub mod assemble;
/// What the threads that make figures share.
mod board;
/// File dialogs.
mod dialog;
/// Figures and numbers into files.
mod export;
/// Opening, saving, exporting.
pub mod files;
/// The session against a crash.
mod keep;
/// Files into a document.
pub mod open;
/// Where answers are left.
mod post;
/// Paths into readings and bands.
mod read;
/// Losses over the fit's parameters.
pub mod range;
/// Running.
mod run;

use crate::workspace::{Kept, Slot};
use board::Board;
use post::Post;
pub use range::{RangeTask, Ranging};
pub use request::{Answer, ExportRequest, Figures, LineRequest, Opened, Request};
use std::panic::{self, AssertUnwindSafe};
use std::sync::Arc;
use std::sync::atomic::{AtomicU64, Ordering};
use std::sync::mpsc::{Receiver, Sender, channel};
use std::thread::{self, JoinHandle};
use std::time::Duration;

/// The worker's threads, seen from the paint thread. Only dropping it waits: for the session to be kept.
pub struct Worker {
    board: Arc<Board>,
    files: Sender<files::Task>,
    dialogs: Sender<dialog::Asked>,
    ranges: Sender<RangeTask>,
    newest_range: Arc<AtomicU64>,
    keeper: Option<Keeper>,
    answers: Receiver<Answer>,
}

/// Where file dialogs come from.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum Dialogs {
    /// From the desktop, where it has any.
    OfTheDesktop,
    /// There are none: paths are typed. For tests, in which nobody answers a dialog.
    None,
}

struct Keeper {
    asked: Sender<Box<Kept>>,
    thread: JoinHandle<()>,
}

impl Worker {
    /// Starts the threads. `wake` is called from them whenever an answer is there to be taken; sessions are kept in
    /// `slot`, where there is one.
    pub fn start(slot: Option<Slot>, shown: Dialogs, wake: impl Fn() + Send + Sync + 'static) -> Self {
        let (sender, answers) = channel();
        let post = Post::new(sender, wake);
        let board = Arc::new(Board::default());
        for serve in [assemble::serve, run::serve, read::serve] {
            let board = Arc::clone(&board);
            begin(&post, move |post| serve(&board, post));
        }
        let (files, asked) = channel();
        begin(&post, move |post| files::serve(&asked, post));
        let (dialogs, asked) = channel();
        begin(&post, move |post| dialog::serve(&asked, shown, post));
        let newest_range = Arc::new(AtomicU64::new(0));
        let (ranges, asked) = channel();
        let newest = Arc::clone(&newest_range);
        begin(&post, move |post| range::serve(&asked, &newest, post));
        let keeper = slot.map(|slot| {
            let (sender, asked) = channel();
            let thread = begin(&post, move |post| keep::serve(&slot, &asked, post));
            Keeper { asked: sender, thread }
        });
        Self { board, files, dialogs, ranges, newest_range, keeper, answers }
    }

    /// Asks for something. A thread that has ended answers nothing more, and there is nobody left to tell.
    pub fn ask(&self, request: Request) {
        match request {
            Request::Run { generation, document } => self.board.change(|state| {
                let settings = &document.settings;
                state.line.get_or_insert_with(|| LineRequest {
                    day: settings.reading_day,
                    conventions: settings.conventions(),
                });
                state.to_assemble = Some((generation, document));
            }),
            Request::Read(line) => self.board.change(|state| state.line = Some(line)),
            Request::Stop => self.board.stop(),
            Request::Range(task) => {
                self.newest_range.store(task.number, Ordering::Release);
                let _ = self.ranges.send(*task);
            }
            Request::StopRange => self.newest_range.store(0, Ordering::Release),
            Request::PickPath { purpose, file_name } => {
                let _ = self.dialogs.send(dialog::Asked { purpose, file_name });
            }
            Request::Open { paths, current } => self.do_with_files(files::Task::Open { paths, current }),
            Request::Save { path, workspace } => self.do_with_files(files::Task::Save { path, workspace }),
            Request::Export(request) => self.do_with_files(files::Task::Export(request)),
            Request::Keep(kept) => {
                if let Some(keeper) = &self.keeper {
                    let _ = keeper.asked.send(kept);
                }
            }
        }
    }

    /// The next answer, if one is there.
    pub fn answer(&self) -> Option<Answer> {
        self.answers.try_recv().ok()
    }

    /// The next answer, waited for; none after `longest`. For those without a paint thread.
    pub fn wait(&self, longest: Duration) -> Option<Answer> {
        self.answers.recv_timeout(longest).ok()
    }

    fn do_with_files(&self, task: files::Task) {
        let _ = self.files.send(task);
    }
}

/// Starts a thread that tells of its own fault, should it have one; the window goes on with what is left.
fn begin(post: &Post, serve: impl FnOnce(&Post) + Send + 'static) -> JoinHandle<()> {
    let post = post.clone();
    thread::spawn(move || {
        if panic::catch_unwind(AssertUnwindSafe(|| serve(&post))).is_err() {
            let sentence =
                "A fault of the program stopped a part of it: save the workspace and start it again";
            post.answer(Answer::Failed(sentence.to_owned()));
        }
    })
}

impl Drop for Worker {
    /// Ends the run and sees the session kept. Other threads end by themselves, a dialog when it is closed.
    fn drop(&mut self) {
        self.board.close();
        self.newest_range.store(0, Ordering::Release);
        if let Some(Keeper { asked, thread }) = self.keeper.take() {
            drop(asked);
            // A keeper with a fault has told so already.
            let _ = thread.join();
        }
    }
}
