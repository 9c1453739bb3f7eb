//! A hand on the window without a screen: it finds things by their accessible labels, clicks, types and drags.

use ebbmark::desk::App;
use ebbmark::desk::session::{RunState, Session};
use ebbmark::desk::worker::{Dialogs, Worker};
use egui::{Key, Modifiers, Vec2};
use egui_kittest::Harness;
use egui_kittest::kittest::Queryable;
use std::path::Path;
use std::time::{Duration, Instant};

const SIZE: [f32; 2] = [1400.0, 900.0];
/// No test waits longer, even on a loaded machine.
const LONGEST_WAIT: Duration = Duration::from_secs(150);

/// A hand on the window: it finds things by their labels, clicks, types and drags.
pub(crate) struct Hand(pub(crate) Harness<'static, App>);

impl Hand {
    pub(crate) fn on(session: Session) -> Self {
        Self::at_size(session, SIZE)
    }

    pub(crate) fn at_size(session: Session, size: [f32; 2]) -> Self {
        let mut hand = Self(Harness::builder().with_size(size).build_eframe(|creation| {
            let ctx = creation.egui_ctx.clone();
            let worker = Worker::start(None, Dialogs::None, move || ctx.request_repaint());
            App::new(&creation.egui_ctx, session, worker)
        }));
        hand.until("the first run", |session| session.live().state == RunState::Finished);
        hand
    }

    pub(crate) fn session(&self) -> &Session {
        self.0.state().session()
    }

    pub(crate) fn until(&mut self, what: &str, is_wished: impl Fn(&Session) -> bool) {
        let began = Instant::now();
        while !is_wished(self.session()) {
            assert!(began.elapsed() < LONGEST_WAIT, "waited in vain for {what}");
            self.0.run_steps(1);
        }
        self.0.run_steps(3);
    }

    pub(crate) fn click(&mut self, label: &str) {
        self.0.get_by_label(label).click();
        self.0.run_steps(4);
    }

    pub(crate) fn press(&mut self, modifiers: Modifiers, key: Key) {
        self.0.key_press_modifiers(modifiers, key);
        self.0.run_steps(4);
    }

    /// Types over what stands in the field that is being edited, and enters it.
    pub(crate) fn enter(&mut self, text: &str) {
        self.0.key_press_modifiers(Modifiers::COMMAND, Key::A);
        self.0.event(egui::Event::Text(text.to_owned()));
        self.0.run_steps(2);
        self.press(Modifiers::NONE, Key::Enter);
    }

    pub(crate) fn open_by_path(&mut self, paths: &[&Path]) {
        let paths: Vec<String> = paths.iter().map(|path| path.display().to_string()).collect();
        self.press(Modifiers::COMMAND | Modifiers::SHIFT, Key::O);
        self.enter(&paths.join(";"));
    }

    /// Drags what has a label, in several moves.
    pub(crate) fn drag(&mut self, label: &str, by: Vec2) {
        let from = self.0.get_by_label(label).rect().center();
        self.0.drag_at(from);
        self.0.run_steps(1);
        for part in 1..=5 {
            self.0.hover_at(from + by * (part as f32 / 5.0));
            self.0.run_steps(1);
        }
        self.0.drop_at(from + by);
        self.0.run_steps(4);
    }

    pub(crate) fn volatility(&self) -> f64 {
        let described = &self.session().document().inputs.holdings[0].description;
        described.volatility.unwrap().value
    }
}
