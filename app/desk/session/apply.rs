//! Applies commands to a session. What has to be done off the paint thread is left as requests for the worker.

use super::edits;
use super::undo::{State, Target};
use super::{Live, RunState, Session};
use crate::desk::commands::{Command, ExportKind, PathPurpose, SettingChange, file_stem};
use crate::desk::worker::{ExportRequest, LineRequest, Request};
use crate::workspace::{BookOrder, Document, Kept, Settings, Tab, Theme, View, Workspace};
use ebbmark_engine::tables::NoticeLevel;
use std::path::PathBuf;
use std::sync::Arc;

impl Session {
    /// Applies one command.
    pub fn apply(&mut self, command: Command) -> Vec<Request> {
        match command {
            Command::Undo => self.step(Step::Back),
            Command::Redo => self.step(Step::Forth),
            Command::StopRun => vec![Request::Stop],
            Command::RangeParameters => self.range(),
            Command::StopRange => self.drop_range(),
            Command::RunAgain => vec![self.run()],
            Command::AskPath(purpose) => vec![self.ask_path(purpose)],
            Command::TypePath(purpose) => self.show_path_field(Some(purpose)),
            Command::ClosePathField => self.show_path_field(None),
            Command::Open(paths) => self.open(paths),
            Command::OpenExample => self.open(Vec::new()),
            Command::Save => match self.file.clone() {
                Some(path) => self.save(path),
                None => vec![self.ask_path(PathPurpose::SaveAs)],
            },
            Command::SaveAs(path) => self.save(path),
            Command::Export(kind, path) => self.export(kind, path),
            Command::DismissNotice(id) => self.without_requests(|session| session.notices.dismiss(id)),
            Command::DismissRefusal => self.without_requests(|session| session.refusal = None),
            view_command if changes_view(&view_command) => self.change_view(view_command),
            edit => self.edit(&edit),
        }
    }

    /// The pointer is up: the next edit is a step of its own.
    pub fn end_gesture(&mut self) {
        self.undo.end_gesture();
    }

    fn without_requests(&mut self, change: impl FnOnce(&mut Self)) -> Vec<Request> {
        change(self);
        Vec::new()
    }

    fn edit(&mut self, command: &Command) -> Vec<Request> {
        let command = &self.snapped(command.clone());
        let Some(document) = edits::edited(&self.document, self.live.model.as_deref(), command) else {
            return Vec::new();
        };
        self.undo.remember(command.text(), Target::of(command), self.state());
        self.put(Arc::new(document))
    }

    /// The reading line stops at days that can be read, as far as the run at hand reaches.
    fn snapped(&self, command: Command) -> Command {
        let reach = self.live.days.last().copied().unwrap_or(0);
        match command {
            Command::ChangeSetting(SettingChange::ReadingDay(day)) if day <= reach => {
                Command::ChangeSetting(SettingChange::ReadingDay(self.live.nearest_day(day)))
            }
            other => other,
        }
    }

    fn step(&mut self, step: Step) -> Vec<Request> {
        let now = self.state();
        let state = match step {
            Step::Back => self.undo.undo(now),
            Step::Forth => self.undo.redo(now),
        };
        let Some(State { document, file }) = state else { return Vec::new() };
        self.file = file;
        self.put(document)
    }

    /// The document and its file as they are now.
    pub(super) fn state(&self) -> State {
        State { document: Arc::clone(&self.document), file: self.file.clone() }
    }

    /// Puts a document in place of the current one and asks for what its figures need.
    pub(super) fn put(&mut self, document: Arc<Document>) -> Vec<Request> {
        let old = std::mem::replace(&mut self.document, document);
        let mut requests = Vec::new();
        if is_other_book(&old, &self.document) {
            // Another book's figures would not be from before an edit, but simply wrong.
            self.live = Live::default();
            requests.push(Request::Stop);
        }
        let is_read_anew =
            needs_run(&old, &self.document) || needs_reading(&old.settings, &self.document.settings);
        if is_read_anew {
            requests.extend(self.drop_range());
        }
        if needs_run(&old, &self.document) {
            requests.push(self.run());
        } else if needs_reading(&old.settings, &self.document.settings) {
            requests.push(Request::Read(self.line()));
        }
        requests.push(self.keep());
        requests
    }

    /// Asks for a run of the document as it stands.
    pub fn run(&mut self) -> Request {
        self.asked_generation += 1;
        Request::Run { generation: self.asked_generation, document: Arc::clone(&self.document) }
    }

    /// Asks for what the reading line shows.
    pub(super) fn line(&self) -> LineRequest {
        let settings = &self.document.settings;
        LineRequest { day: self.reading_day(), conventions: settings.conventions() }
    }

    /// Asks to keep the session.
    pub fn keep(&self) -> Request {
        Request::Keep(Box::new(Kept {
            workspace: self.workspace(),
            file: self.file.clone(),
            has_unsaved_edits: self.has_unsaved_edits(),
        }))
    }

    fn workspace(&self) -> Workspace {
        Workspace { document: Document::clone(&self.document), view: self.view.clone() }
    }

    fn ask_path(&mut self, purpose: PathPurpose) -> Request {
        self.path_field = None;
        let file_name = match purpose {
            PathPurpose::Open => String::new(),
            PathPurpose::SaveAs => format!("{}.ron", file_stem(&self.document.name)),
            PathPurpose::Export(kind) => kind.file_name(&self.document.name),
        };
        Request::PickPath { purpose, file_name }
    }

    pub(super) fn show_path_field(&mut self, purpose: Option<PathPurpose>) -> Vec<Request> {
        self.path_field = purpose;
        Vec::new()
    }

    fn open(&mut self, paths: Vec<PathBuf>) -> Vec<Request> {
        self.path_field = None;
        self.refusal = None;
        vec![Request::Open { paths, current: Arc::clone(&self.document) }]
    }

    fn save(&mut self, path: PathBuf) -> Vec<Request> {
        self.path_field = None;
        vec![Request::Save { path, workspace: Box::new(self.workspace()) }]
    }

    /// Exports wait until the figures shown are those of all paths; there are none of a book with faults.
    fn export(&mut self, kind: ExportKind, path: PathBuf) -> Vec<Request> {
        self.path_field = None;
        if !self.faults.is_empty() {
            self.notices.tell_failure("Not exported: the book has faults; mend them first");
            return Vec::new();
        }
        self.waiting_exports.push((kind, path));
        let due = self.due_exports();
        if due.is_empty() {
            self.notices.tell(NoticeLevel::Info, "Exported when all paths are done");
        }
        due
    }

    /// Exports that need wait no longer.
    pub(super) fn due_exports(&mut self) -> Vec<Request> {
        let live = &self.live;
        let is_ended = matches!(live.state, RunState::Finished | RunState::Stopped);
        let (Some(model), Some(bands), Some(at_line)) = (&live.model, &live.bands, &live.at_line) else {
            return Vec::new();
        };
        let is_whole = bands.days.len() == live.days.len() && self.line().is_answered_by(at_line);
        if !is_ended || live.is_before_edit || !is_whole {
            return Vec::new();
        }
        let request = |(kind, path)| {
            Request::Export(Box::new(ExportRequest {
                kind,
                path,
                document: Arc::clone(&self.document),
                model: Arc::clone(model),
                bands: Arc::clone(bands),
                at_line: Arc::clone(at_line),
                seconds: live.seconds,
            }))
        };
        std::mem::take(&mut self.waiting_exports).into_iter().map(request).collect()
    }

    fn change_view(&mut self, command: Command) -> Vec<Request> {
        let before = self.view.clone();
        match command {
            Command::ChooseHolding(name) => self.choose_holding(name),
            other => change_view(&mut self.view, other),
        }
        if self.view == before { Vec::new() } else { vec![self.keep()] }
    }

    fn choose_holding(&mut self, name: String) {
        let holding = self.document.inputs.holdings.iter().find(|holding| holding.name == name);
        let driven_by = holding.and_then(edits::holdings::factor_of).map(str::to_owned);
        let exposed_to = || {
            let exposure = self.document.inputs.exposures.iter().find(|exposure| exposure.holding == name);
            exposure.map(|exposure| exposure.factor.clone())
        };
        if let Some(factor) = driven_by.or_else(exposed_to) {
            self.view.factor = Some(factor);
        }
        self.view.holding = Some(name);
    }
}

#[derive(Clone, Copy)]
enum Step {
    Back,
    Forth,
}

/// Whether two documents have no holding in common.
fn is_other_book(old: &Document, new: &Document) -> bool {
    let [old, new] = [old, new].map(|document| &document.inputs.holdings);
    !old.is_empty() && !new.iter().any(|holding| old.iter().any(|other| other.name == holding.name))
}

/// Whether other paths are needed, and not only another reading of the same.
fn needs_run(old: &Document, new: &Document) -> bool {
    let of = |settings: &Settings| {
        (
            (settings.paths, settings.seed, settings.horizon_days),
            (settings.days_per_year, settings.loss_limit),
            (settings.book_currency.clone(), settings.repairs_correlation),
        )
    };
    old.inputs != new.inputs || old.history != new.history || of(&old.settings) != of(&new.settings)
}

fn needs_reading(old: &Settings, new: &Settings) -> bool {
    old.conventions() != new.conventions() || old.reading_day != new.reading_day
}

fn changes_view(command: &Command) -> bool {
    matches!(
        command,
        Command::ShowTab(_)
            | Command::ChooseFactor(_)
            | Command::ChooseHolding(_)
            | Command::ChooseCell { .. }
            | Command::OrderMatrix(_)
            | Command::MarkFactor(_)
            | Command::SortBook(_)
            | Command::FilterBook(_)
            | Command::WearTheme(_)
            | Command::ToggleTheme
    )
}

fn change_view(view: &mut View, command: Command) {
    match command {
        Command::ShowTab(tab) => view.tab = tab,
        Command::ChooseFactor(name) => view.factor = Some(name),
        Command::ChooseCell { row, column } => {
            view.tab = Tab::Correlation;
            view.cell = Some((row, column));
        }
        Command::SortBook(column) => {
            view.order = match view.order {
                Some(order) if order.column == column && order.is_ascending => {
                    Some(BookOrder { column, is_ascending: false })
                }
                Some(order) if order.column == column => None,
                _ => Some(BookOrder { column, is_ascending: true }),
            };
        }
        Command::MarkFactor(name) => match view.marked.iter().position(|marked| *marked == name) {
            Some(at) => drop(view.marked.remove(at)),
            None => view.marked.push(name),
        },
        Command::OrderMatrix(order) => view.matrix_order = order,
        Command::FilterBook(text) => view.filter = text,
        Command::WearTheme(theme) => view.theme = theme,
        Command::ToggleTheme => {
            view.theme = match view.theme {
                Theme::Light => Theme::Dark,
                Theme::Dark => Theme::Light,
            };
        }
        _ => {}
    }
}
