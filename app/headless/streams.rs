//! Standard output for the answer, standard error for everything else. A reader who closes the pipe ends the answer,
//! not the program with a fault.

use super::failure::Failure;
use ebbmark_engine::tables::Notice;
use serde::Serialize;
use std::io::{self, ErrorKind, Write};

/// Writes the answer; a closed pipe is no failure.
///
/// # Errors
/// [`Failure::Output`] where the answer could not be written.
pub fn print_answer(answer: &str) -> Result<(), Failure> {
    let mut out = io::stdout().lock();
    match out.write_all(answer.as_bytes()).and_then(|()| out.flush()) {
        Err(error) if error.kind() != ErrorKind::BrokenPipe => Err(error.into()),
        _ => Ok(()),
    }
}

/// An answer as one JSON object.
///
/// # Errors
/// [`Failure::Program`] where it can't be written so.
pub fn json(answer: &impl Serialize) -> Result<String, Failure> {
    let text = serde_json::to_string_pretty(answer).map_err(|error| Failure::Program(error.to_string()))?;
    Ok(text + "\n")
}

/// Tells something on standard error; where there is none to be had, nobody is listening.
pub fn tell(text: &str) {
    let _ = writeln!(io::stderr().lock(), "{text}");
}

/// Tells notices, one a line.
pub fn tell_notices(notices: &[Notice]) {
    for notice in notices {
        tell(&format!("note: {}", notice.text));
    }
}
