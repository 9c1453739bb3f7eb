//! How long a frame's own code takes while a run goes on behind it and the line is dragged, and how soon the first
//! reading stands in the window. Without a screen: filling pixels is left out. `cargo bench --bench frames`
//!
//! Frames are timed by the processor time of the painting thread: what the run and other programs take meanwhile is not
//! theirs. The time to the first reading is of the clock.

#![allow(clippy::print_stdout, reason = "a bench tells what it found")]

use cpu_time::ThreadTime;
use ebbmark::desk::App;
use ebbmark::desk::commands::{Command, SettingChange};
use ebbmark::desk::session::{RunState, Session};
use ebbmark::desk::start::session_of;
use ebbmark::desk::worker::{Dialogs, Worker};
use egui::vec2;
use egui_kittest::Harness;
use egui_kittest::kittest::Queryable;
use std::path::PathBuf;
use std::thread;
use std::time::{Duration, Instant};

/// A screen shows sixty frames a second.
const BETWEEN_FRAMES: Duration = Duration::from_millis(16);

fn main() {
    tell("example", || session_of(&[], None));
    tell("400 holdings on 60 factors", || {
        let part = |name: &str| PathBuf::from(format!("example-portfolios/wide-book/{name}.csv"));
        let mut session = session_of(&["positions", "factors", "correlation"].map(part), None);
        // The wide book holds three currencies: without one of its own it would be asked for.
        session.apply(Command::ChangeSetting(SettingChange::BookCurrency(Some("EUR".to_owned()))));
        session
    });
}

fn tell(name: &str, session: impl FnOnce() -> Session) {
    let began = Instant::now();
    let mut window = window(session());
    while window.state().session().live().bands.is_none() {
        window.step();
    }
    window.step();
    let first = began.elapsed();
    let mut frames = frames_of_a_run(&mut window);
    frames.sort_unstable();
    let at = |share: f64| frames[((frames.len() - 1) as f64 * share) as usize].as_secs_f64() * 1e3;
    println!("{name}: first reading after {:.0} ms", first.as_secs_f64() * 1e3);
    println!(
        "{name}: {} frames during the run; median {:.1} ms, 99 % within {:.1} ms, longest {:.1} ms",
        frames.len(),
        at(0.5),
        at(0.99),
        at(1.0)
    );
}

fn window(session: Session) -> Harness<'static, App> {
    Harness::builder().with_size([1400.0, 900.0]).build_eframe(|creation| {
        let ctx = creation.egui_ctx.clone();
        let worker = Worker::start(None, Dialogs::None, move || ctx.request_repaint());
        App::new(&creation.egui_ctx, session, worker)
    })
}

/// Drags the line to and fro until the run is done.
fn frames_of_a_run(window: &mut Harness<'static, App>) -> Vec<Duration> {
    const WIDTH_POINTS: usize = 250;
    let line = window.get_by_label("Reading line").rect().center();
    window.drag_at(line);
    let mut frames = Vec::new();
    while window.state().session().live().state != RunState::Finished {
        window.hover_at(line + vec2((frames.len() % WIDTH_POINTS) as f32, 0.0));
        let began = ThreadTime::now();
        window.step();
        frames.push(began.elapsed());
        thread::sleep(BETWEEN_FRAMES);
    }
    frames
}
