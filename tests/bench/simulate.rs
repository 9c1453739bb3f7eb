//! How long the engine takes: the job that `tests/reference/rival_numpy.py` does too (50 factors, 12 of them reverting,
//! 21 daily steps, 100,000 paths, drawdown bridged, all measures on every day), its parts, and the first answer.

use criterion::{Criterion, criterion_group, criterion_main};
use ebbmark_engine::book::{HalfLife, LevelUnit};
use ebbmark_engine::factors::{
    Correlation, CurrencyPart, Diffusion, Model, Origins, RiskFactor, Term, Valuation,
};
use ebbmark_engine::measures::{Confidence, Conventions, LossFrom, first_reading, reading};
use ebbmark_engine::simulate::{InstructionSet, Plan, Run, Unwatched, run, run_with};
use rayon::prelude::*;
use std::hint::black_box;

const DAYS: u32 = 21;
const WEIGHT: f64 = 1e6;

fn factor(number: usize, is_reverting: bool) -> RiskFactor {
    let half_life = HalfLife::Days(40.0);
    let diffusion = if is_reverting {
        Diffusion::RevertingLog { volatility: 0.4, long_run: 110.0, half_life }
    } else {
        Diffusion::Geometric { drift: 0.0, volatility: 0.2 }
    };
    let name = format!("factor {number}");
    RiskFactor {
        name,
        level: Some(100.0),
        unit: LevelUnit::Points,
        diffusion,
        is_inverted: false,
        origins: Origins::default(),
    }
}

fn book(n: usize, reverting: usize) -> Model {
    let factors: Vec<RiskFactor> = (0..n).map(|number| factor(number, number >= n - reverting)).collect();
    let cells = (0..n * n).map(|cell| if cell % (n + 1) == 0 { 1.0 } else { 0.3 }).collect();
    let terms = (0..n).map(|factor| Term { factor, weight: WEIGHT }).collect();
    let part = CurrencyPart { rate: None, constant: 0.0, income_per_year: 0.0, terms };
    Model {
        currency: None,
        days_per_year: 252.0,
        correlation: Correlation::new(n, cells).expect("an equicorrelation of 0.3 is valid"),
        factors,
        holdings: Vec::new(),
        valuation: Valuation { parts: vec![part] },
        value: n as f64 * WEIGHT,
        repair: None,
        history: None,
        notices: Vec::new(),
    }
}

fn plan(threads: Option<usize>) -> Plan {
    let kept_days = (1..=DAYS).collect();
    Plan { paths: 100_000, seed: 1, kept_days, loss_limit: Some(5e6), threads }
}

fn conventions() -> Conventions {
    let confidences = ["0.95", "0.99"].map(|text| text.parse::<Confidence>().expect("a confidence"));
    Conventions { confidences: confidences.to_vec(), loss_from: LossFrom::Today, loss_limit: Some(5e6) }
}

fn measure_every_day(book: &Model, run: &Run) -> usize {
    let conventions = conventions();
    let days = (1..=DAYS).into_par_iter();
    days.filter_map(|day| run.sample(day)).map(|sample| reading(book, &sample, &conventions)).count()
}

fn whole_job(criterion: &mut Criterion) {
    let book = book(50, 12);
    criterion.bench_function("50 factors x 21 days x 100,000 paths with all measures, all cores", |bench| {
        bench.iter(|| {
            let run = run(&book, &plan(None), &Unwatched).expect("a valid book");
            black_box(measure_every_day(&book, &run))
        });
    });
}

fn parts(criterion: &mut Criterion) {
    let book = book(50, 12);
    let finished = run(&book, &plan(None), &Unwatched).expect("a valid book");
    criterion.bench_function("measures on 21 days alone, all cores", |bench| {
        bench.iter(|| black_box(measure_every_day(&book, &finished)));
    });
    for set in InstructionSet::available().into_iter().filter(|set| *set != InstructionSet::Scalar) {
        criterion.bench_function(&format!("paths alone, one thread, {set:?}"), |bench| {
            bench.iter(|| black_box(run_with(&book, &plan(Some(1)), &Unwatched, set)));
        });
    }
}

fn first_answer(criterion: &mut Criterion) {
    let (book, conventions) = (book(100, 25), conventions());
    criterion.bench_function("first answer in closed form, 100 factors", |bench| {
        bench.iter(|| black_box(first_reading(&book, 252, &conventions)));
    });
}

criterion_group! {
    name = engine;
    config = Criterion::default().sample_size(10);
    targets = whole_job, parts, first_answer
}
criterion_main!(engine);
