//! The answer of `ebbmark fit`, field by field in the order of the README. Serialises itself; computes nothing.

use ebbmark_engine::fit::{
    DickeyFuller, Evidence, FactorFit, Fit, FittedCorrelation, GeometricFit, Refusal, RevertingFit,
    VarianceRatio,
};
use ebbmark_engine::tables::Notice;
use jiff::civil::Date;
use serde::Serialize;

/// A whole answer.
#[derive(Debug, Clone, PartialEq, Serialize)]
pub struct FitAnswer {
    /// Changes from one row to the next.
    pub observations: usize,
    /// First date.
    pub from: Date,
    /// Last date.
    pub to: Date,
    /// Trading days of a row; none where time is that of the calendar.
    pub row_days: Option<u32>,
    /// In the order of the columns.
    pub factors: Vec<FactorAnswer>,
    /// Of the factors with a chosen diffusion; none where too few changes are common.
    pub correlation: Option<CorrelationAnswer>,
    /// Everything worth telling beside the figures.
    pub notices: Vec<Notice>,
}

/// One factor.
#[derive(Debug, Clone, PartialEq, Serialize)]
pub struct FactorAnswer {
    /// Name.
    pub factor: String,
    /// Changes from one value to the next.
    pub observations: usize,
    /// The diffusion taken; none where none can be.
    pub chosen: Option<&'static str>,
    /// In the log.
    pub geometric: Option<GeometricFit>,
    /// In the log.
    pub reverting_log: Option<RevertingFit>,
    /// In the level.
    pub reverting_level: Option<RevertingFit>,
    /// What speaks for the choice.
    pub evidence: EvidenceAnswer,
    /// Why a diffusion was not fitted.
    pub refused: RefusedAnswer,
}

/// The evidence.
#[derive(Debug, Clone, PartialEq, Serialize)]
pub struct EvidenceAnswer {
    /// Test of a random walk.
    pub dickey_fuller: Option<DickeyFuller>,
    /// Spread by span.
    pub variance_ratios: Vec<VarianceRatio>,
    /// Fitted speed, uncorrected, x years.
    pub speed_times_years: Option<f64>,
    /// In a sentence.
    pub judgement: String,
}

/// Refusals in words; none where the diffusion was fitted.
#[derive(Debug, Clone, PartialEq, Serialize)]
pub struct RefusedAnswer {
    /// Of the geometric diffusion.
    pub geometric: Option<String>,
    /// Of the reverting one of the log.
    pub reverting_log: Option<String>,
    /// Of the reverting one of the level.
    pub reverting_level: Option<String>,
}

/// The correlation of the Brownian motions.
#[derive(Debug, Clone, PartialEq, Serialize)]
pub struct CorrelationAnswer {
    /// n factors.
    pub factors: Vec<String>,
    /// n rows of n.
    pub matrix: Vec<Vec<f64>>,
    /// How it was estimated.
    pub estimator: &'static str,
    /// Weight of the target; none where nothing is shrunk.
    pub shrinkage: Option<f64>,
    /// Of the matrix.
    pub smallest_eigenvalue: f64,
}

impl FitAnswer {
    /// The answer for a fit, with everything to be told.
    pub fn of(fit: &Fit, notices: Vec<Notice>) -> Self {
        Self {
            observations: fit.observations,
            from: fit.dates.0,
            to: fit.dates.1,
            row_days: fit.spacing.row_days(),
            factors: fit.factors.iter().map(FactorAnswer::of).collect(),
            correlation: fit.correlation.as_ref().map(CorrelationAnswer::of),
            notices,
        }
    }
}

impl FactorAnswer {
    fn of(fit: &FactorFit) -> Self {
        fn words<T>(fitted: &Result<T, Refusal>) -> Option<String> {
            fitted.as_ref().err().map(Refusal::to_string)
        }
        Self {
            factor: fit.name.clone(),
            observations: fit.observations,
            chosen: fit.chosen.map(|kind| kind.word()),
            geometric: fit.geometric.ok(),
            reverting_log: fit.reverting_log.ok(),
            reverting_level: fit.reverting_level.ok(),
            evidence: EvidenceAnswer::of(fit.evidence.as_ref(), &fit.judgement),
            refused: RefusedAnswer {
                geometric: words(&fit.geometric),
                reverting_log: words(&fit.reverting_log),
                reverting_level: words(&fit.reverting_level),
            },
        }
    }
}

impl EvidenceAnswer {
    fn of(evidence: Option<&Evidence>, judgement: &str) -> Self {
        Self {
            dickey_fuller: evidence.and_then(|evidence| evidence.dickey_fuller),
            variance_ratios: evidence.map(|evidence| evidence.variance_ratios.clone()).unwrap_or_default(),
            speed_times_years: evidence.and_then(|evidence| evidence.speed_times_years),
            judgement: judgement.to_owned(),
        }
    }
}

impl CorrelationAnswer {
    fn of(fitted: &FittedCorrelation) -> Self {
        let rows = fitted.cells.chunks(fitted.factors.len().max(1));
        Self {
            factors: fitted.factors.clone(),
            matrix: rows.map(<[f64]>::to_vec).collect(),
            estimator: fitted.estimator.word(),
            shrinkage: fitted.shrinkage,
            smallest_eigenvalue: fitted.smallest_eigenvalue,
        }
    }
}
