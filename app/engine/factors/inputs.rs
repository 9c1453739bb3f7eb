//! Inputs as data: what the files and the window say, before it is checked as a whole.

use crate::book::{Description, Exposure, Holding, LevelUnit};
use serde::{Deserialize, Serialize};

/// One row of `factors.csv`.
#[derive(Debug, Clone, PartialEq, Serialize, Deserialize)]
pub struct FactorRow {
    /// Name of the factor.
    pub name: String,
    /// Level today, in the factor's own units.
    pub level: Option<f64>,
    /// What 1.00 of the level is.
    pub unit: Option<LevelUnit>,
    /// Diffusion and its parameters.
    pub description: Description,
    /// Line in the file it came from.
    pub line: Option<usize>,
}

/// `correlation.csv`: well-formed, symmetric and unit-diagonal, but not yet known to be semi-definite.
#[derive(Debug, Clone, PartialEq, Serialize, Deserialize)]
pub struct CorrelationTable {
    /// Factor names, n of them.
    pub names: Vec<String>,
    /// n x n, row per factor, both triangles filled.
    pub cells: Vec<f64>,
    /// Line of each factor's row in the file it came from; empty when it came from none.
    pub lines: Vec<usize>,
}

/// Labels of the files that the rows came from, for the places of faults; empty for what was typed in the window.
#[derive(Debug, Clone, PartialEq, Eq, Default, Serialize, Deserialize)]
pub struct FileLabels {
    /// Of the holdings.
    pub positions: String,
    /// Of the sensitivities.
    pub exposures: String,
    /// Of the factors.
    pub factors: String,
    /// Of the correlation.
    pub correlation: String,
}

/// Everything that makes a model, by content.
#[derive(Debug, Clone, PartialEq, Default, Serialize, Deserialize)]
pub struct Inputs {
    /// Rows of `positions.csv`.
    pub holdings: Vec<Holding>,
    /// Rows of `exposures.csv`.
    pub exposures: Vec<Exposure>,
    /// Rows of `factors.csv`.
    pub factors: Vec<FactorRow>,
    /// `correlation.csv`, where there is one.
    pub correlation: Option<CorrelationTable>,
    /// Where the rows came from.
    pub files: FileLabels,
}
