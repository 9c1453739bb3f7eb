//! One simulated history fitted again, and the book under that fit.

use super::{Base, Losses, RangeError};
use crate::factors::{Fitted, TypedFactor};
use crate::fit::Fit;
use crate::history::History;

/// The book under the fit of one simulated history.
pub(super) struct Draw {
    /// What the book took of that fit.
    pub(super) fitted: Fitted,
    /// Reverting fits refused.
    pub(super) refused: usize,
    pub(super) losses: Losses,
}

/// The typed factors with each diffusion held to the one chosen: a range is that of parameters, not of choices.
pub(super) fn held_kinds(typed: Vec<TypedFactor>, fit: &Fit) -> Vec<TypedFactor> {
    typed
        .into_iter()
        .map(|factor| {
            let chosen = fit.factor(&factor.name).and_then(|fit| fit.chosen);
            TypedFactor { diffusion: factor.diffusion.or(chosen), ..factor }
        })
        .collect()
}

impl Base<'_> {
    /// Levels today stay those of the real history.
    pub(super) fn draw(&self, history: &History) -> Result<Draw, RangeError> {
        let request = &self.request;
        let days_per_year = request.model.days_per_year;
        let fit = Fit::estimated(history, request.fit, days_per_year, &self.typed)?;
        let refused = fit.factors.iter().filter(|factor| {
            factor.chosen.and_then(|kind| factor.reverting(kind)).is_some_and(|fit| fit.is_err())
        });
        let refused = refused.count();
        let mut fitted = fit.taken(&self.typed, self.columns.clone(), request.fit, days_per_year);
        for factor in &mut fitted.factors {
            if let Some(real) = self.fitted.factor(&factor.name) {
                factor.level = real.level;
            }
        }
        let losses = self.losses_under(&fitted)?;
        Ok(Draw { fitted, refused, losses })
    }
}
