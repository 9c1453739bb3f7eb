//! `ebbmark read`: one book at one horizon, from its files to the printed answer.

use super::answer::{Answer, BookAnswer, ContributionsBy, HorizonAnswer, RunAnswer};
use super::arguments::{OutputArguments, ReadArguments};
use super::failure::Failure;
use super::progress::Progress;
use super::{source, streams, table};
use crate::workspace::Document;
use ebbmark_engine::factors::Model;
use ebbmark_engine::measures::{self, ParameterRange, RangeRequest, Reading};
use ebbmark_engine::simulate::{self, Plan, Run};
use ebbmark_engine::tables::{Notice, NoticeLevel};
use std::path::PathBuf;
use std::time::Instant;

/// More threads than this bring nothing, and a system may refuse them.
const MOST_THREADS: usize = 256;

/// Reads the book that the line names and prints the answer.
///
/// # Errors
/// [`Failure`] where the call or the input is wrong, or the program failed.
pub fn read(arguments: &ReadArguments) -> Result<(), Failure> {
    if let Some(option) = arguments.later.first_given() {
        let instead = "Leave it out to read the book as it is described in its files.";
        return Err(Failure::NotYet { what: option.into(), instead });
    }
    let (mut document, notices) = source::from_arguments(&arguments.source)?;
    source::apply(&arguments.settings, &mut document);
    source::apply_fit(&arguments.fit, &mut document)?;
    if arguments.parameter_range && document.history.as_ref().is_none_or(|history| history.levels.is_err()) {
        return Err(Failure::Call("--parameter-range needs a history (--history FILE)".into()));
    }
    answer_and_print(&document, notices, &arguments.output, arguments.parameter_range)
}

/// Reads the book in these files, or the built-in example, and prints the answer as text.
///
/// # Errors
/// As [`read`].
pub fn read_files(paths: &[PathBuf]) -> Result<(), Failure> {
    let (document, notices) = source::from_files(paths)?;
    answer_and_print(&document, notices, &OutputArguments::default(), false)
}

fn answer_and_print(
    document: &Document,
    notices: Vec<Notice>,
    output: &OutputArguments,
    has_range: bool,
) -> Result<(), Failure> {
    let answer = answer(document, notices, output, has_range)?;
    if !output.quiet {
        streams::tell_notices(&answer.notices);
    }
    let text = if output.json {
        streams::json(&answer)?
    } else {
        table::write(&answer, document.settings.loss_from)
    };
    streams::print_answer(&text)
}

fn answer(
    document: &Document,
    mut notices: Vec<Notice>,
    output: &OutputArguments,
    has_range: bool,
) -> Result<Answer, Failure> {
    let settings = &document.settings;
    let days = settings.reading_day;
    let model = document.assemble()?.model;
    let started = Instant::now();
    let run = simulate(&model, document, output)?;
    let sample = run.sample(days).ok_or_else(|| Failure::Program("the run kept no sample".into()))?;
    let reading = measures::reading(&model, &sample, &settings.conventions());
    let range = if has_range { Some(parameter_range(document, &reading, output)?) } else { None };
    let seconds = started.elapsed().as_secs_f64();

    let date = document.date_of(days);
    notices.extend(model.notices.iter().cloned());
    notices.extend(date.and_then(|_| notice_of_weekdays(document)));
    Ok(Answer {
        book: BookAnswer {
            name: document.name.clone(),
            currency: model.currency.clone(),
            value: model.value,
            as_of: document.as_of(),
            capital: settings.percent_base(model.value),
            read_as: "absolute",
        },
        horizon: HorizonAnswer { days, years: f64::from(days) / model.days_per_year, date },
        run: RunAnswer { paths: run.paths(), seed: settings.seed, steps: days, sampling: "plain", seconds },
        moments: reading.moments,
        loss: reading.loss,
        parameter_range: range,
        drawdown: reading.drawdown,
        limit: reading.limit,
        limits: [],
        contributions: [],
        contributions_by: ContributionsBy::default(),
        notices,
    })
}

fn simulate(model: &Model, document: &Document, output: &OutputArguments) -> Result<Run, Failure> {
    let settings = &document.settings;
    let plan = Plan {
        paths: settings.paths,
        seed: settings.seed,
        kept_days: vec![settings.reading_day],
        loss_limit: settings.loss_limit,
        threads: output.threads.map(|count| count.min(MOST_THREADS)),
    };
    let progress = Progress::new(plan.paths, "paths", output.quiet);
    let run = simulate::run(model, &plan, &progress);
    progress.finish();
    Ok(run?)
}

/// The range that the fit's own errors leave, from histories like the one at hand.
fn parameter_range(
    document: &Document,
    reading: &Reading,
    output: &OutputArguments,
) -> Result<ParameterRange, Failure> {
    let settings = &document.settings;
    let no_history = || Failure::Program("the history is gone".into());
    let history = document.history.as_ref().ok_or_else(no_history)?;
    let request = RangeRequest {
        inputs: &document.inputs,
        history: history.history().ok_or_else(no_history)?,
        fit: &history.settings,
        model: &settings.model_settings(),
        day: settings.reading_day,
        conventions: &settings.conventions(),
        draws: measures::parameter_range::USUAL_DRAWS,
        paths: measures::parameter_range::USUAL_PATHS,
        seed: settings.seed,
    };
    let losses: Vec<(f64, f64)> = reading.loss.iter().map(|row| (row.var, row.es)).collect();
    let progress = Progress::new(request.draws, "histories", output.quiet);
    let range = measures::parameter_range(request, &losses, &progress)?;
    progress.finish();
    Ok(range)
}

/// Dates are counted in weekdays where no holidays are known.
fn notice_of_weekdays(document: &Document) -> Option<Notice> {
    let text = "The date counts weekdays as trading days; give a holidays file to leave holidays out.";
    document.holidays.is_none().then(|| Notice { level: NoticeLevel::Info, text: text.into() })
}
