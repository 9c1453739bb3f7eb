//! The answer of `ebbmark read`, field by field in the order of the README. Serialises itself; computes nothing.

use ebbmark_engine::measures::ParameterRange;
use ebbmark_engine::measures::reading::{DrawdownReading, LimitReading, LossRow, MomentsReading};
use ebbmark_engine::tables::Notice;
use jiff::civil::Date;
use serde::Serialize;

/// A whole answer. Money is money of the book's currency, losses and drawdowns are positive.
#[derive(Debug, Clone, PartialEq, Serialize)]
pub struct Answer {
    /// The book and the base of its percentages.
    pub book: BookAnswer,
    /// How far ahead.
    pub horizon: HorizonAnswer,
    /// How it was simulated.
    pub run: RunAnswer,
    /// Moments of the book's value at the horizon.
    pub moments: MomentsReading,
    /// One row a confidence, ascending.
    pub loss: Vec<LossRow>,
    /// Range that the fit's own errors leave; none where it was not asked for.
    pub parameter_range: Option<ParameterRange>,
    /// Largest fall from a running peak.
    pub drawdown: DrawdownReading,
    /// With a loss limit.
    pub limit: Option<LimitReading>,
    /// Limits held against the figures; none are read yet.
    pub limits: [Unavailable; 0],
    /// What each holding adds; not told yet.
    pub contributions: [Unavailable; 0],
    /// What each group, factor and currency adds; not told yet.
    pub contributions_by: ContributionsBy,
    /// Everything worth telling beside the figures.
    pub notices: Vec<Notice>,
}

/// The book.
#[derive(Debug, Clone, PartialEq, Serialize)]
pub struct BookAnswer {
    /// Stem of the positions file.
    pub name: String,
    /// ISO code; none where money has no currency name.
    pub currency: Option<String>,
    /// Value today.
    pub value: f64,
    /// Date of the prices.
    pub as_of: Option<Date>,
    /// Base of every percentage; none where today's value is not positive and no capital is given.
    pub capital: Option<f64>,
    /// Against what it is read; always `absolute` for now.
    pub read_as: &'static str,
}

/// The horizon.
#[derive(Debug, Clone, PartialEq, Serialize)]
pub struct HorizonAnswer {
    /// Trading days.
    pub days: u32,
    /// Trading days over trading days a year.
    pub years: f64,
    /// The day it falls on, where the date of the prices is known.
    pub date: Option<Date>,
}

/// The run.
#[derive(Debug, Clone, PartialEq, Serialize)]
pub struct RunAnswer {
    /// Number of paths.
    pub paths: usize,
    /// Seed of the random numbers.
    pub seed: u64,
    /// Daily steps to the horizon.
    pub steps: u32,
    /// How paths are drawn; always `plain` for now.
    pub sampling: &'static str,
    /// Time the run took. The only figure that may differ between two equal calls.
    pub seconds: f64,
}

/// Lists of contributions.
#[derive(Debug, Clone, PartialEq, Default, Serialize)]
pub struct ContributionsBy {
    /// By group.
    pub group: [Unavailable; 0],
    /// By risk factor.
    pub factor: [Unavailable; 0],
    /// By currency.
    pub currency: [Unavailable; 0],
}

/// A figure that this version never has: its lists are empty and its fields null.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Serialize)]
pub enum Unavailable {}
