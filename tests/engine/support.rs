//! Models built by hand, runs of them, and the one way figures are compared. Nothing is tested here.

use ebbmark_engine::book::{HalfLife, LevelUnit};
use ebbmark_engine::factors::{
    Correlation, CurrencyPart, CurrencyRate, Diffusion, Model, Origins, RiskFactor, Term, Valuation,
};
use ebbmark_engine::fit::{ObservedPath, Steps};
use ebbmark_engine::measures::{Confidence, Conventions, LossFrom};
use ebbmark_engine::simulate::{DaySample, Plan, Run, Unwatched, run};

/// Deterministic formulas against figures computed elsewhere in double precision.
pub(crate) const RELATIVE: f64 = 1e-9;

pub(crate) const DAYS_PER_YEAR: f64 = 252.0;

/// Asserts that a figure lies within `relative` of the expected one.
#[track_caller]
pub(crate) fn close(figure: f64, expected: f64, relative: f64) {
    let gap = (figure - expected).abs();
    assert!(gap <= relative * expected.abs(), "{figure} is not {expected} to {relative:e}");
}

/// Asserts that a figure lies within `absolute` of the expected one.
#[track_caller]
pub(crate) fn near(figure: f64, expected: f64, absolute: f64) {
    assert!((figure - expected).abs() <= absolute, "{figure} is not {expected} to {absolute:e}");
}

/// A factor on a geometric diffusion.
pub(crate) fn geometric(level: f64, drift: f64, volatility: f64) -> RiskFactor {
    factor(level, Diffusion::Geometric { drift, volatility })
}

/// A factor whose log reverts with `speed` a year; a random walk for 0.
pub(crate) fn reverting_log(level: f64, long_run: f64, speed: f64, volatility: f64) -> RiskFactor {
    factor(level, Diffusion::RevertingLog { volatility, long_run, half_life: half_life(speed) })
}

/// A factor whose level reverts with `speed` a year; a random walk for 0.
pub(crate) fn reverting_level(level: f64, long_run: f64, speed: f64, volatility: f64) -> RiskFactor {
    factor(level, Diffusion::RevertingLevel { volatility, long_run, half_life: half_life(speed) })
}

/// Keeps a factor's speed a year when a year has another number of days.
pub(crate) fn rescale_half_life(factor: &mut RiskFactor, days_per_year: f64) {
    if let Diffusion::RevertingLog { half_life: HalfLife::Days(days), .. }
    | Diffusion::RevertingLevel { half_life: HalfLife::Days(days), .. } = &mut factor.diffusion
    {
        *days *= days_per_year / DAYS_PER_YEAR;
    }
}

fn half_life(speed: f64) -> HalfLife {
    if speed > 0.0 { HalfLife::Days(std::f64::consts::LN_2 / speed * DAYS_PER_YEAR) } else { HalfLife::None }
}

fn factor(level: f64, diffusion: Diffusion) -> RiskFactor {
    RiskFactor {
        name: "factor".to_owned(),
        level: Some(level),
        unit: LevelUnit::Points,
        diffusion,
        is_inverted: false,
        origins: Origins::default(),
    }
}

/// What is held in one currency: `rate` names its factor and today's rate, `terms` factor and weight.
pub(crate) fn part(rate: Option<(usize, f64)>, constant: f64, terms: &[(usize, f64)]) -> CurrencyPart {
    CurrencyPart {
        rate: rate.map(|(factor, today)| CurrencyRate { factor, today }),
        constant,
        income_per_year: 0.0,
        terms: terms.iter().map(|(factor, weight)| Term { factor: *factor, weight: *weight }).collect(),
    }
}

/// A model worth `value` today, with the correlations of the pairs named and no others.
pub(crate) fn model(
    factors: Vec<RiskFactor>,
    correlated: &[(usize, usize, f64)],
    parts: Vec<CurrencyPart>,
    value: f64,
) -> Model {
    let n = factors.len();
    let mut cells: Vec<f64> = (0..n * n).map(|cell| f64::from(cell % (n + 1) == 0)).collect();
    for (row, column, correlation) in correlated {
        cells[row * n + column] = *correlation;
        cells[column * n + row] = *correlation;
    }
    Model {
        currency: None,
        days_per_year: DAYS_PER_YEAR,
        factors,
        correlation: Correlation::new(n, cells).unwrap(),
        holdings: vec![],
        valuation: Valuation { parts },
        value,
        repair: None,
        history: None,
        notices: vec![],
    }
}

/// The reference book of the exact moments: one factor of each diffusion, long, short and by its level.
pub(crate) fn reference_book() -> Model {
    model(
        vec![
            geometric(100.0, 0.05, 0.2),
            reverting_log(50.0, 60.0, 2.0, 0.3),
            reverting_level(3.0, 4.0, 0.5, 0.8),
        ],
        &[(0, 1, 0.5), (0, 2, -0.3), (1, 2, 0.2)],
        vec![part(None, 300.0, &[(0, 1000.0), (1, -250.0), (2, 100.0)])],
        1050.0,
    )
}

/// A run of one kept day.
pub(crate) fn sample(model: &Model, paths: usize, seed: u64, day: u32) -> DaySample {
    run_to(model, paths, seed, &[day], None).sample(day).unwrap()
}

/// A run with the days kept and the loss limit watched.
pub(crate) fn run_to(model: &Model, paths: usize, seed: u64, days: &[u32], loss_limit: Option<f64>) -> Run {
    let plan = Plan { paths, seed, kept_days: days.to_vec(), loss_limit, threads: None };
    run(model, &plan, &Unwatched).unwrap()
}

pub(crate) fn confidence(text: &str) -> Confidence {
    text.parse().unwrap()
}

/// Losses from today at these confidences, without a limit.
pub(crate) fn from_today(confidences: &[&str]) -> Conventions {
    Conventions {
        confidences: confidences.iter().map(|text| confidence(text)).collect(),
        loss_from: LossFrom::Today,
        loss_limit: None,
    }
}

/// A path of the modelled variable with steps of whole units.
pub(crate) fn path(values: &[f64], units: &[u32], years_per_unit: f64) -> ObservedPath {
    ObservedPath { values: values.to_vec(), steps: Steps { units: units.to_vec(), years_per_unit } }
}
