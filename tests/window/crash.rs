//! A program that is killed five seconds after an edit has the edit when it is started again.

use crate::screen::Window;
use crate::twin::Twin;
use crate::{Outcome, wait_for_file, write_book};
use std::path::Path;
use std::time::Duration;

const BETWEEN_EDIT_AND_CRASH: Duration = Duration::from_secs(5);
/// The edit: a volatility of 37 %, unlike anything in the book.
const TYPED: &str = "37";
const WRITTEN: &str = "0.37";

pub(crate) fn check(program: &Path, folder: &Path) -> Outcome<()> {
    let state = folder.join("crash-state");
    edit_and_crash(program, folder, &state)?;
    let window = Window::open(program, &state)?;
    window.wait_for_title("slipway* - Ebbmark")?;
    let saved = save(&window, &folder.join("found-again.ron"))?;
    if !saved.contains(WRITTEN) {
        return Err(format!("the edit is not found again in\n{saved}").into());
    }
    eprintln!("crash: the edit was found again after a SIGKILL");
    Ok(())
}

fn edit_and_crash(program: &Path, folder: &Path, state: &Path) -> Outcome<()> {
    let book = write_book(folder)?;
    let twin = Twin::open();
    twin.open_book(&book)?;
    let window = Window::open(program, state)?;
    open_book(&window, &book)?;
    twin.click("Slipway");
    window.click(twin.place("Slipway"))?;
    window.click(twin.place("Volatility of Slipway"))?;
    window.key("ctrl+a")?;
    window.type_text(TYPED)?;
    window.key("Return")?;
    window.wait_for_title("slipway* - Ebbmark")?;
    std::thread::sleep(BETWEEN_EDIT_AND_CRASH);
    window.kill()
}

/// Opens a book by typing its path.
pub(crate) fn open_book(window: &Window, book: &Path) -> Outcome<()> {
    window.key("ctrl+shift+o")?;
    window.enter_path(book)?;
    window.wait_for_title("slipway - Ebbmark")
}

fn save(window: &Window, path: &Path) -> Outcome<String> {
    window.key("ctrl+shift+s")?;
    window.enter_path(path)?;
    wait_for_file(path)
}
