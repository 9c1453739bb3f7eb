//! What moves the book: risk factors, their diffusions and their correlation, and the checked model
//! of a book that everything after this room works on.

/// A valid correlation matrix.
pub mod correlation;
/// A risk factor and its diffusion.
pub mod diffusion;
/// Everything typed or read that makes a model.
pub mod inputs;
/// The checked whole.
pub mod model;
/// The book's value as a function of the factors' moves.
pub mod valuation;

pub use correlation::Correlation;
pub use diffusion::{Diffusion, RiskFactor};
pub use inputs::{CorrelationTable, FactorRow, Inputs};
pub use model::{Model, ModelHolding, ModelSettings};
pub use valuation::{CurrencyPart, CurrencyRate, Term, Valuation};
