//! The thread that turns inputs into a model and a plan. A run goes on until the next model is known to be valid.

use super::board::{Board, Job};
use super::post::Post;
use super::request::Figures;
use crate::workspace::{Assembled, Assembler, Settings};
use ebbmark_engine::simulate::Plan;
use std::sync::Arc;

/// Memory for the values and falls that a run keeps, bytes.
const MEMORY_BUDGET_BYTES: usize = 1 << 30;
/// Days that can always be read: the one-press horizons of the window.
pub const ONE_PRESS_DAYS: [u32; 6] = [1, 10, 21, 63, 126, 252];

/// Assembles what is asked for until the program closes.
pub(super) fn serve(board: &Board, post: &Post) {
    let mut assembler = Assembler::default();
    while let Some((generation, document)) = board.wait_for(|state| state.to_assemble.take()) {
        match assembler.assemble(&document) {
            Ok(assembled) => begin(board, post, generation, assembled, &document.settings),
            Err(faults) => {
                let offer = assembler.repair_offered(&document).map(Arc::new);
                post.figures(generation, Figures::Faults { faults: faults.0, offer });
            }
        }
    }
}

fn begin(board: &Board, post: &Post, generation: u64, assembled: Assembled, settings: &Settings) {
    let Assembled { model, fit, fitted } = assembled;
    let model = Arc::new(model);
    let days = kept_days(settings.paths, settings.horizon_days, MEMORY_BUDGET_BYTES);
    let plan = Plan {
        paths: settings.paths,
        seed: settings.seed,
        kept_days: days.clone(),
        loss_limit: settings.loss_limit,
        threads: None,
    };
    let has_all_days = days.len() == settings.horizon_days as usize;
    post.figures(
        generation,
        Figures::Model { model: Arc::clone(&model), fit, fitted, days: Arc::new(days), has_all_days },
    );
    board.begin(&Arc::new(Job { generation, model, plan }));
}

/// Days whose values and falls are kept, ascending: every day to the horizon where `paths` doubles twice a day fit into
/// `budget_bytes`, else as many as fit, evenly spread, the horizon and the one-press days always among them.
pub fn kept_days(paths: usize, horizon_days: u32, budget_bytes: usize) -> Vec<u32> {
    let bytes_a_day = paths * 2 * size_of::<f64>();
    let fitting = budget_bytes / bytes_a_day.max(1);
    if fitting >= horizon_days as usize {
        return (1..=horizon_days).collect();
    }
    let mut days: Vec<u32> = ONE_PRESS_DAYS.into_iter().filter(|day| *day < horizon_days).collect();
    days.push(horizon_days);
    let free = fitting.saturating_sub(days.len()) as u32;
    days.extend((1..=free).map(|part| part * horizon_days / (free + 1)).filter(|day| *day > 0));
    days.sort_unstable();
    days.dedup();
    days
}
