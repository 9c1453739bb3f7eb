//! The sampled law against the true one: Kolmogorov-Smirnov and chi-square tests with a fixed seed. Each would raise a
//! false alarm for one seed in a thousand.

use crate::support::*;
use ebbmark_engine::factors::Model;
use ebbmark_engine::maths::{drawdown_cdf, normal_cdf, sample_moments};
use ebbmark_engine::measures::exact_moments;

/// `sqrt(n) D` is passed with probability .001 where the law is the true one (Kolmogorov's limit law; scipy's
/// `kstwobign.ppf(.999)`).
const KOLMOGOROV_999: f64 = 1.9495;
/// Chi-square with 99 degrees of freedom at .999 (scipy's `chi2.ppf`).
const CHI_SQUARE_99_999: f64 = 148.230;
const PATHS: usize = 100_000;

fn sorted(mut sample: Vec<f64>) -> Vec<f64> {
    sample.sort_by(f64::total_cmp);
    sample
}

/// Largest distance of the empirical distribution from `cdf`, times the root of its size.
fn kolmogorov(sample: Vec<f64>, cdf: impl Fn(f64) -> f64) -> f64 {
    let n = sample.len() as f64;
    let distances = sorted(sample).into_iter().enumerate().map(|(below, value)| {
        let chance = cdf(value);
        (chance - below as f64 / n).max((below + 1) as f64 / n - chance)
    });
    distances.fold(0.0, f64::max) * n.sqrt()
}

#[track_caller]
fn check(model: &Model, day: u32, cdf: impl Fn(f64) -> f64) {
    let distance = kolmogorov(sample(model, PATHS, 17, day).values, cdf);
    assert!(distance < KOLMOGOROV_999, "distance {distance}");
}

#[test]
fn law_of_a_geometric_holding() {
    let book = model(vec![geometric(100.0, 0.08, 0.35)], &[], vec![part(None, 0.0, &[(0, 1000.0)])], 1000.0);
    let years = 63.0 / DAYS_PER_YEAR;
    let sd = 0.35 * f64::sqrt(years);
    check(&book, 63, |value| normal_cdf(((value / 1000.0).ln() - (0.08 * years - sd * sd / 2.0)) / sd));
}

#[test]
fn law_of_a_reverting_log_holding() {
    let book =
        model(vec![reverting_log(50.0, 60.0, 6.0, 0.5)], &[], vec![part(None, 0.0, &[(0, 50.0)])], 50.0);
    let years = 63.0 / DAYS_PER_YEAR;
    let sd = 0.5 * (-(-12.0 * years).exp_m1() / 12.0).sqrt();
    let median = 60.0_f64.ln() + (50.0_f64 / 60.0).ln() * (-6.0 * years).exp();
    check(&book, 63, |value| normal_cdf((value.ln() - median) / sd));
}

#[test]
fn law_of_a_foreign_holding() {
    // Two lognormals multiplied are one.
    let book = model(
        vec![geometric(100.0, 0.0, 0.2), geometric(1.1, 0.0, 0.1)],
        &[(0, 1, -0.3)],
        vec![part(Some((1, 1.1)), 0.0, &[(0, 100.0)])],
        110.0,
    );
    let years = 21.0 / DAYS_PER_YEAR;
    let variance = (0.05 - 2.0 * 0.3 * 0.02) * years;
    check(&book, 21, |value| normal_cdf(((value / 110.0).ln() + 0.05 * years / 2.0) / variance.sqrt()));
}

#[test]
fn law_of_many_levels_in_a_hundred_bins() {
    // Twenty correlated reverting levels make a normal book; its bins are of equal chance.
    let factors = (0..20).map(|k| reverting_level(0.0, 0.0, f64::from(k) / 2.0, 1.0)).collect();
    let pairs: Vec<_> = (0..20).flat_map(|row| (0..row).map(move |column| (row, column, 0.3))).collect();
    let terms: Vec<_> = (0..20).map(|k| (k, if k % 3 == 0 { -2.0 } else { 1.0 })).collect();
    let book = model(factors, &pairs, vec![part(None, 0.0, &terms)], 0.0);
    let sd = exact_moments(&book, 21).sd;
    let mut counts = [0.0; 100];
    for value in sample(&book, PATHS, 23, 21).values {
        counts[((normal_cdf(value / sd) * 100.0) as usize).min(99)] += 1.0;
    }
    let expected = PATHS as f64 / 100.0;
    let chi_square: f64 = counts.iter().map(|count| (count - expected) * (count - expected) / expected).sum();
    assert!(chi_square < CHI_SQUARE_99_999, "chi-square {chi_square}");
}

#[test]
fn law_of_the_largest_fall() {
    // A year of daily bridged steps; 20,000 paths, so that round trips within a day stay far below the test's reach.
    let book = model(vec![reverting_level(0.0, 0.0, 0.0, 1.0)], &[], vec![part(None, 0.0, &[(0, 1.0)])], 0.0);
    let distance = kolmogorov(sample(&book, 20_000, 29, 252).falls, |fall| drawdown_cdf(0.0, fall));
    assert!(distance < KOLMOGOROV_999, "distance {distance}");
}

/// The reference book on steps of `parts` to a day, with a level held abroad.
fn book_in_steps(parts: f64) -> Model {
    let reference = reference_book();
    let factors = [reference.factors, vec![geometric(1.2, 0.0, 0.1)]].concat();
    let mut book = model(
        factors,
        &[(0, 1, 0.5), (0, 2, -0.3), (1, 2, 0.2), (3, 0, 0.3)],
        vec![reference.valuation.parts[0].clone(), part(Some((3, 1.2)), 50.0, &[(2, -60.0)])],
        1110.0,
    );
    book.days_per_year *= parts;
    book.factors.iter_mut().for_each(|factor| rescale_half_life(factor, DAYS_PER_YEAR * parts));
    book
}

/// Asserts that two samples of equal size have one law, by the two-sample distance.
#[track_caller]
fn check_alike(left: Vec<f64>, right: Vec<f64>) {
    let (left, right) = (sorted(left), sorted(right));
    let n = left.len() as f64;
    let share = |sample: &[f64], value: f64| sample.partition_point(|other| *other <= value) as f64 / n;
    let distance =
        left.iter().map(|value| (share(&left, *value) - share(&right, *value)).abs()).fold(0.0, f64::max);
    assert!(distance * (n / 2.0).sqrt() < KOLMOGOROV_999, "distance {distance}");
}

#[test]
fn law_of_one_step_and_of_252() {
    // The same year in one step and in 252. The book has every diffusion.
    let values = |parts: f64, day: u32, seed: u64| sample(&book_in_steps(parts), PATHS, seed, day).values;
    check_alike(values(1.0 / DAYS_PER_YEAR, 1, 31), values(1.0, 252, 37));
}

#[test]
fn law_of_falls_on_daily_and_on_finer_steps() {
    // The bridge within a step makes the step's length irrelevant: a month of 21 days, and of 336 sixteenths.
    let falls =
        |parts: u32, seed: u64| sample(&book_in_steps(f64::from(parts)), 20_000, seed, 21 * parts).falls;
    check_alike(falls(1, 43), falls(16, 47));
}

#[test]
fn law_of_the_sampled_moments() {
    // z of mean, sd and skewness against the closed form: beyond 4 for one seed in 5,000.
    for day in [1, 10, 252] {
        let exact = exact_moments(&reference_book(), day);
        let sampled = sample_moments(&sample(&reference_book(), PATHS, 41, day).values);
        near(sampled.mean.value, exact.mean, 4.0 * sampled.mean.standard_error);
        near(sampled.sd.value, exact.sd, 4.0 * sampled.sd.standard_error);
        let (skewness, error) = (sampled.skewness.unwrap(), sampled.skewness_error.unwrap());
        near(skewness, exact.skewness.unwrap(), 4.0 * error);
    }
}
