//! The chosen risk factor: its diffusion and parameters, edited in place with their units, and where it is headed by
//! itself. Holdings are not edited here.

/// Where it is headed, as a small chart.
pub mod ahead;

use crate::desk::commands::{Command, Parameter, Queue};
use crate::desk::inputs::{NumberField, Shown, field_row_ui};
use crate::desk::session::Session;
use crate::desk::theme;
use ebbmark_engine::book::{DiffusionKind, HalfLife, LevelUnit};
use ebbmark_engine::factors::{Diffusion, Model, Origin, RiskFactor};
use ebbmark_engine::figures::grouped;
use egui::{ComboBox, Label, Ui};

/// Half-life offered to a factor whose reversion is switched on again, trading days.
const OFFERED_HALF_LIFE_DAYS: f64 = 63.0;
/// Digits shown of a fitted parameter: more than its error leaves.
const FITTED_DIGITS: usize = 4;
/// Largest volatility of a log model that can be dragged to, a fraction per year.
const MOST_LOG_VOLATILITY: f64 = 5.0;

/// Draws the factor chosen in the session, or the first.
pub fn factor_ui(ui: &mut Ui, session: &Session, queue: &mut Queue) {
    let Some(model) = session.live().model.as_deref() else {
        ui.label(theme::soft(ui, "The risk factors are shown here once the book can be read"));
        return;
    };
    let chosen = session.view().factor.as_deref();
    let named = chosen.and_then(|name| model.factors.iter().find(|factor| factor.name == name));
    let Some(factor) = named.or(model.factors.first()) else {
        ui.label(theme::soft(ui, "No risk factor moves this book"));
        return;
    };
    heading_ui(ui, queue, model, factor);
    diffusion_ui(ui, queue, factor);
    parameters_ui(ui, queue, factor);
    origin_ui(ui, session, factor);
    ui.add_space(4.0);
    ahead::ahead_ui(ui, session, model, factor);
}

fn heading_ui(ui: &mut Ui, queue: &mut Queue, model: &Model, factor: &RiskFactor) {
    ui.horizontal(|ui| {
        let combo = ComboBox::from_id_salt("factor")
            .selected_text(theme::strong(&factor.name))
            .width(ui.available_width() - 8.0)
            .truncate();
        let response = combo.show_ui(ui, |ui| {
            for other in &model.factors {
                if ui.selectable_label(other.name == factor.name, &other.name).clicked() {
                    queue.push(Command::ChooseFactor(other.name.clone()));
                }
            }
        });
        response.response.accessible_name("Risk factor").on_hover_text("Risk factor shown here");
    });
}

fn diffusion_ui(ui: &mut Ui, queue: &mut Queue, factor: &RiskFactor) {
    let kind = factor.diffusion.kind();
    field_row_ui(ui, "Diffusion", |ui| {
        let combo = ComboBox::from_id_salt("diffusion").selected_text(kind_words(kind)).width(170.0);
        let response = combo.show_ui(ui, |ui| {
            for other in
                [DiffusionKind::Geometric, DiffusionKind::RevertingLog, DiffusionKind::RevertingLevel]
            {
                let choice = ui.selectable_label(other == kind, kind_words(other));
                if choice.on_hover_text(kind_explanation(other)).clicked() && other != kind {
                    queue.push(Command::SetDiffusion { factor: factor.name.clone(), kind: other });
                }
            }
        });
        let name = format!("Diffusion of {}", factor.name);
        response.response.accessible_name(name).on_hover_text(kind_explanation(kind));
    });
}

fn kind_words(kind: DiffusionKind) -> &'static str {
    match kind {
        DiffusionKind::Geometric => "geometric",
        DiffusionKind::RevertingLog => "reverting, on the log",
        DiffusionKind::RevertingLevel => "reverting, on the level",
    }
}

fn kind_explanation(kind: DiffusionKind) -> &'static str {
    match kind {
        DiffusionKind::Geometric => "Proportional shocks that never fade: shares, exchange rates",
        DiffusionKind::RevertingLog => "Proportional shocks that fade towards a level: commodities, freight",
        DiffusionKind::RevertingLevel => {
            "Absolute shocks that fade towards a level, of any sign: rates, spreads"
        }
    }
}

fn parameters_ui(ui: &mut Ui, queue: &mut Queue, factor: &RiskFactor) {
    if let Some(level) = factor.level {
        parameter_ui(ui, queue, factor, Parameter::Level(level));
    }
    parameter_ui(ui, queue, factor, Parameter::Volatility(factor.diffusion.volatility()));
    match factor.diffusion {
        Diffusion::Geometric { drift, .. } => parameter_ui(ui, queue, factor, Parameter::Drift(drift)),
        Diffusion::RevertingLog { long_run, half_life, .. }
        | Diffusion::RevertingLevel { long_run, half_life, .. } => {
            if let HalfLife::Days(_) = half_life {
                parameter_ui(ui, queue, factor, Parameter::LongRun(long_run));
            }
            parameter_ui(ui, queue, factor, Parameter::HalfLife(half_life));
        }
    }
}

/// Which history the fitted parameters are from.
fn origin_ui(ui: &mut Ui, session: &Session, factor: &RiskFactor) {
    let fit = session.live().fit.as_ref().and_then(|fit| fit.factor(&factor.name));
    let Some((from, to)) = fit.and_then(|fit| fit.dates).filter(|_| factor.origins.has_fitted()) else {
        return;
    };
    let changes = fit.map_or(0, |fit| fit.observations);
    let words = format!("Fitted on {from} to {to}, {} changes", grouped(changes as f64, 0));
    let response = ui.add(Label::new(theme::soft(ui, words)).truncate());
    response
        .on_hover_text("What is typed stands above what is fitted; the Fit view shows all three diffusions");
}

/// Where a parameter came from.
fn origin_of(factor: &RiskFactor, parameter: Parameter) -> Origin {
    let origins = &factor.origins;
    match parameter {
        Parameter::Level(_) => origins.level,
        Parameter::Drift(_) => origins.drift,
        Parameter::Volatility(_) => origins.volatility,
        Parameter::LongRun(_) => origins.long_run,
        Parameter::HalfLife(_) => origins.half_life,
    }
}

fn parameter_ui(ui: &mut Ui, queue: &mut Queue, factor: &RiskFactor, parameter: Parameter) {
    let name = format!("{} of {}", parameter.text(), factor.name);
    let is_fitted = origin_of(factor, parameter) == Origin::Fitted;
    let changed = |ui: &mut Ui| match parameter {
        Parameter::HalfLife(half_life) => {
            half_life_ui(ui, &name, half_life, is_fitted).map(Parameter::HalfLife)
        }
        Parameter::Level(value) => level_field(&name, factor).ui(ui, value).map(Parameter::Level),
        Parameter::LongRun(value) => {
            shortened(level_field(&name, factor), is_fitted).ui(ui, value).map(Parameter::LongRun)
        }
        Parameter::Drift(value) => {
            shortened(NumberField::new(&name, "% a year").shown(Shown::Percent), is_fitted)
                .ui(ui, value)
                .map(Parameter::Drift)
        }
        Parameter::Volatility(value) => {
            shortened(volatility_field(&name, factor), is_fitted).ui(ui, value).map(Parameter::Volatility)
        }
    };
    let label = match parameter {
        Parameter::Level(_) if is_fitted => "Level today, last of the history".to_owned(),
        _ if is_fitted => format!("{}, fitted", parameter.text()),
        _ => parameter.text().to_owned(),
    };
    field_row_ui(ui, &label, |ui| {
        if let Some(parameter) = changed(ui) {
            queue.push(Command::SetParameter { factor: factor.name.clone(), parameter });
        }
    });
}

/// A field that shows no more digits of a fitted parameter than it is worth.
fn shortened(field: NumberField<'_>, is_fitted: bool) -> NumberField<'_> {
    if is_fitted { field.digits(FITTED_DIGITS) } else { field }
}

fn level_field<'a>(name: &'a str, factor: &RiskFactor) -> NumberField<'a> {
    let field = NumberField::new(name, unit_words(factor));
    if factor.diffusion.is_log() { field.range(f64::MIN_POSITIVE..=f64::MAX) } else { field }
}

fn unit_words(factor: &RiskFactor) -> &'static str {
    match factor.unit {
        LevelUnit::Points => "",
        LevelUnit::Percent => "%",
        LevelUnit::Bp => "bp",
    }
}

fn volatility_field<'a>(name: &'a str, factor: &RiskFactor) -> NumberField<'a> {
    if factor.diffusion.is_log() {
        return NumberField::new(name, "% a year").shown(Shown::Percent).range(0.0..=MOST_LOG_VOLATILITY);
    }
    let unit = match factor.unit {
        LevelUnit::Points => "points, over a year",
        LevelUnit::Percent => "% points, over a year",
        LevelUnit::Bp => "bp, over a year",
    };
    NumberField::new(name, unit).range(0.0..=f64::MAX)
}

/// A number of days, or no reversion at all.
fn half_life_ui(ui: &mut Ui, name: &str, half_life: HalfLife, is_fitted: bool) -> Option<HalfLife> {
    let mut has_reversion = matches!(half_life, HalfLife::Days(_));
    let toggle = ui.checkbox(&mut has_reversion, "reverts").accessible_name(format!("Reversion, {name}"));
    if toggle.on_hover_text("Without it the factor is a random walk without drift").changed() {
        let days = HalfLife::Days(OFFERED_HALF_LIFE_DAYS);
        return Some(if has_reversion { days } else { HalfLife::None });
    }
    let HalfLife::Days(days) = half_life else { return None };
    shortened(NumberField::new(name, "days").range(0.01..=1e6), is_fitted).ui(ui, days).map(HalfLife::Days)
}
