//! How long figures take to read: 100,000 paths on one day, and the closed-form first answer of a book on 100 factors.

use criterion::{Criterion, criterion_group, criterion_main};
use ebbmark_engine::book::{HalfLife, LevelUnit};
use ebbmark_engine::factors::*;
use ebbmark_engine::measures::*;
use ebbmark_engine::simulate::{Plan, Unwatched, run};
use std::hint::black_box;

/// A hundred factors, a third of each diffusion, the first five of them currency rates; a fifth of the book in its own
/// currency and the rest abroad.
fn model() -> Model {
    let factors: Vec<RiskFactor> = (0..100)
        .map(|i| RiskFactor {
            name: format!("factor {i}"),
            level: Some(1.0),
            unit: LevelUnit::Points,
            diffusion: match i % 3 {
                _ if i < 5 => Diffusion::Geometric { drift: 0.0, volatility: 0.1 },
                0 => Diffusion::Geometric { drift: 0.02, volatility: 0.2 },
                1 => Diffusion::RevertingLog {
                    volatility: 0.4,
                    long_run: 1.1,
                    half_life: HalfLife::Days(40.0),
                },
                _ => Diffusion::RevertingLevel { volatility: 0.9, long_run: 2.0, half_life: HalfLife::None },
            },
            is_inverted: false,
            origins: Origins::default(),
        })
        .collect();
    let part = |first: usize, rate: Option<CurrencyRate>| CurrencyPart {
        rate,
        constant: 1e6,
        income_per_year: 0.0,
        terms: (5 + first..100).step_by(5).map(|factor| Term { factor, weight: 1e6 }).collect(),
    };
    let rate = |factor| Some(CurrencyRate { factor, today: 1.0 });
    let parts = (0..5).map(|k| part(k, if k == 0 { None } else { rate(k) })).collect();
    let cells = (0..100 * 100).map(|cell| if cell % 101 == 0 { 1.0 } else { 0.3 }).collect();
    Model {
        currency: None,
        days_per_year: 252.0,
        correlation: Correlation::new(100, cells).expect("equal correlations"),
        factors,
        holdings: vec![],
        valuation: Valuation { parts },
        value: 7e7,
        repair: None,
        history: None,
        notices: vec![],
    }
}

fn conventions() -> Conventions {
    let level = |text: &str| text.parse().expect("a confidence");
    Conventions {
        confidences: vec![level("0.95"), level("0.99")],
        loss_from: LossFrom::Today,
        loss_limit: Some(5e6),
    }
}

fn first_answer(c: &mut Criterion) {
    let (model, conventions) = (model(), conventions());
    let days: Vec<u32> = (1..=252).collect();
    c.bench_function("exact moments, 100 factors", |b| b.iter(|| black_box(exact_moments(&model, 21))));
    c.bench_function("first reading, 100 factors", |b| {
        b.iter(|| black_box(first_reading(&model, 21, &conventions)))
    });
    c.bench_function("first bands, 100 factors, 252 days", |b| {
        b.iter(|| black_box(first_bands(&model, &days)))
    });
}

fn paths(c: &mut Criterion) {
    let (model, conventions) = (model(), conventions());
    let kept_days = vec![1, 5, 10, 21];
    let plan =
        Plan { paths: 100_000, seed: 1, kept_days: kept_days.clone(), loss_limit: Some(5e6), threads: None };
    let run = run(&model, &plan, &Unwatched).expect("a run");
    let sample = run.sample(21).expect("a kept day");
    c.bench_function("reading, 100,000 paths", |b| {
        b.iter(|| black_box(reading(&model, &sample, &conventions)))
    });
    c.bench_function("density, 100,000 paths", |b| b.iter(|| black_box(density(&sample.values))));
    c.bench_function("bands, 100,000 paths, 4 days", |b| b.iter(|| black_box(bands(&run, &kept_days))));
}

criterion_group! { name = benches; config = Criterion::default().sample_size(20); targets = first_answer, paths }
criterion_main!(benches);
