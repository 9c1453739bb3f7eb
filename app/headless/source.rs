//! Which book a command reads: the files named by role, a workspace, files told apart by their headers, or the
//! built-in example; and the settings of the line, which stand above those of a workspace.

use super::arguments::{
    DriftName, EstimatorName, FitArguments, LossFromName, MissingName, ModelName, SettingArguments,
    SourceArguments,
};
use super::failure::Failure;
use crate::opening::{self, FileKind, Opened};
use crate::workspace::{self, Document, Settings};
use ebbmark_engine::fit::{DriftChoice, Estimator, FitSettings, Missing, ModelChoice};
use ebbmark_engine::measures::LossFrom;
use ebbmark_engine::tables::{Faults, Notice};
use std::path::{Path, PathBuf};

/// A document, and what its readers want told.
pub(super) type Source = (Document, Vec<Notice>);

/// The book that the line names.
pub(super) fn from_arguments(arguments: &SourceArguments) -> Result<Source, Failure> {
    if let Some(path) = &arguments.workspace {
        return from_workspace(path);
    }
    let files = named_files(arguments);
    if files.is_empty() {
        return from_example();
    }
    Ok(from_opened(opening::read_named(&files)?.into_book()?))
}

/// The book in files told apart by their headers; the built-in example where there are none.
pub(super) fn from_files(paths: &[PathBuf]) -> Result<Source, Failure> {
    match paths {
        [] => from_example(),
        [path] if workspace::is_workspace(path) => from_workspace(path),
        _ => Ok(from_opened(opening::read_files(paths)?.into_book()?)),
    }
}

fn from_example() -> Result<Source, Failure> {
    Ok(from_opened(opening::built_in_example()?))
}

fn from_workspace(path: &Path) -> Result<Source, Failure> {
    let workspace = workspace::read(path).map_err(|error| Faults(vec![error.into_fault()]))?;
    Ok((workspace.document, Vec::new()))
}

fn from_opened(opened: Opened) -> Source {
    Document::of_book(opened, &Settings::usual())
}

fn named_files(arguments: &SourceArguments) -> Vec<(FileKind, PathBuf)> {
    let named = [
        (FileKind::Positions, &arguments.positions),
        (FileKind::Exposures, &arguments.exposures),
        (FileKind::Factors, &arguments.factors),
        (FileKind::Correlation, &arguments.correlation),
        (FileKind::History, &arguments.history),
        (FileKind::Holidays, &arguments.holidays),
    ];
    named.into_iter().filter_map(|(role, path)| Some((role, path.clone()?))).collect()
}

/// Puts the settings of the line above those of the document.
pub(super) fn apply(arguments: &SettingArguments, document: &mut Document) {
    let settings = &mut document.settings;
    put(&mut settings.reading_day, arguments.horizon);
    put(&mut settings.paths, arguments.paths.map(|paths| paths as usize));
    put(&mut settings.seed, arguments.seed);
    put(&mut settings.days_per_year, arguments.days_per_year);
    settings.repairs_correlation |= arguments.repair;
    put(&mut settings.loss_from, arguments.loss_from.map(LossFrom::from));
    put(&mut settings.as_of, arguments.as_of.map(Some));
    put(&mut settings.book_currency, arguments.book_currency.clone().map(Some));
    put(&mut settings.capital, arguments.capital.map(Some));
    put(&mut settings.loss_limit, arguments.loss_limit.map(Some));
    if let Some(levels) = &arguments.confidence {
        settings.confidences = levels.clone();
        settings.confidences.sort_unstable();
        settings.confidences.dedup();
    }
}

/// Puts the line's settings of the fit above those of the document.
///
/// # Errors
/// A failure where one is given without a history.
pub(super) fn apply_fit(arguments: &FitArguments, document: &mut Document) -> Result<(), Failure> {
    match (&mut document.history, arguments.first_given()) {
        (None, Some(option)) => Err(Failure::Call(format!("{option} needs a history (--history FILE)"))),
        (None, None) => Ok(()),
        (Some(history), _) => {
            set_fit(arguments, &mut history.settings);
            Ok(())
        }
    }
}

/// Puts the line's settings above those at hand.
pub(super) fn set_fit(arguments: &FitArguments, settings: &mut FitSettings) {
    put(&mut settings.since, arguments.since.map(Some));
    put(&mut settings.until, arguments.until.map(Some));
    put(&mut settings.row_days, arguments.row_days.map(Some));
    put(&mut settings.model, arguments.model.map(ModelChoice::from));
    put(&mut settings.drift, arguments.drift.map(DriftChoice::from));
    put(&mut settings.estimator, arguments.estimator.map(Estimator::from));
    put(&mut settings.weight_half_life_days, arguments.weight_half_life);
    put(&mut settings.change_days, arguments.change_days);
    put(&mut settings.missing, arguments.missing.map(Missing::from));
}

fn put<T>(setting: &mut T, typed: Option<T>) {
    if let Some(value) = typed {
        *setting = value;
    }
}

impl From<LossFromName> for LossFrom {
    fn from(name: LossFromName) -> Self {
        match name {
            LossFromName::Today => Self::Today,
            LossFromName::Mean => Self::Mean,
        }
    }
}

impl From<ModelName> for ModelChoice {
    fn from(name: ModelName) -> Self {
        match name {
            ModelName::Log => Self::Log,
            ModelName::Level => Self::Level,
        }
    }
}

impl From<DriftName> for DriftChoice {
    fn from(name: DriftName) -> Self {
        match name {
            DriftName::Zero => Self::Zero,
            DriftName::Fitted => Self::Fitted,
        }
    }
}

impl From<EstimatorName> for Estimator {
    fn from(name: EstimatorName) -> Self {
        match name {
            EstimatorName::Sample => Self::Sample,
            EstimatorName::Weighted => Self::Weighted,
            EstimatorName::ShrunkIdentity => Self::ShrunkIdentity,
            EstimatorName::ShrunkConstant => Self::ShrunkConstant,
        }
    }
}

impl From<MissingName> for Missing {
    fn from(name: MissingName) -> Self {
        match name {
            MissingName::Common => Self::Common,
            MissingName::Pairs => Self::Pairs,
        }
    }
}
