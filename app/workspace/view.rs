//! How the window looks at a document: saved with it, but no figure depends on it and undo leaves it alone.

use serde::{Deserialize, Serialize};

/// What stands in the centre.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Default, Serialize, Deserialize)]
#[serde(rename_all = "kebab-case")]
pub enum Tab {
    /// Bands ahead with the reading line.
    #[default]
    Horizon,
    /// What the history says.
    Fit,
    /// The correlation matrix as a heat map.
    Correlation,
}

/// Light or dark.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Default, Serialize, Deserialize)]
#[serde(rename_all = "kebab-case")]
pub enum Theme {
    /// Dark on light.
    #[default]
    Light,
    /// Light on dark.
    Dark,
}

/// How the factors of the correlation matrix stand.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Default, Serialize, Deserialize)]
#[serde(rename_all = "kebab-case")]
pub enum MatrixOrder {
    /// As in the book.
    #[default]
    Book,
    /// By the group of the first holding that each drives.
    Group,
    /// Like beside like, by clustering.
    Closeness,
}

/// A column of the book that it can be sorted by.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Serialize, Deserialize)]
#[serde(rename_all = "kebab-case")]
pub enum BookColumn {
    /// Name of the holding.
    Holding,
    /// Value today.
    Value,
    /// Diffusion in words.
    Diffusion,
}

/// A sorted column. Where a book has none, holdings stand as in the file, by group.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Serialize, Deserialize)]
pub struct BookOrder {
    /// Column.
    pub column: BookColumn,
    /// Smallest first.
    pub is_ascending: bool,
}

/// Everything remembered about how the window looks.
#[derive(Debug, Clone, PartialEq, Eq, Default, Serialize, Deserialize)]
#[serde(default)]
pub struct View {
    /// What stands in the centre.
    pub tab: Tab,
    /// Light or dark.
    pub theme: Theme,
    /// Factor shown under the book, by name.
    pub factor: Option<String>,
    /// Chosen holding, by name.
    pub holding: Option<String>,
    /// Chosen cell of the correlation matrix, by the two factors' names.
    pub cell: Option<(String, String)>,
    /// How the factors of the correlation matrix stand.
    pub matrix_order: MatrixOrder,
    /// Factors marked in the fit, by name.
    pub marked: Vec<String>,
    /// Column that the book is sorted by.
    pub order: Option<BookOrder>,
    /// Text that a shown holding's name or group contains, whatever the case.
    pub filter: String,
}
