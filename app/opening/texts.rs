//! Files as texts with the label a reader knows them by. Knows nothing of what stands in them.

use ebbmark_engine::tables::{Fault, Place};
use std::fs;
use std::path::Path;

/// A file's text, and the label that faults name it by.
#[derive(Debug, Clone, PartialEq, Eq)]
pub(super) struct Text {
    /// The path as it was given.
    pub(super) label: String,
    /// Content.
    pub(super) text: String,
}

/// Reads a file that must be UTF-8.
pub(super) fn read(path: &Path) -> Result<Text, Fault> {
    let label = path.display().to_string();
    let fault = |line: Option<usize>, found: String, expected: &str| Fault {
        place: Place { file: label.clone(), line, column: None },
        found,
        expected: expected.into(),
    };
    let bytes = fs::read(path).map_err(|error| fault(None, error.to_string(), "a file that can be read"))?;
    let text = String::from_utf8(bytes).map_err(|error| {
        let good = &error.as_bytes()[..error.utf8_error().valid_up_to()];
        let line = 1 + good.iter().filter(|byte| **byte == b'\n').count();
        fault(Some(line), "bytes that are not UTF-8".into(), "UTF-8 text; save the file as CSV UTF-8")
    })?;
    Ok(Text { label, text })
}

/// Stem of a path: what a book is called.
pub(super) fn stem(path: &Path) -> String {
    path.file_stem().map(|stem| stem.to_string_lossy().into_owned()).unwrap_or_default()
}
