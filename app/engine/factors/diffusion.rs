//! A risk factor and the diffusion it follows, with every parameter known and checked.

use super::Origins;
use crate::book::{DiffusionKind, HalfLife, LevelUnit};
use serde::{Deserialize, Serialize};

/// A diffusion with its parameters. Rates and volatilities are per year.
#[derive(Debug, Clone, Copy, PartialEq, Serialize, Deserialize)]
pub enum Diffusion {
    /// `dS/S = drift dt + volatility dW`, so that `E[S_T] = S_0 exp(drift T)`.
    Geometric {
        /// Growth rate of the mean, per year.
        drift: f64,
        /// Of the log, per square-root year.
        volatility: f64,
    },
    /// `d ln S = kappa (ln long_run - ln S) dt + volatility dW`.
    RevertingLog {
        /// Of the log, per square-root year.
        volatility: f64,
        /// Median the level is drawn to, above 0; the level today where there is no reversion.
        long_run: f64,
        /// Time in which the gap halves.
        half_life: HalfLife,
    },
    /// `dX = kappa (long_run - X) dt + volatility dW`.
    RevertingLevel {
        /// In level units per square-root year.
        volatility: f64,
        /// Mean the level is drawn to; the level today where there is no reversion.
        long_run: f64,
        /// Time in which the gap halves.
        half_life: HalfLife,
    },
}

impl Diffusion {
    /// Which of the three it is.
    pub fn kind(&self) -> DiffusionKind {
        match self {
            Self::Geometric { .. } => DiffusionKind::Geometric,
            Self::RevertingLog { .. } => DiffusionKind::RevertingLog,
            Self::RevertingLevel { .. } => DiffusionKind::RevertingLevel,
        }
    }

    /// `drift` of a geometric diffusion; 0 for the others.
    pub fn drift(&self) -> f64 {
        match *self {
            Self::Geometric { drift, .. } => drift,
            _ => 0.0,
        }
    }

    /// Long-run level and half-life; none for a geometric diffusion.
    pub fn reversion(&self) -> Option<(f64, HalfLife)> {
        match *self {
            Self::Geometric { .. } => None,
            Self::RevertingLog { long_run, half_life, .. }
            | Self::RevertingLevel { long_run, half_life, .. } => Some((long_run, half_life)),
        }
    }

    /// The same of one over the level: drift `sigma^2 - drift`, long run `1 / long_run`; none for a reverting level,
    /// whose reciprocal is none.
    pub fn inverted(&self) -> Option<Self> {
        match *self {
            Self::Geometric { drift, volatility } => {
                Some(Self::Geometric { drift: volatility * volatility - drift, volatility })
            }
            Self::RevertingLog { volatility, long_run, half_life } => {
                Some(Self::RevertingLog { volatility, long_run: 1.0 / long_run, half_life })
            }
            Self::RevertingLevel { .. } => None,
        }
    }

    /// Whether the modelled variable is the logarithm of the level.
    pub fn is_log(&self) -> bool {
        !matches!(self, Self::RevertingLevel { .. })
    }

    /// `sigma` of the modelled variable per square-root year.
    pub fn volatility(&self) -> f64 {
        match *self {
            Self::Geometric { volatility, .. }
            | Self::RevertingLog { volatility, .. }
            | Self::RevertingLevel { volatility, .. } => volatility,
        }
    }

    /// Reversion speed `kappa` per year: `ln 2 / half-life`; 0 for a geometric factor or no reversion.
    pub fn speed_per_year(&self, days_per_year: f64) -> f64 {
        match *self {
            Self::RevertingLog { half_life: HalfLife::Days(days), .. }
            | Self::RevertingLevel { half_life: HalfLife::Days(days), .. } => {
                std::f64::consts::LN_2 / days * days_per_year
            }
            _ => 0.0,
        }
    }
}

/// A risk factor of a model.
#[derive(Debug, Clone, PartialEq, Serialize)]
pub struct RiskFactor {
    /// Name; a currency rate has the book's currency last.
    pub name: String,
    /// Level today in its own units; none for a geometric factor that needs none.
    pub level: Option<f64>,
    /// What 1.00 of the level is.
    pub unit: LevelUnit,
    /// How it moves.
    pub diffusion: Diffusion,
    /// Whether it was described as the pair the other way round and is read inverted.
    pub is_inverted: bool,
    /// Where each figure came from.
    pub origins: Origins,
}

impl RiskFactor {
    /// Where the modelled variable is drawn to, counted from where it stands today:
    /// `ln(long_run / level)` or `long_run - level`; 0 for a geometric factor or no reversion.
    pub fn gap_to_long_run(&self) -> f64 {
        let level = self.level.unwrap_or(1.0);
        match self.diffusion {
            Diffusion::RevertingLog { long_run, half_life: HalfLife::Days(_), .. } => (long_run / level).ln(),
            Diffusion::RevertingLevel { long_run, half_life: HalfLife::Days(_), .. } => long_run - level,
            _ => 0.0,
        }
    }
}
