//! Files that are never half written: a temporary file beside, flushed to disk, then renamed over the old one.

use std::fs::{self, File};
use std::io::{self, Write};
use std::path::{Path, PathBuf};

/// Writes a file whole, or leaves the old one as it was. Where the path is a link, what it points at is replaced.
///
/// # Errors
/// What the operating system said; no temporary file is left behind.
pub fn write_whole(path: &Path, bytes: &[u8]) -> io::Result<()> {
    let target = fs::canonicalize(path).unwrap_or_else(|_| path.to_path_buf());
    let temporary = beside(&target)?;
    let written = write_flushed(&temporary, bytes).and_then(|()| fs::rename(&temporary, &target));
    if written.is_err() {
        // The first error is the one to tell; a temporary file that can't be removed either changes nothing.
        let _ = fs::remove_file(&temporary);
        return written;
    }
    flush_folder(&target);
    Ok(())
}

/// A name in the same folder that no other process writes to.
fn beside(path: &Path) -> io::Result<PathBuf> {
    let name = path
        .file_name()
        .ok_or_else(|| io::Error::new(io::ErrorKind::InvalidInput, "the path names no file"))?;
    Ok(path.with_file_name(format!(".{}.{}.tmp", name.to_string_lossy(), std::process::id())))
}

fn write_flushed(path: &Path, bytes: &[u8]) -> io::Result<()> {
    let mut file = File::create(path)?;
    file.write_all(bytes)?;
    file.sync_all()
}

/// Makes the renaming itself last. Some file systems can't flush a folder; the file is whole all the same.
fn flush_folder(path: &Path) {
    let folder = path.parent().filter(|folder| !folder.as_os_str().is_empty()).unwrap_or(Path::new("."));
    let _ = File::open(folder).and_then(|folder| folder.sync_all());
}
