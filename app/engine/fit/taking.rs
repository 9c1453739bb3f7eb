//! What a book takes of a fit: the chosen diffusion of each of its factors with the corrected speed, the last level, and
//! the correlation.

use super::{DriftChoice, FactorFit, Fit, FitSettings, Missing, RevertingFit};
use crate::book::{DiffusionKind, HalfLife};
use crate::factors::{CorrelationTable, Diffusion, Fitted, FittedFactor, TypedFactor};
use crate::tables::{Notice, NoticeLevel};
use std::f64::consts::LN_2;

impl Fit {
    /// What the factors of a book take. `columns` are the names of the history's columns.
    pub fn taken(
        &self,
        typed: &[TypedFactor],
        columns: Vec<String>,
        settings: &FitSettings,
        days_per_year: f64,
    ) -> Fitted {
        let factors = typed.iter().filter_map(|factor| {
            let fit = self.factor(&factor.name)?;
            Some(FittedFactor {
                name: fit.name.clone(),
                level: fit.last?,
                dates: fit.dates?,
                observations: fit.observations,
                diffusion: taken_diffusion(fit, fit.chosen?, settings.drift, days_per_year),
            })
        });
        let correlation = self.correlation.as_ref().map(|fitted| CorrelationTable {
            names: fitted.factors.clone(),
            cells: fitted.cells.clone(),
            lines: Vec::new(),
        });
        Fitted {
            label: self.label.clone(),
            dates: self.dates,
            estimator: settings.estimator_words(),
            columns,
            factors: factors.collect(),
            correlation,
            notices: self.all_notices(),
        }
    }
}

/// The diffusion of a kind as a book takes it: the corrected speed, volatility and long run as fitted; no reversion where
/// that speed is not positive or reversion was refused. None where there is not even a volatility.
pub fn taken_diffusion(
    fit: &FactorFit,
    kind: DiffusionKind,
    drift: DriftChoice,
    days_per_year: f64,
) -> Option<Diffusion> {
    let parts = |reverting: &RevertingFit| {
        let half_life = taken_half_life(reverting, days_per_year);
        (reverting.volatility.value, reverting.long_run.value, half_life)
    };
    let walk = |volatility: Option<f64>| Some((volatility?, fit.last?, HalfLife::None));
    let walk_volatility = || fit.geometric.as_ref().ok().map(|fit| fit.volatility.value);
    Some(match kind {
        DiffusionKind::Geometric => {
            let fit = fit.geometric.as_ref().ok()?;
            let drift = if drift == DriftChoice::Fitted { fit.drift.value } else { 0.0 };
            Diffusion::Geometric { drift, volatility: fit.volatility.value }
        }
        DiffusionKind::RevertingLog => {
            let fitted = fit.reverting_log.as_ref().ok().map(parts);
            let (volatility, long_run, half_life) = fitted.or_else(|| walk(walk_volatility()))?;
            Diffusion::RevertingLog { volatility, long_run, half_life }
        }
        DiffusionKind::RevertingLevel => {
            let fitted = fit.reverting_level.as_ref().ok().map(parts);
            let (volatility, long_run, half_life) = fitted.or_else(|| walk(fit.level_walk_volatility))?;
            Diffusion::RevertingLevel { volatility, long_run, half_life }
        }
    })
}

fn taken_half_life(fit: &RevertingFit, days_per_year: f64) -> HalfLife {
    let speed = fit.speed_corrected;
    if speed > 0.0 { HalfLife::Days(LN_2 / speed * days_per_year) } else { HalfLife::None }
}

/// Reversion speed per year that a book takes for a factor: of the half-life typed, else of the fit.
pub(super) fn taken_speed(fit: &FactorFit, typed: Option<HalfLife>, days_per_year: f64) -> f64 {
    let Some(reverting) = fit.chosen.and_then(|kind| fit.reverting(kind)) else { return 0.0 };
    match typed {
        Some(HalfLife::Days(days)) => LN_2 / days * days_per_year,
        Some(HalfLife::None) => 0.0,
        None => reverting.as_ref().map_or(0.0, |fit| fit.speed_corrected.max(0.0)),
    }
}

/// A reverting diffusion of which nothing but a random walk is left.
pub(super) fn no_reversion(fit: &FactorFit) -> Option<Notice> {
    let kind = fit.chosen?;
    let why = match fit.reverting(kind)? {
        Ok(reverting) if reverting.speed_corrected > 0.0 => return None,
        Ok(reverting) => format!(
            "its reversion can't be told from none (speed {:.2} a year, less a bias of {:.2})",
            reverting.speed.value,
            reverting.speed.value - reverting.speed_corrected
        ),
        Err(refusal) => refusal.to_string(),
    };
    let text = format!("{}: {why}; no reversion is taken under {}.", fit.name, kind.word());
    Some(Notice { level: NoticeLevel::Warning, text })
}

impl FitSettings {
    /// How the correlation is estimated, in words.
    pub fn estimator_words(&self) -> String {
        let weights = match self.estimator {
            super::Estimator::Weighted => format!(", half-life {} days", self.weight_half_life_days),
            _ => String::new(),
        };
        let changes = match self.change_days {
            1 => "one-row changes".to_owned(),
            rows => format!("{rows}-row changes"),
        };
        let dates = match self.missing {
            Missing::Common => "common dates",
            Missing::Pairs => "dates of each pair",
        };
        format!("{}{weights}, {changes}, {dates}", self.estimator.word())
    }
}
