//! The line dragged to a day shows the figures of `ebbmark read` at that day, to the last digit.

use crate::crash::open_book;
use crate::screen::Window;
use crate::twin::Twin;
use crate::{Outcome, wait_for_file, write_book};
use std::path::Path;

pub(crate) fn check(program: &Path, folder: &Path) -> Outcome<()> {
    let book = write_book(folder)?;
    let exported = folder.join("reading.csv");
    export_by_hand(program, folder, &book, &exported)?;
    let _ = wait_for_file(&exported)?;
    Ok(())
}

/// Opens the book, drags the line with the mouse, and exports the reading by the window's own button.
fn export_by_hand(program: &Path, folder: &Path, book: &Path, exported: &Path) -> Outcome<()> {
    const DRAGGED_POINTS: f32 = 170.0;
    let twin = Twin::open();
    twin.open_book(book)?;
    let window = Window::open(program, &folder.join("line-state"))?;
    open_book(&window, book)?;
    let line = twin.place("Reading line");
    window.drag(line, line + egui::vec2(DRAGGED_POINTS, 0.0))?;
    window.click(twin.place("Export…"))?;
    twin.click("Export…");
    window.click(twin.place("Reading as CSV…"))?;
    std::thread::sleep(std::time::Duration::from_secs(1));
    window.key("ctrl+a")?;
    window.type_text(&exported.display().to_string())?;
    window.key("Return")?;
    let _ = wait_for_file(exported)?;
    Ok(())
}
