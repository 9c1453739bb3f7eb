//! What the panels say about the reading, as text: amounts in the book's size, their ranges, the verdict on the limit.
//! Plain data from the session; draws nothing.

use crate::desk::session::{AtLine, Session};
use ebbmark_engine::figures::{Scale, grouped, percent};
use ebbmark_engine::history::date_after;
use ebbmark_engine::measures::reading::LossRow;
use jiff::civil::Date;

/// How amounts of the book shown are written.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Money<'a> {
    /// What they are counted in.
    pub scale: Scale,
    /// Currency, where money has a name.
    pub currency: Option<&'a str>,
    /// Base of percentages, money; none where there is no positive one.
    pub base: Option<f64>,
}

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

impl<'a> Money<'a> {
    /// For the book of a session; none before its first model.
    pub fn of(session: &'a Session) -> Option<Self> {
        let model = session.live().model.as_deref()?;
        let largest =
            model.holdings.iter().fold(model.value.abs(), |most, holding| most.max(holding.value.abs()));
        Some(Self {
            scale: Scale::for_amounts_up_to(largest),
            currency: model.currency.as_deref(),
            base: session.document().settings.percent_base(model.value),
        })
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

    /// "4.59 – 4.67"; an end that the sample can't give is said to be missing.
    pub fn range(&self, low: Option<f64>, high: Option<f64>, error_money: f64) -> Option<String> {
        let figure = |money: f64| self.figure(money, error_money);
        match (low, high) {
            (Some(low), Some(high)) if low >= 0.0 => {
                Some(format!("{} \u{2013} {}", figure(low), figure(high)))
            }
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

fn percent_decimals(fraction: f64, error: f64) -> usize {
    let error = if error > 0.0 { error } else { fraction.abs() / 200.0 };
    ebbmark_engine::figures::amounts::decimals_for(error * 100.0).clamp(1, 2)
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

/// The loss row of the confidence that drives every mark.
pub fn chosen_row<'a>(session: &Session, at_line: &'a AtLine) -> Option<&'a LossRow> {
    let chosen = session.document().settings.chosen_confidence.value();
    let distance = |row: &LossRow| (row.confidence - chosen).abs();
    at_line.reading.loss.iter().min_by(|a, b| distance(a).total_cmp(&distance(b)))
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
    let date = horizon_date(session, day).map(|date| {
        let weekday = if is_full { date.strftime("%a ").to_string() } else { String::new() };
        format!(", to {weekday}{}{weekdays}", date_words(date, true))
    });
    format!("{lead}{days}{}", date.unwrap_or_default())
}

/// Date of a day ahead; none where the prices have no date.
pub fn horizon_date(session: &Session, day: u32) -> Option<Date> {
    let document = session.document();
    let holidays = document.holidays.as_deref().map_or(&[][..], Vec::as_slice);
    date_after(document.settings.as_of?, day, holidays)
}
