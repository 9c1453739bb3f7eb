//! Rust sources as the rules read them: path from the root, opening words, and code without comments.
//! Knows nothing of what is allowed.

use std::fs;
use std::path::{Path, PathBuf};

/// A source file.
pub(super) struct Source {
    /// From the root of the project, `/` between its parts.
    pub(super) path: String,
    text: String,
}

impl Source {
    /// A made-up file, for tests of the rules themselves.
    pub(super) fn made_up(path: &str, text: &str) -> Self {
        Self { path: path.into(), text: text.into() }
    }

    /// Lines of code, each with its number, comments taken off.
    pub(super) fn code(&self) -> impl Iterator<Item = (usize, &str)> {
        self.text.lines().enumerate().map(|(index, line)| (index + 1, without_comment(line)))
    }

    /// The `//!` lines that the file opens with, as one text.
    pub(super) fn opening_words(&self) -> String {
        let lines = self.text.lines().map_while(|line| line.strip_prefix("//!"));
        lines.map(str::trim).collect::<Vec<_>>().join(" ")
    }

    /// The whole text.
    pub(super) fn text(&self) -> &str {
        &self.text
    }
}

/// The text before `//`, unless that stands behind a colon as in an address.
fn without_comment(line: &str) -> &str {
    let comment = line.match_indices("//").find(|(at, _)| !line[..*at].ends_with(':'));
    comment.map_or(line, |(at, _)| &line[..at])
}

/// The root of the project.
pub(super) fn root() -> PathBuf {
    PathBuf::from(env!("CARGO_MANIFEST_DIR"))
}

/// Content of a file, from the root; empty where there is none.
pub(super) fn read(path: &str) -> String {
    fs::read_to_string(root().join(path)).unwrap_or_default()
}

/// All Rust sources below these folders, in order of their paths.
pub(super) fn sources(folders: &[&str]) -> Vec<Source> {
    let mut found = Vec::new();
    for folder in folders {
        gather(&root().join(folder), &mut found);
    }
    found.sort_by(|one, other| one.path.cmp(&other.path));
    found
}

fn gather(folder: &Path, found: &mut Vec<Source>) {
    for entry in fs::read_dir(folder).into_iter().flatten().flatten() {
        let path = entry.path();
        if path.is_dir() {
            gather(&path, found);
        } else if path.extension().is_some_and(|extension| extension == "rs") {
            let name = path.strip_prefix(root()).unwrap().to_string_lossy().replace('\\', "/");
            found.push(Source { path: name, text: fs::read_to_string(&path).unwrap() });
        }
    }
}
