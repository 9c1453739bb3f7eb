//! VaR and ES against normal and lognormal closed forms: the first answer to all digits, sampled figures to their error.

use crate::support::*;
use ebbmark_engine::factors::Model;
use ebbmark_engine::maths::{ShiftedLognormal, normal_quantile};
use ebbmark_engine::measures::{LossFrom, first_reading, reading};

/// A geometric holding worth 100 (or owed), drift `mu`, volatility .2.
fn holding(weight: f64, mu: f64) -> Model {
    model(vec![geometric(100.0, mu, 0.2)], &[], vec![part(None, 0.0, &[(0, weight)])], weight)
}

/// VaR and ES at 99 %, printed values to the digits given.
#[track_caller]
fn check(model: &Model, day: u32, loss_from: LossFrom, [var, es]: [f64; 2]) {
    let mut conventions = from_today(&["0.99"]);
    conventions.loss_from = loss_from;
    let row = first_reading(model, day, &conventions).loss[0];
    // Printed to six decimals.
    near(row.var, var, 6e-7);
    near(row.es, es, 6e-7);
    let sampled = reading(model, &sample(model, 200_000, 1, day), &conventions).loss[0];
    // Four standard errors; the printed ranges are 1.96 each way.
    let reach = |low: Option<f64>, high: Option<f64>| (high.unwrap() - low.unwrap()) / 3.92 * 4.0;
    near(sampled.var, var, reach(sampled.var_low, sampled.var_high));
    near(sampled.es, es, reach(sampled.es_low, sampled.es_high));
}

#[test]
fn exact_losses_of_a_lognormal_holding() {
    // V_0 = 100, mu = .05, sigma = .2, one year; and mu = 0, ten days. Computed from the closed forms with scipy.
    check(&holding(100.0, 0.05), 252, LossFrom::Today, [35.290980, 39.417721]);
    check(&holding(-100.0, 0.05), 252, LossFrom::Today, [64.094054, 75.952844]);
    check(&holding(100.0, 0.05), 252, LossFrom::Mean, [40.418089, 44.544831]);
    check(&holding(100.0, 0.0), 10, LossFrom::Today, [8.924155, 10.138624]);
    check(&holding(-100.0, 0.0), 10, LossFrom::Today, [9.624452, 11.123099]);
}

#[test]
fn exact_losses_of_a_level() {
    // A level without reversion is normal: VaR = s z, ES = s phi(z) / p; z .99 = 2.326348, phi/p = 2.665214.
    let book = model(
        vec![reverting_level(3.0, 3.0, 0.0, 0.8)],
        &[],
        vec![part(None, 1000.0, &[(0, 100.0)])],
        1000.0,
    );
    let s = 80.0 * 0.25_f64.sqrt();
    let row = first_reading(&book, 63, &from_today(&["0.99"])).loss[0];
    near(row.var / s, 2.326348, 6e-7);
    near(row.es / s, 2.665214, 6e-7);
}

#[test]
fn exact_first_answer_of_the_reference_book() {
    // Shifted lognormal with the exact moments, computed with scipy; from 4 million paths 223.62/307.36 and 51.01/71.13.
    let var = |day: u32| {
        let rows = first_reading(&reference_book(), day, &from_today(&["0.95", "0.99"])).loss;
        [rows[0].var, rows[1].var]
    };
    for (day, [at_95, at_99]) in [(252, [223.52, 304.87]), (10, [51.08, 71.13])] {
        let [figure_95, figure_99] = var(day);
        near(figure_95, at_95, 0.005);
        near(figure_99, at_99, 0.005);
    }
}

#[test]
fn exact_shifted_lognormal_has_its_moments() {
    // By the rule of the mean over 20,000 quantiles, which is right to about 1e-4 of the sd for these tails.
    for skewness in [-1.5, -0.2, 0.0, 1e-5, 0.6, 2.0] {
        let law = ShiftedLognormal::from_moments(10.0, 2.0, skewness);
        let points = 20_000;
        let mut sums = [0.0; 3];
        for k in 0..points {
            let deviation = law.quantile((f64::from(k) + 0.5) / f64::from(points)) - 10.0;
            sums.iter_mut()
                .zip(1..)
                .for_each(|(sum, power)| *sum += deviation.powi(power) / f64::from(points));
        }
        near(sums[0], 0.0, 1e-3);
        near(sums[1].sqrt(), 2.0, 5e-3);
        near(sums[2] / sums[1].powf(1.5), skewness, 3e-2 + 0.03 * skewness.abs());
        for p in [0.001, 0.01, 0.3, 0.9] {
            near(law.cdf(law.quantile(p)), p, 1e-12);
        }
    }
}

#[test]
fn exact_skewness_of_the_shifted_lognormal_vanishes_smoothly() {
    // The normal law at 0, and just beside it the same figures.
    let law = |skewness| ShiftedLognormal::from_moments(0.0, 1.0, skewness);
    for skewness in [-2e-7, 2e-7] {
        near(law(skewness).quantile(0.01), normal_quantile(0.01), 1e-6);
        near(law(skewness).mean_of_lowest(0.01), law(0.0).mean_of_lowest(0.01), 1e-4);
    }
}

#[test]
fn exact_chance_of_touching_a_limit() {
    // Geometric, S_0 = 100, mu = .05, sigma = .2, one year, touching 90: .55079904, ending below .24926561; 80:
    // .22236889; ten days .00755618. By the reflection formula.
    let book = holding(100.0, 0.05);
    for (day, limit, touching) in [(252, 10.0, 0.55079904), (252, 20.0, 0.22236889), (10, 10.0, 0.00755618)] {
        let mut conventions = from_today(&["0.99"]);
        conventions.loss_limit = Some(limit);
        let sample = run_to(&book, 200_000, 5, &[day], Some(limit)).sample(day).unwrap();
        let read = reading(&book, &sample, &conventions).limit.unwrap();
        near(read.by_horizon, touching, 4.0 * read.by_horizon_error);
        if (day, limit) == (252, 10.0) {
            near(read.at_horizon, 0.24926561, 4.0 * read.at_horizon_error);
        }
    }
}

#[test]
fn exact_chance_of_touching_a_reverting_mean() {
    // A reverting level touches its own long run: 2 Phi(-|X_0 - theta| exp(-k t) / sqrt(s^2 phi(2k, t))) = .597848169
    // for k = 2, s = .3, |X_0 - theta| = .2, t = .5.
    let book =
        model(vec![reverting_level(1.2, 1.0, 2.0, 0.3)], &[], vec![part(None, 12.0, &[(0, 10.0)])], 12.0);
    let touched = run_to(&book, 200_000, 3, &[126], Some(2.0)).sample(126).unwrap().touched.unwrap();
    near(touched.value, 0.597848169, 4.0 * touched.standard_error);
}
