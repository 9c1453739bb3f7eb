//! A model and a plan prepared for the inner loop: transition of one day, packed triangles, the book as flat terms.

use super::triangle::Triangle;
use super::{Plan, SimulateError, Transition};
use crate::factors::{CurrencyPart, Model};

/// Everything a tile of paths needs to be worked; the same for all of them.
#[derive(Debug, Clone)]
pub(super) struct Program {
    pub(super) seed: u64,
    pub(super) years_per_day: f64,
    pub(super) kept_days: Vec<u32>,
    /// Book value at which the loss limit is reached.
    pub(super) floor: Option<f64>,
    pub(super) today: f64,
    pub(super) factors: Vec<FactorStep>,
    /// `C`: independent normals to correlated ones.
    pub(super) lower: Triangle,
    /// `C'`: sensitivities to independent ones, whose square norm is the book's variance over a day.
    pub(super) upper: Triangle,
    pub(super) parts: Vec<CurrencyPart>,
}

/// How one factor's move goes over a day.
#[derive(Debug, Clone, Copy)]
pub(super) struct FactorStep {
    pub(super) decay: f64,
    pub(super) shift: f64,
    pub(super) is_log: bool,
}

impl Program {
    pub(super) fn prepare(model: &Model, plan: &Plan) -> Result<Self, SimulateError> {
        let years_per_day = 1.0 / model.days_per_year;
        let day = Transition::over(model, years_per_day)?;
        let steps =
            model.factors.iter().zip(day.decay.iter().zip(&day.shift)).map(|(factor, (&decay, &shift))| {
                FactorStep { decay, shift, is_log: factor.diffusion.is_log() }
            });
        let n = model.factors.len();
        Ok(Self {
            seed: plan.seed,
            years_per_day,
            kept_days: plan.kept_days.clone(),
            floor: plan.loss_limit.map(|limit| model.value - limit),
            today: model.value,
            factors: steps.collect(),
            lower: Triangle::lower(n, &day.lower),
            upper: Triangle::transposed(n, &day.lower),
            parts: model.valuation.parts.clone(),
        })
    }

    /// Room for one entry a factor, whole strips and whole pairs of normals.
    pub(super) fn padded_factors(&self) -> usize {
        self.lower.padded_rows().next_multiple_of(2)
    }
}
