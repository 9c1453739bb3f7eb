//! Faults refuse an input, notices accompany an answer. Both carry words for the reader;
//! a fault also carries its place. Nothing here reads text.

use serde::{Deserialize, Serialize};
use std::fmt;

/// A place in an input. Lines count from 1, the header included.
#[derive(Debug, Clone, PartialEq, Eq, Default, Serialize, Deserialize)]
pub struct Place {
    /// Label of the file, as the reader knows it; empty where the input was typed in the window.
    pub file: String,
    /// Line, where one is meant.
    pub line: Option<usize>,
    /// Column name, where one is meant.
    pub column: Option<String>,
}

/// One thing that is wrong with an input.
#[derive(Debug, Clone, PartialEq, Eq)]
pub struct Fault {
    /// Where it stands.
    pub place: Place,
    /// What was found there, in words or quoted.
    pub found: String,
    /// What was expected, in words that say what to do.
    pub expected: String,
}

/// Everything that is wrong with an input, in order of place. Never empty when returned as an error.
#[derive(Debug, Clone, PartialEq, Eq)]
pub struct Faults(pub Vec<Fault>);

/// How much a notice matters.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Serialize, Deserialize)]
#[serde(rename_all = "lowercase")]
pub enum NoticeLevel {
    /// Worth knowing.
    Info,
    /// May change what the figures mean.
    Warning,
}

/// Something worth telling beside an answer.
#[derive(Debug, Clone, PartialEq, Eq, Serialize, Deserialize)]
pub struct Notice {
    /// How much it matters.
    pub level: NoticeLevel,
    /// A whole sentence.
    pub text: String,
}

impl Faults {
    /// The answer of a reader: what it read, or everything that is wrong, in order of line.
    ///
    /// # Errors
    /// The faults, where there are any.
    pub fn unless_any<T>(mut faults: Vec<Fault>, answer: T) -> Result<T, Self> {
        faults.sort_by_key(|fault| fault.place.line);
        if faults.is_empty() { Ok(answer) } else { Err(Self(faults)) }
    }
}

impl fmt::Display for Place {
    fn fmt(&self, out: &mut fmt::Formatter<'_>) -> fmt::Result {
        let line = self.line.map(|line| format!("line {line}"));
        let column = self.column.as_ref().map(|column| format!("column {column}"));
        let file = (!self.file.is_empty()).then(|| self.file.clone());
        let parts: Vec<String> = [file, line, column].into_iter().flatten().collect();
        out.write_str(&parts.join(", "))
    }
}

impl fmt::Display for Fault {
    fn fmt(&self, out: &mut fmt::Formatter<'_>) -> fmt::Result {
        let place = self.place.to_string();
        let lead = if place.is_empty() { String::new() } else { format!("{place}: ") };
        write!(out, "{lead}found {}, expected {}", self.found, self.expected)
    }
}

impl fmt::Display for Faults {
    fn fmt(&self, out: &mut fmt::Formatter<'_>) -> fmt::Result {
        let lines: Vec<String> = self.0.iter().map(Fault::to_string).collect();
        out.write_str(&lines.join("\n"))
    }
}

impl std::error::Error for Fault {}
impl std::error::Error for Faults {}
