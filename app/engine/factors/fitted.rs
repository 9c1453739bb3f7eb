//! What a history gives a book: figures for what nobody typed. How they were fitted is the fit's business; that what is
//! typed stands above them is the model's.

use super::{CorrelationTable, Diffusion, RiskFactor};
use crate::book::{DiffusionKind, HalfLife};
use crate::tables::Notice;
use jiff::civil::Date;
use serde::{Deserialize, Serialize};

/// Everything that a history gives a book.
#[derive(Debug, Clone, PartialEq, Serialize, Deserialize)]
pub struct Fitted {
    /// Label of the history.
    pub label: String,
    /// First and last date used.
    pub dates: (Date, Date),
    /// How the correlation was estimated, in words.
    pub estimator: String,
    /// Names of the history's columns, whether the book needs them or not; currency rates among them tell its currency.
    pub columns: Vec<String>,
    /// Factors of the book that the history has, named as the book needs them.
    pub factors: Vec<FittedFactor>,
    /// Correlations of the Brownian motions behind them, already valid.
    pub correlation: Option<CorrelationTable>,
    /// What is worth telling about them.
    pub notices: Vec<Notice>,
}

/// What a history gives one factor.
#[derive(Debug, Clone, PartialEq, Serialize, Deserialize)]
pub struct FittedFactor {
    /// Name, as the book needs it.
    pub name: String,
    /// Last level of the history.
    pub level: f64,
    /// First and last date of its values.
    pub dates: (Date, Date),
    /// Number of changes it was fitted to.
    pub observations: usize,
    /// The chosen diffusion with its parameters; none where it was refused.
    pub diffusion: Option<Diffusion>,
}

/// Which history stands behind a model's fitted figures.
#[derive(Debug, Clone, PartialEq)]
pub struct HistorySource {
    /// Label of the history.
    pub label: String,
    /// First and last date used.
    pub dates: (Date, Date),
    /// How the correlation was estimated, in words; none where all of it is typed.
    pub estimator: Option<String>,
}

/// Where a parameter came from.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Default, Serialize, Deserialize)]
pub enum Origin {
    /// Typed, in a file or in the window.
    Typed,
    /// Fitted to the history.
    Fitted,
    /// Neither: what is usual, such as no drift.
    #[default]
    Usual,
}

/// Where each figure of a factor came from.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Default, Serialize, Deserialize)]
pub struct Origins {
    /// Level today.
    pub level: Origin,
    /// Which diffusion.
    pub diffusion: Origin,
    /// Drift of a geometric factor.
    pub drift: Origin,
    /// Volatility.
    pub volatility: Origin,
    /// Long-run level.
    pub long_run: Origin,
    /// Half-life.
    pub half_life: Origin,
}

/// What the inputs say of a factor before anything is fitted: what a fit has to leave alone.
#[derive(Debug, Clone, PartialEq)]
pub struct TypedFactor {
    /// Name, as the book needs it.
    pub name: String,
    /// The diffusion typed, or the usual one where any of its parameters is typed; none where the history decides.
    pub diffusion: Option<DiffusionKind>,
    /// Half-life, where it is typed.
    pub half_life: Option<HalfLife>,
}

impl Fitted {
    /// What the history gives a factor.
    pub fn factor(&self, name: &str) -> Option<&FittedFactor> {
        self.factors.iter().find(|factor| factor.name == name)
    }

    /// Itself in short, for a model of these factors; the correlation counts where the typed one leaves a pair to it.
    pub(super) fn source(&self, factors: &[RiskFactor], typed: Option<&CorrelationTable>) -> HistorySource {
        let is_typed = |name: &String| typed.is_some_and(|table| table.names.contains(name));
        let fitted = self.correlation.as_ref().map_or([].as_slice(), |table| table.names.as_slice());
        let is_left = |factor: &RiskFactor| fitted.contains(&factor.name) && !is_typed(&factor.name);
        let has_pair = fitted.len() > 1 && factors.iter().any(is_left);
        let estimator = has_pair.then(|| self.estimator.clone());
        HistorySource { label: self.label.clone(), dates: self.dates, estimator }
    }
}

impl Origins {
    /// Whether any figure was fitted to a history, other than its level.
    pub fn has_fitted(&self) -> bool {
        [self.diffusion, self.drift, self.volatility, self.long_run, self.half_life].contains(&Origin::Fitted)
    }
}
