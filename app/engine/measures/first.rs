//! The first answer, before paths arrive: the shifted lognormal law with the book's exact mean, sd and skewness, and for
//! drawdown and limit a Brownian motion with the same change and sd. No paths, no sampling errors.

use super::bands::{Bands, FALL_PERCENTS, VALUE_PERCENTS};
use super::reading::*;
use super::{Confidence, Density, ExactMoments, exact_moments};
use crate::factors::Model;
use crate::maths::{ShiftedLognormal, drawdown_cdf, drawdown_mean_beyond, drawdown_quantile, normal_cdf};
use rayon::prelude::*;

/// Days on which the closed form is worked for the bands; those between are interpolated.
const BAND_NODES: usize = 24;
/// Points of a density, and the standard normal score it reaches either way.
const DENSITY_POINTS: usize = 161;
const DENSITY_REACH: f64 = 4.0;

/// Everything read on a day, in closed form: exact moments, and from them
///
/// - loss: the shifted lognormal law with these moments, exact for one holding on a geometric factor;
/// - drawdown, and the chance of touching the limit: a Brownian motion that has the book's expected change and sd on the
///   day, exact for one level without reversion, rough otherwise.
///
/// Ranges and sampled figures are none; the errors of the limit's chances are 0.
pub fn first_reading(model: &Model, day: u32, conventions: &Conventions) -> Reading {
    let exact = exact_moments(model, day);
    let (law, fall) = (law_of(&exact), FallLaw::of(&exact));
    let reference = match conventions.loss_from {
        LossFrom::Today => model.value,
        LossFrom::Mean => exact.mean,
    };
    let levels = &conventions.confidences;
    Reading {
        moments: moments(&exact),
        loss: levels.iter().map(|level| loss_row(&law, reference, *level)).collect(),
        drawdown: DrawdownReading {
            mean: fall.mean_beyond(0.0),
            mean_error: 0.0,
            quantiles: levels.iter().map(|level| fall.row(*level)).collect(),
        },
        limit: conventions.loss_limit.map(|limit| limit_reading(&exact, &law, model.value, limit)),
    }
}

/// Bands of value and fall on ascending `days` by the laws of [`first_reading`]: worked on up to 24 of the days, and
/// between them interpolated linearly in the square root of time.
pub fn first_bands(model: &Model, days: &[u32]) -> Bands {
    let nodes = nodes(days);
    let rows: Vec<BandRow> = nodes.par_iter().map(|day| band_row(model, *day)).collect();
    let mut bands = Bands {
        days: days.to_vec(),
        values: Vec::with_capacity(days.len()),
        falls: Vec::with_capacity(days.len()),
        is_closed_form: true,
    };
    for day in days {
        let right = nodes.partition_point(|node| node < day).min(nodes.len() - 1);
        let left = if nodes[right] == *day { right } else { right.saturating_sub(1) };
        let root = |day: u32| f64::from(day).sqrt();
        let span = root(nodes[right]) - root(nodes[left]);
        let share = if span > 0.0 { (root(*day) - root(nodes[left])) / span } else { 0.0 };
        bands.values.push(between(&rows[left].values, &rows[right].values, share));
        bands.falls.push(between(&rows[left].falls, &rows[right].falls, share));
    }
    bands
}

/// Densities of the book's value and of its largest fall on a day, by the laws of [`first_reading`].
pub fn first_densities(model: &Model, day: u32) -> (Density, Density) {
    let exact = exact_moments(model, day);
    if exact.sd == 0.0 {
        return (Density::of_one_value(exact.mean), Density::of_one_value(still_fall(exact.change)));
    }
    let law = law_of(&exact);
    let score = |k: usize| DENSITY_REACH * (2.0 * k as f64 / (DENSITY_POINTS - 1) as f64 - 1.0);
    let mut points: Vec<(f64, f64)> = (0..DENSITY_POINTS).map(|k| law.point(score(k))).collect();
    points.sort_by(|left, right| left.0.total_cmp(&right.0));
    let (at, density) = points.into_iter().unzip();
    (Density { at, density }, FallLaw::of(&exact).density())
}

struct BandRow {
    values: [f64; 7],
    falls: [f64; 5],
}

fn band_row(model: &Model, day: u32) -> BandRow {
    let exact = exact_moments(model, day);
    let (law, fall) = (law_of(&exact), FallLaw::of(&exact));
    BandRow {
        values: VALUE_PERCENTS.map(|percent| law.quantile(f64::from(percent) / 100.0)),
        falls: FALL_PERCENTS.map(|percent| fall.quantile(f64::from(percent) / 100.0)),
    }
}

/// Up to [`BAND_NODES`] of ascending days, first and last among them, spread evenly over the square root of time.
fn nodes(days: &[u32]) -> Vec<u32> {
    let (Some(first), Some(last)) = (days.first(), days.last()) else { return Vec::new() };
    let (low, high) = (f64::from(*first).sqrt(), f64::from(*last).sqrt());
    let spread = (0..BAND_NODES).filter_map(|k| {
        let day = (low + (high - low) * k as f64 / (BAND_NODES - 1) as f64).powi(2).round() as u32;
        let next = days.partition_point(|candidate| *candidate < day);
        days.get(next).or(days.last()).copied()
    });
    let mut nodes: Vec<u32> = spread.collect();
    nodes.dedup();
    nodes
}

fn between<const N: usize>(left: &[f64; N], right: &[f64; N], share: f64) -> [f64; N] {
    std::array::from_fn(|k| left[k] + (right[k] - left[k]) * share)
}

fn law_of(exact: &ExactMoments) -> ShiftedLognormal {
    ShiftedLognormal::from_moments(exact.mean, exact.sd, exact.skewness.unwrap_or(0.0))
}

fn moments(exact: &ExactMoments) -> MomentsReading {
    let row = |figure: f64| MomentRow {
        exact: Some(figure).filter(|figure| figure.is_finite()),
        sampled: None,
        standard_error: None,
    };
    MomentsReading {
        mean: row(exact.mean),
        sd: row(exact.sd),
        skewness: row(exact.skewness.unwrap_or(f64::NAN)),
        expected_change: exact.change,
    }
}

fn loss_row(law: &ShiftedLognormal, reference: f64, confidence: Confidence) -> LossRow {
    let tail = confidence.tail();
    LossRow {
        confidence: confidence.value(),
        var: reference - law.quantile(tail),
        var_low: None,
        var_high: None,
        es: reference - law.mean_of_lowest(tail),
        es_low: None,
        es_high: None,
    }
}

/// Chance at the horizon by the law, and of touching by reflection: `Phi(a) + exp(2 m b) Phi(a + 2 m)`, with the change
/// `m` and the limit `b < 0` in units of the sd and `a = b - m`.
fn limit_reading(exact: &ExactMoments, law: &ShiftedLognormal, today: f64, limit: f64) -> LimitReading {
    let at_horizon = law.cdf(today - limit);
    let (change, floor) = (exact.change / exact.sd, -limit / exact.sd);
    let is_at_floor = limit <= 0.0;
    let by_horizon = if exact.sd == 0.0 || is_at_floor {
        if is_at_floor { 1.0 } else { at_horizon }
    } else {
        // Far out exp(2 m b) may be infinite where Phi is 0; their product is at most 1.
        let turned = (2.0 * change * floor).exp() * normal_cdf(floor + change);
        normal_cdf(floor - change) + if turned.is_finite() { turned } else { 0.0 }
    };
    LimitReading {
        loss: limit,
        at_horizon,
        at_horizon_error: 0.0,
        by_horizon: by_horizon.min(1.0).max(at_horizon),
        by_horizon_error: 0.0,
    }
}

/// Largest fall of a book that moves without chance; never a negative zero.
fn still_fall(change: f64) -> f64 {
    (0.0 - change).max(0.0)
}

/// Law of the largest fall of a Brownian motion with the book's change and sd.
struct FallLaw {
    change: f64,
    sd: f64,
}

impl FallLaw {
    fn of(exact: &ExactMoments) -> Self {
        Self { change: exact.change, sd: exact.sd }
    }

    fn drift(&self) -> f64 {
        self.change / self.sd
    }

    fn quantile(&self, p: f64) -> f64 {
        if self.sd > 0.0 { self.sd * drawdown_quantile(self.drift(), p) } else { still_fall(self.change) }
    }

    fn mean_beyond(&self, from: f64) -> f64 {
        if self.sd > 0.0 {
            self.sd * drawdown_mean_beyond(self.drift(), from / self.sd)
        } else {
            still_fall(self.change)
        }
    }

    fn row(&self, confidence: Confidence) -> DrawdownRow {
        let value = self.quantile(confidence.value());
        DrawdownRow {
            confidence: confidence.value(),
            value,
            value_low: None,
            value_high: None,
            mean_beyond: self.mean_beyond(value),
            mean_beyond_error: None,
        }
    }

    /// Differences of the distribution function, between falls of chance 0.00003 and 0.99997.
    fn density(&self) -> Density {
        let chance = normal_cdf(-DENSITY_REACH);
        let ends = [chance, 1.0 - chance].map(|p| drawdown_quantile(self.drift(), p));
        let step = (ends[1] - ends[0]) / (DENSITY_POINTS - 1) as f64;
        let point = |k: usize| ends[0] + k as f64 * step;
        let rise = |at: f64| {
            drawdown_cdf(self.drift(), at + step / 2.0) - drawdown_cdf(self.drift(), at - step / 2.0)
        };
        Density {
            at: (0..DENSITY_POINTS).map(|k| point(k) * self.sd).collect(),
            density: (0..DENSITY_POINTS).map(|k| rise(point(k)).max(0.0) / (step * self.sd)).collect(),
        }
    }
}
