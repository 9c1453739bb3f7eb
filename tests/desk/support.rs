//! A small invented book, and a session driven without a screen.

use ebbmark::desk::commands::Command;
use ebbmark::desk::session::Session;
use ebbmark::desk::worker::{Dialogs, Request, Worker};
use ebbmark::workspace::{Document, Kept, Settings, View, Workspace};
use ebbmark_engine::book::{Description, DiffusionKind, HalfLife, Holding, Kind, LevelUnit, TypedFigure};
use ebbmark_engine::factors::{CorrelationTable, Inputs};
use std::path::{Path, PathBuf};
use std::sync::Arc;
use std::sync::atomic::{AtomicU32, Ordering};
use std::time::{Duration, Instant};

/// No test waits longer for the worker, even on a loaded machine.
const LONGEST_WAIT: Duration = Duration::from_secs(150);

pub(crate) fn figure(value: f64) -> Option<TypedFigure> {
    Some(TypedFigure { value, has_percent_sign: false })
}

pub(crate) fn holding(name: &str, kind: Kind, quantity: f64, price: f64) -> Holding {
    Holding {
        name: name.to_owned(),
        kind,
        quantity,
        price,
        group: String::new(),
        currency: None,
        factor: None,
        multiplier: 1.0,
        unit: None,
        carry: 0.0,
        description: Description::default(),
        line: None,
        other_columns: Vec::new(),
    }
}

/// A share, a rate that reverts, and cash.
pub(crate) fn inputs() -> Inputs {
    let share = Holding {
        description: Description { volatility: figure(0.2), ..Description::default() },
        ..holding("Harbour", Kind::Spot, 1_000.0, 50.0)
    };
    let rate = Holding {
        unit: Some(LevelUnit::Percent),
        description: Description {
            diffusion: Some(DiffusionKind::RevertingLevel),
            volatility: figure(0.8),
            long_run: figure(3.0),
            half_life: Some(HalfLife::Days(120.0)),
            ..Description::default()
        },
        ..holding("Rate", Kind::Level, -2_000.0, 2.5)
    };
    let names = vec!["Harbour".to_owned(), "Rate".to_owned()];
    Inputs {
        holdings: vec![share, rate, holding("Cash", Kind::Cash, 10_000.0, 1.0)],
        exposures: Vec::new(),
        factors: Vec::new(),
        correlation: Some(CorrelationTable { names, cells: vec![1.0, -0.3, -0.3, 1.0], lines: Vec::new() }),
        ..Inputs::default()
    }
}

/// The book, read from few paths so that tests are quick.
pub(crate) fn document() -> Document {
    let settings = Settings { paths: 4_000, horizon_days: 63, ..Settings::usual() };
    Document { name: "small".to_owned(), inputs: Arc::new(inputs()), history: None, holidays: None, settings }
}

pub(crate) fn session() -> Session {
    let workspace = Workspace { document: document(), view: View::default() };
    Session::new(Kept { workspace, file: None, has_unsaved_edits: false })
}

/// A session with a worker, driven as the window drives it.
pub(crate) struct Driven {
    pub(crate) session: Session,
    worker: Worker,
}

impl Driven {
    pub(crate) fn start(mut session: Session) -> Self {
        let worker = Worker::start(None, Dialogs::None, || ());
        worker.ask(session.run());
        Self { session, worker }
    }

    /// Applies a command as a gesture of its own.
    pub(crate) fn apply(&mut self, command: Command) {
        let requests = self.session.apply(command);
        self.session.end_gesture();
        self.ask(requests);
    }

    /// Takes answers until the session is as wished.
    pub(crate) fn until(&mut self, what: &str, is_wished: impl Fn(&Session) -> bool) {
        let began = Instant::now();
        while !is_wished(&self.session) {
            assert!(began.elapsed() < LONGEST_WAIT, "waited in vain for {what}");
            self.take_one();
        }
    }

    /// Takes the next answer, waiting a moment for it.
    pub(crate) fn take_one(&mut self) {
        if let Some(answer) = self.worker.wait(Duration::from_millis(100)) {
            let requests = self.session.take(answer);
            self.ask(requests);
        }
    }

    fn ask(&self, requests: Vec<Request>) {
        requests.into_iter().for_each(|request| self.worker.ask(request));
    }
}

/// A folder of its own for a test, removed when dropped.
pub(crate) struct Folder(PathBuf);

impl Folder {
    pub(crate) fn new() -> Self {
        static COUNT: AtomicU32 = AtomicU32::new(0);
        let number = COUNT.fetch_add(1, Ordering::Relaxed);
        let path = std::env::temp_dir().join(format!("ebbmark-test-{}-{number}", std::process::id()));
        std::fs::create_dir_all(&path).unwrap();
        Self(path)
    }

    pub(crate) fn path(&self) -> &Path {
        &self.0
    }

    pub(crate) fn file(&self, name: &str) -> PathBuf {
        self.0.join(name)
    }

    pub(crate) fn write(&self, name: &str, text: &str) -> PathBuf {
        let path = self.file(name);
        std::fs::write(&path, text).unwrap();
        path
    }

    /// Names in it, sorted.
    pub(crate) fn names(&self) -> Vec<String> {
        let entries = std::fs::read_dir(&self.0).unwrap();
        let mut names: Vec<String> =
            entries.map(|entry| entry.unwrap().file_name().into_string().unwrap()).collect();
        names.sort();
        names
    }
}

impl Drop for Folder {
    fn drop(&mut self) {
        let _ = std::fs::remove_dir_all(&self.0);
    }
}
