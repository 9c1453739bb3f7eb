//! Paths are addressed: whoever draws them, alone or together, on whichever thread, gets the same digits.

use crate::support::{
    brownian, equicorrelation, finished, geometric, model, model_of_parts, plan, reverting_level,
    reverting_log,
};
use ebbmark_engine::factors::{CurrencyPart, CurrencyRate, Model, Term};
use ebbmark_engine::simulate::{
    InstructionSet, Plan, Run, SimulateError, Unwatched, Watcher, draw_again, run, run_with,
};
use std::sync::Mutex;

/// Seven factors of all diffusions in two currencies, so that no part of the loop is left out.
fn mixed_book() -> Model {
    let factors = vec![
        geometric(0.04, 0.2),
        reverting_log(50.0, 60.0, 40.0, 0.45),
        reverting_level(3.0, 4.0, 120.0, 0.9),
        geometric(0.0, 0.08),
        brownian(1.2),
        geometric(-0.02, 0.35),
        reverting_log(9.0, 7.0, 15.0, 0.7),
    ];
    let terms =
        |pairs: &[(usize, f64)]| pairs.iter().map(|&(factor, weight)| Term { factor, weight }).collect();
    let home = CurrencyPart {
        rate: None,
        constant: 1e5,
        income_per_year: 3e3,
        terms: terms(&[(0, 4e5), (1, -8e4), (2, -2e4), (4, 1e4)]),
    };
    let foreign = CurrencyPart {
        rate: Some(CurrencyRate { factor: 3, today: 0.9 }),
        constant: 2e4,
        income_per_year: 0.0,
        terms: terms(&[(5, 2e5), (6, 6e4), (2, 5e3)]),
    };
    model_of_parts(factors, equicorrelation(7, 0.25), vec![home, foreign])
}

/// Two and a half blocks, so that a last block and a last tile are not full.
fn mixed_plan() -> Plan {
    Plan { loss_limit: Some(4e4), ..plan(2_565, 11, 30) }
}

fn is_same(left: &Run, right: &Run) -> bool {
    left.kept_days().iter().all(|&day| left.sample(day) == right.sample(day))
}

#[test]
fn always_same_digits_on_any_number_of_threads() {
    let book = mixed_book();
    let on = |threads| run(&book, &Plan { threads: Some(threads), ..mixed_plan() }, &Unwatched).unwrap();
    let one = on(1);
    assert_eq!(one.paths(), 2_565);
    for threads in [2, 3, 8] {
        assert!(is_same(&one, &on(threads)), "{threads} threads");
    }
}

#[test]
fn always_same_digits_with_every_instruction_set() {
    let book = mixed_book();
    let with = |set| run_with(&book, &mixed_plan(), &Unwatched, set).unwrap();
    let scalar = with(InstructionSet::Scalar);
    for set in InstructionSet::available() {
        assert!(is_same(&scalar, &with(set)), "{set:?}");
    }
}

#[test]
fn always_a_path_drawn_alone_is_the_path_of_the_run() {
    let (book, plan) = (mixed_book(), mixed_plan());
    let together = finished(&book, &plan);
    let numbers = [2_564, 0, 1_031];
    let alone = draw_again(&book, &plan, &numbers).unwrap();
    for day in 1..=30 {
        let (all, few) = (together.sample(day).unwrap(), alone.sample(day).unwrap());
        for (at, &number) in numbers.iter().enumerate() {
            assert_eq!(few.values[at], all.values[number as usize], "value of path {number} on day {day}");
            assert_eq!(few.falls[at], all.falls[number as usize], "fall of path {number} on day {day}");
        }
    }
    assert_eq!(draw_again(&book, &plan, &[]).unwrap().paths(), 0);
}

#[test]
fn always_a_long_run_has_the_digits_of_a_short_one() {
    let book = mixed_book();
    let long = Plan { kept_days: vec![21, 252], ..mixed_plan() };
    let short = Plan { kept_days: vec![21], ..mixed_plan() };
    assert_eq!(finished(&book, &long).sample(21), finished(&book, &short).sample(21));
    assert_eq!(finished(&book, &short).sample(20), None);
}

#[test]
fn always_a_factor_at_the_end_leaves_the_paths_of_the_others() {
    let factors = vec![geometric(0.0, 0.2), reverting_log(50.0, 60.0, 40.0, 0.4), geometric(0.0, 0.3)];
    let before = model(factors[..2].to_vec(), equicorrelation(2, 0.5), &[1e6, 5e5], 0.0);
    let after = model(factors, equicorrelation(3, 0.5), &[1e6, 5e5, 0.0], 0.0);
    let values = |book: &Model| finished(book, &plan(1_000, 5, 21)).values(21);
    assert_eq!(values(&before), values(&after));
}

/// Stops a run after some blocks and keeps what was published last.
struct Stopping {
    after_paths: usize,
    last: Mutex<Option<Run>>,
}

impl Watcher for Stopping {
    fn progress(&self, run: &Run) {
        *self.last.lock().unwrap() = Some(run.clone());
    }

    fn is_stopped(&self) -> bool {
        self.last.lock().unwrap().as_ref().is_some_and(|run| run.paths() >= self.after_paths)
    }
}

#[test]
fn always_a_stopped_run_leaves_the_prefix_of_the_whole_one() {
    let book = mixed_book();
    let long = Plan { paths: 12_000, ..mixed_plan() };
    let watcher = Stopping { after_paths: 4_000, last: Mutex::new(None) };
    assert_eq!(run(&book, &long, &watcher).unwrap_err(), SimulateError::Stopped);
    let half = watcher.last.into_inner().unwrap().unwrap();
    let paths = half.paths();
    assert!((4_000..12_000).contains(&paths), "{paths}");
    // The prefix is what a run of so many paths gives, the limit's probability included.
    assert!(is_same(&half, &finished(&book, &Plan { paths, ..long.clone() })));
    let whole = finished(&book, &long).sample(30).unwrap();
    assert_eq!(half.sample(30).unwrap().values, whole.values[..paths]);
}

#[test]
fn always_semi_definite_correlations_work() {
    // Sixty factors that are mixes of ten, row sums of squares brought to one.
    let (n, rank) = (60, 10);
    let loading =
        |row: usize, of: usize| ((row * 7 + of * 13) as f64).sin() + if row % rank == of { 1.0 } else { 0.0 };
    let rows: Vec<Vec<f64>> = (0..n)
        .map(|row| {
            let raw: Vec<f64> = (0..rank).map(|of| loading(row, of)).collect();
            let norm = raw.iter().map(|x| x * x).sum::<f64>().sqrt();
            raw.iter().map(|x| x / norm).collect()
        })
        .collect();
    let dot = |i: usize, j: usize| rows[i].iter().zip(&rows[j]).map(|(x, y)| x * y).sum::<f64>();
    let cells =
        (0..n * n).map(|cell| if cell % (n + 1) == 0 { 1.0 } else { dot(cell / n, cell % n) }).collect();
    let book = model(vec![geometric(0.0, 0.2); n], cells, &vec![1e4; n], 0.0);
    assert!(finished(&book, &plan(500, 1, 5)).values(5).unwrap().iter().all(|value| value.is_finite()));
}

#[test]
fn exact_a_perfect_hedge_has_no_risk() {
    // Two factors of correlation one and equal volatility, held long and short.
    let book = model(vec![geometric(0.0, 0.2); 2], equicorrelation(2, 1.0), &[1e6, -1e6], 5e5);
    let sample = finished(&book, &plan(1_000, 1, 21)).sample(21).unwrap();
    assert!(sample.values.iter().all(|value| (value - 5e5).abs() < 1e-6));
    assert!(sample.falls.iter().all(|fall| *fall < 1e-6));
}

#[test]
fn exact_without_volatility_the_book_follows_its_mean() {
    let book = model(vec![geometric(0.1, 0.0), brownian(0.0)], equicorrelation(2, 0.0), &[1e6, 1e6], 0.0);
    let sample = finished(&book, &Plan { loss_limit: Some(1.0), ..plan(50, 1, 252) }).sample(252).unwrap();
    // 252 daily additions of the drift: one unit in the last place each.
    let grown = 1e6 * 0.1_f64.exp();
    assert!(sample.values.iter().all(|value| (value / grown - 1.0).abs() < 252.0 * f64::EPSILON));
    assert!(sample.falls.iter().all(|fall| *fall < 1e-8));
    assert_eq!(sample.touched.unwrap().value, 0.0);
}

#[test]
fn exact_cash_never_moves() {
    let book = model(Vec::new(), Vec::new(), &[], 123_456.78);
    let sample = finished(&book, &plan(100, 1, 21)).sample(21).unwrap();
    assert!(sample.values.iter().all(|value| *value == 123_456.78));
    assert!(sample.falls.iter().all(|fall| *fall == 0.0));
}
