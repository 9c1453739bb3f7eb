//! The book's value as a function of the factors' moves: bilinear, currency by currency.
//!
//! With `x_j` the move of factor j's modelled variable since today (`ln S/S_0`, or `X - X_0`) and
//! `y_j = exp(x_j)` for a log factor, `y_j = x_j` for a level factor,
//!
//! ```text
//! V(t) = sum over currencies c of  G_c (constant_c + income_c t + sum_j weight_cj y_j)
//! G_c  = 1                for the book's own currency
//!        rate_today y_c   where the currency's rate is a log factor
//!        rate_today + x_c where it is a level factor
//! ```

/// A currency's rate.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct CurrencyRate {
    /// Index of the factor that is the rate.
    pub factor: usize,
    /// Money of the book's currency for one unit, today.
    pub today: f64,
}

/// `weight x y_factor` in money of the part's currency.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Term {
    /// Index of the factor.
    pub factor: usize,
    /// Money per unit of `y`.
    pub weight: f64,
}

/// Everything that is held in one currency.
#[derive(Debug, Clone, PartialEq)]
pub struct CurrencyPart {
    /// Rate; none for the book's own currency.
    pub rate: Option<CurrencyRate>,
    /// Money of this currency that no factor moves.
    pub constant: f64,
    /// Carry per year, money of this currency.
    pub income_per_year: f64,
    /// What factors move: at most one term a factor, factors ascending.
    pub terms: Vec<Term>,
}

/// The whole book: one part a currency, in order of first appearance.
#[derive(Debug, Clone, PartialEq)]
pub struct Valuation {
    /// Parts.
    pub parts: Vec<CurrencyPart>,
}
