//! Exact mean, sd and skewness of books. Values marked "mpmath" were computed to 30 digits by another route
//! (tests/reference/moments.py).

use crate::support::*;
use ebbmark_engine::factors::Model;
use ebbmark_engine::measures::{ExactMoments, exact_moments};

#[track_caller]
fn check(model: &Model, day: u32, [mean, sd, skewness]: [f64; 3]) {
    let exact = exact_moments(model, day);
    close(exact.mean, mean, RELATIVE);
    close(exact.sd, sd, RELATIVE);
    near(exact.skewness.unwrap(), skewness, RELATIVE * skewness.abs().max(1e-3));
}

#[test]
fn exact_moments_of_the_reference_book() {
    // mpmath; a simulation of 20 million paths elsewhere agreed.
    check(&reference_book(), 252, [1094.6794647883, 184.38160733248, 0.626091619268]);
    check(&reference_book(), 10, [1050.0297765968, 31.692626973363, 0.11120695338]);
}

/// Mean, sd and skewness of a lognormal value: `w = exp(v)`, skewness `(w + 2) sqrt(w - 1)`.
fn lognormal(mean: f64, v: f64) -> [f64; 3] {
    let root = v.exp_m1().sqrt();
    [mean, mean.abs() * root, mean.signum() * (v.exp() + 2.0) * root]
}

#[test]
fn exact_moments_of_a_geometric_holding() {
    let held = |weight: f64| {
        model(vec![geometric(1.0, 0.07, 0.4)], &[], vec![part(None, 0.0, &[(0, weight)])], weight)
    };
    check(&held(500.0), 126, lognormal(500.0 * (0.07_f64 * 0.5).exp(), 0.16 * 0.5));
    check(&held(-500.0), 126, lognormal(-500.0 * (0.07_f64 * 0.5).exp(), 0.16 * 0.5));
}

#[test]
fn exact_moments_of_a_foreign_geometric_holding() {
    // 100 x 1.10, volatilities .2 and .1, correlation -.3, drifts .05 and .01: volatility .194935887, mean 116.103306.
    let foreign = model(
        vec![geometric(100.0, 0.05, 0.2), geometric(1.1, 0.01, 0.1)],
        &[(0, 1, -0.3)],
        vec![part(Some((1, 1.1)), 0.0, &[(0, 100.0)])],
        110.0,
    );
    let v: f64 = 0.04 + 0.01 - 2.0 * 0.3 * 0.02;
    near(v.sqrt(), 0.194935887, 1e-9);
    let mean = 110.0 * (0.06_f64 - 0.3 * 0.02).exp();
    near(mean, 116.103306, 1e-6);
    check(&foreign, 252, lognormal(mean, v));
}

#[test]
fn exact_moments_of_a_foreign_level() {
    // V = F g (X - X_0) with ln F and X - X_0 jointly normal: under the measure that F tilts, X shifts by its covariance.
    // E[F^k (a + b Z')^k] by hand, k = 1, 2, 3, with Var ln F = v, Var X = q, Cov = c, E X = m:
    // E V^k = g^k exp(k mu + k^2 v / 2) E[N(m + k c, q)^k].
    let (vol_rate, vol_level, correlation, years): (f64, f64, f64, f64) = (0.12, 0.9, 0.4, 0.5);
    let (rate, money) = (1.3, 7.0);
    let foreign = model(
        vec![geometric(rate, 0.02, vol_rate), reverting_level(2.0, 2.0, 0.0, vol_level)],
        &[(0, 1, correlation)],
        vec![part(Some((0, rate)), 0.0, &[(1, money)])],
        0.0,
    );
    let (v, q) = (vol_rate * vol_rate * years, vol_level * vol_level * years);
    let c = correlation * vol_rate * vol_level * years;
    let raw = |k: f64, normal: f64| {
        (money * rate).powf(k) * (k * (0.02 * years - v / 2.0) + k * k * v / 2.0).exp() * normal
    };
    let first = raw(1.0, c);
    let second = raw(2.0, 4.0 * c * c + q);
    let third = raw(3.0, 27.0 * c * c * c + 9.0 * c * q);
    let variance = second - first * first;
    let skewness = (third - 3.0 * first * second + 2.0 * first.powi(3)) / variance.powf(1.5);
    check(&foreign, 126, [first, variance.sqrt(), skewness]);
}

#[test]
fn exact_moments_of_a_level_in_a_level_rate() {
    // V = (r + Y) w X with Y, X jointly normal of mean 0: E V = w c, Var V = w^2 (r^2 q + q p + c^2), and the third
    // central moment w^3 (6 r^2 q c + 6 q p c + 2 c^3), by Isserlis' theorem.
    let (r, w, years) = (1.25, 40.0, 1.0 / 12.0);
    let (vol_y, vol_x, correlation): (f64, f64, f64) = (0.3, 0.8, -0.35);
    let foreign = model(
        vec![reverting_level(r, r, 0.0, vol_y), reverting_level(3.0, 3.0, 0.0, vol_x)],
        &[(0, 1, correlation)],
        vec![part(Some((0, r)), 0.0, &[(1, w)])],
        0.0,
    );
    let (p, q, c) = (vol_y * vol_y * years, vol_x * vol_x * years, correlation * vol_y * vol_x * years);
    let variance = w * w * (r * r * q + q * p + c * c);
    let third = w * w * w * (6.0 * r * r * q * c + 6.0 * q * p * c + 2.0 * c * c * c);
    check(&foreign, 21, [w * c, variance.sqrt(), third / variance.powf(1.5)]);
}

#[test]
fn exact_moments_of_a_rate_held_in_its_own_currency() {
    // V = (r + Y) (k + w Y), a level position on the currency's own rate: a quadratic in one normal variable.
    // b Y + w Y^2 with b = k + r w: mean w q, variance b^2 q + 2 w^2 q^2, third 6 b^2 w q^2 + 8 w^3 q^3.
    let (r, k, w, vol) = (1.25, 30.0, 40.0, 0.3_f64);
    let own =
        model(vec![reverting_level(r, r, 0.0, vol)], &[], vec![part(Some((0, r)), k, &[(0, w)])], r * k);
    let (q, b) = (vol * vol * 0.25, k + r * w);
    let variance: f64 = b * b * q + 2.0 * w * w * q * q;
    let third = 6.0 * b * b * w * q * q + 8.0 * w * w * w * q * q * q;
    check(&own, 63, [r * k + w * q, variance.sqrt(), third / variance.powf(1.5)]);
}

#[test]
fn exact_moments_keep_their_digits_beside_a_large_constant() {
    // One day, and a cash line 10^12 times the move: the change and the higher moments know nothing of it.
    let with_cash = |cash: f64| {
        let mut model = reference_book();
        model.valuation.parts[0].constant += cash;
        model.value += cash;
        exact_moments(&model, 1)
    };
    let (small, large) = (with_cash(0.0), with_cash(1e12));
    assert_eq!([small.change, small.sd], [large.change, large.sd]);
    assert_eq!(small.skewness, large.skewness);
}

#[test]
fn exact_income_accrues_at_the_currency_s_rate() {
    let mut abroad = part(Some((0, 2.0)), 100.0, &[]);
    abroad.income_per_year = 8.0;
    let book = model(vec![geometric(2.0, 0.1, 0.2)], &[], vec![abroad], 200.0);
    let growth = (0.1_f64 * 0.25).exp();
    close(exact_moments(&book, 63).mean, 2.0 * 102.0 * growth, RELATIVE);
}

#[test]
fn exact_sd_of_a_perfect_hedge_is_zero() {
    // Two names of one factor, long and short: variance and skewness are rounding, and say so.
    let hedge = model(
        vec![geometric(1.0, 0.0, 0.3), geometric(1.0, 0.0, 0.3)],
        &[(0, 1, 1.0)],
        vec![part(None, 100.0, &[(0, 1e6), (1, -1e6)])],
        100.0,
    );
    let expected = ExactMoments { mean: 100.0, change: 0.0, sd: 0.0, skewness: None };
    assert_eq!(exact_moments(&hedge, 252), expected);
}
