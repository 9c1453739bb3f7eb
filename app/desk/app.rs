//! The loop of a frame: take the worker's answers, hear keys and dropped files, let the panels draw, apply what they
//! pushed. What is drawn lives in `panels`, what a command does in `session`.

use super::commands::{Command, Queue, shortcuts};
use super::panels;
use super::session::Session;
use super::theme;
use super::worker::{Request, Worker};
use std::path::PathBuf;

/// The window's application.
pub struct App {
    session: Session,
    worker: Worker,
    queue: Queue,
    title: String,
}

impl App {
    /// The application of a session. Its first run is asked for at once; `worker` wakes `ctx` when something arrives.
    pub fn new(ctx: &egui::Context, mut session: Session, worker: Worker) -> Self {
        theme::install(ctx);
        worker.ask(session.run());
        worker.ask(session.keep());
        Self { session, worker, queue: Queue::default(), title: String::new() }
    }

    /// What the window shows.
    pub fn session(&self) -> &Session {
        &self.session
    }

    /// Asks for a command, as a panel would.
    pub fn push(&mut self, command: Command) {
        self.queue.push(command);
    }

    fn take_answers(&mut self) {
        while let Some(answer) = self.worker.answer() {
            let requests = self.session.take(answer);
            self.ask(requests);
        }
    }

    fn hear(&mut self, ctx: &egui::Context) {
        shortcuts::pressed(ctx).into_iter().for_each(|command| self.queue.push(command));
        let dropped: Vec<PathBuf> =
            ctx.input(|input| input.raw.dropped_files.iter().map(|file| file.path().to_path_buf()).collect());
        if !dropped.is_empty() {
            self.queue.push(Command::Open(dropped));
        }
    }

    /// Applies what was pushed in this frame. A gesture lasts while the pointer is held down.
    fn apply_pushed(&mut self, ctx: &egui::Context) {
        let commands = self.queue.take();
        if !commands.is_empty() {
            ctx.request_repaint();
        }
        for command in commands {
            let requests = self.session.apply(command);
            self.ask(requests);
        }
        if !ctx.input(|input| input.pointer.any_down()) {
            self.session.end_gesture();
        }
    }

    fn ask(&self, requests: Vec<Request>) {
        requests.into_iter().for_each(|request| self.worker.ask(request));
    }

    fn name_window(&mut self, ctx: &egui::Context) {
        let mark = if self.session.has_unsaved_edits() { "*" } else { "" };
        let title = format!("{}{mark} - Ebbmark", self.session.document().name);
        if title != self.title {
            ctx.send_viewport_cmd(egui::ViewportCommand::Title(title.clone()));
            self.title = title;
        }
    }
}

impl eframe::App for App {
    fn logic(&mut self, _ctx: &egui::Context, _frame: &mut eframe::Frame) {
        self.take_answers();
    }

    fn ui(&mut self, ui: &mut egui::Ui, _frame: &mut eframe::Frame) {
        let ctx = ui.ctx().clone();
        self.hear(&ctx);
        theme::wear(&ctx, self.session.view().theme);
        panels::window_ui(ui, &self.session, &mut self.queue);
        self.apply_pushed(&ctx);
        self.name_window(&ctx);
    }
}
