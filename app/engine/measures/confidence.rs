//! Confidence levels as exact decimals, so that ranks are exact.

use serde::{Deserialize, Serialize};
use std::cmp::Ordering;
use std::fmt;
use std::str::FromStr;

/// Most digits after the point of the fraction: the nearest double then reads back to the same decimal.
const MOST_DECIMALS: usize = 15;

/// A confidence in (0.5, 1), kept as the decimal it was written as: `numerator / 10^decimals`, no trailing zeros.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Hash, Serialize, Deserialize)]
#[serde(try_from = "String", into = "String")]
pub struct Confidence {
    numerator: u64,
    decimals: u32,
}

/// Why a text is no confidence.
#[derive(Debug, Clone, PartialEq, Eq, thiserror::Error)]
pub enum ConfidenceError {
    /// Not a plain decimal.
    #[error("found \"{0}\", expected a confidence such as 0.99 or 99%")]
    NotADecimal(String),
    /// A decimal outside (0.5, 1).
    #[error("found {0}, expected a confidence above 0.5 (50%) and below 1 (100%)")]
    OutOfRange(String),
    /// Too many digits.
    #[error("found {0}, expected a confidence with at most {MOST_DECIMALS} decimals")]
    TooManyDecimals(String),
}

impl Confidence {
    /// 95 %.
    pub const NINETY_FIVE: Self = Self { numerator: 95, decimals: 2 };
    /// 99 %.
    pub const NINETY_NINE: Self = Self { numerator: 99, decimals: 2 };

    /// Nearest double.
    pub fn value(self) -> f64 {
        self.numerator as f64 / self.denominator() as f64
    }

    /// `1 - c`, nearest double.
    pub fn tail(self) -> f64 {
        (self.denominator() - self.numerator) as f64 / self.denominator() as f64
    }

    /// `ceil(n c)` in whole numbers: the ascending rank of the order statistic that is the quantile of `n` values.
    pub fn rank(self, n: usize) -> usize {
        let product = n as u128 * u128::from(self.numerator);
        product.div_ceil(u128::from(self.denominator())) as usize
    }

    /// `n (1 - c)`, the number of values beyond the quantile, correctly rounded from whole numbers. Its whole part is
    /// `n - rank(n)`.
    pub fn tail_count(self, n: usize) -> f64 {
        let denominator = u128::from(self.denominator());
        let product = n as u128 * (denominator - u128::from(self.numerator));
        (product / denominator) as f64 + (product % denominator) as f64 / denominator as f64
    }

    fn denominator(self) -> u64 {
        10_u64.pow(self.decimals)
    }

    /// Shortest form of `digits` after a leading `0.`, both as they were written.
    fn from_decimals(digits: &str, text: &str) -> Result<Self, ConfidenceError> {
        let digits = digits.trim_end_matches('0');
        if digits.len() > MOST_DECIMALS {
            return Err(ConfidenceError::TooManyDecimals(text.to_owned()));
        }
        let numerator = digits.parse().unwrap_or(0);
        let confidence = Self { numerator, decimals: digits.len() as u32 };
        let is_above_half = 2 * confidence.numerator > confidence.denominator();
        if is_above_half { Ok(confidence) } else { Err(ConfidenceError::OutOfRange(text.to_owned())) }
    }
}

impl FromStr for Confidence {
    type Err = ConfidenceError;

    /// A decimal fraction (`0.975`, `.975`) or a percentage (`97.5%`, `97.5 %`).
    fn from_str(text: &str) -> Result<Self, ConfidenceError> {
        let text = text.trim();
        let (number, is_percent) = match text.strip_suffix('%') {
            Some(number) => (number.trim_end(), true),
            None => (text, false),
        };
        let (whole, decimals) = number.split_once('.').unwrap_or((number, ""));
        let are_digits = |part: &str| part.bytes().all(|byte| byte.is_ascii_digit());
        if whole.len() + decimals.len() == 0 || !are_digits(whole) || !are_digits(decimals) {
            return Err(ConfidenceError::NotADecimal(text.to_owned()));
        }
        let whole = whole.trim_start_matches('0');
        let whole_digits = if is_percent { 2 } else { 0 };
        if whole.len() > whole_digits {
            return Err(ConfidenceError::OutOfRange(text.to_owned()));
        }
        Self::from_decimals(&format!("{whole:0>whole_digits$}{decimals}"), text)
    }
}

impl fmt::Display for Confidence {
    /// In percent: `97.5 %`.
    fn fmt(&self, formatter: &mut fmt::Formatter<'_>) -> fmt::Result {
        let digits = format!("{:0>1$}", self.numerator, self.decimals as usize);
        let digits = format!("{digits:0<2}");
        let (whole, decimals) = digits.split_at(2);
        let point = if decimals.is_empty() { "" } else { "." };
        write!(formatter, "{whole}{point}{decimals} %")
    }
}

impl Ord for Confidence {
    fn cmp(&self, other: &Self) -> Ordering {
        let scaled = |of: &Self, by: &Self| u128::from(of.numerator) * u128::from(by.denominator());
        scaled(self, other).cmp(&scaled(other, self))
    }
}

impl PartialOrd for Confidence {
    fn partial_cmp(&self, other: &Self) -> Option<Ordering> {
        Some(self.cmp(other))
    }
}

impl TryFrom<String> for Confidence {
    type Error = ConfidenceError;

    fn try_from(text: String) -> Result<Self, ConfidenceError> {
        text.parse()
    }
}

impl From<Confidence> for String {
    /// The decimal fraction: `0.975`.
    fn from(confidence: Confidence) -> Self {
        format!("0.{:0>1$}", confidence.numerator, confidence.decimals as usize)
    }
}
