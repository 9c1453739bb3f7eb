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

impl Valuation {
    /// The book as the sum of its holdings' parts: currencies in order of first appearance.
    pub(super) fn sum<'a>(parts: impl IntoIterator<Item = &'a CurrencyPart>) -> Self {
        let mut sum = Self { parts: Vec::new() };
        for part in parts {
            match sum.parts.iter_mut().find(|known| known.rate == part.rate) {
                Some(known) => known.add(part),
                None => sum.parts.push(part.clone()),
            }
        }
        sum
    }

    /// Value `years` from today after these moves `x`, one a factor; `is_log` tells which factors are log factors.
    pub fn value(&self, is_log: &[bool], moves: &[f64], years: f64) -> f64 {
        let growth = |factor: usize| if is_log[factor] { moves[factor].exp() } else { moves[factor] };
        self.parts.iter().fold(0.0, |value, part| {
            let rate = part.rate.map_or(1.0, |rate| {
                if is_log[rate.factor] {
                    rate.today * growth(rate.factor)
                } else {
                    rate.today + moves[rate.factor]
                }
            });
            let still = part.income_per_year.mul_add(years, part.constant);
            let local = part.terms.iter().fold(still, |sum, term| sum + term.weight * growth(term.factor));
            rate.mul_add(local, value)
        })
    }
}

impl CurrencyPart {
    pub(super) fn add(&mut self, other: &Self) {
        self.constant += other.constant;
        self.income_per_year += other.income_per_year;
        for term in &other.terms {
            match self.terms.binary_search_by_key(&term.factor, |known| known.factor) {
                Ok(at) => self.terms[at].weight += term.weight,
                Err(at) => self.terms.insert(at, *term),
            }
        }
    }
}
