//! The law of the largest fall from a running peak of a Brownian motion with drift, in closed form. No paths.

use super::root;
use std::f64::consts::PI;

/// Drifts for which the series keeps its digits; further down it cancels.
const DRIFTS: std::ops::RangeInclusive<f64> = -3.0..=5.0;
/// Below this a difference from 1 is taken by its own series.
const SMALL: f64 = 1e-2;

/// `P(largest fall < fall)` of a Brownian motion with `drift`, variance 1 a unit of time, over one unit of time.
///
/// What lies below the running peak is a reflected Brownian motion, so this is a survival probability, expanded in its
/// eigenfunctions. With `c = drift x fall`, summed over the positive roots of `tan a = a / c`,
///
/// ```text
/// P = sum of exp(-(drift^2 + a^2 / fall^2) / 2 - c) 2 sin(a)^3 / (a (1 - sin(2a) / (2a)))
/// ```
///
/// with one root in each `(n pi, (n + 1) pi)`. The first goes to 0 at `c = 1`, where its term is
/// `3 exp(-1 - drift^2 / 2)`, and is imaginary beyond. Of the structure of Magdon-Ismail, Atiya, Pratap and
/// Abu-Mostafa, On the maximum drawdown of a Brownian motion, J. Applied Probability 41 (2004).
///
/// To about 1e-9 for drifts from -3 to 5. A drift outside is approximated by the law at the nearer end, moved by the
/// difference (down) or scaled (up).
pub fn drawdown_cdf(drift: f64, fall: f64) -> f64 {
    if drift < *DRIFTS.start() {
        return series(*DRIFTS.start(), fall + drift - DRIFTS.start());
    }
    if drift > *DRIFTS.end() {
        return series(*DRIFTS.end(), fall * drift / DRIFTS.end());
    }
    series(drift, fall)
}

/// The fall that is not passed with probability `p`, by the law of [`drawdown_cdf`].
pub fn drawdown_quantile(drift: f64, p: f64) -> f64 {
    let most = drift.abs() + 12.0;
    root(|fall| drawdown_cdf(drift, fall) - p, 0.0, most, 1e-10).unwrap_or(most)
}

/// Mean of the largest fall where it lies beyond `from`: `integral of P(largest fall > x) dx over x > from`, divided by
/// `P(largest fall > from)`, plus `from`. At `from = 0` the mean.
pub fn drawdown_mean_beyond(drift: f64, from: f64) -> f64 {
    const STEPS: usize = 240;
    // Beyond this the chance is below 1e-15: with a drift up it decays like exp(-2 drift x), else like a normal tail.
    let reach = if drift > 0.0 { (20.0 / drift).min(9.0) } else { 9.0 - drift };
    let beyond = |fall| 1.0 - drawdown_cdf(drift, fall);
    let step = reach / STEPS as f64;
    let inner = (1..STEPS).map(|k| if k % 2 == 1 { 4.0 } else { 2.0 } * beyond(from + k as f64 * step));
    let first = beyond(from);
    from + (first + inner.sum::<f64>()) * step / 3.0 / first.max(f64::MIN_POSITIVE)
}

fn series(drift: f64, fall: f64) -> f64 {
    const MOST_TERMS: usize = 400;
    const NEGLIGIBLE: f64 = 1e-18;
    let c = drift * fall;
    if fall <= 0.0 {
        return 0.0;
    }
    if c > 200.0 {
        return 1.0;
    }
    let mut sum = first_term(drift, fall);
    for n in 1..MOST_TERMS {
        let (low, high) = (n as f64 * PI, (n + 1) as f64 * PI);
        if (-c - (low / fall).powi(2) / 2.0).exp() < NEGLIGIBLE {
            break;
        }
        let Some(a) = root(|a| c * a.sin() - a * a.cos(), low, high, 1e-14) else { break };
        sum += term(drift, fall, a);
    }
    sum.clamp(0.0, 1.0)
}

fn term(drift: f64, fall: f64, a: f64) -> f64 {
    let decay = (drift * drift + (a / fall).powi(2)) / 2.0 + drift * fall;
    let x = 2.0 * a;
    let rest = if x < SMALL { x * x / 6.0 * (1.0 - x * x / 20.0) } else { 1.0 - x.sin() / x };
    (-decay).exp() * 2.0 * a.sin().powi(3) / (a * rest)
}

fn first_term(drift: f64, fall: f64) -> f64 {
    const NEAR_ONE: f64 = 1e-9;
    let c = drift * fall;
    if (c - 1.0).abs() < NEAR_ONE {
        return 3.0 * (-1.0 - drift * drift / 2.0).exp();
    }
    if c < 1.0 {
        let a = root(|a| c * a.sin() - a * a.cos(), f64::MIN_POSITIVE.sqrt(), PI, 1e-15);
        return a.map_or(0.0, |a| term(drift, fall, a));
    }
    // a = i e with tanh e = e / c, and drift^2 - (e / fall)^2 = (drift / cosh e)^2.
    let Some(e) = root(|e| c * e.tanh() - e, (3.0 * (c - 1.0) / c).min(1.0).sqrt() / 2.0, c, 1e-15) else {
        return 1.0;
    };
    let x = 2.0 * e;
    let rest = if x < SMALL { x * x / 6.0 * (1.0 - 7.0 * x * x / 60.0) } else { 1.0 - x / x.sinh() };
    let decay = (drift / e.cosh()).powi(2) / 2.0 + c;
    (-decay).exp() * 2.0 * e.sinh().powi(2) / (e.cosh() * rest)
}
