//! Drives the release program in a real window, as a hand would, and checks what comes of it. Run by `.ci/run`; not part
//! of `cargo test`, because it needs a display with a window manager, and xdotool.
//!
//! ```text
//! cargo run --example drive-window -- target/release/ebbmark [crash|line]
//! ```
#![allow(clippy::print_stderr, reason = "a program for people and for `.ci/run`")]

/// An edit is found again after a SIGKILL.
mod crash;
/// What the window exports at a day is what the command prints.
mod line;
/// The window, a mouse and a keyboard.
mod screen;
/// Where things stand in the window.
mod twin;

use std::error::Error;
use std::path::{Path, PathBuf};
use std::time::{Duration, Instant};

/// What went wrong, in a sentence.
pub(crate) type Outcome<T> = Result<T, Box<dyn Error>>;

/// A book of one's own: a share, a rate that reverts, cash.
pub(crate) const POSITIONS: &str = "\
name,kind,quantity,price,multiplier,unit,diffusion,volatility,long_run,half_life_days
Slipway,spot,1200,84.5,,,,0.24,,
Harbour rate,level,-900,2.75,10,percent,reverting-level,0.85,3.1,90
Till,cash,25000,,,,,,,
";

fn main() -> Outcome<()> {
    let mut arguments = std::env::args().skip(1);
    let program = arguments.next().map(PathBuf::from).ok_or("name the program to drive")?.canonicalize()?;
    let which = arguments.next();
    let is_asked = |name: &str| which.as_deref().is_none_or(|asked| asked == name);
    let folder = std::env::temp_dir().join(format!("ebbmark-window-{}", std::process::id()));
    std::fs::create_dir_all(&folder)?;
    let checked = (|| {
        if is_asked("crash") {
            crash::check(&program, &folder)?;
        }
        if is_asked("line") {
            line::check(&program, &folder)?;
        }
        Ok(())
    })();
    std::fs::remove_dir_all(&folder)?;
    checked
}

/// Waits until `found` gives something.
pub(crate) fn wait_for<T>(what: &str, mut found: impl FnMut() -> Option<T>) -> Outcome<T> {
    const LONGEST: Duration = Duration::from_secs(150);
    let began = Instant::now();
    loop {
        if let Some(found) = found() {
            return Ok(found);
        }
        if began.elapsed() > LONGEST {
            return Err(format!("waited in vain for {what}").into());
        }
        std::thread::sleep(Duration::from_millis(50));
    }
}

/// Writes the book into a folder.
pub(crate) fn write_book(folder: &Path) -> Outcome<PathBuf> {
    let path = folder.join("slipway.csv");
    std::fs::write(&path, POSITIONS)?;
    Ok(path)
}

/// Waits for a file that is written whole.
pub(crate) fn wait_for_file(path: &Path) -> Outcome<String> {
    wait_for(&path.display().to_string(), || std::fs::read_to_string(path).ok())
}
