//! A history as it was opened: its levels, where they stood, and the hash that tells whether they still are the same.

use super::example::built_in_text;
use super::read_bytes;
use ebbmark_engine::history::{History, read_history};
use ebbmark_engine::tables::{Faults, Table};
use sha2::{Digest, Sha256};
use std::path::{Path, PathBuf};

/// A history, where it came from and what its bytes were.
#[derive(Debug, Clone, PartialEq)]
pub struct OpenedHistory {
    /// The file; for the example's own a path that no file has.
    pub path: PathBuf,
    /// SHA-256 of its bytes, in hexadecimal.
    pub hash: String,
    /// Its levels.
    pub history: History,
}

/// Reads a history whose file is known.
///
/// # Errors
/// Every fault of the file.
pub fn read_history_file(path: &Path) -> Result<OpenedHistory, Faults> {
    let label = path.display().to_string();
    let bytes = built_in_text(path).map_or_else(|| read_bytes(path), |text| Ok(text.as_bytes().to_vec()))?;
    let (history, _) = read_history(&Table::from_bytes(&bytes, &label)?)?;
    Ok(OpenedHistory { path: path.to_path_buf(), hash: hash_of(&bytes), history })
}

/// SHA-256 in hexadecimal.
pub(super) fn hash_of(bytes: &[u8]) -> String {
    Sha256::digest(bytes).iter().map(|byte| format!("{byte:02x}")).collect()
}
