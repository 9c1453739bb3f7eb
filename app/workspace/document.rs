//! A book with everything that decides its figures. How it is looked at lives in `view`; nothing here is computed.

use super::BookHistory;
use crate::opening::Opened;
use ebbmark_engine::factors::{Inputs, ModelSettings};
use ebbmark_engine::fit::FitSettings;
use ebbmark_engine::history::date_after;
use ebbmark_engine::measures::{Confidence, Conventions, LossFrom};
use ebbmark_engine::tables::Notice;
use jiff::civil::Date;
use std::sync::Arc;

/// Longest horizon that can be asked for, trading days.
pub const LONGEST_HORIZON_DAYS: u32 = 504;
/// Fewest paths of a run.
pub const FEWEST_PATHS: usize = 1_000;
/// Most paths of a run.
pub const MOST_PATHS: usize = 10_000_000;

/// A book and its settings. Cheap to clone: the inputs are shared until edited.
#[derive(Debug, Clone, PartialEq)]
pub struct Document {
    /// Name of the book.
    pub name: String,
    /// Holdings, exposures, factors and correlation, by content.
    pub inputs: Arc<Inputs>,
    /// Levels of its factors by date, where there are any.
    pub history: Option<BookHistory>,
    /// Holidays, ascending; none where trading days are weekdays.
    pub holidays: Option<Arc<Vec<Date>>>,
    /// Everything else that decides the figures.
    pub settings: Settings,
}

/// What is set about a book beside its inputs.
#[derive(Debug, Clone, PartialEq)]
pub struct Settings {
    /// ISO code, where the book's currency is named here.
    pub book_currency: Option<String>,
    /// Trading days in a year, above 0.
    pub days_per_year: f64,
    /// Whether an impossible correlation matrix is taken as the nearest valid one.
    pub repairs_correlation: bool,
    /// Date of the prices.
    pub as_of: Option<Date>,
    /// Base of every percentage, in money of the book's currency; today's value when none.
    pub capital: Option<f64>,
    /// Loss from today's value that should not be passed, in money of the book's currency.
    pub loss_limit: Option<f64>,
    /// What a loss is counted from.
    pub loss_from: LossFrom,
    /// Confidence levels read, ascending, at least one.
    pub confidences: Vec<Confidence>,
    /// The one of `confidences` that every mark on screen shows.
    pub chosen_confidence: Confidence,
    /// Paths of a run.
    pub paths: usize,
    /// Seed of a run.
    pub seed: u64,
    /// How far ahead the window looks, trading days; a run's last day.
    pub horizon_days: u32,
    /// Where the reading line stands, trading days, 1 to `horizon_days`: what `ebbmark read` calls the horizon.
    pub reading_day: u32,
}

impl Document {
    /// Date of the prices: the one set, else the last of the history.
    pub fn as_of(&self) -> Option<Date> {
        self.settings.as_of.or_else(|| self.history.as_ref()?.last_date())
    }

    /// Date of a day ahead; none where the prices have no date.
    pub fn date_of(&self, day: u32) -> Option<Date> {
        let holidays = self.holidays.as_deref().map_or([].as_slice(), Vec::as_slice);
        date_after(self.as_of()?, day, holidays)
    }

    /// A book as it was opened, and what its readers want told. It has a currency, a date, capital and limit of its own;
    /// how it is read is taken over from `before`.
    pub fn of_book(book: Opened, before: &Settings) -> (Self, Vec<Notice>) {
        let Opened { name, inputs, history, holidays, book_currency, as_of, notices } = book;
        let settings = Settings {
            book_currency,
            as_of,
            capital: None,
            loss_limit: None,
            repairs_correlation: false,
            ..before.clone()
        };
        let holidays = holidays.map(Arc::new);
        let history = history.map(|history| BookHistory::of(history, FitSettings::usual()));
        (Self { name, inputs: Arc::new(inputs), history, holidays, settings }, notices)
    }
}

impl Settings {
    /// What is usual where nothing is known: a year ahead, read at a month.
    pub fn usual() -> Self {
        Self {
            book_currency: None,
            days_per_year: 252.0,
            repairs_correlation: false,
            as_of: None,
            capital: None,
            loss_limit: None,
            loss_from: LossFrom::Today,
            confidences: vec![Confidence::NINETY_FIVE, Confidence::NINETY_NINE],
            chosen_confidence: Confidence::NINETY_NINE,
            paths: 100_000,
            seed: 1,
            horizon_days: 252,
            reading_day: 21,
        }
    }

    /// How a sample is read under these settings.
    pub fn conventions(&self) -> Conventions {
        Conventions {
            confidences: self.confidences.clone(),
            loss_from: self.loss_from,
            loss_limit: self.loss_limit,
        }
    }

    /// What the model needs of these settings.
    pub fn model_settings(&self) -> ModelSettings {
        ModelSettings {
            book_currency: self.book_currency.clone(),
            days_per_year: self.days_per_year,
            repairs_correlation: self.repairs_correlation,
        }
    }

    /// Base of percentages for a book worth `value`: the capital set, else a positive value, else none.
    pub fn percent_base(&self, value: f64) -> Option<f64> {
        self.capital.or(Some(value)).filter(|base| *base > 0.0)
    }
}
