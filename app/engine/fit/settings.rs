//! How a history is fitted: which dates, which diffusions, which estimator of the correlation.

use jiff::civil::Date;
use serde::{Deserialize, Serialize};

/// Everything about a fit that its reader decides.
#[derive(Debug, Clone, PartialEq, Serialize, Deserialize)]
pub struct FitSettings {
    /// First date used; from the beginning when none.
    pub since: Option<Date>,
    /// Last date used; to the end when none.
    pub until: Option<Date>,
    /// Trading days between two rows; told from the dates when none.
    pub row_days: Option<u32>,
    /// Which diffusions are chosen from.
    pub model: ModelChoice,
    /// Drift that a geometric factor takes of its fit.
    pub drift: DriftChoice,
    /// Estimator of the correlation.
    pub estimator: Estimator,
    /// Half-life of the weights of [`Estimator::Weighted`], trading days, above 0.
    pub weight_half_life_days: f64,
    /// Rows that a change spans for the correlation: 1, 5 or 10, overlapping.
    pub change_days: u32,
    /// What is done with dates on which not every factor has a value.
    pub missing: Missing,
}

/// Which diffusions are chosen from where none is typed.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Serialize, Deserialize)]
pub enum ModelChoice {
    /// By the evidence: a log model where every value is positive, else the level.
    Chosen,
    /// A log model for all.
    Log,
    /// `reverting-level` for all.
    Level,
}

/// Drift that a geometric factor takes of its fit.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Serialize, Deserialize)]
pub enum DriftChoice {
    /// None: a history says little about it.
    Zero,
    /// The fitted one.
    Fitted,
}

/// Estimator of the correlation.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Serialize, Deserialize)]
pub enum Estimator {
    /// Every change counts the same, the mean removed.
    Sample,
    /// Recent changes count more, by a half-life; no mean removed.
    Weighted,
    /// Shrunk towards equal variances without correlation (Ledoit and Wolf 2004, J. Multivariate Analysis 88).
    ShrunkIdentity,
    /// Shrunk towards one correlation for all pairs (Ledoit and Wolf 2004, J. Portfolio Management 30).
    ShrunkConstant,
}

/// What is done with missing values in a correlation.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Serialize, Deserialize)]
pub enum Missing {
    /// Only dates that all factors have.
    Common,
    /// For each pair the dates that both have; the matrix is then repaired where that makes it impossible.
    Pairs,
}

impl FitSettings {
    /// All dates, the choice by the evidence, no drift, plain correlations of one-row changes on common dates.
    pub fn usual() -> Self {
        Self {
            since: None,
            until: None,
            row_days: None,
            model: ModelChoice::Chosen,
            drift: DriftChoice::Zero,
            estimator: Estimator::Sample,
            weight_half_life_days: 63.0,
            change_days: 1,
            missing: Missing::Common,
        }
    }
}

impl Estimator {
    /// As it is written on a command line and in an answer.
    pub fn word(self) -> &'static str {
        match self {
            Self::Sample => "sample",
            Self::Weighted => "weighted",
            Self::ShrunkIdentity => "shrunk-identity",
            Self::ShrunkConstant => "shrunk-constant",
        }
    }
}
