//! What a book's charts are made of: bands, the reading at one day, the distributions there, and how amounts are written.

use super::money::{confidence_words, half_range, row_at};
use super::{Money, Span};
use crate::factors::Model;
use crate::measures::reading::{DrawdownRow, LossRow};
use crate::measures::{Bands, Density, LossFrom, Reading};
use jiff::civil::Date;

/// Air above and below what is drawn, a share of its length.
const AIR: f64 = 0.06;
/// A limit is drawn where it lies no further below the bands than this share of their width.
const LIMIT_REACH: f64 = 0.5;

/// A book at one reading line.
#[derive(Debug, Clone, Copy)]
pub struct Subject<'a> {
    /// What the book is called.
    pub book: &'a str,
    /// Its model.
    pub model: &'a Model,
    /// Base of percentages, money; none where there is no positive one.
    pub base: Option<f64>,
    /// Date of the prices.
    pub as_of: Option<Date>,
    /// Date of the day read.
    pub date: Option<Date>,
    /// Whether the dates know holidays.
    pub has_holidays: bool,
    /// Bands ahead.
    pub bands: &'a Bands,
    /// Last day drawn.
    pub last_day: u32,
    /// Day read.
    pub day: u32,
    /// The reading there.
    pub reading: &'a Reading,
    /// Distribution of the value there.
    pub values: &'a Density,
    /// Distribution of the largest fall up to there.
    pub falls: &'a Density,
    /// The confidence that drives every mark.
    pub confidence: f64,
    /// What a loss is counted from.
    pub loss_from: LossFrom,
    /// Loss from today that should not be passed, money.
    pub loss_limit: Option<f64>,
    /// Paths behind the figures; none for the closed form.
    pub paths: Option<usize>,
    /// Seed of the paths.
    pub seed: u64,
}

impl<'a> Subject<'a> {
    /// How its amounts are written.
    pub fn money(&self) -> Money<'a> {
        Money::of(self.model, self.base)
    }

    /// Value today.
    pub fn today(&self) -> f64 {
        self.model.value
    }

    /// The chosen confidence's loss.
    pub fn loss(&self) -> Option<&'a LossRow> {
        row_at(&self.reading.loss, self.confidence)
    }

    /// The chosen confidence's largest fall.
    pub fn fall(&self) -> Option<&'a DrawdownRow> {
        let chosen = self.loss()?.confidence;
        self.reading.drawdown.quantiles.iter().find(|row| row.confidence == chosen)
    }

    /// Value that losses are counted from.
    pub fn loss_base(&self) -> f64 {
        let mean = &self.reading.moments.mean;
        match self.loss_from {
            LossFrom::Today => self.today(),
            LossFrom::Mean => mean.exact.or(mean.sampled).unwrap_or(self.today()),
        }
    }

    /// Value at which the chosen VaR and ES are reached.
    pub fn tail_values(&self) -> Option<[f64; 2]> {
        self.loss().map(|loss| [self.loss_base() - loss.var, self.loss_base() - loss.es])
    }

    /// Value at which the loss limit is reached.
    pub fn limit_value(&self) -> Option<f64> {
        self.loss_limit.map(|limit| self.today() - limit)
    }

    /// Days and values of the bands, today first: all values are today's.
    pub fn value_rows(&self) -> impl Iterator<Item = (f64, [f64; 7])> + 'a {
        let ahead = self.bands.days.iter().map(|day| f64::from(*day)).zip(self.bands.values.iter().copied());
        [(0.0, [self.today(); 7])].into_iter().chain(ahead)
    }

    /// Days and largest falls, today first: there is none.
    pub fn fall_rows(&self) -> impl Iterator<Item = (f64, [f64; 5])> + 'a {
        let ahead = self.bands.days.iter().map(|day| f64::from(*day)).zip(self.bands.falls.iter().copied());
        [(0.0, [0.0; 5])].into_iter().chain(ahead)
    }

    /// Lowest and highest value that must be seen: the bands, ES, and the limit where it is not far away.
    pub fn value_range(&self) -> (f64, f64) {
        let bands = self.value_rows().flat_map(|(_, values)| [values[0], values[6]]);
        let (low, high) = bands
            .chain(self.tail_values().map(|[_, es]| es))
            .filter(|value| value.is_finite())
            .fold((self.today(), self.today()), |(low, high): (f64, f64), value| {
                (low.min(value), high.max(value))
            });
        match self.limit_value() {
            Some(limit) if limit < low && low - limit < LIMIT_REACH * (high - low) => (limit, high),
            _ => (low, high),
        }
    }

    /// Deepest fall that must be seen.
    pub fn deepest_fall(&self) -> f64 {
        let falls = self.fall_rows().map(|(_, falls)| falls[4]).chain(self.fall().map(|fall| fall.value));
        falls.filter(|fall| fall.is_finite()).fold(f64::MIN_POSITIVE, f64::max)
    }

    /// The value axis of a page.
    pub fn value_span(&self) -> Span {
        let (low, high) = self.value_range();
        Span::new(low, high).with_air(AIR)
    }

    /// The axis of falls of a page: downwards from zero.
    pub fn fall_span(&self) -> Span {
        Span::new(self.deepest_fall() * (1.0 + AIR), 0.0)
    }

    /// "99 % VaR 4.63".
    pub fn var_words(&self) -> String {
        self.loss().map_or_else(String::new, |loss| {
            let error = half_range(loss.var_low, loss.var_high);
            format!("{} VaR {}", confidence_words(loss.confidence), self.money().figure(loss.var, error))
        })
    }

    /// "ES 5.30".
    pub fn es_words(&self) -> String {
        self.loss().map_or_else(String::new, |loss| {
            let error = half_range(loss.es_low, loss.es_high);
            format!("ES {}", self.money().figure(loss.es, error))
        })
    }

    /// Where the figures come from, in words.
    pub fn source_words(&self) -> &'static str {
        if self.paths.is_none() || self.bands.is_closed_form {
            "closed form until paths arrive"
        } else {
            "50, 90 and 98 % of paths on each day"
        }
    }
}
