//! Whole figures for the page: panels placed, the figures in words, and a foot that says what was assumed.

use super::figure::{Figure, Place};
use super::{Room, Subject, confidence_words, days_words, fall, grouped, half_range, loss, value};
use crate::book::DiffusionKind;
use crate::measures::LossFrom;
use jiff::civil::Date;

/// The caution that stands on everything shown and exported.
pub const CAUTION: &str = "Model estimates from stated assumptions; not investment advice and not a regulatory capital \
                           figure. House policy, local rules and licensed practice come first.";

const AHEAD: Place = Place { left: 0.052, top: 0.055, right: 0.70, bottom: 0.60 };
const VALUES: Place = Place { left: 0.815, top: 0.055, right: 1.0, bottom: 0.60 };
const FALLS: Place = Place { left: 0.052, top: 0.70, right: 0.70, bottom: 0.95 };
const FALL_SIZES: Place = Place { left: 0.815, top: 0.70, right: 1.0, bottom: 0.95 };
const WHOLE: Place = Place { left: 0.0, top: 0.055, right: 1.0, bottom: 0.93 };

/// The book's value ahead with its distribution at the reading line, and below both the largest fall.
pub fn horizon_figure(subject: &Subject<'_>) -> Figure {
    let (values, falls) = (subject.value_span(), subject.fall_span());
    let (upper, lower) = (Room { across: 10, up: 9 }, Room { across: 10, up: 5 });
    Figure {
        title: format!("{}: how far its value may go", subject.book),
        subtitle: in_words(subject),
        panels: vec![
            value::ahead(subject, values, upper, AHEAD),
            value::beside(subject, values, upper, VALUES),
            fall::so_far(subject, falls, lower, FALLS),
            fall::beside(subject, falls, lower, FALL_SIZES),
        ],
        foot: foot(subject),
    }
}

/// The loss distribution at the reading line.
pub fn distribution_figure(subject: &Subject<'_>) -> Figure {
    Figure {
        title: format!("{}: loss over {}", subject.book, days_words(subject.day)),
        subtitle: in_words(subject),
        panels: vec![loss::distribution(subject, Room { across: 12, up: 6 }, WHOLE)],
        foot: foot(subject),
    }
}

/// "Over 21 trading days, to 29 Dec 2026: 99 % VaR EUR 6.84 m (9.48 % of capital), range 6.77 to 6.90; ES 7.75."
fn in_words(subject: &Subject<'_>) -> String {
    let Some(row) = subject.loss() else { return String::new() };
    let money = subject.money();
    let error = half_range(row.var_low, row.var_high);
    let to = subject.date.map_or_else(String::new, |date| format!(", to {}", date_words(date)));
    let share =
        money.share(row.var, error).map_or_else(String::new, |share| format!(" ({share} of capital)"));
    let range = money.range(row.var_low, row.var_high, error);
    let range = range.map_or_else(String::new, |range| format!(", range {range}"));
    format!(
        "Over {}{to}: {} VaR {}{share}{range}; {}",
        days_words(subject.day),
        confidence_words(row.confidence),
        money.amount(row.var, error),
        subject.es_words(),
    )
}

fn foot(subject: &Subject<'_>) -> Vec<String> {
    let of_kind = |kind: DiffusionKind| {
        subject.model.factors.iter().filter(|factor| factor.diffusion.kind() == kind).count()
    };
    let kinds = [
        (of_kind(DiffusionKind::Geometric), "geometric"),
        (of_kind(DiffusionKind::RevertingLog), "reverting on the log"),
        (of_kind(DiffusionKind::RevertingLevel), "reverting on the level"),
    ];
    let kinds: Vec<String> =
        kinds.iter().filter(|(count, _)| *count > 0).map(|(count, word)| format!("{count} {word}")).collect();
    let factors = if kinds.is_empty() {
        "no risk factor".to_owned()
    } else {
        format!("risk factors: {}", kinds.join(", "))
    };
    let paths = subject.paths.map_or_else(
        || "closed form, no paths yet".to_owned(),
        |paths| format!("{} paths, seed {}", grouped(paths as f64, 0), subject.seed),
    );
    let prices = subject.as_of.map_or_else(
        || "prices without a date".to_owned(),
        |date| {
            let days = if subject.has_holidays { "" } else { ", trading days are weekdays" };
            format!("prices of {}{days}", date_words(date))
        },
    );
    let reference = match subject.loss_from {
        LossFrom::Today => "losses count from today's value",
        LossFrom::Mean => "losses count from the expected value",
    };
    let model = format!(
        "Model: {factors}; exact joint transition, daily steps; read at {}.",
        days_words(subject.day)
    );
    let mut lines = vec![model];
    lines.extend(origins(subject));
    lines.extend([
        format!("Run: {paths}; {prices}; {reference}."),
        "Assumed: normal shocks, constant volatility, holdings unchanged, no flows. Ranges are 95 % simulation ranges."
            .to_owned(),
        CAUTION.to_owned(),
    ]);
    lines
}

/// "Parameters: 12 of 15 factors fitted on 30 Nov 2023 to 30 Nov 2026 (history.csv), the rest typed; correlation: …".
fn origins(subject: &Subject<'_>) -> Option<String> {
    let history = subject.model.history.as_ref()?;
    let factors = &subject.model.factors;
    let fitted = factors.iter().filter(|factor| factor.origins.has_fitted()).count();
    let (from, to) = history.dates;
    let count = if fitted == factors.len() {
        "all factors".to_owned()
    } else {
        format!("{fitted} of {} factors", factors.len())
    };
    let rest = if fitted == factors.len() { "" } else { ", the rest typed" };
    let correlation = history.estimator.as_ref().map_or("typed", String::as_str);
    Some(format!(
        "Parameters: {count} fitted on {} to {} ({}){rest}; correlation: {correlation}.",
        date_words(from),
        date_words(to),
        file_name(&history.label)
    ))
}

/// The last part of a path; on paper nobody needs the rest.
fn file_name(label: &str) -> &str {
    label.rsplit(['/', '\\']).next().unwrap_or(label)
}

/// "30 Nov 2026".
fn date_words(date: Date) -> String {
    date.strftime("%-d %b %Y").to_string()
}
