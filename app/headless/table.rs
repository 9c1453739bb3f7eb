//! The answer of `ebbmark read` as text: sections of aligned rows, the unit once. Every figure comes from the answer;
//! the only arithmetic is percent of the capital and z, the sampled less the exact figure in standard errors.

use super::answer::Answer;
use super::columns::align;
use super::writer::Writer;
use ebbmark_engine::figures::{CAUTION, grouped, percent, source_words};
use ebbmark_engine::measures::LossFrom;
use ebbmark_engine::measures::reading::{DrawdownRow, LossRow, MomentRow};

type Rows = Vec<Vec<String>>;

const FOOT: &str = "\
Ranges are 95 % simulation ranges, ± is one standard error: the noise of the simulation alone.
Assumed: normal shocks, constant volatility, holdings unchanged, no flows.
";

/// The whole answer, ending with a line break.
pub(super) fn write(answer: &Answer, loss_from: LossFrom) -> String {
    let writer = Writer::for_answer(answer);
    let sections = [
        head(answer),
        align(&loss_rows(answer, loss_from, &writer)),
        align(&range_rows(answer, &writer)),
        range_sources(answer),
        align(&fall_rows(answer, &writer)),
        align(&limit_rows(answer, &writer)),
        align(&moment_rows(answer, &writer)),
        pull(answer, &writer),
        format!("{FOOT}{CAUTION}\n"),
    ];
    let written: Vec<String> = sections.into_iter().filter(|section| !section.is_empty()).collect();
    written.join("\n")
}

fn head(answer: &Answer) -> String {
    let (book, horizon, run) = (&answer.book, &answer.horizon, &answer.run);
    let currency = book.currency.as_ref().map(|code| format!("{code} ")).unwrap_or_default();
    let as_of = book.as_of.map(|date| format!(" at prices of {date}")).unwrap_or_default();
    let to = horizon.date.map(|date| format!(", to {date}")).unwrap_or_default();
    let (value, paths) = (grouped(book.value, 0), grouped(run.paths as f64, 0));
    let days = if horizon.days == 1 { "day" } else { "days" };
    format!(
        "{}: {currency}{value}{as_of}\nRead at {} trading {days}{to}; {paths} paths, seed {}\n",
        book.name, horizon.days, run.seed
    )
}

fn loss_rows(answer: &Answer, loss_from: LossFrom, writer: &Writer) -> Rows {
    let title = match loss_from {
        LossFrom::Today => "Loss from today's value",
        LossFrom::Mean => "Loss from the expected value",
    };
    let writer = writer.within(answer.loss.iter().map(|row| error_of(row.es_low, row.es_high)));
    let mut rows = vec![writer.head(title, "95 % range")];
    for row in &answer.loss {
        let LossRow { confidence, var, var_low, var_high, es, es_low, es_high } = *row;
        for (measure, value, low, high) in [("VaR", var, var_low, var_high), ("ES", es, es_low, es_high)] {
            let label = format!("  {} {measure}", level(confidence));
            rows.push(vec![label, writer.loss(value), writer.range(low, high), writer.of_capital(value)]);
        }
    }
    rows
}

/// The second range: over the fit's parameters.
fn range_rows(answer: &Answer, writer: &Writer) -> Rows {
    let Some(range) = &answer.parameter_range else { return Vec::new() };
    let writer = writer.within(range.loss.iter().map(|row| (row.var_high - row.var_low) / 40.0));
    let mut rows = vec![vec![writer.titled("Range over the fit's parameters"), "95 % range".to_owned()]];
    for row in &range.loss {
        for (measure, low, high) in [("VaR", row.var_low, row.var_high), ("ES", row.es_low, row.es_high)] {
            let label = format!("  {} {measure}", level(row.confidence));
            rows.push(vec![label, writer.range(Some(low), Some(high))]);
        }
    }
    rows
}

fn range_sources(answer: &Answer) -> String {
    let Some(range) = &answer.parameter_range else { return String::new() };
    format!(
        "Most of it from {}; {} simulated histories fitted again, {} refits refused\n",
        source_words(range, 3),
        range.draws,
        range.refused
    )
}

/// About one standard error of a figure with a 95 % range; 0 where an end is open.
fn error_of(low: Option<f64>, high: Option<f64>) -> f64 {
    low.zip(high).map_or(0.0, |(low, high)| (high - low) / 4.0)
}

fn fall_rows(answer: &Answer, writer: &Writer) -> Rows {
    let fall = &answer.drawdown;
    let row = |label: String, writer: &Writer, value: f64, spread: String| {
        vec![label, writer.money(value), spread, writer.of_capital(value)]
    };
    let mut rows = vec![writer.head("Largest fall from a peak on the way", "95 % range or error")];
    let fine = writer.within([fall.mean_error].into_iter());
    rows.push(row("  mean".into(), &fine, fall.mean, fine.error(Some(fall.mean_error))));
    let writer = writer.within(fall.quantiles.iter().filter_map(|row| row.mean_beyond_error));
    for &DrawdownRow { confidence, value, value_low, value_high, mean_beyond, mean_beyond_error } in
        &fall.quantiles
    {
        let label = format!("  {} quantile", level(confidence));
        rows.push(row(label, &writer, value, writer.range(value_low, value_high)));
        let label = format!("  mean of the worst {}", level(1.0 - confidence));
        rows.push(row(label, &writer, mean_beyond, writer.error(mean_beyond_error)));
    }
    rows
}

fn limit_rows(answer: &Answer, writer: &Writer) -> Rows {
    let Some(limit) = &answer.limit else { return Vec::new() };
    let title = format!("Chance of a loss from today beyond {}", writer.with_unit(limit.loss));
    let chance = |label: &str, chance: f64, error: f64| {
        vec![label.to_owned(), percent(chance, 2), format!("± {}", percent(error, 2))]
    };
    vec![
        vec![title],
        chance("  at the horizon", limit.at_horizon, limit.at_horizon_error),
        chance("  at any time up to it", limit.by_horizon, limit.by_horizon_error),
    ]
}

fn moment_rows(answer: &Answer, writer: &Writer) -> Rows {
    let moments = &answer.moments;
    let writer = writer.within(moments.sd.standard_error.into_iter());
    let money = |value: f64| writer.money(value);
    let title = writer.titled("Value at the horizon");
    vec![
        [title.as_str(), "exact", "sampled", "±", "z"].map(str::to_owned).to_vec(),
        moment_row("  expected", &moments.mean, money),
        moment_row("  standard deviation", &moments.sd, money),
        moment_row("  skewness", &moments.skewness, |value| grouped(value, 3)),
    ]
}

fn moment_row(label: &str, row: &MomentRow, write: impl Fn(f64) -> String) -> Vec<String> {
    let figure = |value: Option<f64>| value.map_or("none".into(), &write);
    let z = row.z().map_or("none".into(), |z| grouped(z, 1));
    vec![label.into(), figure(row.exact), figure(row.sampled), figure(row.standard_error), z]
}

/// The two parts of what may happen: where the book is drawn to, and how far it may stray from there.
fn pull(answer: &Answer, writer: &Writer) -> String {
    let moments = &answer.moments;
    let writer = writer.within(moments.sd.standard_error.into_iter());
    let change = writer.with_unit(moments.expected_change);
    let spread = moments.sd.exact.or(moments.sd.sampled).map_or("none".into(), |sd| writer.with_unit(sd));
    format!("Expected change {change}, from drift, reversion and carry; dispersion round it {spread}\n")
}

/// A confidence or its complement: `97.5 %`.
fn level(fraction: f64) -> String {
    let text = grouped(fraction * 100.0, 4);
    format!("{} %", text.trim_end_matches('0').trim_end_matches('.'))
}

#[cfg(test)]
mod tests {
    use super::level;

    #[test]
    fn exact_levels_have_the_digits_they_need() {
        assert_eq!([0.95, 0.975, 0.999, 1.0 - 0.99].map(level), ["95 %", "97.5 %", "99.9 %", "1 %"]);
    }
}
