//! What leaves the window and as what; and what a path is asked for. Writing it is the worker's business.

/// A figure that leaves the window.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum ExportFigure {
    /// Bands of the book's value ahead.
    Horizon,
    /// Distribution of the loss at the reading line.
    LossDistribution,
}

/// What is exported, and as what.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum ExportKind {
    /// A figure as SVG.
    Svg(ExportFigure),
    /// A figure as PNG, 1920 x 1080.
    Png(ExportFigure),
    /// A figure as PNG, 3840 x 2160.
    LargePng(ExportFigure),
    /// The numbers behind a figure as CSV.
    Numbers(ExportFigure),
    /// The reading at the reading line as CSV.
    Reading,
}

/// What a path is asked for.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum PathPurpose {
    /// Files to open.
    Open,
    /// Where to save the workspace.
    SaveAs,
    /// Where to export to.
    Export(ExportKind),
}

impl ExportFigure {
    /// What it is called.
    pub fn title(self) -> &'static str {
        match self {
            Self::Horizon => "Horizon figure",
            Self::LossDistribution => "Loss distribution",
        }
    }
}

impl ExportKind {
    /// All of them, in the order of the menu.
    pub const ALL: [Self; 9] = [
        Self::Svg(ExportFigure::Horizon),
        Self::Png(ExportFigure::Horizon),
        Self::LargePng(ExportFigure::Horizon),
        Self::Numbers(ExportFigure::Horizon),
        Self::Svg(ExportFigure::LossDistribution),
        Self::Png(ExportFigure::LossDistribution),
        Self::LargePng(ExportFigure::LossDistribution),
        Self::Numbers(ExportFigure::LossDistribution),
        Self::Reading,
    ];

    /// File extension, without the point.
    pub fn extension(self) -> &'static str {
        match self {
            Self::Svg(_) => "svg",
            Self::Png(_) | Self::LargePng(_) => "png",
            Self::Numbers(_) | Self::Reading => "csv",
        }
    }

    /// What it is called in the menu.
    pub fn title(self) -> String {
        match self {
            Self::Svg(figure) => format!("{} as SVG", figure.title()),
            Self::Png(figure) => format!("{} as PNG, 1920 × 1080", figure.title()),
            Self::LargePng(figure) => format!("{} as PNG, 3840 × 2160", figure.title()),
            Self::Numbers(figure) => format!("{}, numbers as CSV", figure.title()),
            Self::Reading => "Reading as CSV".to_owned(),
        }
    }

    /// File name offered for a book's name, for example `mixed-fund-horizon.svg`.
    pub fn file_name(self, book: &str) -> String {
        let part = match self {
            Self::Svg(figure) | Self::Png(figure) | Self::LargePng(figure) | Self::Numbers(figure) => {
                match figure {
                    ExportFigure::Horizon => "horizon",
                    ExportFigure::LossDistribution => "loss-distribution",
                }
            }
            Self::Reading => "reading",
        };
        let size = if matches!(self, Self::LargePng(_)) { "-large" } else { "" };
        format!("{}-{part}{size}.{}", file_stem(book), self.extension())
    }
}

/// A book's name as part of a file name: what a path could trip over becomes a dash.
pub fn file_stem(book: &str) -> String {
    let stem: String = book.chars().map(|c| if c.is_alphanumeric() || c == '-' { c } else { '-' }).collect();
    if stem.is_empty() { "book".to_owned() } else { stem }
}
