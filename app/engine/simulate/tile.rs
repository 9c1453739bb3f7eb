//! Sixteen paths worked side by side from today to the horizon: draw, correlate, move, value, bridge.

use super::elementary::{LANES, Lanes, exp, normal_pair};
use super::falls::Falls;
use super::program::Program;
use super::random::uniforms;
use crate::factors::CurrencyPart;
use pulp::Simd;

/// The state of sixteen paths and the room their step needs.
pub(super) struct Tile<'a> {
    program: &'a Program,
    paths: [u64; LANES],
    /// Moves of the modelled variables since today, a row per factor.
    moves: Vec<Lanes>,
    /// Growth `exp(x)` of log factors, the move itself of level factors.
    growth: Vec<Lanes>,
    /// Normals, then shocks, on the way in; sensitivities of the book on the way out. One room for all three keeps a
    /// tile within the first-level cache.
    scratch: Vec<Lanes>,
    /// The book's value.
    pub(super) value: Lanes,
    /// Its variance over a day from here, by each path's own state.
    variance: Lanes,
    /// Falls from the running peak, and the limit's survival.
    pub(super) falls: Falls,
}

impl<'a> Tile<'a> {
    #[inline(always)]
    pub(super) fn new(program: &'a Program) -> Self {
        let rows = vec![Lanes::splat(0.0); program.padded_factors()];
        Self {
            program,
            paths: [0; LANES],
            moves: rows.clone(),
            growth: rows.clone(),
            scratch: rows,
            value: Lanes::splat(0.0),
            variance: Lanes::splat(0.0),
            falls: Falls::from(program.today),
        }
    }

    /// Back to today, for these paths.
    #[inline(always)]
    pub(super) fn start<S: Simd>(&mut self, simd: S, paths: [u64; LANES]) {
        self.paths = paths;
        self.moves.fill(Lanes::splat(0.0));
        for (growth, factor) in self.growth.iter_mut().zip(&self.program.factors) {
            *growth = Lanes::splat(if factor.is_log { 1.0 } else { 0.0 });
        }
        self.value_book(simd, 0);
        self.value = Lanes::splat(self.program.today);
        self.falls = Falls::from(self.program.today);
    }

    /// One day on, to `day`.
    #[inline(always)]
    pub(super) fn step<S: Simd>(&mut self, simd: S, day: u32) {
        self.draw(day);
        self.program.lower.multiply_in_place(simd, &mut self.scratch);
        self.move_factors();
        let (from, variance_before) = (self.value, self.variance);
        self.value_book(simd, day);
        let variance = Lanes::each(|lane| 0.5 * (variance_before.0[lane] + self.variance.0[lane]));
        self.falls.step(self.program, &self.paths, day, [&from, &self.value], &variance);
    }

    #[inline(always)]
    fn draw(&mut self, day: u32) {
        let pairs = self.program.factors.len().div_ceil(2);
        for (lane, pair) in self.scratch.as_chunks_mut::<2>().0[..pairs].iter_mut().enumerate() {
            *pair = normal_pair(&uniforms(self.program.seed, &self.paths, day, lane as u32));
        }
    }

    #[inline(always)]
    fn move_factors(&mut self) {
        let states = self.moves.iter_mut().zip(&mut self.growth).zip(&self.scratch);
        for (factor, ((moves, growth), shock)) in self.program.factors.iter().zip(states) {
            let before = *moves;
            let after =
                Lanes::each(|lane| factor.decay.mul_add(before.0[lane], factor.shift + shock.0[lane]));
            *moves = after;
            *growth = if factor.is_log { Lanes::each(|lane| exp(after.0[lane])) } else { after };
        }
    }

    /// Value on `day`, and the variance over a day from there: `|C' delta|^2` with `delta_i = dV/dx_i`.
    #[inline(always)]
    fn value_book<S: Simd>(&mut self, simd: S, day: u32) {
        let years = f64::from(day) * self.program.years_per_day;
        self.scratch.fill(Lanes::splat(0.0));
        self.value = Lanes::splat(0.0);
        for part in &self.program.parts {
            self.add_part(part, years);
        }
        self.variance = self.program.upper.square_norm(simd, &self.scratch);
    }

    #[inline(always)]
    fn add_part(&mut self, part: &CurrencyPart, years: f64) {
        let rate = part.rate.map_or(Lanes::splat(1.0), |rate| {
            let growth = &self.growth[rate.factor].0;
            let is_log = self.program.factors[rate.factor].is_log;
            Lanes::each(|lane| if is_log { rate.today * growth[lane] } else { rate.today + growth[lane] })
        });
        let mut local = Lanes::splat(part.income_per_year.mul_add(years, part.constant));
        for term in &part.terms {
            let growth = self.growth[term.factor];
            let worth = Lanes::each(|lane| term.weight * growth.0[lane]);
            local = Lanes::each(|lane| local.0[lane] + worth.0[lane]);
            let slope =
                if self.program.factors[term.factor].is_log { worth } else { Lanes::splat(term.weight) };
            let before = self.scratch[term.factor];
            // At home the rate is 1: adding alone gives the same digits.
            self.scratch[term.factor] = if part.rate.is_some() {
                Lanes::each(|lane| rate.0[lane].mul_add(slope.0[lane], before.0[lane]))
            } else {
                Lanes::each(|lane| slope.0[lane] + before.0[lane])
            };
        }
        for lane in 0..LANES {
            self.value.0[lane] = rate.0[lane].mul_add(local.0[lane], self.value.0[lane]);
        }
        if let Some(currency) = part.rate {
            let is_log = self.program.factors[currency.factor].is_log;
            let sensitivity = &mut self.scratch[currency.factor].0;
            for lane in 0..LANES {
                sensitivity[lane] += local.0[lane] * if is_log { rate.0[lane] } else { 1.0 };
            }
        }
    }
}
