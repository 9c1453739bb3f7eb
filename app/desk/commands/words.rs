//! Words of the commands: on buttons, in tooltips, and beside undo and redo.

use super::{Command, FitChange, HoldingChange, Parameter, PathPurpose, SettingChange, shortcuts};
use crate::workspace::{MatrixOrder, Tab, Theme};

impl Command {
    /// Text on a button or in a menu; also what an undo step is called. "…" where it asks for more.
    pub fn text(&self) -> String {
        match self {
            Self::AskPath(PathPurpose::Open) => "Open…".to_owned(),
            Self::AskPath(PathPurpose::SaveAs) => "Save as…".to_owned(),
            Self::AskPath(PathPurpose::Export(kind)) => format!("{}…", kind.title()),
            Self::TypePath(PathPurpose::Open) => "Open by path…".to_owned(),
            Self::TypePath(PathPurpose::SaveAs) => "Save to path…".to_owned(),
            Self::TypePath(PathPurpose::Export(kind)) => format!("{} to path…", kind.title()),
            Self::ClosePathField | Self::DismissNotice(_) | Self::DismissRefusal => "Close".to_owned(),
            Self::Export(kind, _) => kind.title(),
            Self::RenameBook(_) => "Rename the book".to_owned(),
            Self::ChangeHolding { change, .. } => change.text().to_owned(),
            Self::SetParameter { factor, parameter } => format!("{} of {factor}", parameter.text()),
            Self::SetDiffusion { factor, .. } => format!("Diffusion of {factor}"),
            Self::SetCorrelation { row, column, .. } => format!("Correlation of {row} and {column}"),
            Self::TakeDiffusion { factors, kind } => match factors.as_slice() {
                [factor] => format!("Take {} for {factor}", kind.word()),
                several => format!("Take {} for {} factors", kind.word(), several.len()),
            },
            Self::ChangeFit(change) => change.text().to_owned(),
            Self::ChangeSetting(change) => change.text().to_owned(),
            Self::ChooseFactor(name) | Self::ChooseHolding(name) => name.clone(),
            Self::ChooseCell { row, column } => format!("{row}, {column}"),
            other => other.plain_text().to_owned(),
        }
    }

    fn plain_text(&self) -> &'static str {
        match self {
            Self::Open(_) => "Open",
            Self::OpenExample => "Open the example",
            Self::Save => "Save",
            Self::SaveAs(_) => "Save as",
            Self::Undo => "Undo",
            Self::Redo => "Redo",
            Self::AddHolding(_) => "Add holding",
            Self::RemoveHolding { .. } => "Remove holding",
            Self::SetExposure { .. } => "Sensitivity",
            Self::LeaveHistory => "Leave the history",
            Self::ShowTab(Tab::Horizon) => "Horizon",
            Self::ShowTab(Tab::Fit) => "Fit",
            Self::ShowTab(Tab::Correlation) => "Correlation",
            Self::OrderMatrix(MatrixOrder::Book) => "As in the book",
            Self::OrderMatrix(MatrixOrder::Group) => "By group",
            Self::OrderMatrix(MatrixOrder::Closeness) => "Like beside like",
            Self::SortBook(_) => "Sort",
            Self::FilterBook(_) => "Filter",
            Self::WearTheme(Theme::Light) => "Light",
            Self::WearTheme(Theme::Dark) => "Dark",
            Self::ToggleTheme => "Light or dark",
            Self::StopRun => "Stop",
            Self::RunAgain => "Run again",
            Self::RangeParameters => "Range over the parameters",
            Self::StopRange => "Stop ranging",
            _ => "",
        }
    }

    /// What it does, in a sentence without a full stop.
    pub fn explanation(&self) -> &'static str {
        match self {
            Self::AskPath(PathPurpose::Open) => {
                "Open a workspace, or positions with the files that go with them"
            }
            Self::TypePath(PathPurpose::Open) => {
                "Type the path of a file to open; several go between semicolons"
            }
            Self::AskPath(PathPurpose::SaveAs) | Self::TypePath(PathPurpose::SaveAs) => {
                "Save everything needed to see the same figures again"
            }
            Self::AskPath(PathPurpose::Export(_)) | Self::TypePath(PathPurpose::Export(_)) => {
                "Export what the reading line shows, with its assumptions"
            }
            Self::OpenExample => "Open the invented book that comes with the program",
            Self::Save => "Save the workspace; asks where the first time",
            Self::Undo => "Take the last edit back",
            Self::Redo => "Do it again",
            Self::AddHolding(_) => "Add a holding to the end of the book",
            Self::RemoveHolding { .. } => "Remove this holding and its sensitivities",
            Self::ShowTab(Tab::Horizon) => "The book's value ahead, read where the line stands",
            Self::ShowTab(Tab::Fit) => "What the history says of each factor, and how sure that is",
            Self::ShowTab(Tab::Correlation) => "Correlation of the factors' daily shocks",
            Self::ToggleTheme | Self::WearTheme(_) => "Change between light and dark",
            Self::StopRun => "Stop the run; the figures so far stay",
            Self::RunAgain => "Draw all paths again",
            Self::RangeParameters => {
                "How far VaR and ES move over the fit's 95 % parameter range: 200 histories like the one at hand, fitted again"
            }
            Self::StopRange => "Stop ranging over the parameters",
            _ => "",
        }
    }

    /// The explanation with the command's key, as a tooltip shows it.
    pub fn tooltip(&self, ctx: &egui::Context) -> String {
        match shortcuts::shortcut_of(self) {
            Some(shortcut) => format!("{} ({})", self.explanation(), ctx.format_shortcut(&shortcut)),
            None => self.explanation().to_owned(),
        }
    }
}

impl HoldingChange {
    /// What is changed.
    pub fn text(&self) -> &'static str {
        match self {
            Self::Name(_) => "Name",
            Self::Kind(_) => "Kind",
            Self::Quantity(_) => "Quantity",
            Self::Price(_) => "Price",
            Self::Group(_) => "Group",
            Self::Currency(_) => "Currency",
            Self::Factor(_) => "Factor",
            Self::Multiplier(_) => "Contract size",
            Self::Unit(_) => "Unit of the level",
            Self::Carry(_) => "Carry",
        }
    }
}

impl Parameter {
    /// What is set.
    pub fn text(&self) -> &'static str {
        match self {
            Self::Level(_) => "Level today",
            Self::Drift(_) => "Drift",
            Self::Volatility(_) => "Volatility",
            Self::LongRun(_) => "Long-run level",
            Self::HalfLife(_) => "Half-life",
        }
    }
}

impl FitChange {
    /// What is set.
    pub fn text(&self) -> &'static str {
        match self {
            Self::Since(_) => "First date of the fit",
            Self::Until(_) => "Last date of the fit",
            Self::RowDays(_) => "Days between rows",
            Self::Model(_) => "Diffusions to choose from",
            Self::Drift(_) => "Drift of the fit",
            Self::Estimator(_) => "Estimator of the correlation",
            Self::WeightHalfLife(_) => "Half-life of the weights",
            Self::ChangeDays(_) => "Days of a change",
            Self::Missing(_) => "Missing values",
        }
    }
}

impl SettingChange {
    /// What is set.
    pub fn text(&self) -> &'static str {
        match self {
            Self::BookCurrency(_) => "Currency of the book",
            Self::DaysPerYear(_) => "Trading days in a year",
            Self::RepairsCorrelation(true) => "Use the nearest valid matrix",
            Self::RepairsCorrelation(false) => "Use the matrix as typed",
            Self::AsOf(_) => "Date of the prices",
            Self::Capital(_) => "Capital",
            Self::LossLimit(_) => "Loss limit",
            Self::LossFrom(_) => "Loss counted from",
            Self::Confidences(_) => "Confidence levels",
            Self::ChosenConfidence(_) => "Confidence shown",
            Self::Paths(_) => "Paths",
            Self::Seed(_) => "Seed",
            Self::HorizonDays(_) => "Horizon",
            Self::ReadingDay(_) => "Reading line",
        }
    }
}
