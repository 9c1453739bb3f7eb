//! What the panels say about the reading, as text: amounts in the book's size, their ranges, the verdict on the limit.
//! Plain data from the session; draws nothing.

use crate::desk::session::{AtLine, Session};
use crate::workspace::Document;
use ebbmark_engine::factors::Model;
pub use ebbmark_engine::figures::{Money, confidence_words, half_range, signed};
use ebbmark_engine::figures::{Subject, row_at};
use ebbmark_engine::measures::Bands;
use ebbmark_engine::measures::reading::LossRow;
use jiff::civil::Date;

/// Where the loss limit stands against a range.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum Verdict {
    /// The whole range lies within the limit.
    Inside,
    /// The whole range lies beyond it.
    Outside,
    /// The limit lies in the range.
    Undecided,
}

/// How amounts of the book shown are written; none before its first model.
pub fn money_of(session: &Session) -> Option<Money<'_>> {
    let model = session.live().model.as_deref()?;
    Some(Money::of(model, session.document().settings.percent_base(model.value)))
}

/// The loss row of the confidence that drives every mark.
pub fn chosen_row<'a>(session: &Session, at_line: &'a AtLine) -> Option<&'a LossRow> {
    row_at(&at_line.reading.loss, session.document().settings.chosen_confidence.value())
}

/// What the charts of a document are drawn from.
pub fn subject<'a>(
    document: &'a Document,
    model: &'a Model,
    bands: &'a Bands,
    at_line: &'a AtLine,
) -> Subject<'a> {
    let settings = &document.settings;
    Subject {
        book: &document.name,
        model,
        base: settings.percent_base(model.value),
        as_of: document.as_of(),
        date: document.date_of(at_line.day),
        has_holidays: document.holidays.is_some(),
        bands,
        last_day: settings.horizon_days,
        day: at_line.day,
        reading: &at_line.reading,
        values: &at_line.values,
        falls: &at_line.falls,
        confidence: settings.chosen_confidence.value(),
        loss_from: at_line.conventions.loss_from,
        loss_limit: at_line.conventions.loss_limit,
        paths: at_line.paths,
        seed: settings.seed,
    }
}

/// The limit against a loss and its range; by the loss alone where there is no range.
pub fn verdict(row: &LossRow, limit: f64) -> Verdict {
    let (low, high) = match (row.var_low, row.var_high) {
        (None, None) => (row.var, row.var),
        (low, high) => (low.unwrap_or(f64::NEG_INFINITY), high.unwrap_or(f64::INFINITY)),
    };
    match limit {
        limit if high <= limit => Verdict::Inside,
        limit if low > limit => Verdict::Outside,
        _ => Verdict::Undecided,
    }
}

impl Verdict {
    /// In a word.
    pub fn word(self) -> &'static str {
        match self {
            Self::Inside => "inside",
            Self::Outside => "outside",
            Self::Undecided => "undecided",
        }
    }
}

/// "30 Nov 2026", without the year where there is less room.
pub fn date_words(date: Date, has_year: bool) -> String {
    date.strftime(if has_year { "%-d %b %Y" } else { "%-d %b" }).to_string()
}

/// "Read at 21 trading days, to Tue 29 Dec 2026", or "21 trading days, to 29 Dec 2026" where there is less room.
pub fn reading_words(session: &Session, is_full: bool) -> String {
    let day = session.reading_day();
    let days = if day == 1 { "1 trading day".to_owned() } else { format!("{day} trading days") };
    let lead = if is_full { "Read at " } else { "" };
    let weekdays = if session.document().holidays.is_none() { " (weekdays)" } else { "" };
    let date = session.document().date_of(day).map(|date| {
        let weekday = if is_full { date.strftime("%a ").to_string() } else { String::new() };
        format!(", to {weekday}{}{weekdays}", date_words(date, true))
    });
    format!("{lead}{days}{}", date.unwrap_or_default())
}
