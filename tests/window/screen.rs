//! The program's window on the screen at hand, and a mouse and a keyboard for it.

use crate::{Outcome, wait_for};
use std::path::Path;
use std::process::{Child, Command};
use std::time::Duration;

/// Time that a person leaves between two moves of the hand, and the window to paint what came of the first.
const PAUSE: Duration = Duration::from_millis(300);
/// Time for the first frames of a program, which are the slowest.
const SETTLING: Duration = Duration::from_secs(1);
/// Time in which a path field comes up, where there is no file dialog.
const UNTIL_FIELD: Duration = Duration::from_millis(1_500);
const MOVES_OF_A_DRAG: i32 = 20;

/// The program in its window; it is killed when dropped.
pub(crate) struct Window {
    program: Child,
    id: String,
}

fn xdotool(arguments: &[&str]) -> Outcome<String> {
    let output = Command::new("xdotool").args(arguments).output()?;
    let said = String::from_utf8_lossy(&output.stderr).into_owned();
    if output.status.success() { Ok(String::from_utf8(output.stdout)?) } else { Err(said.into()) }
}

impl Window {
    /// Starts the program, its sessions kept in `state`, and waits for its window.
    pub(crate) fn open(program: &Path, state: &Path) -> Outcome<Self> {
        let program = Command::new(program)
            .env("EBBMARK_STATE", state)
            // Without a desktop's services paths are typed, and no dialog waits for a hand.
            .env("DBUS_SESSION_BUS_ADDRESS", "unix:path=/nonexistent")
            .spawn()?;
        let mut window = Self { program, id: String::new() };
        window.id = wait_for("the window", || {
            let found = xdotool(&["search", "--onlyvisible", "--name", " Ebbmark$"]).ok()?;
            found.lines().next().map(str::to_owned)
        })?;
        // Keys go to the window that has the focus, which the window manager gives in its own time.
        wait_for("the focus", || {
            xdotool(&["windowactivate", "--sync", &window.id]).ok()?;
            xdotool(&["getactivewindow"]).ok().filter(|active| active.trim() == window.id)
        })?;
        std::thread::sleep(SETTLING);
        Ok(window)
    }

    pub(crate) fn title(&self) -> Outcome<String> {
        Ok(xdotool(&["getwindowname", &self.id])?.trim().to_owned())
    }

    pub(crate) fn wait_for_title(&self, title: &str) -> Outcome<()> {
        wait_for(&format!("the title {title}"), || self.title().ok().filter(|found| found == title))?;
        std::thread::sleep(PAUSE);
        Ok(())
    }

    pub(crate) fn click(&self, at: egui::Pos2) -> Outcome<()> {
        self.move_to(at)?;
        xdotool(&["click", "1"])?;
        std::thread::sleep(PAUSE);
        Ok(())
    }

    pub(crate) fn drag(&self, from: egui::Pos2, to: egui::Pos2) -> Outcome<()> {
        self.move_to(from)?;
        xdotool(&["mousedown", "1"])?;
        for part in 1..=MOVES_OF_A_DRAG {
            self.move_to(from.lerp(to, part as f32 / MOVES_OF_A_DRAG as f32))?;
            std::thread::sleep(PAUSE / 10);
        }
        xdotool(&["mouseup", "1"])?;
        std::thread::sleep(PAUSE);
        Ok(())
    }

    pub(crate) fn key(&self, key: &str) -> Outcome<()> {
        xdotool(&["key", "--clearmodifiers", key])?;
        std::thread::sleep(PAUSE);
        Ok(())
    }

    pub(crate) fn type_text(&self, text: &str) -> Outcome<()> {
        xdotool(&["type", "--clearmodifiers", "--delay", "20", text])?;
        std::thread::sleep(PAUSE);
        Ok(())
    }

    /// Types a path into the path field, once that had time to come up, and enters it.
    pub(crate) fn enter_path(&self, path: &Path) -> Outcome<()> {
        std::thread::sleep(UNTIL_FIELD);
        self.key("ctrl+a")?;
        self.type_text(&path.display().to_string())?;
        self.key("Return")
    }

    /// Ends the program without a warning, as a crash does.
    pub(crate) fn kill(mut self) -> Outcome<()> {
        self.program.kill()?;
        self.program.wait()?;
        Ok(())
    }

    fn move_to(&self, at: egui::Pos2) -> Outcome<()> {
        let [x, y] = [at.x, at.y].map(|place| place.round().to_string());
        xdotool(&["mousemove", "--window", &self.id, &x, &y])?;
        std::thread::sleep(PAUSE / 10);
        Ok(())
    }
}

impl Drop for Window {
    fn drop(&mut self) {
        let _ = self.program.kill();
        let _ = self.program.wait();
    }
}
