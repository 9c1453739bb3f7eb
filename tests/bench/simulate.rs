//! How long a run takes: 50 factors, 12 of them reverting, 21 daily steps, 100,000 paths, drawdown bridged.

use criterion::{Criterion, criterion_group, criterion_main};
use ebbmark_engine::book::{HalfLife, LevelUnit};
use ebbmark_engine::factors::*;
use ebbmark_engine::simulate::*;
use std::hint::black_box;

fn model(n: usize, reverting: usize) -> Model {
    let factors: Vec<RiskFactor> = (0..n)
        .map(|i| RiskFactor {
            name: format!("factor {i}"),
            level: Some(100.0),
            unit: LevelUnit::Points,
            diffusion: if i < n - reverting {
                Diffusion::Geometric { drift: 0.0, volatility: 0.2 }
            } else {
                Diffusion::RevertingLog { volatility: 0.4, long_run: 110.0, half_life: HalfLife::Days(40.0) }
            },
            is_inverted: false,
        })
        .collect();
    let part = CurrencyPart {
        rate: None,
        constant: 0.0,
        income_per_year: 0.0,
        terms: (0..n).map(|factor| Term { factor, weight: 1e6 }).collect(),
    };
    Model {
        currency: None,
        days_per_year: 252.0,
        correlation: Correlation::identity(n),
        factors,
        holdings: vec![],
        valuation: Valuation { parts: vec![part] },
        value: n as f64 * 1e6,
        notices: vec![],
    }
}

fn run_of_fifty(c: &mut Criterion) {
    let model = model(50, 12);
    for (name, threads) in [("one thread", 1), ("two threads", 2)] {
        let plan = Plan {
            paths: 100_000,
            seed: 1,
            kept_days: (1..=21).collect(),
            loss_limit: Some(5e6),
            threads: Some(threads),
        };
        c.bench_function(&format!("50 factors x 21 days x 100,000 paths, {name}"), |b| {
            b.iter(|| black_box(run(&model, &plan, &Unwatched)).unwrap())
        });
    }
    let plan = Plan {
        paths: 100_000,
        seed: 1,
        kept_days: (1..=21).collect(),
        loss_limit: Some(5e6),
        threads: Some(1),
    };
    for set in InstructionSet::available().into_iter().skip(2) {
        c.bench_function(&format!("{set:?}"), |b| {
            b.iter(|| black_box(run_with(&model, &plan, &Unwatched, set)).unwrap())
        });
    }
}

criterion_group! { name = benches; config = Criterion::default().sample_size(10); targets = run_of_fifty }
criterion_main!(benches);
