//! The reverting fit, at regular and irregular dates.

use crate::support::*;
use ebbmark_engine::fit::reverting::{fit_reverting, speed_bias};
use ebbmark_engine::fit::{ObservedPath, RevertingFit};

/// Twenty-one values a quarter of a year apart. Source: the data table of M. A. van den Berg's note on calibrating the
/// Ornstein-Uhlenbeck model (2011).
const QUARTERS: [f64; 21] = [
    3.0, 1.76, 1.2693, 1.196, 0.9468, 0.9532, 0.6252, 0.8604, 1.0984, 1.431, 1.3019, 1.4005, 1.2686, 0.7147,
    0.9237, 0.7297, 0.7105, 0.8683, 0.7406, 0.7314, 0.6232,
];

fn fitted(path: &ObservedPath) -> RevertingFit {
    fit_reverting(path, false, 252.0).unwrap()
}

#[test]
fn table_worked_example_at_regular_dates() {
    let path = path(&QUARTERS, &[1; 20], 0.25);
    let fit = fitted(&path);
    // The note's own figures, which divide by n.
    near(fit.long_run.value, 0.907_487_888_283_31, 1e-8);
    near(fit.speed.value, 3.128_732_178_123_86, 1e-8);
    near(fit.volatility.value, 0.553_154_534_531_90, 1e-8);
    // The rest by scipy, to the digits given.
    near(fit.log_likelihood, 4.148_699_59, 1e-8);
    near(fit.speed.low.unwrap(), 1.8437, 5e-5);
    near(fit.speed.high.unwrap(), 5.0335, 5e-5);
    near(fit.half_life_days.value / 252.0, 0.22154, 5e-6);
    near(fit.half_life_days.low.unwrap() / 252.0, 0.13771, 5e-6);
    near(fit.half_life_days.high.unwrap() / 252.0, 0.37595, 5e-6);
    near(fit.speed.standard_error.unwrap(), 0.736, 5e-4);
}

#[test]
fn agree_irregular_dates_with_scipy() {
    // Items 3, 4, 9, 10, 11 and 16 left out, dates kept; profile and joint maximisation by scipy agree to these digits.
    let left_out = [3, 4, 9, 10, 11, 16];
    let path = thinned(&left_out);
    let fit = fitted(&path);
    near(fit.speed.value, 3.653_954_47, 5e-8);
    near(fit.long_run.value, 0.869_018_93, 5e-9);
    near(fit.volatility.value, 0.543_298_00, 5e-9);
    near(fit.log_likelihood, 3.579_294_41, 5e-9);
}

#[test]
fn agree_both_roads_at_regular_dates() {
    // Dates that are a hair from regular go the irregular way; regular ones have a closed form.
    let values: Vec<f64> =
        (0..400).map(|i| (f64::from(i) * 0.7).sin() + 0.4 * (f64::from(i) * 1.9).cos()).collect();
    let regular = fitted(&path(&values, &vec![1000; 399], 1e-5));
    let mut units = vec![1000; 399];
    units[200] = 1001;
    let irregular = fitted(&path(&values, &units, 1e-5));
    let pairs = [
        (regular.speed, irregular.speed),
        (regular.long_run, irregular.long_run),
        (regular.volatility, irregular.volatility),
        (regular.half_life_days, irregular.half_life_days),
    ];
    for (one, other) in pairs {
        // One step in 399 is longer by a thousandth.
        let tolerance = 1e-4 * one.standard_error.unwrap();
        near(one.value, other.value, tolerance);
        near(one.standard_error.unwrap(), other.standard_error.unwrap(), tolerance);
        near(one.low.unwrap(), other.low.unwrap(), 10.0 * tolerance);
        near(one.high.unwrap(), other.high.unwrap(), 10.0 * tolerance);
    }
    near(regular.log_likelihood, irregular.log_likelihood, 0.01);
}

#[test]
fn agree_errors_with_the_likelihood_itself() {
    // Curvature of the likelihood by differences, at irregular dates: the likelihood is written out here once more.
    let path = thinned(&[3, 4, 9, 10, 11, 16]);
    let fit = fitted(&path);
    let top = [fit.speed.value, fit.long_run.value, fit.volatility.value.ln()];
    near(likelihood(&path, top), fit.log_likelihood, 1e-10);
    let step = 1e-4;
    let second = |i: usize, j: usize| {
        let at = |a: f64, b: f64| {
            let mut point = top;
            point[i] += a * step;
            point[j] += b * step;
            likelihood(&path, point)
        };
        (at(1.0, 1.0) - at(1.0, -1.0) - at(-1.0, 1.0) + at(-1.0, -1.0)) / (4.0 * step * step)
    };
    let information: Vec<Vec<f64>> = (0..3).map(|i| (0..3).map(|j| -second(i, j)).collect()).collect();
    let [speed, mean, log_volatility] = inverse_diagonal(&information).map(f64::sqrt);
    // Second differences of a double leave about seven digits.
    near(fit.speed.standard_error.unwrap(), speed, 1e-6);
    near(fit.long_run.standard_error.unwrap(), mean, 1e-6);
    near(fit.volatility.standard_error.unwrap(), fit.volatility.value * log_volatility, 1e-6);
}

#[test]
fn exact_half_life_without_upper_end() {
    // A slow drift back: at the profile's lower end there is no reversion left.
    let values: Vec<f64> = (0..60).map(|i| f64::from(i) * 0.05 + (f64::from(i) * 1.3).sin()).collect();
    let fit = fitted(&path(&values, &[1; 59], 1.0 / 252.0));
    assert!(fit.half_life_days.high.is_some() || fit.speed.low == Some(0.0));
    let walk: Vec<f64> = WALK
        .iter()
        .scan(0.0, |sum, step| {
            *sum += step;
            Some(*sum)
        })
        .collect();
    let fit = fitted(&path(&walk, &vec![1; walk.len() - 1], 1.0 / 252.0));
    assert_eq!(fit.speed.low, Some(0.0));
    assert_eq!(fit.half_life_days.high, None);
}

/// Steps of a random walk, written down once.
const WALK: [f64; 16] =
    [0.3, -1.2, 0.8, 0.5, -0.4, 1.1, 0.9, -0.2, -0.7, 0.6, 1.3, -1.0, 0.2, 0.4, -0.3, 0.1];

#[test]
fn exact_bias_of_the_speed() {
    // (5 + 2 exp(kappa dt) + exp(2 kappa dt)) / (2 n dt) at kappa = 1, weekly, ten years; about 4 / T.
    let bias = speed_bias(1.0, 1.0 / 52.0, 520.0);
    near(bias, (5.0 + 2.0 * (1.0_f64 / 52.0).exp() + (2.0_f64 / 52.0).exp()) / 20.0, 1e-12);
    near(bias, 0.4, 0.005);
}

fn thinned(left_out: &[usize]) -> ObservedPath {
    let kept: Vec<usize> = (0..QUARTERS.len()).filter(|item| !left_out.contains(item)).collect();
    let values: Vec<f64> = kept.iter().map(|item| QUARTERS[*item]).collect();
    let units: Vec<u32> = kept.windows(2).map(|two| (two[1] - two[0]) as u32).collect();
    path(&values, &units, 0.25)
}

/// Exact transition density, conditional on the first value.
fn likelihood(path: &ObservedPath, [speed, mean, log_volatility]: [f64; 3]) -> f64 {
    let variance = (2.0 * log_volatility).exp();
    path.values
        .windows(2)
        .zip(path.steps.years())
        .map(|(two, years)| {
            let spread = variance * (1.0 - (-2.0 * speed * years).exp()) / (2.0 * speed);
            let rest = two[1] - mean - (two[0] - mean) * (-speed * years).exp();
            -0.5 * ((2.0 * std::f64::consts::PI * spread).ln() + rest * rest / spread)
        })
        .sum()
}

fn inverse_diagonal(m: &[Vec<f64>]) -> [f64; 3] {
    let minor = |i: usize, j: usize| {
        let rows: Vec<usize> = (0..3).filter(|row| *row != i).collect();
        let columns: Vec<usize> = (0..3).filter(|column| *column != j).collect();
        m[rows[0]][columns[0]] * m[rows[1]][columns[1]] - m[rows[0]][columns[1]] * m[rows[1]][columns[0]]
    };
    let determinant = m[0][0] * minor(0, 0) - m[0][1] * minor(0, 1) + m[0][2] * minor(0, 2);
    [0, 1, 2].map(|i| minor(i, i) / determinant)
}
