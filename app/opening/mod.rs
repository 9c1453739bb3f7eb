//! Files become a book: bytes to tables, tables to parts, parts to inputs. Knows paths and what a file is; knows no
//! screen, no command line and no workspace.

mod example;
mod parts;

pub use ebbmark_engine::tables::FileKind;
pub use example::built_in_example;
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
        let table = read_table(path)?;
        let kind = FileKind::of(&table).map_err(|fault| Faults(vec![fault]))?;
        Ok((kind, stem(path), table))
    }))
}

/// Reads files whose kinds the caller names.
///
/// # Errors
/// Every fault of every file.
pub fn read_named(files: &[(FileKind, PathBuf)]) -> Result<Parts, Faults> {
    gather(files.iter().map(|(kind, path)| Ok((*kind, stem(path), read_table(path)?))))
}

fn gather(tables: impl Iterator<Item = Result<(FileKind, String, Table), Faults>>) -> Result<Parts, Faults> {
    let (mut parts, mut faults) = (Parts::default(), Vec::new());
    for table in tables {
        let taken = table.and_then(|(kind, stem, table)| parts.take(kind, &stem, &table));
        faults.extend(taken.err().into_iter().flat_map(|more| more.0));
    }
    if faults.is_empty() { Ok(parts) } else { Err(Faults(faults)) }
}

fn read_table(path: &Path) -> Result<Table, Faults> {
    let label = path.display().to_string();
    let bytes = fs::read(path).map_err(|error| {
        let place = Place { file: label.clone(), line: None, column: None };
        Faults(vec![Fault {
            place,
            found: error.to_string(),
            expected: "a file that can be read".to_owned(),
        }])
    })?;
    Table::from_bytes(&bytes, &label)
}

/// What a book is called.
fn stem(path: &Path) -> String {
    path.file_stem().map(|stem| stem.to_string_lossy().into_owned()).unwrap_or_default()
}
