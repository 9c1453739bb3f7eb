//! Files into a document: a workspace, a book, or parts that join the current book. Nothing of the session changes here.

use super::request::Opened;
use crate::opening::{self, Parts};
use crate::workspace::{BookHistory, Document, Settings, is_workspace, read};
use ebbmark_engine::factors::Inputs;
use ebbmark_engine::fit::FitSettings;
use ebbmark_engine::tables::{Fault, Faults, Place};
use std::path::{Path, PathBuf};
use std::sync::Arc;

/// Opens files, or the built-in example where there are none. A book is opened only if it makes a valid model.
///
/// # Errors
/// Everything wrong with the files.
pub fn open(paths: &[PathBuf], current: &Document) -> Result<Opened, Faults> {
    match paths {
        [] => Ok(opened_book(opening::built_in_example()?, &current.settings)),
        [path] if is_workspace(path) => open_workspace(path),
        _ => match paths.iter().find(|path| is_workspace(path)) {
            Some(workspace) => Err(alone(workspace)),
            None => open_parts(opening::read_files(paths)?, current),
        },
    }
}

fn open_workspace(path: &Path) -> Result<Opened, Faults> {
    let workspace = read(path).map_err(|error| Faults(vec![error.into_fault()]))?;
    Ok(Opened {
        document: workspace.document,
        view: Some(workspace.view),
        file: Some(path.to_path_buf()),
        notices: Vec::new(),
    })
}

fn alone(workspace: &Path) -> Faults {
    Faults(vec![Fault {
        place: Place { file: workspace.display().to_string(), line: None, column: None },
        found: "a workspace together with other files".to_owned(),
        expected: "a workspace alone".to_owned(),
    }])
}

fn open_parts(parts: Parts, current: &Document) -> Result<Opened, Faults> {
    let opened = if parts.holdings.is_some() {
        opened_book(parts.into_book()?, &current.settings)
    } else {
        joined(parts, current)
    };
    check(&opened.document)?;
    Ok(opened)
}

/// Whether a document makes a valid model, in whichever of its currencies: where only the book's currency is left to be
/// said, the window asks for it.
fn check(document: &Document) -> Result<(), Faults> {
    let Err(faults) = document.assemble() else { return Ok(()) };
    let mut in_currency = document.clone();
    let is_valid_in = |currency: &String| {
        in_currency.settings.book_currency = Some(currency.clone());
        in_currency.assemble().is_ok()
    };
    let mut named = document.inputs.holdings.iter().filter_map(|holding| holding.currency.as_ref());
    if document.settings.book_currency.is_none() && named.any(is_valid_in) { Ok(()) } else { Err(faults) }
}

/// A book of its own, without a workspace.
pub fn opened_book(book: opening::Opened, before: &Settings) -> Opened {
    let (document, notices) = Document::of_book(book, before);
    Opened { document, view: None, file: None, notices }
}

/// The current book with the parts that were opened in place of its own.
fn joined(parts: Parts, current: &Document) -> Opened {
    let mut inputs = Inputs::clone(&current.inputs);
    if let Some(exposures) = parts.exposures {
        (inputs.exposures, inputs.files.exposures) = (exposures, parts.files.exposures);
    }
    if let Some(factors) = parts.factors {
        (inputs.factors, inputs.files.factors) = (factors, parts.files.factors);
    }
    if parts.correlation.is_some() {
        (inputs.correlation, inputs.files.correlation) = (parts.correlation, parts.files.correlation);
    }
    let document = Document {
        inputs: Arc::new(inputs),
        history: joined_history(parts.history, current),
        holidays: parts.holidays.map(Arc::new).or_else(|| current.holidays.clone()),
        ..current.clone()
    };
    Opened { document, view: None, file: None, notices: parts.notices }
}

/// A new history is fitted as the one before was, but over all its dates.
fn joined_history(opened: Option<opening::OpenedHistory>, current: &Document) -> Option<BookHistory> {
    let before = current.history.as_ref();
    let Some(opened) = opened else { return before.cloned() };
    let usual = before.map_or_else(FitSettings::usual, |before| before.settings.clone());
    Some(BookHistory::of(opened, FitSettings { since: None, until: None, row_days: None, ..usual }))
}
