//! How often the 95 % ranges hold the true figure: 1,000 seeds of 10,000 paths each. Prints the shares, and fails where
//! one lies outside 93 to 97 %. Run with `cargo bench -p ebbmark-engine --bench coverage`; takes well under a minute.
#![expect(clippy::print_stdout, reason = "its answer is a table")]

use ebbmark_engine::book::{HalfLife, LevelUnit};
use ebbmark_engine::factors::*;
use ebbmark_engine::maths::*;
use ebbmark_engine::measures::*;
use ebbmark_engine::simulate::{Plan, Unwatched, run};
use rayon::prelude::*;
use std::process::ExitCode;

const SEEDS: u64 = 1_000;
const PATHS: usize = 10_000;
/// Common shares; with 1,000 seeds a true 95 % comes out within 93.6 and 96.4 in 19 cases of 20.
const WANTED: std::ops::RangeInclusive<f64> = 0.93..=0.97;
const LEVELS: [&str; 2] = ["0.95", "0.99"];

/// Figures whose ranges are counted, with the truth of each.
struct Case {
    name: &'static str,
    model: Model,
    days: u32,
    /// Per confidence: VaR, ES, and, where the law is known, largest fall and mean beyond.
    truth: Vec<[Option<f64>; 4]>,
}

const FIGURES: [&str; 4] = ["VaR", "ES", "drawdown", "mean beyond"];

fn model(diffusion: Diffusion, weight: f64, value: f64) -> Model {
    let factor = RiskFactor {
        name: "factor".to_owned(),
        level: Some(1.0),
        unit: LevelUnit::Points,
        diffusion,
        is_inverted: false,
        origins: Origins::default(),
    };
    let terms = vec![Term { factor: 0, weight }];
    Model {
        currency: None,
        days_per_year: 252.0,
        factors: vec![factor],
        correlation: Correlation::identity(1),
        holdings: vec![],
        valuation: Valuation {
            parts: vec![CurrencyPart { rate: None, constant: 0.0, income_per_year: 0.0, terms }],
        },
        value,
        repair: None,
        history: None,
        notices: vec![],
    }
}

/// A level without reversion: the book is a Brownian motion, every figure has a closed form.
fn brownian() -> Case {
    let days = 126;
    let sd = (f64::from(days) / 252.0).sqrt();
    let truth = LEVELS.map(|text| {
        let level: f64 = confidence(text).value();
        let (z, fall) = (normal_quantile(level), drawdown_quantile(0.0, level));
        let es = normal_density(z) / (1.0 - level);
        [z, es, fall, drawdown_mean_beyond(0.0, fall)].map(|figure| Some(sd * figure))
    });
    let diffusion = Diffusion::RevertingLevel { volatility: 1.0, long_run: 1.0, half_life: HalfLife::None };
    Case { name: "Brownian book, 126 days", model: model(diffusion, 1.0, 0.0), days, truth: truth.to_vec() }
}

/// A short geometric holding over a year: the tail is lognormal, longer than normal.
fn short() -> Case {
    let mut model = model(Diffusion::Geometric { drift: 0.0, volatility: 0.4 }, -1.0, -1.0);
    model.days_per_year = 1.0;
    let truth = LEVELS.map(|text| {
        let level: f64 = confidence(text).value();
        let z = normal_quantile(level);
        let es = normal_cdf(0.4 - z) / (1.0 - level) - 1.0;
        [Some((0.4 * z - 0.08).exp_m1()), Some(es), None, None]
    });
    Case { name: "short geometric holding of 40 %, a year", model, days: 1, truth: truth.to_vec() }
}

fn confidence(text: &str) -> Confidence {
    text.parse().expect("a confidence")
}

/// Per confidence and figure, whether the range of one seed holds the truth.
fn held(case: &Case, seed: u64) -> Vec<[bool; 4]> {
    let conventions = Conventions {
        confidences: LEVELS.map(confidence).to_vec(),
        loss_from: LossFrom::Today,
        loss_limit: None,
    };
    let plan = Plan { paths: PATHS, seed, kept_days: vec![case.days], loss_limit: None, threads: Some(1) };
    let run = run(&case.model, &plan, &Unwatched).expect("a run");
    let read = reading(&case.model, &run.sample(case.days).expect("a kept day"), &conventions);
    let rows = read.loss.iter().zip(&read.drawdown.quantiles).zip(&case.truth);
    rows.map(|((loss, fall), truth)| {
        let reach = TWO_SIDED_95 * fall.mean_beyond_error.unwrap_or(f64::NAN);
        let ranges = [
            (loss.var_low, loss.var_high),
            (loss.es_low, loss.es_high),
            (fall.value_low, fall.value_high),
            (Some(fall.mean_beyond - reach), Some(fall.mean_beyond + reach)),
        ];
        std::array::from_fn(|figure| match (ranges[figure], truth[figure]) {
            ((Some(low), Some(high)), Some(truth)) => (low..=high).contains(&truth),
            _ => false,
        })
    })
    .collect()
}

/// Prints a case's shares; whether all of them are as wanted.
fn report(case: &Case) -> bool {
    let seeds: Vec<_> = (1..=SEEDS).into_par_iter().map(|seed| held(case, seed)).collect();
    let mut is_as_wanted = true;
    for (row, level) in LEVELS.iter().enumerate() {
        for (figure, name) in
            FIGURES.iter().enumerate().filter(|(figure, _)| case.truth[row][*figure].is_some())
        {
            let share = seeds.iter().filter(|seed| seed[row][figure]).count() as f64 / SEEDS as f64;
            is_as_wanted &= WANTED.contains(&share);
            println!("{}: {name} at {}: {:.1} %", case.name, confidence(level), 100.0 * share);
        }
    }
    is_as_wanted
}

fn main() -> ExitCode {
    let reports = [brownian(), short()].map(|case| report(&case));
    if reports.iter().all(|is_as_wanted| *is_as_wanted) { ExitCode::SUCCESS } else { ExitCode::FAILURE }
}
