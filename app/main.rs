//! The program: a window, or a command without a screen; and the way from one to the other where no window can be had.
//! Says what failed and with which exit code; does nothing itself.

use clap::Parser;
use ebbmark::desk;
use ebbmark::headless::{Arguments, Command, Failure, fit, read, streams};
use std::any::Any;
use std::panic::{self, AssertUnwindSafe, PanicHookInfo};
use std::path::PathBuf;
use std::process::ExitCode;
use std::sync::Mutex;

fn main() -> ExitCode {
    let arguments = Arguments::parse();
    panic::set_hook(Box::new(remember_place));
    let outcome = panic::catch_unwind(AssertUnwindSafe(|| match &arguments.command {
        None => open(&arguments.files),
        Some(command) => obey(command),
    }));
    match outcome.unwrap_or_else(|panic| Err(fault_of_the_program(panic.as_ref()))) {
        Ok(()) => ExitCode::SUCCESS,
        Err(failure) => {
            streams::tell(&format!("ebbmark: {failure}"));
            ExitCode::from(failure.exit_code())
        }
    }
}

/// Opens the window. Where none can be had, says why and prints the reading as text.
fn open(files: &[PathBuf]) -> Result<(), Failure> {
    match desk::open(files) {
        Ok(()) => Ok(()),
        Err(reason) => {
            streams::tell(&format!("ebbmark: {reason}; its answer for the same book follows."));
            read::read_files(files)
        }
    }
}

fn obey(command: &Command) -> Result<(), Failure> {
    let (what, instead) = match command {
        Command::Read(arguments) => return read::read(arguments),
        Command::Fit(arguments) => return fit::fit(arguments),
        Command::Stress(_) => {
            ("ebbmark stress", "Read the book with other volatilities or levels in its files.")
        }
        Command::Backtest(_) => ("ebbmark backtest", "Read the book with `ebbmark read`."),
        Command::Report(_) => {
            ("ebbmark report", "Export figures from the window, or use `ebbmark read --json`.")
        }
    };
    Err(Failure::NotYet { what: what.into(), instead })
}

/// Where the last fault of the program arose; what it was is told once, with the exit code that goes with it.
static PLACE_OF_FAULT: Mutex<String> = Mutex::new(String::new());

fn remember_place(panic: &PanicHookInfo<'_>) {
    if let (Some(place), Ok(mut remembered)) = (panic.location(), PLACE_OF_FAULT.lock()) {
        *remembered = format!(" at {place}");
    }
}

fn fault_of_the_program(panic: &(dyn Any + Send)) -> Failure {
    let text = panic.downcast_ref::<String>().map(String::as_str);
    let words = text.or_else(|| panic.downcast_ref::<&str>().copied()).unwrap_or("no reason was given");
    let place = PLACE_OF_FAULT.lock().map(|place| place.clone()).unwrap_or_default();
    Failure::Program(format!("{words}{place}"))
}
