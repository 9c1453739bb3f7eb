//! What an edit sets, one value each. How it is written into the inputs lives in `session::edits`.

use ebbmark_engine::book::{HalfLife, Kind, LevelUnit};
use ebbmark_engine::fit::{DriftChoice, Estimator, Missing, ModelChoice};
use ebbmark_engine::measures::{Confidence, LossFrom};
use jiff::civil::Date;

/// One figure or word of a holding.
#[derive(Debug, Clone, PartialEq)]
pub enum HoldingChange {
    /// Unique name; its sensitivities and a factor named like it follow.
    Name(String),
    /// What it is.
    Kind(Kind),
    /// Signed quantity.
    Quantity(f64),
    /// Price, level or value today; `level` rows that share a factor share it.
    Price(f64),
    /// Group, `/` nests.
    Group(String),
    /// ISO code; none for the book's currency.
    Currency(Option<String>),
    /// Factor that drives it; none for its own.
    Factor(Option<String>),
    /// Contract size.
    Multiplier(f64),
    /// Unit of its level.
    Unit(Option<LevelUnit>),
    /// Income less financing per year, as a fraction of today's value.
    Carry(f64),
}

/// One parameter of a factor. Rates are per year: fractions for log models, level units for a reverting level.
#[derive(Debug, Clone, Copy, PartialEq)]
pub enum Parameter {
    /// Level today, in the factor's own units.
    Level(f64),
    /// Geometric drift per year.
    Drift(f64),
    /// Volatility per square-root year.
    Volatility(f64),
    /// Long-run level in the factor's own units.
    LongRun(f64),
    /// Half-life in trading days, or none.
    HalfLife(HalfLife),
}

/// One setting of the fit.
#[derive(Debug, Clone, Copy, PartialEq)]
pub enum FitChange {
    /// First date used; none for the first there is.
    Since(Option<Date>),
    /// Last date used; none for the last there is.
    Until(Option<Date>),
    /// Trading days of a row; none to tell it from the dates.
    RowDays(Option<u32>),
    /// Which diffusions are chosen from.
    Model(ModelChoice),
    /// Drift that a geometric factor takes.
    Drift(DriftChoice),
    /// Estimator of the correlation.
    Estimator(Estimator),
    /// Half-life of its weights, trading days.
    WeightHalfLife(f64),
    /// Rows that a change spans: 1, 5 or 10.
    ChangeDays(u32),
    /// What is done with missing values.
    Missing(Missing),
}

/// One setting.
#[derive(Debug, Clone, PartialEq)]
pub enum SettingChange {
    /// The book's currency, an ISO code.
    BookCurrency(Option<String>),
    /// Trading days in a year.
    DaysPerYear(f64),
    /// Whether an impossible correlation matrix is taken as the nearest valid one.
    RepairsCorrelation(bool),
    /// Date of the prices.
    AsOf(Option<Date>),
    /// Base of percentages, money.
    Capital(Option<f64>),
    /// Loss limit, money.
    LossLimit(Option<f64>),
    /// What a loss is counted from.
    LossFrom(LossFrom),
    /// Confidence levels, in any order.
    Confidences(Vec<Confidence>),
    /// The confidence that every mark shows; added to the levels where it is not one of them.
    ChosenConfidence(Confidence),
    /// Paths of a run.
    Paths(usize),
    /// Seed of a run.
    Seed(u64),
    /// How far ahead the window looks, trading days.
    HorizonDays(u32),
    /// Where the reading line stands, trading days; moved to the nearest day that can be read.
    ReadingDay(u32),
}
