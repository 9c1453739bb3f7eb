//! What looks odd in a history, and what it would do to the figures. Nothing is repaired: whoever keeps the file decides.

mod cover;
mod dates;
mod jumps;
mod robust;
mod words;

use super::{History, Series, Spacing};
use crate::tables::{Notice, NoticeLevel, Place};
use jiff::civil::Date;

/// Something odd, with the row it concerns first.
#[derive(Debug, Clone, PartialEq)]
pub struct Blemish {
    /// File, line and factor; no factor where it concerns the dates of all.
    pub place: Place,
    /// Date of that line.
    pub date: Date,
    /// What it is.
    pub kind: BlemishKind,
}

/// What is odd. Rows and changes are counted among those with a value.
#[derive(Debug, Clone, Copy, PartialEq)]
pub enum BlemishKind {
    /// Weekends among the dates, though a year is said to have fewer days than have no weekend.
    Weekends {
        /// How many.
        count: usize,
        /// Dates in all.
        rows: usize,
        /// As the dates have them.
        rows_per_year: f64,
        /// As was said.
        days_per_year: f64,
    },
    /// A long time without a row where a row is a trading day; the longest such stands for all.
    Pause {
        /// How many of them there are.
        count: usize,
        /// Date before the longest.
        from: Date,
        /// Its calendar days.
        days: i32,
    },
    /// Too few values to see a change.
    TooFew {
        /// 0 or 1.
        values: usize,
    },
    /// The same value throughout.
    Constant {
        /// That value.
        value: f64,
    },
    /// Begins after other series.
    LateStart {
        /// Rows before it.
        missing: usize,
        /// Rows in all.
        rows: usize,
    },
    /// Ends before other series.
    EarlyEnd {
        /// Rows after it.
        missing: usize,
    },
    /// Blank cells between the first value and the last.
    Blanks {
        /// How many.
        count: usize,
        /// The most in a row.
        longest: usize,
    },
    /// Values of 0 or less, which have no logarithm.
    NotPositive {
        /// How many.
        count: usize,
        /// The first of them.
        first: f64,
    },
    /// Values that repeat the one before; the date is that of the longest run.
    Stale {
        /// Changes that are none.
        unchanged: usize,
        /// Changes in all.
        changes: usize,
        /// The most repeats in a row.
        longest: usize,
    },
    /// A change by about the ratio of a split, and the level stays.
    Split {
        /// From and to.
        jump: Jump,
        /// New shares for old ones.
        ratio: (u32, u32),
    },
    /// A change by about 10, 100 or 1,000, and the level stays.
    OtherUnit {
        /// From and to.
        jump: Jump,
        /// 10, 100 or 1,000.
        factor: u32,
    },
    /// A value far from those before and after it.
    Spike {
        /// To the value that stands out.
        jump: Jump,
        /// The value after it.
        after: f64,
    },
}

/// A change that is far larger than most.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Jump {
    /// Value before.
    pub from: f64,
    /// Value on the date.
    pub to: f64,
    /// Volatility with the jump over that without it.
    pub volatility_ratio: f64,
}

impl Blemish {
    /// Factor it concerns; none where it concerns the dates of all.
    pub fn factor(&self) -> Option<&str> {
        self.place.column.as_deref()
    }

    /// Whether it may change what the figures mean.
    pub fn level(&self) -> NoticeLevel {
        const MUCH: f64 = 0.1;
        let is_worrying = match self.kind {
            BlemishKind::Blanks { .. } => false,
            BlemishKind::LateStart { missing, rows } => 2 * missing > rows,
            BlemishKind::Stale { unchanged, changes, .. } => unchanged as f64 > MUCH * changes as f64,
            _ => true,
        };
        if is_worrying { NoticeLevel::Warning } else { NoticeLevel::Info }
    }
}

impl From<&Blemish> for Notice {
    fn from(blemish: &Blemish) -> Self {
        Self { level: blemish.level(), text: format!("{}: {}", blemish.place, blemish.words()) }
    }
}

/// Everything odd in a history whose rows are spaced in such a way: of its dates first, then series by series.
pub fn blemishes(history: &History, spacing: Spacing, days_per_year: f64) -> Vec<Blemish> {
    if history.dates.is_empty() {
        return Vec::new();
    }
    let of_dates = dates::blemishes(history, spacing, days_per_year);
    let of_series = history.series.iter().flat_map(|series| {
        let column = Column { history, spacing, series, quoted: series.quoted().collect() };
        [cover::blemishes(&column), jumps::blemishes(&column)].concat()
    });
    of_dates.into_iter().chain(of_series).collect()
}

/// A series and what its rows mean.
struct Column<'a> {
    history: &'a History,
    spacing: Spacing,
    series: &'a Series,
    /// Rows with a value, and the value.
    quoted: Vec<(usize, f64)>,
}

impl Column<'_> {
    fn blemish(&self, row: usize, kind: BlemishKind) -> Blemish {
        at(self.history, row, Some(&self.series.name), kind)
    }
}

fn at(history: &History, row: usize, factor: Option<&str>, kind: BlemishKind) -> Blemish {
    let file = history.label.clone();
    let place = Place { file, line: Some(history.lines[row]), column: factor.map(str::to_owned) };
    Blemish { place, date: history.dates[row], kind }
}
