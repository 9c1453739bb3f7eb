//! Files become a book: bytes to tables, tables to parts, parts to inputs. Knows paths and what a file is; knows no
//! screen, no command line and no workspace.

mod example;
mod history;
mod parts;

pub use ebbmark_engine::tables::FileKind;
pub use example::built_in_example;
pub use history::{OpenedHistory, read_history_file};
pub use parts::{Opened, Parts};

use ebbmark_engine::tables::{Fault, Faults, Place, Table};
use std::fs;
use std::path::{Path, PathBuf};

/// Reads files whose kinds are told by their headers; two of one kind are a fault.
///
/// # Errors
/// Every fault of every file.
pub fn read_files(paths: &[PathBuf]) -> Result<Parts, Faults> {
    gather(paths.iter().map(|path| {
        let (source, table) = read_table(path)?;
        let kind = FileKind::of(&table).map_err(|fault| Faults(vec![fault]))?;
        Ok((kind, source, table))
    }))
}

/// Reads files whose kinds the caller names.
///
/// # Errors
/// Every fault of every file.
pub fn read_named(files: &[(FileKind, PathBuf)]) -> Result<Parts, Faults> {
    gather(files.iter().map(|(kind, path)| {
        let (source, table) = read_table(path)?;
        Ok((*kind, source, table))
    }))
}

fn gather(tables: impl Iterator<Item = Result<(FileKind, Source, Table), Faults>>) -> Result<Parts, Faults> {
    let (mut parts, mut faults) = (Parts::default(), Vec::new());
    for table in tables {
        let taken = table.and_then(|(kind, source, table)| parts.take(kind, &source, &table));
        faults.extend(taken.err().into_iter().flat_map(|more| more.0));
    }
    if faults.is_empty() { Ok(parts) } else { Err(Faults(faults)) }
}

/// Where a file came from.
struct Source {
    path: PathBuf,
    /// What a book of it is called.
    stem: String,
    /// Of its bytes.
    hash: String,
}

fn read_table(path: &Path) -> Result<(Source, Table), Faults> {
    let bytes = read_bytes(path)?;
    let table = Table::from_bytes(&bytes, &path.display().to_string())?;
    Ok((Source { path: path.to_path_buf(), stem: stem(path), hash: history::hash_of(&bytes) }, table))
}

fn read_bytes(path: &Path) -> Result<Vec<u8>, Faults> {
    let label = path.display().to_string();
    fs::read(path).map_err(|error| {
        let place = Place { file: label, line: None, column: None };
        Faults(vec![Fault {
            place,
            found: error.to_string(),
            expected: "a file that can be read".to_owned(),
        }])
    })
}

/// What a book is called.
fn stem(path: &Path) -> String {
    path.file_stem().map(|stem| stem.to_string_lossy().into_owned()).unwrap_or_default()
}
