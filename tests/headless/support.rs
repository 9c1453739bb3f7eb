//! Running the program and reading what it says. Asserts nothing of its own but that a call ended as it should.

use serde_json::Value;
use std::fs;
use std::path::PathBuf;
use std::process::{Command, Output};

/// What a call left behind.
pub(crate) struct Call {
    /// Exit code.
    pub(crate) code: i32,
    /// Standard output.
    pub(crate) out: String,
    /// Standard error.
    pub(crate) err: String,
}

impl From<Output> for Call {
    fn from(output: Output) -> Self {
        let text = |bytes| String::from_utf8(bytes).unwrap();
        Self { code: output.status.code().unwrap(), out: text(output.stdout), err: text(output.stderr) }
    }
}

/// The program with a line of arguments, its folder the root of the project, and no display.
pub(crate) fn command(line: &[&str]) -> Command {
    let mut command = Command::new(env!("CARGO_BIN_EXE_ebbmark"));
    command.current_dir(env!("CARGO_MANIFEST_DIR")).args(line);
    command.env_remove("DISPLAY").env_remove("WAYLAND_DISPLAY").env_remove("WAYLAND_SOCKET");
    command
}

/// Calls the program.
pub(crate) fn call(line: &[&str]) -> Call {
    command(line).output().unwrap().into()
}

/// The JSON that a call of `read` answers with few paths, so that a test is quick.
pub(crate) fn read_json(options: &[&str]) -> Value {
    let line = [&["read", "--json", "--paths", "2000"], options].concat();
    let Call { code, out, err } = call(&line);
    assert_eq!(code, 0, "{err}");
    serde_json::from_str(&out).unwrap()
}

/// The same without the one field that may differ between two equal calls.
pub(crate) fn without_seconds(mut answer: Value) -> Value {
    assert!(answer["run"]["seconds"].take().as_f64().is_some_and(|seconds| seconds >= 0.0));
    answer
}

/// Writes a file of a test's own and gives its path.
pub(crate) fn write(test: &str, name: &str, content: &str) -> String {
    let folder = PathBuf::from(env!("CARGO_TARGET_TMPDIR")).join("headless").join(test);
    fs::create_dir_all(&folder).unwrap();
    let path = folder.join(name);
    fs::write(&path, content).unwrap();
    path.to_string_lossy().into_owned()
}

/// A book of one share, and one of two whose worst case is a gain.
pub(crate) const ONE_SHARE: &str = "name,quantity,price,volatility\nBrook,1000,50,20%\n";
