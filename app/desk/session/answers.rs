//! Takes the worker's answers into a session. Figures of a run that is no longer shown are dropped.

use super::undo::Target;
use super::{Live, RunState, Session};
use crate::desk::commands::{Command, PathPurpose};
use crate::desk::worker::{Answer, Figures, Opened, Request};
use crate::workspace::{Settings, View};
use ebbmark_engine::factors::{Fitted, Model};
use ebbmark_engine::tables::{Notice, NoticeLevel};
use std::path::PathBuf;
use std::sync::Arc;

impl Session {
    /// Takes one answer.
    pub fn take(&mut self, answer: Answer) -> Vec<Request> {
        match answer {
            Answer::Figures { generation, figures } => return self.take_figures(generation, figures),
            Answer::Ranging { number, ranging } => self.take_ranging(number, ranging),
            Answer::Opened(opened) => return self.take_opened(*opened),
            Answer::Refused(refusal) => self.refusal = Some(refusal),
            Answer::Picked { purpose, paths } => return self.take_picked(purpose, paths),
            Answer::NoDialog(purpose) => self.path_field = Some(purpose),
            Answer::Saved { path, document } => {
                self.notices.tell(NoticeLevel::Info, format!("Saved to {}", path.display()));
                self.file = Some(path);
                self.saved = Some(document);
                return vec![self.keep()];
            }
            Answer::Exported(path) => {
                self.notices.tell(NoticeLevel::Info, format!("Exported to {}", path.display()));
            }
            Answer::Failed(sentence) => self.notices.tell_failure(sentence),
        }
        Vec::new()
    }

    fn take_picked(&mut self, purpose: PathPurpose, mut paths: Vec<PathBuf>) -> Vec<Request> {
        match purpose {
            PathPurpose::Open => self.apply(Command::Open(paths)),
            PathPurpose::SaveAs => paths.pop().map_or(Vec::new(), |path| self.apply(Command::SaveAs(path))),
            PathPurpose::Export(kind) => {
                paths.pop().map_or(Vec::new(), |path| self.apply(Command::Export(kind, path)))
            }
        }
    }

    fn take_opened(&mut self, opened: Opened) -> Vec<Request> {
        let Opened { document, view, file, notices } = opened;
        let open = Command::Open(file.iter().cloned().collect());
        self.undo.remember(open.text(), Target::of(&open), self.state());
        self.undo.end_gesture();
        notices.into_iter().for_each(|Notice { level, text }| self.notices.tell(level, text));
        let theme = self.view.theme;
        self.view = view.unwrap_or_else(|| View { theme, ..View::default() });
        let document = Arc::new(document);
        self.saved = Some(Arc::clone(&document));
        self.file = file;
        self.put(document)
    }

    fn take_figures(&mut self, generation: u64, figures: Figures) -> Vec<Request> {
        let is_newest = generation == self.asked_generation;
        if is_newest {
            match figures {
                Figures::Model { model, fit, fitted, days, has_all_days } => {
                    self.keep_fitted(fitted);
                    let requests = self.begin(generation, model, days, has_all_days);
                    self.live.fit = fit;
                    return requests;
                }
                Figures::Faults { faults, offer } => {
                    self.faults = faults;
                    self.repair_offered = offer;
                    self.live.is_before_edit = self.live.model.is_some();
                    return Vec::new();
                }
                _ => {}
            }
        }
        if generation == self.live.generation { self.take_shown(figures) } else { Vec::new() }
    }

    /// What the history gave is kept with it, for a day on which the history is gone; no edit, and no step to undo.
    fn keep_fitted(&mut self, fitted: Option<Arc<Fitted>>) {
        if fitted.is_some()
            && let Some(history) = &mut Arc::make_mut(&mut self.document).history
        {
            history.fitted = fitted;
        }
    }

    /// A valid model: its run begins, and what is shown belongs to it from now on.
    fn begin(
        &mut self,
        generation: u64,
        model: Arc<Model>,
        days: Arc<Vec<u32>>,
        has_all_days: bool,
    ) -> Vec<Request> {
        self.faults.clear();
        self.repair_offered = None;
        let mut standing = model.notices.clone();
        if !has_all_days {
            standing.push(fewer_days_notice(&self.document.settings, days.len()));
        }
        self.notices.stand(standing);
        self.live = Live {
            generation,
            model: Some(model),
            days,
            state: RunState::Running,
            bands: self.live.bands.take(),
            at_line: self.live.at_line.take(),
            ..Live::default()
        };
        // The line may have moved since the run was asked for, or stop at other days now.
        vec![Request::Read(self.line())]
    }

    fn take_shown(&mut self, figures: Figures) -> Vec<Request> {
        let live = &mut self.live;
        match figures {
            Figures::Bands(bands) => live.bands = Some(bands),
            Figures::AtLine(at_line) => live.at_line = Some(at_line),
            Figures::Progress { paths, seconds } => (live.paths_done, live.seconds) = (paths, seconds),
            Figures::Finished { seconds } => {
                live.paths_done =
                    live.at_line.as_ref().and_then(|line| line.paths).unwrap_or(live.paths_done);
                live.seconds = seconds;
                live.state = RunState::Finished;
            }
            Figures::Stopped => live.state = RunState::Stopped,
            Figures::Failed(sentence) => {
                live.state = RunState::Idle;
                self.notices.tell_failure(sentence);
            }
            Figures::Model { .. } | Figures::Faults { .. } => {}
        }
        self.due_exports()
    }
}

fn fewer_days_notice(settings: &Settings, kept: usize) -> Notice {
    let text = format!(
        "{} paths over {} days do not fit into 1 GiB: {kept} days are kept, and the reading line stops at those",
        settings.paths, settings.horizon_days
    );
    Notice { level: NoticeLevel::Info, text }
}
