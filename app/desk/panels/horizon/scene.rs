//! What the Horizon view shows, gathered from the session as plain data: bands from today on, the reading at the line,
//! and the words of titles and marks. Draws nothing.

use crate::desk::readout::{Money, chosen_row, confidence_words, half_range};
use crate::desk::session::{AtLine, Session};
use ebbmark_engine::measures::reading::{DrawdownRow, LossRow};
use ebbmark_engine::measures::{Bands, LossFrom};

/// Everything that the four charts draw.
#[derive(Debug)]
pub struct Scene<'a> {
    /// How amounts are written.
    pub money: Money<'a>,
    /// Value today.
    pub today: f64,
    /// Bands, money.
    pub bands: &'a Bands,
    /// Reading and distributions at the line.
    pub at_line: &'a AtLine,
    /// Loss at the chosen confidence.
    pub loss: &'a LossRow,
    /// Largest fall at the chosen confidence.
    pub fall: Option<&'a DrawdownRow>,
    /// Loss from today that should not be passed.
    pub loss_limit: Option<f64>,
    /// Last day drawn.
    pub last_day: u32,
    /// Value that losses are counted from.
    pub loss_base: f64,
    /// Whether the figures are from before an edit that made the inputs invalid.
    pub is_before_edit: bool,
}

impl<'a> Scene<'a> {
    /// What is to be drawn; none before the first figures have arrived.
    pub fn of(session: &'a Session) -> Option<Self> {
        let live = session.live();
        let (bands, at_line) = (live.bands.as_deref()?, live.at_line.as_deref()?);
        let today = live.model.as_deref()?.value;
        let loss = chosen_row(session, at_line)?;
        let moments = &at_line.reading.moments;
        let mean = moments.mean.exact.or(moments.mean.sampled).unwrap_or(today);
        let fall = at_line.reading.drawdown.quantiles.iter().find(|row| row.confidence == loss.confidence);
        Some(Self {
            money: Money::of(session)?,
            today,
            bands,
            at_line,
            loss,
            fall,
            loss_limit: session.document().settings.loss_limit,
            last_day: session.document().settings.horizon_days,
            loss_base: if session.document().settings.loss_from == LossFrom::Mean { mean } else { today },
            is_before_edit: live.is_before_edit,
        })
    }

    /// Days and values of the bands, today first: all values are today's.
    pub fn values(&self) -> impl Iterator<Item = (f64, [f64; 7])> + '_ {
        let ahead = self.bands.days.iter().map(|day| f64::from(*day)).zip(self.bands.values.iter().copied());
        [(0.0, [self.today; 7])].into_iter().chain(ahead)
    }

    /// Days and largest falls, today first: there is none.
    pub fn falls(&self) -> impl Iterator<Item = (f64, [f64; 5])> + '_ {
        let ahead = self.bands.days.iter().map(|day| f64::from(*day)).zip(self.bands.falls.iter().copied());
        [(0.0, [0.0; 5])].into_iter().chain(ahead)
    }

    /// Value at which the chosen VaR is reached.
    pub fn var_value(&self) -> f64 {
        self.loss_base - self.loss.var
    }

    /// Value at which the chosen ES is reached.
    pub fn es_value(&self) -> f64 {
        self.loss_base - self.loss.es
    }

    /// Value at which the loss limit is reached.
    pub fn limit_value(&self) -> Option<f64> {
        self.loss_limit.map(|limit| self.today - limit)
    }

    /// Lowest and highest value that must be seen: the bands, ES, and the limit where it is not far away.
    pub fn value_range(&self) -> (f64, f64) {
        let bands = self.values().flat_map(|(_, values)| [values[0], values[6]]);
        let (low, high) = bands
            .chain([self.es_value()])
            .filter(|value| value.is_finite())
            .fold((self.today, self.today), |(low, high): (f64, f64), value| {
                (low.min(value), high.max(value))
            });
        match self.limit_value() {
            Some(limit) if limit < low && low - limit < 0.5 * (high - low) => (limit, high),
            _ => (low, high),
        }
    }

    /// Deepest fall that must be seen.
    pub fn deepest_fall(&self) -> f64 {
        let falls = self.falls().map(|(_, falls)| falls[4]).chain(self.fall.map(|fall| fall.value));
        falls.filter(|fall| fall.is_finite()).fold(f64::MIN_POSITIVE, f64::max)
    }

    /// Title of the upper chart.
    pub fn upper_title(&self) -> String {
        with_unit("Book value ahead", &self.money.unit())
    }

    /// Title of the lower chart.
    pub fn lower_title(&self) -> String {
        with_unit("Largest fall from a peak so far", &self.money.unit())
    }

    /// What the shades hold, and where the figures come from.
    pub fn legend(&self) -> &'static str {
        match (self.is_before_edit, self.at_line.paths) {
            (true, _) => "\u{26a0} from before the edit",
            (false, None) => "closed form until paths arrive",
            (false, Some(_)) if self.bands.is_closed_form => "closed form until paths arrive",
            _ => "50, 90 and 98 % of paths on each day",
        }
    }

    /// "99 % VaR 4.63".
    pub fn var_words(&self) -> String {
        let error = half_range(self.loss.var_low, self.loss.var_high);
        format!("{} VaR {}", confidence_words(self.loss.confidence), self.money.figure(self.loss.var, error))
    }

    /// "ES 5.30".
    pub fn es_words(&self) -> String {
        let error = half_range(self.loss.es_low, self.loss.es_high);
        format!("ES {}", self.money.figure(self.loss.es, error))
    }
}

fn with_unit(title: &str, unit: &str) -> String {
    if unit.is_empty() { title.to_owned() } else { format!("{title}, {unit}") }
}
