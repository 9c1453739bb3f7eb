//! A whole history fitted: every factor under all three diffusions, and the correlation of those that were chosen.

use super::correlation::{FittedCorrelation, Sample};
use super::innovations::{Mover, standard_pairs};
use super::taking::{no_reversion, taken_speed};
use super::{Estimator, FactorFit, FitSettings, Missing};
use crate::factors::{TypedFactor, inverse_rate};
use crate::history::{Blemish, History, Series, Spacing, blemishes};
use crate::tables::{Fault, Faults, Notice, NoticeLevel, Place};
use jiff::civil::Date;
use rayon::prelude::*;

/// Everything that a history says under some settings.
#[derive(Debug, Clone, PartialEq)]
pub struct Fit {
    /// Label of the history.
    pub label: String,
    /// Number of changes from one row to the next.
    pub observations: usize,
    /// First and last date.
    pub dates: (Date, Date),
    /// What a row is in time.
    pub spacing: Spacing,
    /// In the order of the columns.
    pub factors: Vec<FactorFit>,
    /// Of the factors for which a diffusion was chosen; none where too few changes are common.
    pub correlation: Option<FittedCorrelation>,
    /// What looks odd in the history.
    pub blemishes: Vec<Blemish>,
    /// What is worth telling about the fit.
    pub notices: Vec<Notice>,
}

impl Fit {
    /// Fits a history within the dates of the settings, and tells what is odd about it. `typed` says what the book's
    /// inputs leave open; a factor that is not among them is open altogether.
    ///
    /// # Errors
    /// A fault where the settings leave fewer than two dates, or don't go together.
    pub fn of(
        history: &History,
        settings: &FitSettings,
        days_per_year: f64,
        typed: &[TypedFactor],
    ) -> Result<Self, Faults> {
        let used = history_for(history, settings, typed)?;
        let mut fit = Self::estimated(&used, settings, days_per_year, typed)?;
        let inverted = typed.iter().filter_map(|factor| inversion(history, &factor.name));
        fit.notices.splice(0..0, inverted);
        fit.blemishes = blemishes(&used, fit.spacing, days_per_year);
        Ok(fit)
    }

    /// The estimates of [`Fit::of`] for a history that is cut and turned already, without a look for oddities.
    ///
    /// # Errors
    /// A fault where there are fewer than two dates.
    pub fn estimated(
        history: &History,
        settings: &FitSettings,
        days_per_year: f64,
        typed: &[TypedFactor],
    ) -> Result<Self, Faults> {
        let [first, .., last] = history.dates.as_slice() else {
            let found = format!(
                "{} in the dates asked for",
                if history.dates.is_empty() { "no date" } else { "one date" }
            );
            return Err(fault(history, &found, "at least two, to see a change"));
        };
        let spacing = Spacing::of(history, settings.row_days);
        let said = |name: &str| typed.iter().find(|factor| factor.name == name);
        let fit_one = |series: &Series| {
            let kind = said(&series.name).and_then(|factor| factor.diffusion);
            FactorFit::of(history, series, spacing, days_per_year, settings.model, kind)
        };
        let factors: Vec<FactorFit> = history.series.par_iter().map(fit_one).collect();
        let movers: Vec<Mover<'_>> = history
            .series
            .iter()
            .zip(&factors)
            .filter_map(|(series, fit)| {
                let half_life = said(&fit.name).and_then(|factor| factor.half_life);
                Mover::of(series, fit, taken_speed(fit, half_life, days_per_year))
            })
            .collect();
        let rows = history.dates.len();
        let mut notices: Vec<Notice> = factors.iter().filter_map(no_reversion).collect();
        let sample = Sample { movers: &movers, history, spacing, days_per_year, settings };
        let correlation = sample.correlation(&mut notices);
        Ok(Self {
            label: history.label.clone(),
            observations: rows - 1,
            dates: (*first, *last),
            spacing,
            factors,
            correlation,
            blemishes: Vec::new(),
            notices,
        })
    }

    /// Correlation of two factors' Brownian motions; 0 where it is not fitted, 1 of a factor with itself.
    pub fn correlation_of(&self, one: &str, other: &str) -> f64 {
        let known = self.correlation.as_ref().and_then(|correlation| correlation.of(one, other));
        if one == other { 1.0 } else { known.unwrap_or(0.0) }
    }

    /// What moved two factors at the same times, beyond what their diffusions foretold, each in its own standard
    /// deviations: the points that their correlation is read off. `history` and `settings` are those of the fit.
    pub fn shocks_of(
        &self,
        history: &History,
        settings: &FitSettings,
        days_per_year: f64,
        [one, other]: [&str; 2],
    ) -> Vec<[f64; 2]> {
        let mover = |name: &str| Mover::of(history.series(name)?, self.factor(name)?, 0.0);
        let (Some(one), Some(other)) = (mover(one), mover(other)) else { return Vec::new() };
        standard_pairs(history, [one, other], settings.change_days as usize, self.spacing, days_per_year)
    }

    /// Everything worth telling: what looks odd, then what the fit made of it.
    pub fn all_notices(&self) -> Vec<Notice> {
        self.blemishes.iter().map(Notice::from).chain(self.notices.iter().cloned()).collect()
    }

    /// The fit of a factor.
    pub fn factor(&self, name: &str) -> Option<&FactorFit> {
        self.factors.iter().find(|factor| factor.name == name)
    }
}

/// Settings that do not go together.
fn check(history: &History, settings: &FitSettings) -> Result<(), Faults> {
    let is_shrunk = matches!(settings.estimator, Estimator::ShrunkIdentity | Estimator::ShrunkConstant);
    if is_shrunk && settings.missing == Missing::Pairs {
        let found = format!("{} with missing values by pairs", settings.estimator.word());
        return Err(fault(history, &found, "common dates for a shrunk estimator, or sample or weighted"));
    }
    if settings.since.zip(settings.until).is_some_and(|(since, until)| since > until) {
        return Err(fault(history, "a first date after the last", "dates in order"));
    }
    Ok(())
}

/// The part of a history that the settings ask for, with currency rates the way round that the book needs them.
///
/// # Errors
/// A fault where the settings don't go together, or a rate is there both ways round.
pub fn history_for(
    history: &History,
    settings: &FitSettings,
    typed: &[TypedFactor],
) -> Result<History, Faults> {
    check(history, settings)?;
    let mut history = history.between(settings.since, settings.until);
    for factor in typed {
        let Some(other) = inverse_rate(&factor.name) else { continue };
        let find = |name: &str| history.series.iter().position(|series| series.name == name);
        match (find(&factor.name), find(&other)) {
            (Some(_), Some(_)) => {
                let found = format!("the rate both as {other} and as {}", factor.name);
                return Err(fault(&history, &found, "one of them"));
            }
            (None, Some(at)) => invert(&mut history.series[at], &factor.name),
            _ => {}
        }
    }
    Ok(history)
}

fn invert(series: &mut Series, name: &str) {
    name.clone_into(&mut series.name);
    series.values.iter_mut().flatten().for_each(|value| *value = value.recip());
}

/// That a column is read the other way round, where it is.
fn inversion(history: &History, name: &str) -> Option<Notice> {
    let other = inverse_rate(name)?;
    let has = |name: &str| history.series.iter().any(|series| series.name == name);
    (!has(name) && has(&other)).then(|| Notice {
        level: NoticeLevel::Info,
        text: format!("{other} of the history is read inverted, as {name}."),
    })
}

fn fault(history: &History, found: &str, expected: &str) -> Faults {
    let place = Place { file: history.label.clone(), line: None, column: None };
    Faults(vec![Fault { place, found: found.to_owned(), expected: expected.to_owned() }])
}
