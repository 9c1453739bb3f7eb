//! The checked model of a book: holdings with their values, factors in order, correlation, valuation.

use super::{Correlation, CurrencyPart, RiskFactor, Valuation};
use crate::tables::Notice;

/// What the caller sets about a model beside its inputs.
#[derive(Debug, Clone, PartialEq)]
pub struct ModelSettings {
    /// The book's currency, where the caller names it.
    pub book_currency: Option<String>,
    /// Trading days in a year.
    pub days_per_year: f64,
}

/// A holding of a model.
#[derive(Debug, Clone, PartialEq)]
pub struct ModelHolding {
    /// Name.
    pub name: String,
    /// Group, `/` nests.
    pub group: String,
    /// ISO code; none where money has no currency name.
    pub currency: Option<String>,
    /// Value today in the book's currency.
    pub value: f64,
    /// What it adds to the book: a part of its own, in its currency.
    pub part: CurrencyPart,
}

/// Everything the simulation and the measures need, valid as a whole.
#[derive(Debug, Clone, PartialEq)]
pub struct Model {
    /// ISO code of the book's currency; none where money has no name.
    pub currency: Option<String>,
    /// Trading days in a year.
    pub days_per_year: f64,
    /// In order of first appearance.
    pub factors: Vec<RiskFactor>,
    /// Of the factors' Brownian motions, in the factors' order.
    pub correlation: Correlation,
    /// In order of the positions.
    pub holdings: Vec<ModelHolding>,
    /// The book's value as a function of the factors' moves.
    pub valuation: Valuation,
    /// The book's value today.
    pub value: f64,
    /// What is worth telling about it.
    pub notices: Vec<Notice>,
}
