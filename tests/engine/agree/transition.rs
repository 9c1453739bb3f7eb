//! The exact transition against itself: steps put together, and one long step against many short ones.

use crate::support::*;
use ebbmark_engine::factors::{Model, RiskFactor};
use ebbmark_engine::maths::sample_moments;
use ebbmark_engine::simulate::Transition;

/// A walk and a level of speed 5 a year, of correlation .8.
fn two_speeds(terms: &[(usize, f64)]) -> Model {
    let factors: Vec<RiskFactor> =
        vec![reverting_level(0.0, 0.0, 0.0, 1.0), reverting_level(0.0, 1.0, 5.0, 1.0)];
    model(factors, &[(0, 1, 0.8)], vec![part(None, 0.0, terms)], 0.0)
}

#[test]
fn agree_transition_over_a_whole_and_over_its_parts() {
    // E Q(.3) E + Q(.7) = Q(1), E = diag(exp(-.7 k)), and the shifts likewise. To rounding.
    let book = reference_book();
    let [first, second, whole] = [0.3, 0.7, 1.0].map(|years| Transition::over(&book, years).unwrap());
    for row in 0..3 {
        near(second.decay[row] * first.shift[row] + second.shift[row], whole.shift[row], 1e-12);
        for column in 0..3 {
            let cell = 3 * row + column;
            let carried = second.decay[row] * first.covariance[cell] * second.decay[column];
            near(carried + second.covariance[cell], whole.covariance[cell], 1e-12);
        }
    }
}

/// phi(5, t) / sqrt(t phi(10, t)) times .8.
fn correlation_after(years: f64) -> f64 {
    let phi = |rate: f64| -(-rate * years).exp_m1() / rate;
    0.8 * phi(5.0) / (years * phi(10.0)).sqrt()
}

#[test]
fn agree_correlation_after_one_step_and_after_252() {
    near(correlation_after(1.0), 0.502566673, 5e-10);
    let book = two_speeds(&[]);
    for (days, printed) in
        [(1.0, 0.799986878), (63.0, 0.753598113), (252.0, 0.502566673), (1260.0, 0.226274170)]
    {
        let q = Transition::over(&book, days / DAYS_PER_YEAR).unwrap().covariance;
        near(q[1] / (q[0] * q[3]).sqrt(), printed, 5e-10);
    }
    // 252 daily steps put together.
    let day = Transition::over(&book, 1.0 / DAYS_PER_YEAR).unwrap();
    let mut covariance = [0.0; 4];
    for _ in 0..252 {
        for (cell, entry) in covariance.iter_mut().enumerate() {
            *entry = day.decay[cell / 2] * *entry * day.decay[cell % 2] + day.covariance[cell];
        }
    }
    let whole = Transition::over(&book, 1.0).unwrap().covariance;
    covariance.iter().zip(whole).for_each(|(stepped, whole)| close(*stepped, whole, 1e-12));
}

/// Correlation of the two factors after a year, read off three books on the same paths:
/// `Var(a + b) = Var a + Var b + 2 Cov`.
fn sampled_correlation(days_per_year: f64, day: u32, paths: usize) -> f64 {
    let sd = |terms: &[(usize, f64)]| {
        let mut book = two_speeds(terms);
        book.days_per_year = days_per_year;
        book.factors.iter_mut().for_each(|factor| rescale_half_life(factor, days_per_year));
        sample_moments(&sample(&book, paths, 7, day).values).sd.value
    };
    let (a, b, both) = (sd(&[(0, 1.0)]), sd(&[(1, 1.0)]), sd(&[(0, 1.0), (1, 1.0)]));
    (both * both - a * a - b * b) / (2.0 * a * b)
}

#[test]
fn agree_sampled_correlation_of_one_step_and_of_252() {
    let paths = 100_000;
    // Error of a correlation r from n normal pairs: (1 - r^2) / sqrt(n); four of them.
    let reach = 4.0 * (1.0 - 0.502566673_f64.powi(2)) / (paths as f64).sqrt();
    near(sampled_correlation(252.0, 252, paths), 0.502566673, reach);
    near(sampled_correlation(1.0, 1, paths), 0.502566673, reach);
}
