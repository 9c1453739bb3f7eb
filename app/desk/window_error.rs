//! Why no window can be had, in a sentence that says what is missing and what to install or use instead.

use std::any::Any;

/// What to do where there is no window.
const INSTEAD: &str = "or use `ebbmark read`, which needs no window";
/// What the window loads at run time.
const LIBRARIES: &str = "libx11-xcb1 libxcursor1 libxi6 libxkbcommon-x11-0 libgl1";

/// Why no window can be had.
#[derive(Debug, Clone, PartialEq, Eq, thiserror::Error)]
pub enum WindowError {
    /// Neither of the display variables is set.
    #[error(
        "no window: there is no display; start it in a desktop session, or set DISPLAY or WAYLAND_DISPLAY, {INSTEAD}"
    )]
    NoDisplay,
    /// The display does not answer.
    #[error("no window: the display can't be reached ({0}); check DISPLAY or WAYLAND_DISPLAY, {INSTEAD}")]
    Unreachable(String),
    /// OpenGL can't be had.
    #[error(
        "no window: OpenGL 2.1 or newer can't be had ({0}); install libgl1 and a graphics driver (software rendering will do), {INSTEAD}"
    )]
    NoGraphics(String),
    /// A system library is missing.
    #[error(
        "no window: a system library is missing ({0}); install {LIBRARIES} (names as in Debian), {INSTEAD}"
    )]
    NoLibrary(String),
}

impl WindowError {
    /// Refuses at once where no display is named at all.
    ///
    /// # Errors
    /// [`WindowError::NoDisplay`].
    pub fn check_display() -> Result<(), Self> {
        let is_set = |name| std::env::var_os(name).is_some_and(|value| !value.is_empty());
        let can_be_asked = !cfg!(target_os = "linux") || is_set("DISPLAY") || is_set("WAYLAND_DISPLAY");
        if can_be_asked { Ok(()) } else { Err(Self::NoDisplay) }
    }

    /// The reason that the window's library gives.
    pub fn of(error: &eframe::Error) -> Self {
        let words = one_line(&error.to_string());
        match error {
            _ if names_library(&words) => Self::NoLibrary(words),
            eframe::Error::Winit(_) | eframe::Error::WinitEventLoop(_) => Self::Unreachable(words),
            _ => Self::NoGraphics(words),
        }
    }

    /// The reason behind a panic of the window's library.
    pub fn of_panic(panic: &(dyn Any + Send)) -> Self {
        let text = panic.downcast_ref::<String>().map(String::as_str);
        let words = text.or_else(|| panic.downcast_ref::<&str>().copied()).unwrap_or("no reason was given");
        Self::NoLibrary(one_line(words))
    }
}

fn names_library(words: &str) -> bool {
    words.contains(".so") || words.to_lowercase().contains("librar")
}

/// Words in one line, not too long, without the place in a library's source that they may begin with.
fn one_line(words: &str) -> String {
    const LONGEST: usize = 160;
    let after_place = words.rsplit_once(".rs:").and_then(|(_, rest)| rest.split_once(": "));
    let line: Vec<&str> = after_place.map_or(words, |(_, rest)| rest).split_whitespace().collect();
    line.join(" ").chars().take(LONGEST).collect()
}
