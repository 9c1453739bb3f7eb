//! What the window begins with: the files named, else the last session, else the built-in example; and the window itself.

use super::app::App;
use super::notices::Refusal;
use super::session::Session;
use super::window_error::WindowError;
use super::worker::files::whole_path;
use super::worker::open::{open as open_files, opened_book};
use super::worker::{Dialogs, Opened, Worker};
use crate::opening;
use crate::workspace::{self, Beginning, Document, Kept, Settings, Slot, View, Workspace};
use ebbmark_engine::tables::{Faults, NoticeLevel};
use std::panic::{self, AssertUnwindSafe};
use std::path::PathBuf;
use std::sync::Arc;
use std::sync::atomic::{AtomicBool, Ordering};

const FIRST_SIZE: [f32; 2] = [1400.0, 900.0];
const SMALLEST_SIZE: [f32; 2] = [1100.0, 700.0];

/// Opens the window and returns when it is closed.
///
/// # Errors
/// [`WindowError`] where no window can be had; its sentence says what is missing and what to do.
pub fn open(files: &[PathBuf]) -> Result<(), WindowError> {
    WindowError::check_display()?;
    let is_open = Arc::new(AtomicBool::new(false));
    let opened = Arc::clone(&is_open);
    let create: eframe::AppCreator<'_> = Box::new(move |creation| {
        opened.store(true, Ordering::Release);
        let (session, slot) = begin(files);
        let ctx = creation.egui_ctx.clone();
        let worker = Worker::start(slot, Dialogs::OfTheDesktop, move || ctx.request_repaint());
        Ok(Box::new(App::new(&creation.egui_ctx, session, worker)))
    });
    // A missing system library ends in a panic inside the window's libraries; one that comes later is a fault of ours.
    let result = panic::catch_unwind(AssertUnwindSafe(|| eframe::run_native("Ebbmark", options(), create)));
    match result {
        Ok(result) => result.map_err(|error| WindowError::of(&error)),
        Err(panic) if is_open.load(Ordering::Acquire) => panic::resume_unwind(panic),
        Err(panic) => Err(WindowError::of_panic(&*panic)),
    }
}

fn options() -> eframe::NativeOptions {
    eframe::NativeOptions {
        viewport: egui::ViewportBuilder::default()
            .with_icon(icon())
            .with_app_id("ebbmark")
            .with_inner_size(FIRST_SIZE)
            .with_min_inner_size(SMALLEST_SIZE),
        // A third faster on software graphics, and flat colours have nothing to dither.
        dithering: false,
        ..eframe::NativeOptions::default()
    }
}

/// The session to begin with, and where it is kept.
fn begin(files: &[PathBuf]) -> (Session, Option<Slot>) {
    let beginning = if files.is_empty() { Beginning::Last } else { Beginning::Other };
    let folder = workspace::state_folder().ok_or_else(|| "no home folder is set".to_owned());
    let taken = folder.and_then(|folder| Slot::take(&folder, beginning).map_err(|error| error.to_string()));
    let (slot, kept, failure) = match taken {
        Ok((slot, kept)) => (Some(slot), kept, None),
        Err(reason) => (None, None, Some(reason)),
    };
    let mut session = session_of(files, kept);
    if let Some(reason) = failure {
        let sentence = format!("The session can't be kept against a crash ({reason}): save the workspace");
        session.notices_mut().tell_failure(sentence);
    }
    (session, slot)
}

/// The session of the files named, else of what was kept, else of the built-in example. Files that can't be opened are
/// listed with everything wrong with them, beside the example.
pub fn session_of(files: &[PathBuf], kept: Option<Kept>) -> Session {
    match kept {
        Some(kept) if files.is_empty() => found_again(kept),
        _ => {
            let example = example();
            if files.is_empty() {
                return just_opened(example);
            }
            let files: Vec<PathBuf> = files.iter().map(|file| whole_path(file)).collect();
            match open_files(&files, &example.document) {
                Ok(opened) => just_opened(opened),
                Err(Faults(faults)) => {
                    let mut session = just_opened(example);
                    session.refuse(Refusal { paths: files, faults });
                    session
                }
            }
        }
    }
}

/// A kept session; where it has no edits of its own, what now stands in its file.
fn found_again(kept: Kept) -> Session {
    let in_file = kept.file.as_ref().filter(|_| !kept.has_unsaved_edits).map(|file| workspace::read(file));
    if let Some(Ok(workspace)) = in_file {
        return Session::new(Kept { workspace, ..kept });
    }
    let has_unsaved_edits = kept.has_unsaved_edits;
    let mut session = Session::new(kept);
    if has_unsaved_edits {
        session
            .notices_mut()
            .tell(NoticeLevel::Info, "Found the last session again, with edits that are not saved yet");
    }
    session
}

fn just_opened(opened: Opened) -> Session {
    let Opened { document, view, file, notices } = opened;
    let workspace = Workspace { document, view: view.unwrap_or_default() };
    let mut session = Session::new(Kept { workspace, file, has_unsaved_edits: false });
    notices.into_iter().for_each(|notice| session.notices_mut().tell(notice.level, notice.text));
    session
}

/// The built-in example; an empty book if it could not be read, which a test rules out.
fn example() -> Opened {
    let empty = || Opened {
        document: Document {
            name: String::new(),
            inputs: Arc::default(),
            history: None,
            holidays: None,
            settings: Settings::usual(),
        },
        view: Some(View::default()),
        file: None,
        notices: Vec::new(),
    };
    opening::built_in_example().map_or_else(|_| empty(), |book| opened_book(book, &Settings::usual()))
}

/// The program's icon, drawn from its SVG; an empty one, which the window manager replaces, where it can't be.
fn icon() -> egui::IconData {
    let side = 128;
    let (width, height) = (side, side);
    let rgba = crate::export::pixels(include_str!("../../assets/icon.svg"), width, height);
    rgba.map_or_else(|_| egui::IconData::default(), |rgba| egui::IconData { rgba, width, height })
}
