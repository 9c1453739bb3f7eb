//! A single risk factor ahead, in its own units: exact mean and bands, no paths.

use crate::factors::RiskFactor;
use crate::maths::normal_quantile;
use crate::simulate::factor_move;

/// Mean and central bands of a factor per day, in its own units; of 1 today where the factor has no level.
#[derive(Debug, Clone, PartialEq)]
pub struct FactorAhead {
    /// Days, as asked for.
    pub days: Vec<u32>,
    /// Mean, per day.
    pub mean: Vec<f64>,
    /// Lower and upper end of the band that holds 50 %, per day.
    pub half: Vec<[f64; 2]>,
    /// Lower and upper end of the band that holds 90 %, per day.
    pub ninety: Vec<[f64; 2]>,
}

/// The factor on each of `days` from today: with mean `m` and variance `v` of the modelled variable's move,
///
/// ```text
/// log diffusions   mean S_0 exp(m + v/2),   ends S_0 exp(m +/- z sqrt(v))
/// level diffusion  mean X_0 + m,            ends X_0 + m +/- z sqrt(v)
/// ```
pub fn factor_ahead(factor: &RiskFactor, days_per_year: f64, days: &[u32]) -> FactorAhead {
    let moves: Vec<(f64, f64)> =
        days.iter().map(|day| factor_move(factor, days_per_year, f64::from(*day) / days_per_year)).collect();
    let is_log = factor.diffusion.is_log();
    let today = factor.level.unwrap_or(if is_log { 1.0 } else { 0.0 });
    let moved = |by: f64| if is_log { today * by.exp() } else { today + by };
    let band = |inside: f64| {
        let z = normal_quantile(0.5 + inside / 2.0);
        moves.iter().map(|(m, v)| [-z, z].map(|z| moved(m + z * v.sqrt()))).collect()
    };
    FactorAhead {
        days: days.to_vec(),
        mean: moves.iter().map(|(m, v)| moved(if is_log { m + v / 2.0 } else { *m })).collect(),
        half: band(0.5),
        ninety: band(0.9),
    }
}
