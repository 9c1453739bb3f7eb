//! The built-in example book, compiled in from `example-portfolios/mixed-fund`.

use super::history::hash_of;
use super::{FileKind, Opened, Parts, Source};
use ebbmark_engine::tables::{Faults, Table};
use jiff::civil::{Date, date};
use std::path::{Path, PathBuf};

/// Stem of the example's positions file.
const NAME: &str = "Ellerwick";
const CURRENCY: &str = "EUR";
const AS_OF: Date = date(2026, 11, 30);

const FILES: [(FileKind, &str, &str); 6] = [
    (FileKind::Positions, "Ellerwick.csv", include_str!("../../example-portfolios/mixed-fund/Ellerwick.csv")),
    (FileKind::Exposures, "exposures.csv", include_str!("../../example-portfolios/mixed-fund/exposures.csv")),
    (FileKind::Factors, "factors.csv", include_str!("../../example-portfolios/mixed-fund/factors.csv")),
    (
        FileKind::Correlation,
        "correlation.csv",
        include_str!("../../example-portfolios/mixed-fund/correlation.csv"),
    ),
    (FileKind::History, "history.csv", include_str!("../../example-portfolios/mixed-fund/history.csv")),
    (FileKind::Holidays, "holidays.csv", include_str!("../../example-portfolios/mixed-fund/holidays.csv")),
];

/// The book that is compiled in, with its currency and the date of its prices.
///
/// # Errors
/// None in a released program; a test reads it.
pub fn built_in_example() -> Result<Opened, Faults> {
    let mut parts = Parts::default();
    for (kind, label, text) in FILES {
        let path = path_of(label);
        let table = Table::read(text, &path.display().to_string())?;
        let source = Source { path, stem: NAME.to_owned(), hash: hash_of(text.as_bytes()) };
        parts.take(kind, &source, &table)?;
    }
    let opened = parts.into_book()?;
    Ok(Opened { book_currency: Some(CURRENCY.to_owned()), as_of: Some(AS_OF), ..opened })
}

/// Where a file of the example is said to stand.
fn path_of(label: &str) -> PathBuf {
    Path::new("built-in example").join(label)
}

/// The text of a file of the example, by the path it is said to have.
pub(super) fn built_in_text(path: &Path) -> Option<&'static str> {
    FILES.iter().find(|(_, label, _)| path_of(label) == path).map(|(_, _, text)| *text)
}
