//! Standard errors of a reverting fit from the observed information: the curvature of the log-likelihood at its
//! maximum, in closed form.

use super::ObservedPath;
use super::reverting::Peak;
use crate::maths::decay_integral;

/// One standard error each.
#[derive(Debug, Clone, Copy, PartialEq)]
pub(super) struct RevertingErrors {
    /// Of `kappa`, per year.
    pub(super) speed: f64,
    /// Of `theta`, in the modelled variable.
    pub(super) mean: f64,
    /// Of `ln sigma`.
    pub(super) log_volatility: f64,
}

/// Derivatives of `Q(kappa, theta) = sum r^2 / f` and of `sum ln f`.
#[derive(Default)]
struct Curvature {
    speed: f64,
    speed_speed: f64,
    speed_mean: f64,
    mean_mean: f64,
    log_spread: f64,
}

/// Errors at the maximum of `l = -n ln sigma - Q / (2 sigma^2) - (1/2) sum ln f`, in `kappa`, `theta` and `ln sigma`;
/// none where the curvature there is not that of a maximum.
pub(super) fn standard_errors(path: &ObservedPath, peak: &Peak) -> Option<RevertingErrors> {
    let n = path.steps.count() as f64;
    let curvature = Curvature::at(path, peak);
    let variance = peak.variance;
    let speed_speed = curvature.speed_speed / (2.0 * variance) + curvature.log_spread / 2.0;
    let speed_mean = curvature.speed_mean / (2.0 * variance);
    let mean_mean = curvature.mean_mean / (2.0 * variance);
    let (speed_scale, scale_scale) = (-curvature.speed / variance, 2.0 * n);
    // Inverse of [[a, b, c], [b, d, 0], [c, 0, e]] on its diagonal.
    let rest = speed_speed - speed_mean * speed_mean / mean_mean - speed_scale * speed_scale / scale_scale;
    let speed_variance = rest.recip();
    let mean_variance = mean_mean.recip() + (speed_mean / mean_mean).powi(2) * speed_variance;
    let scale_variance = scale_scale.recip() + (speed_scale / scale_scale).powi(2) * speed_variance;
    let variances = [speed_variance, mean_variance, scale_variance];
    let is_maximum = variances.iter().all(|variance| variance.is_finite() && *variance > 0.0);
    let [speed, mean, log_volatility] = variances.map(f64::sqrt);
    is_maximum.then_some(RevertingErrors { speed, mean, log_volatility })
}

impl Curvature {
    /// With `u = x_i - theta`, `E = exp(-kappa dt)`, `r = x_{i+1} - theta - u E`, `w = 1 / f`, `h = (ln f)'`:
    ///
    /// ```text
    /// r' = u dt E     r'' = -u dt^2 E     dr/dtheta = -(1 - E)     d2r/dkappa dtheta = -dt E
    /// w' = -h w       w'' = (h^2 - h') w
    /// ```
    fn at(path: &ObservedPath, peak: &Peak) -> Self {
        let mut sum = Self::default();
        for (two, years) in path.values.windows(2).zip(path.steps.years()) {
            let from_mean = two[0] - peak.mean;
            let decay = (-peak.speed * years).exp();
            let pull = -(-peak.speed * years).exp_m1();
            let rest = two[1] - peak.mean - from_mean * decay;
            let weight = decay_integral(2.0 * peak.speed, years).recip();
            let (slope, bend) = log_spread_slopes(peak.speed, years);
            let (rest_1, rest_2) = (from_mean * years * decay, -from_mean * years * years * decay);
            sum.speed += (2.0 * rest * rest_1 - slope * rest * rest) * weight;
            let of_rest = 2.0 * (rest_1 * rest_1 + rest * rest_2) - 4.0 * slope * rest * rest_1;
            sum.speed_speed += (of_rest + (slope * slope - bend) * rest * rest) * weight;
            let cross = -rest_1 * pull - rest * years * decay + slope * rest * pull;
            sum.speed_mean += 2.0 * cross * weight;
            sum.mean_mean += 2.0 * pull * pull * weight;
            sum.log_spread += bend;
        }
        sum
    }
}

/// First and second derivative of `ln phi(2 kappa, dt)` in kappa. With `y = 2 kappa dt`:
/// `(y / expm1(y) - 1) / kappa` and `(1 - y^2 e^y / expm1(y)^2) / kappa^2`, the second by its series where y is small,
/// since it is then the small difference of two numbers near 1.
fn log_spread_slopes(speed: f64, years: f64) -> (f64, f64) {
    let y = 2.0 * speed * years;
    let growth = y.exp_m1();
    let slope = (y / growth - 1.0) / speed;
    let bend = if y < 0.05 {
        4.0 * years * years * (1.0 / 12.0 - y * y / 240.0 + y.powi(4) / 6048.0)
    } else {
        (1.0 - (y / growth).powi(2) * y.exp()) / (speed * speed)
    };
    (slope, bend)
}
