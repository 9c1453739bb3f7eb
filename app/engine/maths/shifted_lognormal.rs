//! The shifted lognormal law with a given mean, standard deviation and skewness; the normal one without skewness.

use super::{normal_cdf, normal_density, normal_quantile};

/// A skewness this small is none: the closed forms divide by it, and the law is the normal one to as many digits.
const NO_SKEWNESS: f64 = 1e-7;

/// `V = mean + sign scale (exp(s Z - s^2 / 2) - 1)`, `Z` standard normal; the sign is that of the skewness `g`, and
///
/// ```text
/// w = exp(s^2),   (w + 2) sqrt(w - 1) = |g|,   scale = sd / sqrt(w - 1)
/// ```
///
/// whose only solution is `sqrt(w - 1) = 2 sinh(asinh(|g| / 2) / 3)`. At an sd of 0 all of it lies on the mean.
/// Source: Johnson, Kotz and Balakrishnan, Continuous Univariate Distributions 1, chapter 14 (from memory).
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct ShiftedLognormal {
    mean: f64,
    sd: f64,
    /// `sign s`; 0 for the normal law.
    signed_log_sd: f64,
    /// `sign scale`.
    signed_scale: f64,
}

impl ShiftedLognormal {
    /// The law with these moments; `sd` 0 or more.
    pub fn from_moments(mean: f64, sd: f64, skewness: f64) -> Self {
        let root = 2.0 * ((skewness.abs() / 2.0).asinh() / 3.0).sinh();
        let (log_sd, scale) =
            if skewness.abs() < NO_SKEWNESS { (0.0, 0.0) } else { ((root * root).ln_1p().sqrt(), sd / root) };
        let sign = skewness.signum();
        Self { mean, sd, signed_log_sd: sign * log_sd, signed_scale: sign * scale }
    }

    /// The value not passed with probability `p`.
    pub fn quantile(&self, p: f64) -> f64 {
        self.at(normal_quantile(p))
    }

    /// Mean of the lowest `p` of the law.
    pub fn mean_of_lowest(&self, p: f64) -> f64 {
        let z = normal_quantile(p);
        if self.is_normal() {
            return self.mean - self.sd * normal_density(z) / p;
        }
        self.mean + self.signed_scale * (normal_cdf(z - self.signed_log_sd) / p - 1.0)
    }

    /// `P(V < value)`.
    pub fn cdf(&self, value: f64) -> f64 {
        if self.sd == 0.0 { if self.mean < value { 1.0 } else { 0.0 } } else { normal_cdf(self.score(value)) }
    }

    /// Density at the point that the standard normal score `z` goes to, and that point; 0 where the sd is.
    pub fn point(&self, z: f64) -> (f64, f64) {
        let s = self.signed_log_sd;
        let slope =
            if self.is_normal() { self.sd } else { self.signed_scale * s * (s * z - s * s / 2.0).exp() };
        (self.at(z), if slope > 0.0 { normal_density(z) / slope } else { 0.0 })
    }

    fn is_normal(&self) -> bool {
        self.signed_log_sd == 0.0
    }

    fn at(&self, z: f64) -> f64 {
        let s = self.signed_log_sd;
        if self.sd == 0.0 {
            self.mean
        } else if self.is_normal() {
            self.mean + self.sd * z
        } else {
            self.mean + self.signed_scale * (s * z - s * s / 2.0).exp_m1()
        }
    }

    /// The `z` that goes to a value; infinite beyond the end of the law.
    fn score(&self, value: f64) -> f64 {
        if self.is_normal() {
            return (value - self.mean) / self.sd;
        }
        let s = self.signed_log_sd;
        let growth = (value - self.mean) / self.signed_scale;
        if growth <= -1.0 { -s.signum() * f64::INFINITY } else { (growth.ln_1p() + s * s / 2.0) / s }
    }
}
