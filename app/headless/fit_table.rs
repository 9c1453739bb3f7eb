//! The answer of `ebbmark fit` as text: a block a factor, then the correlation. Every figure comes from the answer.

use super::columns::align;
use super::fit_answer::{CorrelationAnswer, FactorAnswer, FitAnswer};
use ebbmark_engine::figures::{CAUTION, grouped, percent};
use ebbmark_engine::fit::{GeometricFit, RevertingFit};
use ebbmark_engine::maths::RangedEstimate;

const FOOT: &str = "\
± is one standard error; ranges are 95 %, those of half-life and speed by profile likelihood. Log-likelihoods are of the
modelled variable: compare the first two, not the third. Drift is hardly known from history: the book takes none unless asked.
";

/// The whole answer, ending with a line break.
pub(super) fn write(answer: &FitAnswer) -> String {
    let rows = match answer.row_days {
        Some(1) => "a row is one trading day".to_owned(),
        Some(days) => format!("a row is {days} trading days"),
        None => "time between rows by the calendar".to_owned(),
    };
    let head = format!("{} changes from {} to {}, {rows}\n", answer.observations, answer.from, answer.to);
    let mut sections = vec![head];
    sections.extend(answer.factors.iter().map(factor));
    sections.extend(answer.correlation.as_ref().map(correlation));
    sections.push(format!("{FOOT}{CAUTION}\n"));
    sections.join("\n")
}

fn factor(answer: &FactorAnswer) -> String {
    let chosen = answer.chosen.unwrap_or("none");
    let mut text = format!(
        "{}: {chosen} ({} changes)\n  {}\n",
        answer.factor, answer.observations, answer.evidence.judgement
    );
    let mut rows = Vec::new();
    rows.extend(answer.geometric.iter().flat_map(geometric_rows));
    rows.extend(answer.reverting_log.iter().flat_map(|fit| reverting_rows("reverting-log", fit, true)));
    rows.extend(answer.reverting_level.iter().flat_map(|fit| reverting_rows("reverting-level", fit, false)));
    text.push_str(&align(&rows));
    let refused = [
        ("geometric", &answer.refused.geometric),
        ("reverting-log", &answer.refused.reverting_log),
        ("reverting-level", &answer.refused.reverting_level),
    ];
    for (name, why) in refused {
        if let Some(why) = why {
            text.push_str(&format!("  {name}: not fitted; {why}\n"));
        }
    }
    text.push_str(&tests(answer));
    text
}

fn geometric_rows(fit: &GeometricFit) -> Vec<Vec<String>> {
    vec![
        row("  geometric", "volatility", &fit.volatility, per_cent),
        row("", "drift", &fit.drift, per_cent),
        likelihood(fit.log_likelihood),
    ]
}

fn reverting_rows(name: &str, fit: &RevertingFit, is_log: bool) -> Vec<Vec<String>> {
    let volatility: fn(f64, f64) -> String = if is_log { per_cent } else { figure };
    let corrected =
        vec![String::new(), "speed corrected".to_owned(), figure(fit.speed_corrected, error(&fit.speed))];
    vec![
        row(&format!("  {name}"), "volatility", &fit.volatility, volatility),
        row("", "long run", &fit.long_run, figure),
        row("", "half-life, days", &fit.half_life_days, figure),
        row("", "speed a year", &fit.speed, figure),
        corrected,
        likelihood(fit.log_likelihood),
    ]
}

fn row(name: &str, parameter: &str, estimate: &RangedEstimate, write: fn(f64, f64) -> String) -> Vec<String> {
    let error = error(estimate);
    let spread =
        estimate.standard_error.map_or("no error".to_owned(), |error| format!("± {}", write(error, error)));
    let range = match (estimate.low, estimate.high) {
        (Some(low), Some(high)) => format!("{} to {}", write(low, error), write(high, error)),
        (Some(low), None) => format!("from {}, no upper end", write(low, error)),
        (None, Some(high)) => format!("to {}, no lower end", write(high, error)),
        (None, None) => "no range".to_owned(),
    };
    vec![name.to_owned(), parameter.to_owned(), write(estimate.value, error), spread, range]
}

fn likelihood(value: f64) -> Vec<String> {
    vec![String::new(), "log-likelihood".to_owned(), figure(value, 0.1)]
}

fn error(estimate: &RangedEstimate) -> f64 {
    estimate.standard_error.unwrap_or(estimate.value.abs() / 100.0)
}

/// A fraction in percent, to two digits of its error.
fn per_cent(value: f64, error: f64) -> String {
    percent(value, decimals(error * 100.0))
}

/// A figure to two digits of its error.
fn figure(value: f64, error: f64) -> String {
    grouped(value, decimals(error))
}

/// Decimals that show two digits of an error.
fn decimals(error: f64) -> usize {
    if error > 0.0 && error.is_finite() { (1 - error.log10().floor() as i32).clamp(0, 8) as usize } else { 4 }
}

fn tests(answer: &FactorAnswer) -> String {
    let evidence = &answer.evidence;
    let test = evidence.dickey_fuller.map(|test| {
        format!(
            "Dickey-Fuller t {:.2} (1 % {:.2}, 5 % {:.2}, 10 % {:.2})",
            test.t, test.critical_1, test.critical_5, test.critical_10
        )
    });
    let ratios = evidence
        .variance_ratios
        .iter()
        .map(|row| format!("{} rows {:.3} (z {:.1})", row.span, row.ratio, row.z));
    let ratios: Vec<String> = ratios.collect();
    let ratios = (!ratios.is_empty()).then(|| format!("variance ratios: {}", ratios.join(", ")));
    let parts: Vec<String> = [test, ratios].into_iter().flatten().collect();
    if parts.is_empty() { String::new() } else { format!("  {}\n", parts.join("; ")) }
}

fn correlation(answer: &CorrelationAnswer) -> String {
    let shrinkage = answer
        .shrinkage
        .map(|weight| format!(", {} towards its target", percent(weight, 1)))
        .unwrap_or_default();
    let head = format!(
        "Correlation of the Brownian motions: {}{shrinkage}; smallest eigenvalue {:.4}\n",
        answer.estimator, answer.smallest_eigenvalue
    );
    let rows: Vec<Vec<String>> = answer
        .factors
        .iter()
        .zip(&answer.matrix)
        .enumerate()
        .map(|(at, (name, row))| {
            let cells = row[..=at].iter().map(|cell| format!("{cell:.2}"));
            std::iter::once(format!("  {name}")).chain(cells).collect()
        })
        .collect();
    head + &align(&rows)
}
