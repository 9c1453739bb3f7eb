//! What moves the book: risk factors, their diffusions and their correlation, and the checked model
//! of a book that everything after this room works on.

/// Everything typed or read that makes a model.
pub mod inputs;
/// A risk factor and its diffusion.
pub mod diffusion;
/// A valid correlation matrix.
pub mod correlation;
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
pub use diffusion::{Diffusion, RiskFactor};
pub use inputs::{CorrelationTable, FactorRow, FileLabels, Inputs};
pub use model::{Model, ModelHolding, ModelSettings};
pub use valuation::{CurrencyPart, CurrencyRate, Term, Valuation};
