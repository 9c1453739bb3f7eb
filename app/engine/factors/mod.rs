//! What moves the book: risk factors, their diffusions and their correlation, and the checked model
//! of a book that everything after this room works on.

/// Everything typed or read that makes a model.
pub mod inputs;
/// From a table of factors to what it says about each.
pub mod read_factors;
/// From a square table to a symmetric matrix.
pub mod read_correlation;
/// A risk factor and its diffusion.
pub mod diffusion;
/// What a history gives for what nobody typed.
pub mod fitted;
/// A valid correlation matrix.
pub mod correlation;
/// The nearest valid matrix.
pub mod repair;
/// The book's value as a function of the factors' moves.
pub mod valuation;
/// The checked whole.
pub mod model;
mod currencies;
mod descriptions;
mod resolution;
mod parts;
mod pairing;

pub use correlation::{Correlation, CorrelationError};
pub use currencies::inverse_rate;
pub use diffusion::{Diffusion, RiskFactor};
pub use fitted::{Fitted, FittedFactor, HistorySource, Origin, Origins, TypedFactor};
pub use inputs::{CorrelationTable, FactorRow, FileLabels, Inputs};
pub use model::{Model, ModelHolding, ModelSettings, typed_factors};
pub use read_correlation::read_correlation;
pub use read_factors::read_factors;
pub use repair::{PairChange, Repair};
pub use valuation::{CurrencyPart, CurrencyRate, Term, Valuation};
