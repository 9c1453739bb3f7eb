//! A line on standard error that grows while work is done. Shown on a terminal only.

use ebbmark_engine::measures::RangeWatcher;
use ebbmark_engine::simulate::{Run, Watcher};
use std::io::{self, IsTerminal, Write};
use std::sync::Mutex;
use std::time::{Duration, Instant};

const WIDTH: usize = 30;
const BETWEEN_PAINTS: Duration = Duration::from_millis(100);

/// Watches work and paints how far it is.
pub(super) struct Progress {
    /// How much there is to do.
    whole: usize,
    /// What it counts.
    unit: &'static str,
    /// Time of the last paint; none where nothing is painted.
    painted: Option<Mutex<Instant>>,
}

impl Progress {
    /// For so many of a unit; silent when asked, or where standard error is no terminal.
    pub(super) fn new(whole: usize, unit: &'static str, is_silent: bool) -> Self {
        let is_painted = !is_silent && io::stderr().is_terminal();
        Self { whole, unit, painted: is_painted.then(|| Mutex::new(Instant::now())) }
    }

    fn paint(&self, done: usize) {
        // A paint that finds another at work is left out.
        let Some(Ok(mut painted)) = self.painted.as_ref().map(Mutex::try_lock) else { return };
        if painted.elapsed() < BETWEEN_PAINTS {
            return;
        }
        *painted = Instant::now();
        let mut err = io::stderr().lock();
        let _ = write!(err, "\r{}", bar(done, self.whole, self.unit)).and_then(|()| err.flush());
    }

    /// Wipes the line.
    pub(super) fn finish(&self) {
        if self.painted.is_some() {
            let _ = write!(io::stderr().lock(), "\r\x1b[2K");
        }
    }
}

impl Watcher for Progress {
    fn progress(&self, run: &Run) {
        self.paint(run.paths());
    }

    fn is_stopped(&self) -> bool {
        false
    }
}

impl RangeWatcher for Progress {
    fn progress(&self, draws: usize) {
        self.paint(draws);
    }

    fn is_stopped(&self) -> bool {
        false
    }
}

fn bar(done: usize, whole: usize, unit: &str) -> String {
    let filled = (WIDTH * done) / whole.max(1);
    format!("{}{} {done} of {whole} {unit}", "=".repeat(filled), "-".repeat(WIDTH - filled.min(WIDTH)))
}

#[cfg(test)]
mod tests {
    use super::bar;

    #[test]
    fn exact_bar_fills_with_the_paths() {
        assert_eq!(bar(0, 100, "paths"), format!("{} 0 of 100 paths", "-".repeat(30)));
        assert_eq!(bar(50, 100, "paths"), format!("{}{} 50 of 100 paths", "=".repeat(15), "-".repeat(15)));
        assert_eq!(bar(100, 100, "paths"), format!("{} 100 of 100 paths", "=".repeat(30)));
    }
}
