//! One factor of a history under all three diffusions, each fitted or refused, with the evidence for the choice.

use super::choice::{choose, judgement};
use super::{Evidence, GeometricFit, ModelChoice, ObservedPath, Refusal, RevertingFit, geometric, reverting};
use crate::book::DiffusionKind;
use crate::history::{History, Series, Spacing};
use jiff::civil::Date;

/// Everything that a history says about one factor.
#[derive(Debug, Clone, PartialEq)]
pub struct FactorFit {
    /// Name.
    pub name: String,
    /// Number of changes, from one quoted value to the next.
    pub observations: usize,
    /// First and last date with a value.
    pub dates: Option<(Date, Date)>,
    /// Last value.
    pub last: Option<f64>,
    /// In the log.
    pub geometric: Result<GeometricFit, Refusal>,
    /// In the log.
    pub reverting_log: Result<RevertingFit, Refusal>,
    /// In the level.
    pub reverting_level: Result<RevertingFit, Refusal>,
    /// `sigma` of a random walk of the level (divisor n - 1), for a level that does not revert.
    pub level_walk_volatility: Option<f64>,
    /// The one taken; none where none can be.
    pub chosen: Option<DiffusionKind>,
    /// In the variable of the choice: the level where that is modelled or chosen from, else the log.
    pub evidence: Option<Evidence>,
    /// What the evidence amounts to, in a sentence.
    pub judgement: String,
}

impl FactorFit {
    /// Fits a series. `typed` is the diffusion that the book gives the factor; it stands above the evidence.
    pub fn of(
        history: &History,
        series: &Series,
        spacing: Spacing,
        days_per_year: f64,
        model: ModelChoice,
        typed: Option<DiffusionKind>,
    ) -> Self {
        let level = ObservedPath::of(history, series, spacing, days_per_year);
        let log = level.log().ok_or(Refusal::NotPositive);
        let in_log = |log: &ObservedPath| reverting::fit_reverting(log, true, days_per_year);
        let reverting_log = log.as_ref().map_err(|refusal| *refusal).and_then(in_log);
        let reverting_level = reverting::fit_reverting(&level, false, days_per_year);
        let log_evidence = log.as_ref().ok().map(|log| Evidence::of(log, reverting_log.as_ref().ok()));
        let mut fit = Self {
            name: series.name.clone(),
            observations: level.steps.count(),
            dates: quoted_dates(history, series),
            last: level.values.last().copied(),
            geometric: log.as_ref().map_err(|refusal| *refusal).and_then(geometric::fit_geometric),
            reverting_log,
            reverting_level,
            level_walk_volatility: geometric::RandomWalk::of(&level).ok().map(|walk| walk.volatility()),
            chosen: None,
            evidence: log_evidence,
            judgement: String::new(),
        };
        fit.chosen = choose(&fit, model, typed);
        if model == ModelChoice::Level || fit.chosen == Some(DiffusionKind::RevertingLevel) {
            fit.evidence = Some(Evidence::of(&level, fit.reverting_level.as_ref().ok()));
        }
        fit.judgement = judgement(&fit, typed.is_some());
        fit
    }

    /// Whether every value is positive, so that the log models can be fitted.
    pub fn is_positive(&self) -> bool {
        self.geometric != Err(Refusal::NotPositive)
    }

    /// `nu` of the geometric fit, the mean log return a year; 0 where it was refused.
    pub fn mean_log_return(&self) -> f64 {
        self.geometric.as_ref().map_or(0.0, |fit| fit.drift.value - fit.volatility.value.powi(2) / 2.0)
    }

    /// The reverting fit of a kind; none for a geometric one.
    pub fn reverting(&self, kind: DiffusionKind) -> Option<&Result<RevertingFit, Refusal>> {
        match kind {
            DiffusionKind::Geometric => None,
            DiffusionKind::RevertingLog => Some(&self.reverting_log),
            DiffusionKind::RevertingLevel => Some(&self.reverting_level),
        }
    }
}

fn quoted_dates(history: &History, series: &Series) -> Option<(Date, Date)> {
    let ((first, _), (last, _)) = (series.quoted().next()?, series.quoted().next_back()?);
    Some((*history.dates.get(first)?, *history.dates.get(last)?))
}
