//! The root of a continuous function in a bracket. Derivatives are not asked for.

/// A root of `function` in `[low, high]` to within `tolerance`, by Brent's method; none where the ends have the same
/// sign or a value is NaN.
///
/// Source: Brent, Algorithms for Minimization without Derivatives (1973), chapter 4; from memory.
pub fn root(function: impl Fn(f64) -> f64, low: f64, high: f64, tolerance: f64) -> Option<f64> {
    const MOST_STEPS: usize = 200;
    let (mut a, mut b) = (low, high);
    let (mut fa, mut fb) = (function(a), function(b));
    let is_bracketed = fa * fb <= 0.0;
    if !is_bracketed {
        return None;
    }
    let (mut c, mut fc, mut step, mut step_before) = (a, fa, b - a, b - a);
    for _ in 0..MOST_STEPS {
        if fb * fc > 0.0 {
            (c, fc, step, step_before) = (a, fa, b - a, b - a);
        }
        if fc.abs() < fb.abs() {
            (a, fa, b, fb, c, fc) = (b, fb, c, fc, b, fb);
        }
        let reach = 2.0 * f64::EPSILON * b.abs() + tolerance / 2.0;
        let half = (c - b) / 2.0;
        if half.abs() <= reach || fb == 0.0 {
            return Some(b);
        }
        let guess = interpolated_step([a, b, c], [fa, fb, fc]);
        let is_good =
            guess.abs() < (1.5 * half.abs() - reach / 2.0).min(step_before.abs() / 2.0) && guess * half > 0.0;
        (step_before, step) = if step_before.abs() >= reach && fa.abs() > fb.abs() && is_good {
            (step, guess)
        } else {
            (half, half)
        };
        (a, fa) = (b, fb);
        b += if step.abs() > reach { step } else { reach.copysign(half) };
        fb = function(b);
        if fb.is_nan() {
            return None;
        }
    }
    Some(b)
}

/// From `b`: the inverse quadratic step through three points, the secant step where two coincide.
fn interpolated_step([a, b, c]: [f64; 3], [fa, fb, fc]: [f64; 3]) -> f64 {
    let s = fb / fa;
    if a == c {
        return -(c - b) * s / (1.0 - s);
    }
    let (q, r) = (fa / fc, fb / fc);
    let p = s * ((c - b) * q * (q - r) - (b - a) * (r - 1.0));
    -p / ((q - 1.0) * (r - 1.0) * (s - 1.0))
}
