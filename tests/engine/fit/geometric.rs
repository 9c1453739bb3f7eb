//! The geometric fit, at regular and irregular dates.

use crate::support::*;
use ebbmark_engine::fit::geometric::fit_geometric;

#[test]
fn exact_worked_example_at_irregular_dates() {
    // Prices 100, 102, 101, 105, 104 with gaps of 1, 3, 1, 2 days of 252: nu, sigma (divisor n - 1) and the error of nu
    // from their formulas, worked out in numpy.
    let prices = [100.0_f64, 102.0, 101.0, 105.0, 104.0].map(f64::ln);
    let fit = fit_geometric(&path(&prices, &[1, 3, 1, 2], 1.0 / 252.0)).unwrap();
    let sigma = fit.volatility.value;
    near(sigma, 0.384_397_830_5, 1e-9);
    near(fit.drift.value - sigma * sigma / 2.0, 1.411_945_673_5, 1e-9);
    // The error of numpy's example uses divisor n: 0.3328982863 / sqrt(7/252) = 1.997.
    near(fit.drift.standard_error.unwrap() * 0.332_898_286_3 / sigma, 1.997, 5e-4);
    near(fit.volatility.standard_error.unwrap(), sigma / 8.0_f64.sqrt(), 1e-15);
    near(fit.volatility.high.unwrap(), sigma * (1.0 + 1.96 / 8.0_f64.sqrt()), 1e-9);
}

#[test]
fn exact_likelihood_of_two_changes() {
    // Two changes x of +/- s over a year: mean 0, variance s^2, each with density exp(-1/2) / (s sqrt(2 pi)).
    let s = 0.3;
    let fit = fit_geometric(&path(&[0.0, s, 0.0], &[1, 1], 1.0)).unwrap();
    near(fit.log_likelihood, 2.0 * (-0.5 - (s * (2.0 * std::f64::consts::PI).sqrt()).ln()), 1e-14);
    near(fit.volatility.value, s * 2.0_f64.sqrt(), 1e-15);
}
