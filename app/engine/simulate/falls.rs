//! The largest fall from a running peak and the touching of the loss limit, watched continuously: within a step the
//! book's value is a Brownian bridge between the step's ends, with the local variance of the path itself.
//!
//! Approximations, both within one step only: highest and lowest value of a step are drawn independently of each other
//! given its ends, and a peak followed by a trough inside one step is not seen. They matter only near today, where a day
//! is much of the time so far; so the first days are cut into parts by drawing the bridge in between.

use super::elementary::{LANES, Lanes, exp, ln, normal_pair};
use super::program::Program;
use super::random::{BRIDGE_LANE, PART_LANE, uniforms};

/// A day is cut so that a part of it is about one in so many of the time since today, or left whole. Measured on a
/// Brownian motion, the mean fall is then within 0.3 % of its law from the first day on; uncut it would be 24 % low there.
const PARTS_SINCE_TODAY: u32 = 8;

/// Running figures of sixteen paths.
#[derive(Debug, Clone)]
pub(super) struct Falls {
    peak: Lanes,
    /// Largest fall from a running peak so far.
    pub(super) largest: Lanes,
    /// Probability, given the path's values at the ends of its steps, that the limit was not touched so far.
    pub(super) survival: Lanes,
}

impl Falls {
    /// Nothing has fallen yet from today's value.
    pub(super) fn from(today: f64) -> Self {
        Self { peak: Lanes::splat(today), largest: Lanes::splat(0.0), survival: Lanes::splat(1.0) }
    }

    /// Takes in the step to `day` between `ends`, whose bridge has `variance` over the step.
    #[inline(always)]
    pub(super) fn step(
        &mut self,
        program: &Program,
        paths: &[u64; LANES],
        day: u32,
        ends: [&Lanes; 2],
        variance: &Lanes,
    ) {
        match parts_of(day) {
            1 => self.bridge(ends, variance, &uniforms(program.seed, paths, day, BRIDGE_LANE)),
            parts => self.early_day(program, paths, day, parts, ends, variance),
        }
        if let Some(floor) = program.floor {
            self.survive(floor, ends, variance);
        }
    }

    #[inline(always)]
    fn early_day(
        &mut self,
        program: &Program,
        paths: &[u64; LANES],
        day: u32,
        parts: u32,
        ends: [&Lanes; 2],
        variance: &Lanes,
    ) {
        let part_variance = Lanes::each(|lane| variance.0[lane] / f64::from(parts));
        let mut from = *ends[0];
        let mut normals = [Lanes::splat(0.0); 2];
        for part in 0..parts {
            let left = f64::from(parts - part);
            if part % 2 == 0 {
                normals = normal_pair(&uniforms(program.seed, paths, day, PART_LANE + part));
            }
            let spread = (left - 1.0) / left;
            let normal = &normals[(part % 2) as usize].0;
            let to = Lanes::each(|lane| {
                let mean = from.0[lane] + (ends[1].0[lane] - from.0[lane]) / left;
                (part_variance.0[lane] * spread).sqrt().mul_add(normal[lane], mean)
            });
            let lane = PART_LANE + PARTS_SINCE_TODAY + part;
            self.bridge([&from, &to], &part_variance, &uniforms(program.seed, paths, day, lane));
            from = to;
        }
    }

    /// Highest and lowest value of a Brownian bridge from `a` to `b` with variance `v`, each by one uniform:
    /// `(a + b +/- sqrt((b - a)^2 - 2 v ln u)) / 2`.
    #[inline(always)]
    fn bridge(&mut self, ends: [&Lanes; 2], variance: &Lanes, uniforms: &[[f64; LANES]; 2]) {
        for lane in 0..LANES {
            let (a, b, v) = (ends[0].0[lane], ends[1].0[lane], variance.0[lane]);
            let square = (b - a) * (b - a);
            let rise = (-2.0 * v).mul_add(ln(uniforms[0][lane]), square).sqrt();
            let drop = (-2.0 * v).mul_add(ln(uniforms[1][lane]), square).sqrt();
            let highest = 0.5 * (a + b + rise);
            let lowest = 0.5 * (a + b - drop);
            let from_peak = larger(self.largest.0[lane], self.peak.0[lane] - lowest);
            self.peak.0[lane] = larger(self.peak.0[lane], highest);
            self.largest.0[lane] = larger(from_peak, self.peak.0[lane] - b);
        }
    }

    /// Between ends `a` and `b` above the floor a bridge of variance `v` stays above it with probability
    /// `1 - exp(-2 (a - floor)(b - floor) / v)`.
    #[inline(always)]
    fn survive(&mut self, floor: f64, ends: [&Lanes; 2], variance: &Lanes) {
        for lane in 0..LANES {
            let (a, b, v) = (ends[0].0[lane] - floor, ends[1].0[lane] - floor, variance.0[lane]);
            let exponent = if v > 0.0 { -2.0 * a * b / v } else { -f64::MAX };
            let stays = if (a >= 0.0) & (b >= 0.0) { 1.0 - exp(exponent) } else { 0.0 };
            self.survival.0[lane] *= stays;
        }
    }
}

/// How many parts a day is cut into: a power of two.
fn parts_of(day: u32) -> u32 {
    1 << (PARTS_SINCE_TODAY / day.max(1)).max(1).ilog2()
}

#[inline(always)]
fn larger(left: f64, right: f64) -> f64 {
    if right > left { right } else { left }
}
