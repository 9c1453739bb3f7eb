//! Edits of diffusions and their parameters. A factor that is edited is described in one place afterwards: its own
//! row, else the first holding it drives, else a new row.

use super::holdings::{factor_of, set_level};
use super::{correlation, finite};
use crate::desk::commands::Parameter;
use ebbmark_engine::book::{Description, DiffusionKind, HalfLife, Kind, TypedFigure};
use ebbmark_engine::factors::{Diffusion, FactorRow, Inputs, Model, Origin, RiskFactor};

/// Half-life a factor is given when it first reverts, trading days: a quarter of a year, to be changed by the reader.
const FIRST_HALF_LIFE_DAYS: f64 = 63.0;

/// Chooses a factor's diffusion. Volatility is carried over at today's level, so that the daily spread stays; a factor
/// that had no long run reverts to today's level.
pub fn set_diffusion(inputs: &mut Inputs, model: Option<&Model>, factor: &str, kind: DiffusionKind) {
    straighten(inputs, model, factor);
    let known = factor_in(model, factor).cloned();
    if known.as_ref().is_some_and(|known| known.origins.has_fitted()) {
        return take_fitted(inputs, model, factor, kind);
    }
    let description = description_mut(inputs, factor);
    description.diffusion = Some(kind);
    if let Some(known) = known {
        carry_over(description, &known, kind);
    }
}

/// Leaves a factor's parameters to the fit of one kind; a typed drift of a geometric factor stays.
pub fn take_fitted(inputs: &mut Inputs, model: Option<&Model>, factor: &str, kind: DiffusionKind) {
    straighten(inputs, model, factor);
    let description = description_mut(inputs, factor);
    let drift = description.drift.filter(|_| kind == DiffusionKind::Geometric);
    *description = Description { diffusion: Some(kind), drift, ..Description::default() };
}

fn carry_over(description: &mut Description, factor: &RiskFactor, kind: DiffusionKind) {
    let will_be_log = kind != DiffusionKind::RevertingLevel;
    let level = factor.level.filter(|level| *level != 0.0).map(f64::abs);
    let volatility = factor.diffusion.volatility();
    description.volatility = match (factor.diffusion.is_log(), will_be_log) {
        (true, false) => level.map(|level| bare(volatility * level)),
        (false, true) => level.map(|level| percent(volatility / level)),
        (_, true) => Some(percent(volatility)),
        (_, false) => Some(bare(volatility)),
    };
    if kind == DiffusionKind::Geometric {
        description.long_run = None;
        description.half_life = None;
    } else {
        description.drift = None;
        description.long_run = description.long_run.or(factor.level.map(bare));
        description.half_life = description.half_life.or(Some(HalfLife::Days(FIRST_HALF_LIFE_DAYS)));
    }
}

/// Sets one parameter of a factor; none where the value can't be taken.
pub fn set_parameter(
    inputs: &mut Inputs,
    model: Option<&Model>,
    factor: &str,
    parameter: Parameter,
) -> Option<()> {
    straighten(inputs, model, factor);
    pin_fitted_diffusion(inputs, model, factor);
    let is_log = is_log(inputs, model, factor);
    let figure = |value| if is_log { percent(value) } else { bare(value) };
    match parameter {
        Parameter::Level(level) => return set_level_today(inputs, factor, finite(level)?),
        Parameter::Drift(drift) => description_mut(inputs, factor).drift = Some(percent(finite(drift)?)),
        Parameter::Volatility(volatility) => {
            let volatility = finite(volatility).filter(|volatility| *volatility >= 0.0)?;
            description_mut(inputs, factor).volatility = Some(figure(volatility));
        }
        Parameter::LongRun(level) => description_mut(inputs, factor).long_run = Some(bare(finite(level)?)),
        Parameter::HalfLife(HalfLife::Days(days)) if !(days.is_finite() && days > 0.0) => return None,
        Parameter::HalfLife(half_life) => description_mut(inputs, factor).half_life = Some(half_life),
    }
    Some(())
}

/// A parameter is typed for the diffusion that the history chose: that is typed with it, so that it stays.
fn pin_fitted_diffusion(inputs: &mut Inputs, model: Option<&Model>, factor: &str) {
    let known = factor_in(model, factor).filter(|known| known.origins.diffusion == Origin::Fitted);
    if let Some(kind) = known.map(|known| known.diffusion.kind()) {
        description_mut(inputs, factor).diffusion.get_or_insert(kind);
    }
}

/// Whether the factor's diffusion, as the inputs now say, is one of the log models.
fn is_log(inputs: &mut Inputs, model: Option<&Model>, factor: &str) -> bool {
    match description_mut(inputs, factor).diffusion {
        Some(kind) => kind != DiffusionKind::RevertingLevel,
        None => factor_in(model, factor).is_none_or(|known| known.diffusion.is_log()),
    }
}

fn set_level_today(inputs: &mut Inputs, factor: &str, level: f64) -> Option<()> {
    set_level(inputs, factor, level);
    let drives = |kind| {
        move |holding: &&ebbmark_engine::book::Holding| {
            holding.kind == kind && factor_of(holding) == Some(factor)
        }
    };
    if inputs.holdings.iter().any(|holding| drives(Kind::Level)(&holding)) {
        return Some(());
    }
    if let Some(row) = inputs.factors.iter_mut().find(|row| row.name == factor) {
        row.level = Some(level);
        return Some(());
    }
    let spots = inputs.holdings.iter().filter(drives(Kind::Spot)).count();
    match inputs.holdings.iter_mut().find(|holding| drives(Kind::Spot)(&&**holding)) {
        Some(holding) if spots == 1 => holding.price = Some(level).filter(|level| *level > 0.0)?,
        _ => inputs.factors.push(FactorRow { level: Some(level), ..new_row(factor) }),
    }
    Some(())
}

/// The one place where a factor is described; other rows' words about it are moved there.
fn description_mut<'a>(inputs: &'a mut Inputs, factor: &str) -> &'a mut Description {
    let mut merged = Description::default();
    for row in inputs.factors.iter_mut().filter(|row| row.name == factor) {
        merge(&mut merged, std::mem::take(&mut row.description));
    }
    for holding in inputs.holdings.iter_mut().filter(|holding| factor_of(holding) == Some(factor)) {
        merge(&mut merged, std::mem::take(&mut holding.description));
    }
    let row = inputs.factors.iter().position(|row| row.name == factor);
    let holding = inputs.holdings.iter().position(|holding| factor_of(holding) == Some(factor));
    let place = match (row, holding) {
        (Some(row), _) => &mut inputs.factors[row].description,
        (None, Some(holding)) => &mut inputs.holdings[holding].description,
        (None, None) => {
            let row = inputs.factors.len();
            inputs.factors.push(new_row(factor));
            &mut inputs.factors[row].description
        }
    };
    *place = merged;
    place
}

fn merge(into: &mut Description, from: Description) {
    into.diffusion = into.diffusion.or(from.diffusion);
    into.drift = into.drift.or(from.drift);
    into.volatility = into.volatility.or(from.volatility);
    into.long_run = into.long_run.or(from.long_run);
    into.half_life = into.half_life.or(from.half_life);
}

fn new_row(factor: &str) -> FactorRow {
    FactorRow {
        name: factor.to_owned(),
        level: None,
        unit: None,
        description: Description::default(),
        line: None,
    }
}

/// Writes a currency rate that was described the other way round as the model reads it, before it is edited.
pub fn straighten(inputs: &mut Inputs, model: Option<&Model>, factor: &str) {
    let Some(known) = factor_in(model, factor).filter(|known| known.is_inverted) else { return };
    let Some((foreign, own)) = factor.split_once('/') else { return };
    let turned = format!("{own}/{foreign}");
    let Some(row) = inputs.factors.iter_mut().find(|row| row.name == turned) else { return };
    factor.clone_into(&mut row.name);
    row.level = row.level.map(f64::recip);
    row.description.drift = match known.diffusion {
        Diffusion::Geometric { drift, .. } => Some(percent(drift)),
        _ => None,
    };
    row.description.long_run = row.description.long_run.map(|figure| bare(figure.value.recip()));
    if let Some(table) = &mut inputs.correlation {
        correlation::turn(table, &turned, factor);
    }
}

fn factor_in<'a>(model: Option<&'a Model>, name: &str) -> Option<&'a RiskFactor> {
    model?.factors.iter().find(|factor| factor.name == name)
}

/// A fraction, written with its sign so that a large one is not taken for a slip.
fn percent(value: f64) -> TypedFigure {
    TypedFigure { value, has_percent_sign: true }
}

fn bare(value: f64) -> TypedFigure {
    TypedFigure { value, has_percent_sign: false }
}
