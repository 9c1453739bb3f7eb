//! Models made without files, for tests that need a book and not its reading.

use ebbmark_engine::book::{HalfLife, LevelUnit};
use ebbmark_engine::factors::{Correlation, CurrencyPart, Diffusion, Model, RiskFactor, Term, Valuation};
use ebbmark_engine::simulate::{Plan, Run, Unwatched, run};

/// A geometric factor at level 100.
pub(crate) fn geometric(drift: f64, volatility: f64) -> RiskFactor {
    factor(100.0, Diffusion::Geometric { drift, volatility })
}

/// A factor whose log reverts.
pub(crate) fn reverting_log(level: f64, long_run: f64, half_life_days: f64, volatility: f64) -> RiskFactor {
    factor(level, Diffusion::RevertingLog { volatility, long_run, half_life: HalfLife::Days(half_life_days) })
}

/// A factor whose level reverts.
pub(crate) fn reverting_level(level: f64, long_run: f64, half_life_days: f64, volatility: f64) -> RiskFactor {
    factor(
        level,
        Diffusion::RevertingLevel { volatility, long_run, half_life: HalfLife::Days(half_life_days) },
    )
}

/// A Brownian motion: a level without reversion.
pub(crate) fn brownian(volatility: f64) -> RiskFactor {
    factor(0.0, Diffusion::RevertingLevel { volatility, long_run: 0.0, half_life: HalfLife::None })
}

fn factor(level: f64, diffusion: Diffusion) -> RiskFactor {
    RiskFactor {
        name: String::new(),
        level: Some(level),
        unit: LevelUnit::Points,
        diffusion,
        is_inverted: false,
    }
}

/// A book in one currency: `weights` are money per unit of growth, a row per factor; 252 days a year.
pub(crate) fn model(
    factors: Vec<RiskFactor>,
    correlation: Vec<f64>,
    weights: &[f64],
    constant: f64,
) -> Model {
    let terms = weights.iter().enumerate().map(|(factor, &weight)| Term { factor, weight }).collect();
    let part = CurrencyPart { rate: None, constant, income_per_year: 0.0, terms };
    model_of_parts(factors, correlation, vec![part])
}

/// A book of parts in several currencies.
pub(crate) fn model_of_parts(
    factors: Vec<RiskFactor>,
    correlation: Vec<f64>,
    parts: Vec<CurrencyPart>,
) -> Model {
    let named = factors.into_iter().enumerate();
    let factors: Vec<RiskFactor> =
        named.map(|(at, factor)| RiskFactor { name: format!("factor {at}"), ..factor }).collect();
    let valuation = Valuation { parts };
    let is_log: Vec<bool> = factors.iter().map(|factor| factor.diffusion.is_log()).collect();
    let value = valuation.value(&is_log, &vec![0.0; factors.len()], 0.0);
    Model {
        currency: None,
        days_per_year: 252.0,
        correlation: Correlation::new(factors.len(), correlation).unwrap(),
        factors,
        holdings: Vec::new(),
        valuation,
        value,
        notices: Vec::new(),
    }
}

/// All factors correlated alike.
pub(crate) fn equicorrelation(n: usize, rho: f64) -> Vec<f64> {
    (0..n * n).map(|cell| if cell % (n + 1) == 0 { 1.0 } else { rho }).collect()
}

/// A run to `horizon_days`, every day kept.
pub(crate) fn plan(paths: usize, seed: u64, horizon_days: u32) -> Plan {
    Plan { paths, seed, kept_days: (1..=horizon_days).collect(), loss_limit: None, threads: None }
}

/// The finished run.
pub(crate) fn finished(model: &Model, plan: &Plan) -> Run {
    run(model, plan, &Unwatched).unwrap()
}
