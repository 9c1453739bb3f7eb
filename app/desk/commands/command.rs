//! The closed list of commands. Words, keys and effects live elsewhere.

use super::{ExportKind, FitChange, HoldingChange, Parameter, PathPurpose, SettingChange};
use crate::workspace::{BookColumn, MatrixOrder, Tab, Theme};
use ebbmark_engine::book::{DiffusionKind, Holding};
use std::path::PathBuf;

/// Everything that can be done in the window.
#[derive(Debug, Clone, PartialEq)]
pub enum Command {
    /// Asks for a path: by a file dialog where there is one, else in the path field.
    AskPath(PathPurpose),
    /// Shows the path field to type in, without a dialog.
    TypePath(PathPurpose),
    /// Puts the path field away.
    ClosePathField,
    /// Opens files: a workspace, a book, or parts that join the current book.
    Open(Vec<PathBuf>),
    /// Opens the built-in example book.
    OpenExample,
    /// Saves where the session was saved before, else asks.
    Save,
    /// Saves as a workspace at a path.
    SaveAs(PathBuf),
    /// Writes a figure or its numbers to a path.
    Export(ExportKind, PathBuf),
    /// Takes the last edit back.
    Undo,
    /// Does the edit last taken back again.
    Redo,

    /// Renames the book.
    RenameBook(String),
    /// Adds a holding at the end of the book.
    AddHolding(Box<Holding>),
    /// Removes a holding and its sensitivities.
    RemoveHolding {
        /// Row in the inputs' holdings.
        row: usize,
    },
    /// Changes one figure or word of a holding.
    ChangeHolding {
        /// Row in the inputs' holdings.
        row: usize,
        /// What is set.
        change: HoldingChange,
    },
    /// Changes the money of a sensitivity.
    SetExposure {
        /// Row in the inputs' exposures.
        row: usize,
        /// Money of the holding's currency per move.
        money: f64,
    },
    /// Chooses another diffusion for a factor; its parameters are carried over as far as they mean something.
    SetDiffusion {
        /// Factor, by its name in the model.
        factor: String,
        /// The diffusion.
        kind: DiffusionKind,
    },
    /// Sets one parameter of a factor.
    SetParameter {
        /// Factor, by its name in the model.
        factor: String,
        /// The parameter and its value.
        parameter: Parameter,
    },
    /// Takes the fitted diffusion of a kind for factors: nothing of them stays typed but that kind and a geometric drift.
    TakeDiffusion {
        /// Factors, by their names in the model.
        factors: Vec<String>,
        /// The diffusion.
        kind: DiffusionKind,
    },
    /// Changes how the history is fitted.
    ChangeFit(FitChange),
    /// Takes the history away; what was fitted is then missing.
    LeaveHistory,
    /// Sets a correlation, both triangles at once.
    SetCorrelation {
        /// One factor, by its name in the model.
        row: String,
        /// The other.
        column: String,
        /// Correlation of the two Brownian motions, -1 to 1.
        value: f64,
    },
    /// Changes a setting.
    ChangeSetting(SettingChange),

    /// Chooses what stands in the centre.
    ShowTab(Tab),
    /// Chooses the factor shown under the book.
    ChooseFactor(String),
    /// Chooses a holding, and with it its factor.
    ChooseHolding(String),
    /// Chooses a cell of the correlation matrix.
    ChooseCell {
        /// Factor of the row.
        row: String,
        /// Factor of the column.
        column: String,
    },
    /// Orders the correlation matrix.
    OrderMatrix(MatrixOrder),
    /// Marks a factor in the fit, or takes the mark away.
    MarkFactor(String),
    /// Sorts the book by a column; the other way round when it is sorted by it already, then not at all.
    SortBook(BookColumn),
    /// Shows only holdings whose name or group contains a text.
    FilterBook(String),
    /// Wears a theme.
    WearTheme(Theme),
    /// Changes between light and dark.
    ToggleTheme,
    /// Stops the run; what has arrived stays.
    StopRun,
    /// Starts the run again.
    RunAgain,
    /// Ranges the losses at the line over the fit's parameters.
    RangeParameters,
    /// Stops that.
    StopRange,
    /// Puts a notice away, by its number.
    DismissNotice(u64),
    /// Puts away the list of what was wrong with files that were not opened.
    DismissRefusal,
}
