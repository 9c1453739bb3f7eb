//! How the table writes an amount: in the size of the book, with as many digits as a section's errors allow.

use super::answer::Answer;
use ebbmark_engine::figures::{Scale, percent};

/// Decimals of amounts that have no error, where they are counted in millions or more.
const DECIMALS_WITHOUT_ERROR: usize = 3;

/// Writes the amounts of one section.
#[derive(Debug, Clone)]
pub(super) struct Writer {
    scale: Scale,
    currency: Option<String>,
    capital: Option<f64>,
    decimals: usize,
}

impl Writer {
    /// In the size of the largest amount that matters: the book, or what it may lose.
    pub(super) fn for_answer(answer: &Answer) -> Self {
        let losses = answer.loss.iter().map(|row| row.es.abs());
        let scale = Scale::for_amounts_up_to(losses.fold(answer.book.value.abs(), f64::max));
        let currency = answer.book.currency.clone();
        Self { scale, currency, capital: answer.book.capital, decimals: 0 }.within(std::iter::empty())
    }

    /// With the digits that the smallest of these errors, in money, allows.
    pub(super) fn within(&self, errors: impl Iterator<Item = f64>) -> Self {
        let smallest = errors.filter(|error| *error > 0.0).fold(f64::INFINITY, f64::min);
        let decimals = if smallest.is_finite() {
            self.scale.decimals(smallest)
        } else if self.scale.size > 1.0 {
            DECIMALS_WITHOUT_ERROR
        } else {
            0
        };
        Self { decimals, ..self.clone() }
    }

    /// An amount without its unit.
    pub(super) fn money(&self, money: f64) -> String {
        self.scale.figure(money, self.decimals)
    }

    /// An amount with its unit: `EUR 4.88 m`.
    pub(super) fn with_unit(&self, money: f64) -> String {
        let currency = self.currency.as_deref().unwrap_or_default();
        format!("{currency} {} {}", self.money(money), self.scale.word).trim().to_owned()
    }

    /// A loss; a negative one is a gain and called so.
    pub(super) fn loss(&self, money: f64) -> String {
        let figure = self.money(money);
        if figure.starts_with('-') { format!("{figure} (gain)") } else { figure }
    }

    /// A range, an open end in words.
    pub(super) fn range(&self, low: Option<f64>, high: Option<f64>) -> String {
        match (low, high) {
            (Some(low), Some(high)) => format!("{} to {}", self.money(low), self.money(high)),
            (Some(low), None) => format!("from {}, no upper end (too few paths)", self.money(low)),
            (None, Some(high)) => format!("to {}, no lower end (too few paths)", self.money(high)),
            (None, None) => "no range (too few paths)".into(),
        }
    }

    /// One standard error.
    pub(super) fn error(&self, error: Option<f64>) -> String {
        error.map_or("no error (too few paths)".into(), |error| format!("± {}", self.money(error)))
    }

    /// An amount in percent of the capital; empty where there is no base.
    pub(super) fn of_capital(&self, money: f64) -> String {
        self.capital.map_or(String::new(), |capital| percent(money / capital, 2))
    }

    /// A title with the unit of the amounts below it.
    pub(super) fn titled(&self, title: &str) -> String {
        let unit = self.scale.unit(self.currency.as_deref());
        if unit.is_empty() { title.to_owned() } else { format!("{title}, {unit}") }
    }

    /// The first row of a section: title with unit, the spread's name, and percent of the capital where there is one.
    pub(super) fn head(&self, title: &str, spread: &str) -> Vec<String> {
        let of_capital = if self.capital.is_some() { "of capital" } else { "" };
        vec![self.titled(title), String::new(), spread.to_owned(), of_capital.to_owned()]
    }
}
