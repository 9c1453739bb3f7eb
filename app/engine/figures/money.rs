//! Amounts of one book in words: in the book's size, with the digits that their error allows, in per cent of its base.

use super::amounts::{Scale, decimals_for, grouped, percent};
use crate::factors::Model;
use crate::measures::reading::LossRow;

/// How amounts of a book are written.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Money<'a> {
    /// What they are counted in.
    pub scale: Scale,
    /// Currency, where money has a name.
    pub currency: Option<&'a str>,
    /// Base of percentages, money; none where there is no positive one.
    pub base: Option<f64>,
}

impl<'a> Money<'a> {
    /// For a model's book; `base` is its capital.
    pub fn of(model: &'a Model, base: Option<f64>) -> Self {
        let largest =
            model.holdings.iter().fold(model.value.abs(), |most, holding| most.max(holding.value.abs()));
        Self { scale: Scale::for_amounts_up_to(largest), currency: model.currency.as_deref(), base }
    }

    /// "EUR m", "EUR", or nothing.
    pub fn unit(&self) -> String {
        self.scale.unit(self.currency)
    }

    /// An amount with as many digits as its range allows.
    pub fn figure(&self, money: f64, error_money: f64) -> String {
        self.scale.figure(money, self.decimals(money, error_money))
    }

    /// "EUR 4.63 m".
    pub fn amount(&self, money: f64, error_money: f64) -> String {
        let parts = [self.currency.unwrap_or(""), &self.figure(money, error_money), self.scale.word];
        parts.into_iter().filter(|part| !part.is_empty()).collect::<Vec<_>>().join(" ")
    }

    /// An amount with its sign, `+` too.
    pub fn change(&self, money: f64, error_money: f64) -> String {
        signed(money, self.figure(money, error_money))
    }

    /// An amount in per cent of the base.
    pub fn share(&self, money: f64, error_money: f64) -> Option<String> {
        let base = self.base?;
        Some(percent(money / base, percent_decimals(money / base, error_money / base)))
    }

    /// "4.59–4.67"; an end that the sample can't give is said to be missing.
    pub fn range(&self, low: Option<f64>, high: Option<f64>, error_money: f64) -> Option<String> {
        let figure = |money: f64| self.figure(money, error_money);
        match (low, high) {
            (Some(low), Some(high)) if low >= 0.0 => Some(format!("{}\u{2013}{}", figure(low), figure(high))),
            (Some(low), Some(high)) => Some(format!("{} to {}", figure(low), figure(high))),
            (Some(low), None) => Some(format!("{} to no upper end", figure(low))),
            (None, Some(high)) => Some(format!("no lower end to {}", figure(high))),
            (None, None) => None,
        }
    }

    /// Digits of an amount: as its error allows, or three significant ones where it has none.
    fn decimals(&self, money: f64, error_money: f64) -> usize {
        let error = if error_money > 0.0 { error_money } else { money.abs() / 100.0 };
        self.scale.decimals(error).min(if self.scale.size > 1.0 { 4 } else { 2 })
    }
}

/// Half the width of a range, money; 0 where an end is missing.
pub fn half_range(low: Option<f64>, high: Option<f64>) -> f64 {
    low.zip(high).map_or(0.0, |(low, high)| (high - low) / 2.0)
}

/// A figure with `+` before it where it is a gain.
pub fn signed(value: f64, figure: String) -> String {
    if value > 0.0 { format!("+{figure}") } else { figure }
}

/// A confidence in per cent: `97.5 %`.
pub fn confidence_words(confidence: f64) -> String {
    let text = grouped(confidence * 100.0, 4);
    format!("{} %", text.trim_end_matches('0').trim_end_matches('.'))
}

/// The row of a reading at a confidence, or the nearest to it.
pub fn row_at(rows: &[LossRow], confidence: f64) -> Option<&LossRow> {
    let distance = |row: &LossRow| (row.confidence - confidence).abs();
    rows.iter().min_by(|a, b| distance(a).total_cmp(&distance(b)))
}

fn percent_decimals(fraction: f64, error: f64) -> usize {
    let error = if error > 0.0 { error } else { fraction.abs() / 100.0 };
    decimals_for(error * 100.0).clamp(1, 2)
}
