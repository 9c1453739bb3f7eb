//! `ebbmark fit`: one history fitted, from its file to the printed answer.

use super::arguments::{CommandFitArguments, SourceArguments};
use super::failure::Failure;
use super::fit_answer::FitAnswer;
use super::{fit_table, source, streams};
use crate::opening::{self, FileKind};
use crate::workspace::{BookHistory, Document, Settings};
use ebbmark_engine::factors::{Inputs, typed_factors};
use ebbmark_engine::fit::{Fit, FitSettings};
use ebbmark_engine::tables::Notice;
use std::sync::Arc;

/// Fits the history that the line names and prints the answer.
///
/// # Errors
/// [`Failure`] where the call or the input is wrong.
pub fn fit(arguments: &CommandFitArguments) -> Result<(), Failure> {
    let (mut document, notices) = document(&arguments.source)?;
    source::apply_fit(&arguments.fit, &mut document)?;
    let settings = &mut document.settings;
    settings.days_per_year = arguments.days_per_year.unwrap_or(settings.days_per_year);
    settings.book_currency = arguments.book_currency.clone().or(settings.book_currency.take());
    let answer = answer(&document, notices)?;
    if !arguments.quiet {
        streams::tell_notices(&answer.notices);
    }
    let text = if arguments.json { streams::json(&answer)? } else { fit_table::write(&answer) };
    streams::print_answer(&text)
}

fn answer(document: &Document, mut notices: Vec<Notice>) -> Result<FitAnswer, Failure> {
    let history = document.history.as_ref();
    let history = history.ok_or_else(|| Failure::Call("no history: name one with --history FILE".into()))?;
    let levels = history.levels.as_ref().map_err(|why| Failure::Call(format!("no history: {why}")))?;
    let settings = document.settings.model_settings();
    let columns: Vec<String> = levels.series.iter().map(|series| series.name.clone()).collect();
    let typed = if document.inputs.holdings.is_empty() {
        Vec::new()
    } else {
        typed_factors(&document.inputs, &columns, &settings)?
    };
    let fit = Fit::of(levels, &history.settings, settings.days_per_year, &typed)?;
    notices.extend(fit.all_notices());
    Ok(FitAnswer::of(&fit, notices))
}

/// The book that the line names with its history, or a history alone.
fn document(arguments: &SourceArguments) -> Result<source::Source, Failure> {
    match &arguments.history {
        Some(path) if arguments.positions.is_none() => {
            let parts = opening::read_named(&[(FileKind::History, path.clone())])?;
            let history = parts.history.map(|history| BookHistory::of(history, FitSettings::usual()));
            let inputs = Arc::new(Inputs::default());
            let settings = Settings::usual();
            let document = Document { name: String::new(), inputs, history, holidays: None, settings };
            Ok((document, parts.notices))
        }
        _ => source::from_arguments(arguments),
    }
}
