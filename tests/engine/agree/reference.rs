//! Against figures that scripts in tests/reference compute with numpy and scipy.

use super::{number, rows};
use crate::support::*;
use ebbmark_engine::factors::{Model, RiskFactor};
use ebbmark_engine::maths::{
    UpperTail, drawdown_cdf, normal_cdf, normal_quantile, rank_range, sample_moments,
};
use ebbmark_engine::measures::exact_moments;

/// The books of moments.py.
fn book(name: &str) -> Model {
    let geometric_price = || geometric(100.0, 0.05, 0.2);
    let log_price = || reverting_log(50.0, 60.0, 2.0, 0.3);
    let level = || reverting_level(3.0, 4.0, 0.5, 0.8);
    let geometric_rate = || geometric(1.25, 0.01, 0.1);
    let level_rate = || reverting_level(1.25, 1.1, 1.5, 0.15);
    match name {
        "reference book" => reference_book(),
        "geometric rate, geometric and level" => foreign([geometric_rate(), geometric_price(), level()]),
        "geometric rate, reverting log and level" => foreign([geometric_rate(), log_price(), level()]),
        "reverting log rate, geometric and reverting log" => {
            foreign([reverting_log(1.25, 1.1, 1.0, 0.12), geometric_price(), log_price()])
        }
        "level rate, geometric and level" => foreign([level_rate(), geometric_price(), level()]),
        "level rate, level and reverting log" => foreign([level_rate(), level(), log_price()]),
        other => panic!("no book {other}"),
    }
}

/// `V = 500 + rate (100 + 1000 y_1 - 40 y_2)`.
fn foreign(factors: [RiskFactor; 3]) -> Model {
    let today = |factor: &RiskFactor| f64::from(factor.diffusion.is_log());
    let local = 100.0 + 1000.0 * today(&factors[1]) - 40.0 * today(&factors[2]);
    model(
        factors.to_vec(),
        &[(0, 1, 0.5), (0, 2, -0.3), (1, 2, 0.2)],
        vec![part(None, 500.0, &[]), part(Some((0, 1.25)), 100.0, &[(1, 1000.0), (2, -40.0)])],
        500.0 + 1.25 * local,
    )
}

#[test]
fn agree_exact_moments_with_quadrature() {
    let rows = rows(include_str!("../data/moments.csv"));
    assert_eq!(rows.len(), 13);
    for row in rows {
        let exact = exact_moments(&book(&row[0]), row[1].parse().unwrap());
        close(exact.mean, number(&row[2]), RELATIVE);
        close(exact.sd, number(&row[3]), RELATIVE);
        // The quadrature's third moment loses digits to its mean on short horizons.
        close(exact.skewness.unwrap(), number(&row[4]), 1e-8);
    }
}

#[test]
fn agree_drawdown_law_with_its_inverted_transform() {
    // The inversion in doubles is right to about 1e-10.
    let rows = rows(include_str!("../data/drawdown.csv"));
    assert!(rows.len() > 30);
    for row in rows {
        near(1.0 - drawdown_cdf(number(&row[0]), number(&row[1])), number(&row[2]), 1e-8);
    }
}

#[test]
fn agree_normal_law_with_scipy() {
    for row in rows(include_str!("../data/normal.csv")) {
        let (z, cdf) = (number(&row[0]), number(&row[1]));
        // exp(-z^2 / 2) carries the rounding of its exponent.
        close(normal_cdf(z), cdf, 1e-16 * (100.0 + z * z));
        if (-30.0..5.0).contains(&z) {
            // Near 1 the quantile can't be better than the cdf's own last digit, phi(4) eps.
            near(normal_quantile(cdf), z, 1e-12);
        }
    }
}

#[test]
fn agree_ranks_with_scipy() {
    let rows = rows(include_str!("../data/ranks.csv"));
    assert_eq!(rows.len(), 54);
    for row in rows {
        let range = rank_range(row[0].parse().unwrap(), number(&row[1]), 0.025);
        let expected = [row[2].parse().ok(), row[3].parse().ok()];
        assert_eq!([range.low, range.high], expected, "{} at {}", row[0], row[1]);
    }
}

#[test]
fn agree_estimators_with_numpy() {
    let golden = (5.0_f64.sqrt() - 1.0) / 2.0;
    let sample: Vec<f64> = (1..=1000).map(|i| (f64::from(i) * golden % 1.0).powi(3) * 100.0 - 20.0).collect();
    let rows = rows(include_str!("../data/estimators.csv"));
    let expected = |name: &str| number(&rows.iter().find(|row| row[0] == name).unwrap()[1]);
    let moments = sample_moments(&sample);
    close(moments.mean.value, expected("mean"), RELATIVE);
    close(moments.mean.standard_error, expected("sd") / 1000.0_f64.sqrt(), RELATIVE);
    close(moments.sd.value, expected("sd"), RELATIVE);
    close(moments.sd.standard_error, expected("sd_error"), RELATIVE);
    close(moments.skewness.unwrap(), expected("skewness"), RELATIVE);
    close(moments.skewness_error.unwrap(), expected("skewness_error"), RELATIVE);
    for text in ["0.95", "0.9775", "0.99"] {
        let level = confidence(text);
        let rank = level.rank(1000);
        let tail = UpperTail::from_rank(sample.clone(), rank);
        let beyond = tail.mean_beyond(rank, level.tail_count(1000)).unwrap();
        close(tail.order_statistic(rank).unwrap(), expected(&format!("var_{text}")), RELATIVE);
        close(beyond.value, expected(&format!("es_{text}")), RELATIVE);
        close(beyond.standard_error, expected(&format!("es_error_{text}")), RELATIVE);
    }
}
