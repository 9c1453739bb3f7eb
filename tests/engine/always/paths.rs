//! Paths are addressed: whoever draws them, alone or together, on whichever thread, gets the same digits.

use crate::support::{geometric, model, part, reverting_level, reverting_log};
use ebbmark_engine::factors::{Model, RiskFactor};
use ebbmark_engine::simulate::{
    InstructionSet, Plan, Run, SimulateError, Unwatched, Watcher, draw_again, run, run_with,
};
use std::sync::Mutex;

/// All pairs of `n` factors correlated alike.
fn alike(n: usize, correlation: f64) -> Vec<(usize, usize, f64)> {
    (0..n).flat_map(|row| (0..row).map(move |column| (row, column, correlation))).collect()
}

fn brownian(volatility: f64) -> RiskFactor {
    reverting_level(0.0, 0.0, 0.0, volatility)
}

fn plan(paths: usize, seed: u64, horizon_days: u32) -> Plan {
    Plan { paths, seed, kept_days: (1..=horizon_days).collect(), loss_limit: None, threads: None }
}

fn finished(model: &Model, plan: &Plan) -> Run {
    run(model, plan, &Unwatched).unwrap()
}

/// Seven factors of all diffusions in two currencies, so that no part of the loop is left out.
fn mixed_book() -> Model {
    let factors = vec![
        geometric(100.0, 0.04, 0.2),
        reverting_log(50.0, 60.0, 4.4, 0.45),
        reverting_level(3.0, 4.0, 1.5, 0.9),
        geometric(0.9, 0.0, 0.08),
        brownian(1.2),
        geometric(20.0, -0.02, 0.35),
        reverting_log(9.0, 7.0, 12.0, 0.7),
    ];
    let home = part(None, 1e5, &[(0, 4e5), (1, -8e4), (2, -2e4), (4, 1e4)]);
    let foreign = part(Some((3, 0.9)), 2e4, &[(2, 5e3), (5, 2e5), (6, 6e4)]);
    model(factors, &alike(7, 0.25), vec![home, foreign], 1e5 + 4e5 - 8e4 + 0.9 * (2e4 + 2.6e5))
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
    let factors =
        vec![geometric(1.0, 0.0, 0.2), reverting_log(50.0, 60.0, 4.0, 0.4), geometric(1.0, 0.0, 0.3)];
    let held = |factors: &[RiskFactor], terms: &[(usize, f64)]| {
        model(factors.to_vec(), &alike(factors.len(), 0.5), vec![part(None, 0.0, terms)], 1.5e6)
    };
    let before = held(&factors[..2], &[(0, 1e6), (1, 5e5)]);
    let after = held(&factors, &[(0, 1e6), (1, 5e5), (2, 0.0)]);
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
    let pairs: Vec<_> =
        alike(n, 0.0).into_iter().map(|(row, column, _)| (row, column, dot(row, column))).collect();
    let terms: Vec<_> = (0..n).map(|factor| (factor, 1e4)).collect();
    let held = vec![part(None, 0.0, &terms)];
    let book = model(vec![geometric(1.0, 0.0, 0.2); n], &pairs, held, 1e4 * n as f64);
    assert!(finished(&book, &plan(500, 1, 5)).values(5).unwrap().iter().all(|value| value.is_finite()));
}

#[test]
fn exact_a_perfect_hedge_has_no_risk() {
    // Two factors of correlation one and equal volatility, held long and short.
    let hedge = vec![part(None, 5e5, &[(0, 1e6), (1, -1e6)])];
    let book = model(vec![geometric(1.0, 0.0, 0.2); 2], &[(0, 1, 1.0)], hedge, 5e5);
    let sample = finished(&book, &plan(1_000, 1, 21)).sample(21).unwrap();
    assert!(sample.values.iter().all(|value| (value - 5e5).abs() < 1e-6));
    assert!(sample.falls.iter().all(|fall| *fall < 1e-6));
}

#[test]
fn exact_without_volatility_the_book_follows_its_mean() {
    let still = vec![part(None, 0.0, &[(0, 1e6), (1, 1e6)])];
    let book = model(vec![geometric(1.0, 0.1, 0.0), brownian(0.0)], &[], still, 1e6);
    let sample = finished(&book, &Plan { loss_limit: Some(1.0), ..plan(50, 1, 252) }).sample(252).unwrap();
    // 252 daily additions of the drift: one unit in the last place each.
    let grown = 1e6 * 0.1_f64.exp();
    assert!(sample.values.iter().all(|value| (value / grown - 1.0).abs() < 252.0 * f64::EPSILON));
    assert!(sample.falls.iter().all(|fall| *fall < 1e-8));
    assert_eq!(sample.touched.unwrap().value, 0.0);
}

#[test]
fn exact_cash_never_moves() {
    let book = model(Vec::new(), &[], vec![part(None, 123_456.78, &[])], 123_456.78);
    let sample = finished(&book, &plan(100, 1, 21)).sample(21).unwrap();
    assert!(sample.values.iter().all(|value| *value == 123_456.78));
    assert!(sample.falls.iter().all(|fall| *fall == 0.0));
}

/// A change of these digits needs a line in DEVELOPERS.md: pictures made before it can't be made again.
#[test]
fn pinned_first_paths_of_the_mixed_book() {
    let sample = finished(&mixed_book(), &Plan { paths: 2, ..mixed_plan() }).sample(30).unwrap();
    assert_eq!(
        (sample.values, sample.falls),
        (vec![707547.0859999808, 647931.2241815932], vec![66092.2728017529, 68358.19194692385])
    );
}
