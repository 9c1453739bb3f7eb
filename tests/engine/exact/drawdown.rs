//! The largest fall of a Brownian motion: the engine's series against printed values and an independent road, and sampled
//! falls of a one-factor book against the series.

use crate::support::*;
use ebbmark_engine::factors::Model;
use ebbmark_engine::maths::{drawdown_cdf, drawdown_mean_beyond, drawdown_quantile};
use ebbmark_engine::measures::reading;

/// Values were computed by two routes that agree to 1e-10; the series here must meet their printed digits.
const PRINTED: f64 = 1e-6;

#[test]
fn exact_law_of_the_largest_fall() {
    for (drift, passing_one, [at_50, at_95, at_99]) in [
        (0.0, 0.629222570, [1.148973, 2.241403, 2.807034]),
        (1.0, 0.330613520, [0.847892, 1.611585, 2.075064]),
        (-1.0, 0.874696953, [1.681868, 3.044215, 3.664246]),
    ] {
        near(1.0 - drawdown_cdf(drift, 1.0), passing_one, 1e-9);
        near(drawdown_quantile(drift, 0.5), at_50, PRINTED);
        near(drawdown_quantile(drift, 0.95), at_95, PRINTED);
        near(drawdown_quantile(drift, 0.99), at_99, PRINTED);
    }
    near(1.0 - drawdown_cdf(2.0, 1.0), 0.126083557, 1e-9);
}

#[test]
fn exact_mean_of_the_largest_fall() {
    // Drift m, variance 1, one year: sqrt(pi / 2) at 0, else (2 / |m|) Q(m^2 / 2), Q as computed for both signs.
    near(drawdown_mean_beyond(0.0, 0.0), (std::f64::consts::PI / 2.0).sqrt(), PRINTED);
    for (x, up, down) in [
        (0.01, 0.0845995, 0.0929219),
        (0.1, 0.2428396, 0.3263441),
        (0.5, 0.4625377, 0.8857938),
        (1.0, 0.5876914, 1.446603),
        (2.0, 0.7272690, 2.484662),
    ] {
        let m = f64::sqrt(2.0 * x);
        near(drawdown_mean_beyond(m, 0.0), 2.0 / m * up, 2e-6);
        near(drawdown_mean_beyond(-m, 0.0), 2.0 / m * down, 2e-6);
    }
    near(drawdown_mean_beyond(f64::sqrt(20.0), 0.0), 2.0 / f64::sqrt(20.0) * 1.0875393, 2e-6);
}

#[test]
fn exact_law_is_continuous_where_its_first_root_vanishes() {
    // At drift x fall = 1 the first root passes from real to imaginary.
    for drift in [0.5, 1.0, 2.0] {
        let at = 1.0 / drift;
        let [below, on, above] = [-1e-7, 0.0, 1e-7].map(|step| drawdown_cdf(drift, at + step));
        near(below, on, 1e-6);
        near(above, on, 1e-6);
        assert!(below < on && on < above);
    }
}

/// A book of one level without reversion whose value drifts by `drift` of its yearly sd a year. The drift is bought by a
/// carry.
fn brownian_book(drift: f64) -> Model {
    let mut held = part(None, 0.0, &[(0, 1.0)]);
    held.income_per_year = drift;
    model(vec![reverting_level(0.0, 0.0, 0.0, 1.0)], &[], vec![held], 0.0)
}

#[test]
fn exact_sampled_falls_of_a_brownian_book() {
    // One year of 252 daily steps, bridged; four standard errors, the quantiles' from their ranges.
    for (drift, mean, [at_95, at_99]) in [
        (0.0, 1.253314137, [2.241403, 2.807034]),
        (1.0, 2.0 * 0.4625377, [1.611585, 2.075064]),
        (-1.0, 2.0 * 0.8857938, [3.044215, 3.664246]),
    ] {
        let book = brownian_book(drift);
        let read = reading(&book, &sample(&book, 40_000, 11, 252), &from_today(&["0.95", "0.99"])).drawdown;
        near(read.mean, mean, 4.0 * read.mean_error);
        for (row, value) in read.quantiles.iter().zip([at_95, at_99]) {
            let error = (row.value_high.unwrap() - row.value_low.unwrap()) / 3.92;
            near(row.value, value, 4.0 * error);
            let beyond = drawdown_mean_beyond(drift, value);
            near(row.mean_beyond, beyond, 4.0 * row.mean_beyond_error.unwrap());
        }
    }
}

/// The mean fall of a Brownian motion is `sqrt(pi/2) sigma sqrt(T)` from the first day on. Allowed: 0.5 % for the trips
/// within a part of a day that are not seen, and four standard errors.
#[test]
fn exact_falls_of_the_first_days() {
    let day_sd = 1.0 / DAYS_PER_YEAR.sqrt();
    let book = model(vec![reverting_level(0.0, 0.0, 0.0, 1.0)], &[], vec![part(None, 0.0, &[(0, 1.0)])], 0.0);
    let run = run_to(&book, 200_000, 3, &[1, 2, 3, 5, 8, 9], None);
    for &day in run.kept_days() {
        let falls = run.falls(day).unwrap();
        let n = falls.len() as f64;
        let mean = falls.iter().sum::<f64>() / n;
        let sd = (falls.iter().map(|fall| (fall - mean).powi(2)).sum::<f64>() / n).sqrt();
        let expected = (std::f64::consts::FRAC_PI_2 * f64::from(day)).sqrt() * day_sd;
        near(mean, expected, 0.005 * expected + 4.0 * sd / n.sqrt());
    }
}
