//! From what is said about a factor to its diffusion, every parameter known and checked. Rates that were described the
//! other way round are turned here.

use super::descriptions::{Described, Said};
use super::{Diffusion, FittedFactor, Origin, Origins, RiskFactor};
use crate::book::{DiffusionKind, HalfLife, TypedFigure};
use crate::tables::{Fault, Notice, NoticeLevel, Place};

/// A bare volatility of a log model above this is taken for per cent written without a sign.
const LARGEST_BARE_VOLATILITY: f64 = 5.0;

/// Gathers the faults and notices of one factor.
struct Resolving<'a> {
    said: &'a Described,
    kind: DiffusionKind,
    /// The history's diffusion of that kind.
    fitted: Option<Diffusion>,
    origins: Origins,
    faults: Vec<Fault>,
}

/// The factor that a description amounts to, with a history's figures where it says nothing.
pub(super) fn resolve(
    said: &Described,
    fitted: Option<&FittedFactor>,
    notices: &mut Vec<Notice>,
) -> Result<RiskFactor, Vec<Fault>> {
    let chosen = fitted.and_then(|fitted| fitted.diffusion).and_then(|diffusion| {
        // What is written the other way round is resolved the way it is written, and turned as a whole.
        if said.is_inverted { diffusion.inverted() } else { Some(diffusion) }
    });
    let kind = typed_kind(said).or(chosen.map(|chosen| chosen.kind())).unwrap_or(usual_kind(said));
    let fitted = chosen.filter(|chosen| chosen.kind() == kind);
    let mut resolving = Resolving { said, kind, fitted, origins: Origins::default(), faults: Vec::new() };
    let level = resolving.level();
    let volatility = resolving.volatility();
    let drift = resolving.drift();
    let reversion = if kind == DiffusionKind::Geometric { None } else { resolving.reversion(level) };
    resolving.refuse_inverted_level();
    let (Some(volatility), true) = (volatility, resolving.faults.is_empty()) else {
        return Err(resolving.faults);
    };
    resolving.origins.diffusion = match (typed_kind(said), fitted) {
        (Some(_), _) => Origin::Typed,
        (None, Some(_)) => Origin::Fitted,
        (None, None) => Origin::Usual,
    };
    let (long_run, half_life) = reversion.unwrap_or((level.unwrap_or(1.0), HalfLife::None));
    let diffusion = match kind {
        DiffusionKind::Geometric => Diffusion::Geometric { drift, volatility },
        DiffusionKind::RevertingLog => Diffusion::RevertingLog { volatility, long_run, half_life },
        DiffusionKind::RevertingLevel => Diffusion::RevertingLevel { volatility, long_run, half_life },
    };
    let unit = said.unit.as_ref().map_or_else(Default::default, |said| said.value);
    let (name, is_inverted, origins) = (said.name.clone(), said.is_inverted, resolving.origins);
    let factor = RiskFactor { name, level, unit, diffusion, is_inverted, origins };
    notices.extend(unused(said, kind));
    Ok(if said.is_inverted { turned(factor) } else { factor })
}

/// The diffusion typed; where only its parameters are, the usual one, which they were written for.
pub(super) fn typed_kind(said: &Described) -> Option<DiffusionKind> {
    let is_described = said.drift.is_some()
        || said.volatility.is_some()
        || said.long_run.is_some()
        || said.half_life.is_some();
    said.diffusion.as_ref().map(|said| said.value).or(is_described.then(|| usual_kind(said)))
}

/// Geometric, or a reverting level where a `level` row uses the factor.
fn usual_kind(said: &Described) -> DiffusionKind {
    if said.has_level_row { DiffusionKind::RevertingLevel } else { DiffusionKind::Geometric }
}

/// The rate the other way round, its level one over.
fn turned(factor: RiskFactor) -> RiskFactor {
    let diffusion = factor.diffusion.inverted().unwrap_or(factor.diffusion);
    RiskFactor { level: factor.level.map(f64::recip), diffusion, ..factor }
}

/// What is described but moves nothing under the factor's diffusion.
fn unused(said: &Described, kind: DiffusionKind) -> Option<Notice> {
    let cells = if kind == DiffusionKind::Geometric {
        vec![("long_run", said.long_run.is_some()), ("half_life_days", said.half_life.is_some())]
    } else {
        vec![("drift", said.drift.is_some())]
    };
    let names: Vec<&str> = cells.into_iter().filter(|(_, is_said)| *is_said).map(|(name, _)| name).collect();
    (!names.is_empty()).then(|| Notice {
        level: NoticeLevel::Warning,
        text: format!("{}: {} is given but not used under {}.", said.name, names.join(" and "), kind.word()),
    })
}

impl Resolving<'_> {
    fn is_log(&self) -> bool {
        self.kind != DiffusionKind::RevertingLevel
    }

    fn fault(&mut self, place: Place, found: impl Into<String>, expected: impl Into<String>) {
        self.faults.push(Fault { place, found: found.into(), expected: expected.into() });
    }

    fn missing(&mut self, column: &str, what: &str) {
        let place = Place { column: Some(column.to_owned()), ..self.said.place.clone() };
        self.fault(place, format!("no {column} for the factor {}", self.said.name), what);
    }

    fn level(&mut self) -> Option<f64> {
        let is_needed = self.said.needs_level || self.kind != DiffusionKind::Geometric;
        match &self.said.level {
            Some(said) if self.is_log() && (is_needed || self.said.is_inverted) && said.value <= 0.0 => {
                let expected =
                    format!("a level above 0: {} has a {} diffusion", self.said.name, self.kind.word());
                self.fault(said.place.clone(), format!("`{}`", said.value), expected);
                None
            }
            Some(said) => {
                let is_fitted = self.said.has_fitted_level;
                self.origins.level = if is_fitted { Origin::Fitted } else { Origin::Typed };
                Some(said.value)
            }
            None => {
                if is_needed {
                    self.missing("level", "its level today: give it in factors.csv");
                }
                None
            }
        }
    }

    fn volatility(&mut self) -> Option<f64> {
        let Some(said) = &self.said.volatility else {
            let fitted = self.fitted.map(|fitted| fitted.volatility());
            if fitted.is_none() {
                self.missing("volatility", "its volatility a year: type it, or give a history to fit it to");
            }
            self.origins.volatility = Origin::Fitted;
            return fitted;
        };
        self.origins.volatility = Origin::Typed;
        let TypedFigure { value, has_percent_sign } = said.value;
        if !(value.is_finite() && value >= 0.0) {
            self.fault(said.place.clone(), format!("`{value}`"), "a volatility of 0 or more");
            return None;
        }
        if self.is_log() && !has_percent_sign && value > LARGEST_BARE_VOLATILITY {
            let expected = format!(
                "a fraction or a % sign ({value} means {} % a year; write {value}% or {})",
                with_thousands(value * 100.0),
                value / 100.0
            );
            self.fault(said.place.clone(), format!("`{value}`"), expected);
            return None;
        }
        self.without_percent(said)
    }

    fn drift(&mut self) -> f64 {
        let fitted = self.fitted.map_or(0.0, |fitted| fitted.drift());
        match &self.said.drift {
            Some(_) => self.origins.drift = Origin::Typed,
            None if fitted != 0.0 => self.origins.drift = Origin::Fitted,
            None => {}
        }
        let said = self.said;
        self.plain(&said.drift).unwrap_or(fitted)
    }

    /// A figure in the factor's own units takes no `%` where the level itself is modelled.
    fn without_percent(&mut self, said: &Said<TypedFigure>) -> Option<f64> {
        if !self.is_log() && said.value.has_percent_sign {
            let found = format!("`{}%`", said.value.value * 100.0);
            let expected = format!(
                "a number without %: {} is modelled in its own units ({})",
                self.said.name,
                self.kind.word()
            );
            self.fault(said.place.clone(), found, expected);
            return None;
        }
        self.plain(&Some(said.clone()))
    }

    fn plain(&mut self, said: &Option<Said<TypedFigure>>) -> Option<f64> {
        let said = said.as_ref()?;
        if !said.value.value.is_finite() {
            self.fault(said.place.clone(), format!("`{}`", said.value.value), "a finite number");
            return None;
        }
        Some(said.value.value)
    }

    fn reversion(&mut self, level: Option<f64>) -> Option<(f64, HalfLife)> {
        let fitted = self.fitted.and_then(|fitted| fitted.reversion());
        self.origins.half_life = Origin::Typed;
        let half_life = match (&self.said.half_life, fitted) {
            (None, Some((_, half_life))) => {
                self.origins.half_life = Origin::Fitted;
                Some(half_life)
            }
            (None, None) => {
                let what = "its half-life in trading days, or none: type it, or give a history to fit it to";
                self.missing("half_life_days", what);
                None
            }
            (Some(said), _) => match said.value {
                HalfLife::Days(days) if !(days > 0.0 && days.is_finite()) => {
                    self.fault(said.place.clone(), format!("`{days}`"), "trading days above 0, or none");
                    None
                }
                half_life => Some(half_life),
            },
        };
        if half_life == Some(HalfLife::None) {
            return level.map(|level| (level, HalfLife::None));
        }
        let Some(said) = &self.said.long_run else {
            if half_life.is_some() && fitted.is_none() {
                self.missing("long_run", "the level it is drawn to: type it, or give a history to fit it to");
            }
            self.origins.long_run = Origin::Fitted;
            return Some((fitted?.0, half_life?));
        };
        self.origins.long_run = Origin::Typed;
        let long_run = self.without_percent(said)?;
        if self.is_log() && long_run <= 0.0 {
            self.fault(
                said.place.clone(),
                format!("`{long_run}`"),
                "a long-run level above 0: its log reverts",
            );
            return None;
        }
        Some((long_run, half_life?))
    }

    fn refuse_inverted_level(&mut self) {
        if self.said.is_inverted && !self.is_log() {
            let place =
                self.said.diffusion.as_ref().map_or(self.said.place.clone(), |said| said.place.clone());
            let expected = format!(
                "the rate as {}, or a log diffusion: one over a reverting level is not a reverting level",
                self.said.name
            );
            self.fault(place, "an inverted rate with `reverting-level`", expected);
        }
    }
}

/// 1800 as `1,800`.
fn with_thousands(number: f64) -> String {
    let digits = format!("{number:.0}");
    let groups: Vec<&str> =
        digits.as_bytes().rchunks(3).rev().filter_map(|group| std::str::from_utf8(group).ok()).collect();
    groups.join(",")
}
