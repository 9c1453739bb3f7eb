//! The Dickey-Fuller test of a random walk, and MacKinnon's critical values for it.

use super::ObservedPath;
use super::autoregression::Regression;
use serde::Serialize;

/// t of the slope less one in the regression of each value on the one before, with a constant and no lags. A random walk
/// is doubted where t lies below a critical value.
#[derive(Debug, Clone, Copy, PartialEq, Serialize)]
pub struct DickeyFuller {
    /// `(b - 1) / se(b)`.
    pub t: f64,
    /// 1 % point under a random walk.
    pub critical_1: f64,
    /// 5 % point.
    pub critical_5: f64,
    /// 10 % point.
    pub critical_10: f64,
}

/// `b0 + b1 / n + b2 / n^2 + b3 / n^3` for the 1, 5 and 10 % points, constant case.
///
/// Source: MacKinnon (2010), Critical values for cointegration tests, Queen's Economics Department working paper 1227.
const SURFACES: [[f64; 4]; 3] = [
    [-3.43035, -6.5393, -16.786, -79.433],
    [-2.86154, -2.8903, -4.234, -40.040],
    [-2.56677, -1.5384, -2.809, 0.0],
];

impl DickeyFuller {
    /// Of a path; none with fewer than four values or where nothing is left over by the regression.
    pub fn of(path: &ObservedPath) -> Option<Self> {
        let n = path.steps.count();
        if n < 3 {
            return None;
        }
        let fit = Regression::of(&path.values);
        let slope_error = (fit.residual_squares / (n as f64 - 2.0) / fit.squares_before).sqrt();
        let t = (fit.slope - 1.0) / slope_error;
        let [critical_1, critical_5, critical_10] = critical_values(n as f64);
        t.is_finite().then_some(Self { t, critical_1, critical_5, critical_10 })
    }
}

/// The 1, 5 and 10 % points for a regression of `n` rows.
pub fn critical_values(n: f64) -> [f64; 3] {
    SURFACES.map(|surface| surface.iter().rev().fold(0.0, |sum, coefficient| sum / n + coefficient))
}
