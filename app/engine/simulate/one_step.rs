//! The book's value at one horizon in a single exact step, for what needs many readings of nearly the same book: stresses
//! of parameters on common random numbers. What is watched on the way needs daily steps, and is not told here.

use super::{Plan, SimulateError, Unwatched, run};
use crate::book::HalfLife;
use crate::factors::{Diffusion, Model};

/// Book values on `day` of `paths` paths, in path order, each drawn in one step from today. Two models with the same
/// number of factors share their random numbers. The transition has no time-step error, so the law is that of a daily
/// run; the single values are others.
///
/// # Errors
/// As [`run`].
pub fn values_in_one_step(
    model: &Model,
    day: u32,
    paths: usize,
    seed: u64,
) -> Result<Vec<f64>, SimulateError> {
    let plan = Plan { paths, seed, kept_days: vec![1], loss_limit: None, threads: Some(1) };
    let run = run(&in_steps_of(model, day), &plan, &Unwatched)?;
    Ok(run.values(1).unwrap_or_default())
}

/// The same model with another length of a day: one day of it is `days` of the other.
fn in_steps_of(model: &Model, days: u32) -> Model {
    let mut model = model.clone();
    model.days_per_year /= f64::from(days);
    for factor in &mut model.factors {
        if let Diffusion::RevertingLog { half_life: HalfLife::Days(half_life), .. }
        | Diffusion::RevertingLevel { half_life: HalfLife::Days(half_life), .. } = &mut factor.diffusion
        {
            *half_life /= f64::from(days);
        }
    }
    model
}
