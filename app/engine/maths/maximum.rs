//! Where a continuous function of one variable is largest. Derivatives are not asked for.

/// Parts of the interval in which the largest value is first looked for, so that a second hill is not missed.
const PARTS: usize = 24;

/// The place in `[low, high]` where `function` is largest, to within `tolerance`: a scan of 24 parts, then Brent's
/// parabolic search round the highest of them. An end where the function still rises there. NaN counts as lowest.
///
/// Source: Brent, Algorithms for Minimization without Derivatives (1973), chapter 5; from memory.
pub fn maximum(function: impl Fn(f64) -> f64, low: f64, high: f64, tolerance: f64) -> f64 {
    let at = |part: usize| low + (high - low) * part as f64 / PARTS as f64;
    let height = |x: f64| Some(function(x)).filter(|value| !value.is_nan()).unwrap_or(f64::NEG_INFINITY);
    let heights: Vec<f64> = (0..=PARTS).map(|part| height(at(part))).collect();
    let highest = (0..=PARTS).fold(0, |best, part| if heights[part] > heights[best] { part } else { best });
    let (left, right) = (at(highest.saturating_sub(1)), at((highest + 1).min(PARTS)));
    let found = search(height, left, right, tolerance);
    if height(found) >= heights[highest] { found } else { at(highest) }
}

/// The three best places so far with their heights, best first.
struct Best {
    x: [f64; 3],
    height: [f64; 3],
}

fn search(height: impl Fn(f64) -> f64, mut left: f64, mut right: f64, tolerance: f64) -> f64 {
    const MOST_STEPS: usize = 100;
    const GOLDEN: f64 = 0.381_966_011_250_105_1;
    let start = left + GOLDEN * (right - left);
    let mut best = Best { x: [start; 3], height: [height(start); 3] };
    let (mut step, mut step_before) = (0.0_f64, 0.0_f64);
    for _ in 0..MOST_STEPS {
        let x = best.x[0];
        let middle = (left + right) / 2.0;
        let reach = f64::EPSILON.sqrt() * x.abs() * 1e-2 + tolerance / 3.0;
        if (x - middle).abs() + (right - left) / 2.0 <= 2.0 * reach {
            break;
        }
        let guess = best.parabolic_step().filter(|guess| {
            guess.abs() < step_before.abs() / 2.0 && x + guess > left + reach && x + guess < right - reach
        });
        step_before = step;
        step = guess.unwrap_or_else(|| {
            step_before = if x < middle { right - x } else { left - x };
            GOLDEN * step_before
        });
        let next = if step.abs() >= reach { x + step } else { x + reach.copysign(step) };
        let found = height(next);
        if found >= best.height[0] {
            *(if next < x { &mut right } else { &mut left }) = x;
        } else {
            *(if next < x { &mut left } else { &mut right }) = next;
        }
        best.take(next, found);
    }
    best.x[0]
}

impl Best {
    /// From the best place to the top of the parabola through all three; none where they lie on a line.
    fn parabolic_step(&self) -> Option<f64> {
        let ([x, w, v], [fx, fw, fv]) = (self.x, self.height);
        let (r, q) = ((x - w) * (fx - fv), (x - v) * (fx - fw));
        let (top, bottom) = ((x - v) * q - (x - w) * r, 2.0 * (q - r));
        Some(-top / bottom).filter(|step| step.is_finite() && bottom != 0.0)
    }

    fn take(&mut self, x: f64, height: f64) {
        let ([first, second, third], [high, middle, low]) = (self.x, self.height);
        if height >= high {
            (self.x, self.height) = ([x, first, second], [height, high, middle]);
        } else if height >= middle || second == first {
            (self.x, self.height) = ([first, x, second], [high, height, middle]);
        } else if height >= low || third == first || third == second {
            (self.x[2], self.height[2]) = (x, height);
        }
    }
}
