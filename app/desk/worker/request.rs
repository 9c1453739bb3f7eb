//! What the session asks of the worker, and what comes back. Plain data.

use super::range::{RangeTask, Ranging};
use crate::desk::commands::{ExportKind, PathPurpose};
use crate::desk::notices::Refusal;
use crate::desk::session::AtLine;
use crate::workspace::{Document, Kept, View, Workspace};
use ebbmark_engine::factors::{Fitted, Model, Repair};
use ebbmark_engine::fit::Fit;
use ebbmark_engine::measures::{Bands, Conventions};
use ebbmark_engine::tables::{Fault, Notice};
use std::path::PathBuf;
use std::sync::Arc;

/// Something to be done off the paint thread.
#[derive(Debug)]
pub enum Request {
    /// Assembles a document's model and runs it; an older run goes on until the new model is known to be valid.
    Run {
        /// Number of the run.
        generation: u64,
        /// What to run.
        document: Arc<Document>,
    },
    /// Reads the paths at hand at another day or by other conventions; no new run. The latest request wins.
    Read(LineRequest),
    /// Stops the run; what has arrived stays.
    Stop,
    /// Ranges the losses at the line over the fit's parameters; an older wish is stopped.
    Range(Box<RangeTask>),
    /// Stops ranging.
    StopRange,
    /// Shows a file dialog.
    PickPath {
        /// What for.
        purpose: PathPurpose,
        /// File name offered.
        file_name: String,
    },
    /// Opens files, or, with none, the built-in example book.
    Open {
        /// The files.
        paths: Vec<PathBuf>,
        /// Book that parts without positions join.
        current: Arc<Document>,
    },
    /// Writes a workspace.
    Save {
        /// Where.
        path: PathBuf,
        /// What.
        workspace: Box<Workspace>,
    },
    /// Writes a figure or its numbers.
    Export(Box<ExportRequest>),
    /// Keeps the session so that it survives a crash.
    Keep(Box<Kept>),
}

/// A reading asked for.
#[derive(Debug, Clone, PartialEq)]
pub struct LineRequest {
    /// Day, one of the kept days.
    pub day: u32,
    /// How it is read.
    pub conventions: Conventions,
}

/// An export asked for, with everything it shows.
#[derive(Debug, Clone)]
pub struct ExportRequest {
    /// What.
    pub kind: ExportKind,
    /// Where.
    pub path: PathBuf,
    /// Book and settings.
    pub document: Arc<Document>,
    /// Its model.
    pub model: Arc<Model>,
    /// Bands ahead.
    pub bands: Arc<Bands>,
    /// Everything at the reading line.
    pub at_line: Arc<AtLine>,
    /// Paths behind bands and line, seconds they took.
    pub seconds: f64,
}

/// Something that came back.
#[derive(Debug)]
pub enum Answer {
    /// Figures of a run.
    Figures {
        /// Number of the run.
        generation: u64,
        /// What of it.
        figures: Figures,
    },
    /// How far the range over the parameters is.
    Ranging {
        /// Number of the wish.
        number: u64,
        /// How far.
        ranging: Ranging,
    },
    /// A document was opened.
    Opened(Box<Opened>),
    /// Files were not opened.
    Refused(Refusal),
    /// A path was chosen in a dialog.
    Picked {
        /// What for.
        purpose: PathPurpose,
        /// Paths, at least one.
        paths: Vec<PathBuf>,
    },
    /// There is no file dialog on this machine.
    NoDialog(PathPurpose),
    /// A workspace was written.
    Saved {
        /// Where.
        path: PathBuf,
        /// What.
        document: Arc<Document>,
    },
    /// An export was written.
    Exported(PathBuf),
    /// Something asked for could not be done; a sentence that says what to do.
    Failed(String),
}

/// A part of a run's figures.
#[derive(Debug)]
pub enum Figures {
    /// The inputs are a valid model; its run begins.
    Model {
        /// The model.
        model: Arc<Model>,
        /// The fit of its history, where there is one.
        fit: Option<Arc<Fit>>,
        /// What the model took of it.
        fitted: Option<Arc<Fitted>>,
        /// Days on which the line can stop.
        days: Arc<Vec<u32>>,
        /// Whether the memory budget allowed every day.
        has_all_days: bool,
    },
    /// The inputs are not a valid model; no run begins.
    Faults {
        /// Everything wrong with them.
        faults: Vec<Fault>,
        /// The repair that would make a model of them, where the correlation is all that is wrong.
        offer: Option<Arc<Repair>>,
    },
    /// Bands ahead.
    Bands(Arc<Bands>),
    /// Everything at the reading line.
    AtLine(Arc<AtLine>),
    /// Paths done so far, and seconds since the run began.
    Progress {
        /// Paths done.
        paths: usize,
        /// Seconds.
        seconds: f64,
    },
    /// All paths are done and read.
    Finished {
        /// Seconds that the run took.
        seconds: f64,
    },
    /// The run was stopped.
    Stopped,
    /// The run failed; a sentence.
    Failed(String),
}

/// A document that was opened.
#[derive(Debug)]
pub struct Opened {
    /// The document.
    pub document: Document,
    /// Its view, from a workspace.
    pub view: Option<View>,
    /// Where it is saved, for a workspace.
    pub file: Option<PathBuf>,
    /// What the readers want told.
    pub notices: Vec<Notice>,
}

impl LineRequest {
    /// Whether a reading is the one asked for, from however many paths.
    pub fn is_answered_by(&self, at_line: &AtLine) -> bool {
        self.day == at_line.day && self.conventions == at_line.conventions
    }
}
