//! Workspaces and kept sessions as RON text, `format: 1`. Files are opened and written next door.

use super::check_rows;
use super::document::{FEWEST_PATHS, MOST_PATHS};
use super::{BookHistory, Document, Kept, LONGEST_HORIZON_DAYS, Settings, View, Workspace, check_fitted};
use ebbmark_engine::factors::{Fitted, Inputs};
use ebbmark_engine::fit::FitSettings;
use ebbmark_engine::measures::{Confidence, LossFrom};
use jiff::civil::Date;
use ron::ser::PrettyConfig;
use serde::{Deserialize, Serialize};
use std::path::PathBuf;
use std::sync::Arc;

/// The format that this program writes, and the newest it reads.
pub const FORMAT: u32 = 1;

/// Why a text is not a workspace this program can use.
#[derive(Debug, Clone, PartialEq, Eq, thiserror::Error)]
pub enum FormatError {
    /// A later program wrote it.
    #[error(
        "found format {found}, expected format {FORMAT} or older; open it with the newer program that wrote it"
    )]
    Newer {
        /// Format of the file.
        found: u32,
    },
    /// It is not RON, or not a workspace.
    #[error("found {reason}, expected a workspace as this program writes it")]
    Unreadable {
        /// What was found.
        reason: String,
        /// Line, from 1.
        line: usize,
    },
    /// A value lies outside its range.
    #[error("found {found}, expected {expected}")]
    Value {
        /// What it is, and the value.
        found: String,
        /// Its range.
        expected: String,
    },
}

#[derive(Deserialize)]
struct Head {
    format: u32,
}

#[derive(Serialize, Deserialize)]
struct WorkspaceText {
    format: u32,
    name: String,
    settings: SettingsText,
    holidays: Option<Vec<Date>>,
    view: View,
    inputs: Inputs,
    #[serde(default)]
    history: Option<HistoryText>,
}

#[derive(Serialize, Deserialize)]
struct HistoryText {
    path: PathBuf,
    sha256: String,
    settings: FitSettings,
    fitted: Option<Fitted>,
}

#[derive(Serialize, Deserialize)]
struct KeptText {
    format: u32,
    file: Option<PathBuf>,
    has_unsaved_edits: bool,
    workspace: WorkspaceText,
}

#[derive(Serialize, Deserialize)]
struct SettingsText {
    book_currency: Option<String>,
    days_per_year: f64,
    #[serde(default)]
    repairs_correlation: bool,
    as_of: Option<Date>,
    capital: Option<f64>,
    loss_limit: Option<f64>,
    loss_from: LossFromText,
    confidences: Vec<Confidence>,
    chosen_confidence: Confidence,
    paths: usize,
    seed: u64,
    horizon_days: u32,
    reading_day: u32,
}

#[derive(Serialize, Deserialize)]
#[serde(rename_all = "kebab-case")]
enum LossFromText {
    Today,
    Mean,
}

/// A workspace as text.
///
/// # Errors
/// A sentence, where a value can't be written.
pub fn text_of_workspace(workspace: &Workspace) -> Result<String, FormatError> {
    text_of(&WorkspaceText::of(workspace))
}

/// A kept session as text.
///
/// # Errors
/// A sentence, where a value can't be written.
pub fn text_of_kept(kept: &Kept) -> Result<String, FormatError> {
    text_of(&KeptText {
        format: FORMAT,
        file: kept.file.clone(),
        has_unsaved_edits: kept.has_unsaved_edits,
        workspace: WorkspaceText::of(&kept.workspace),
    })
}

/// The workspace of a text. A format newer than [`FORMAT`] is refused before anything else is looked at.
///
/// # Errors
/// [`FormatError`], with both numbers for a newer format.
pub fn workspace_of_text(text: &str) -> Result<Workspace, FormatError> {
    of_text::<WorkspaceText>(text)?.checked()
}

/// The kept session of a text.
///
/// # Errors
/// [`FormatError`].
pub fn kept_of_text(text: &str) -> Result<Kept, FormatError> {
    let KeptText { file, has_unsaved_edits, workspace, .. } = of_text(text)?;
    Ok(Kept { workspace: workspace.checked()?, file, has_unsaved_edits })
}

fn text_of(value: &impl Serialize) -> Result<String, FormatError> {
    let style = PrettyConfig::new().compact_arrays(true).depth_limit(4);
    let text = ron::ser::to_string_pretty(value, style)
        .map_err(|error| FormatError::Unreadable { reason: error.to_string(), line: 0 })?;
    Ok(text + "\n")
}

fn of_text<'a, T: Deserialize<'a>>(text: &'a str) -> Result<T, FormatError> {
    let Head { format } = ron::from_str(text).map_err(unreadable)?;
    if format > FORMAT {
        return Err(FormatError::Newer { found: format });
    }
    ron::from_str(text).map_err(unreadable)
}

fn unreadable(error: ron::error::SpannedError) -> FormatError {
    FormatError::Unreadable { reason: error.code.to_string(), line: error.span.start.line }
}

impl WorkspaceText {
    fn of(workspace: &Workspace) -> Self {
        let document = &workspace.document;
        Self {
            format: FORMAT,
            name: document.name.clone(),
            settings: SettingsText::of(&document.settings),
            holidays: document.holidays.as_deref().cloned(),
            view: workspace.view.clone(),
            inputs: Inputs::clone(&document.inputs),
            history: document.history.as_ref().map(HistoryText::of),
        }
    }

    fn checked(self) -> Result<Workspace, FormatError> {
        check_rows(&self.inputs)?;
        let document = Document {
            name: self.name,
            inputs: Arc::new(self.inputs),
            history: self.history.map(HistoryText::checked).transpose()?,
            holidays: self.holidays.map(Arc::new),
            settings: self.settings.checked()?,
        };
        Ok(Workspace { document, view: self.view })
    }
}

impl HistoryText {
    fn of(history: &BookHistory) -> Self {
        Self {
            path: history.path.clone(),
            sha256: history.hash.clone(),
            settings: history.settings.clone(),
            fitted: history.fitted.as_deref().cloned(),
        }
    }

    /// Without its levels: whoever opens files reads them again.
    fn checked(self) -> Result<BookHistory, FormatError> {
        let Self { path, sha256, settings, fitted } = self;
        let days = settings.weight_half_life_days;
        within("weight_half_life_days", days, days.is_finite() && days > 0.0, "trading days above 0")?;
        let rows = settings.change_days;
        within("change_days", rows, [1, 5, 10].contains(&rows), "1, 5 or 10")?;
        let rows = settings.row_days.unwrap_or(1);
        within("row_days", rows, rows > 0, "1 or more")?;
        fitted.as_ref().map_or(Ok(()), check_fitted)?;
        let levels = Err(format!("{} was not read", path.display()));
        Ok(BookHistory { path, hash: sha256, settings, levels, fitted: fitted.map(Arc::new) })
    }
}

impl SettingsText {
    fn of(settings: &Settings) -> Self {
        Self {
            book_currency: settings.book_currency.clone(),
            days_per_year: settings.days_per_year,
            repairs_correlation: settings.repairs_correlation,
            as_of: settings.as_of,
            capital: settings.capital,
            loss_limit: settings.loss_limit,
            loss_from: match settings.loss_from {
                LossFrom::Today => LossFromText::Today,
                LossFrom::Mean => LossFromText::Mean,
            },
            confidences: settings.confidences.clone(),
            chosen_confidence: settings.chosen_confidence,
            paths: settings.paths,
            seed: settings.seed,
            horizon_days: settings.horizon_days,
            reading_day: settings.reading_day,
        }
    }

    fn checked(self) -> Result<Settings, FormatError> {
        let positive = |number: f64| number.is_finite() && number > 0.0;
        within("days_per_year", self.days_per_year, positive(self.days_per_year), "a number above 0")?;
        for (name, money) in [("capital", self.capital), ("loss_limit", self.loss_limit)] {
            let is_legal = money.is_none_or(positive);
            within(name, money.unwrap_or_default(), is_legal, "an amount above 0")?;
        }
        let is_legal = (FEWEST_PATHS..=MOST_PATHS).contains(&self.paths);
        within("paths", self.paths, is_legal, "1000 to 10000000")?;
        let is_legal = (1..=LONGEST_HORIZON_DAYS).contains(&self.horizon_days);
        within("horizon_days", self.horizon_days, is_legal, "1 to 504 trading days")?;
        let is_legal = (1..=self.horizon_days).contains(&self.reading_day);
        within("reading_day", self.reading_day, is_legal, "a day from 1 to the horizon")?;
        let is_legal = self.confidences.is_sorted() && self.confidences.contains(&self.chosen_confidence);
        within("chosen_confidence", self.chosen_confidence, is_legal, "one of ascending confidences")?;
        Ok(Settings {
            book_currency: self.book_currency,
            days_per_year: self.days_per_year,
            repairs_correlation: self.repairs_correlation,
            as_of: self.as_of,
            capital: self.capital,
            loss_limit: self.loss_limit,
            loss_from: match self.loss_from {
                LossFromText::Today => LossFrom::Today,
                LossFromText::Mean => LossFrom::Mean,
            },
            confidences: self.confidences,
            chosen_confidence: self.chosen_confidence,
            paths: self.paths,
            seed: self.seed,
            horizon_days: self.horizon_days,
            reading_day: self.reading_day,
        })
    }
}

fn within(name: &str, value: impl std::fmt::Display, is_legal: bool, range: &str) -> Result<(), FormatError> {
    let refusal = || FormatError::Value { found: format!("{name} {value}"), expected: range.to_owned() };
    if is_legal { Ok(()) } else { Err(refusal()) }
}
