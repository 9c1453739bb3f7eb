//! Where things stand in the window: the same window without a screen, asked by accessible label. What is done in the
//! real window is done here too, so that both look alike.

use crate::{Outcome, wait_for};
use ebbmark::desk::App;
use ebbmark::desk::commands::Command;
use ebbmark::desk::session::{RunState, Session};
use ebbmark::desk::start::session_of;
use ebbmark::desk::worker::{Dialogs, Worker};
use egui::Pos2;
use egui_kittest::Harness;
use egui_kittest::kittest::Queryable;
use std::cell::RefCell;
use std::path::Path;

/// The window's first size, points and pixels.
const SIZE: [f32; 2] = [1400.0, 900.0];

/// A window without a screen.
pub(crate) struct Twin {
    harness: RefCell<Harness<'static, App>>,
}

impl Twin {
    /// The window as it opens with the built-in example.
    pub(crate) fn open() -> Self {
        let harness = Harness::builder().with_size(SIZE).with_max_steps(64).build_eframe(|creation| {
            let ctx = creation.egui_ctx.clone();
            let worker = Worker::start(None, Dialogs::None, move || ctx.request_repaint());
            App::new(&creation.egui_ctx, session_of(&[], None), worker)
        });
        Self { harness: RefCell::new(harness) }
    }

    /// Opens a book and waits for its figures.
    pub(crate) fn open_book(&self, path: &Path) -> Outcome<()> {
        self.harness.borrow_mut().state_mut().push(Command::Open(vec![path.to_path_buf()]));
        let name = path.file_stem().unwrap_or_default().to_string_lossy().into_owned();
        self.until("the book's figures", |session| {
            session.document().name == name && session.live().state == RunState::Finished
        })
    }

    /// Centre of the one thing with a label.
    pub(crate) fn place(&self, label: &str) -> Pos2 {
        self.harness.borrow().get_by_label(label).rect().center()
    }

    /// Clicks on the one thing with a label.
    pub(crate) fn click(&self, label: &str) {
        let mut harness = self.harness.borrow_mut();
        harness.get_by_label(label).click();
        harness.run_steps(4);
    }

    fn until(&self, what: &str, is_wished: impl Fn(&Session) -> bool) -> Outcome<()> {
        wait_for(what, || {
            let mut harness = self.harness.borrow_mut();
            harness.run_steps(2);
            is_wished(harness.state().session()).then_some(())
        })
    }
}
