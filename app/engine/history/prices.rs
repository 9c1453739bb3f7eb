//! Prices by date as they were written, blanks kept. Nothing here fills, smooths or judges them.

use jiff::civil::Date;

/// Dated prices or levels of several factors.
#[derive(Debug, Clone, PartialEq)]
pub struct History {
    /// The reader's name for the file.
    pub label: String,
    /// Strictly increasing; on each of them at least one series has a value when it is read.
    pub dates: Vec<Date>,
    /// Line of each date in the file.
    pub lines: Vec<usize>,
    /// A series per factor, in the order of the columns.
    pub series: Vec<Series>,
}

/// Prices of one factor.
#[derive(Debug, Clone, PartialEq)]
pub struct Series {
    /// Name of the factor, as the header writes it.
    pub name: String,
    /// A finite value per date of the history; none where the cell is blank.
    pub values: Vec<Option<f64>>,
}

impl History {
    /// The rows from `since` to `until`, both included; none for an end that is open. All series stay, also those left
    /// without a value.
    pub fn between(&self, since: Option<Date>, until: Option<Date>) -> Self {
        let first = since.map_or(0, |since| self.dates.partition_point(|date| *date < since));
        let end = until.map_or(self.dates.len(), |until| self.dates.partition_point(|date| *date <= until));
        let rows = first..end.max(first);
        let cut = |series: &Series| Series {
            name: series.name.clone(),
            values: series.values[rows.clone()].to_vec(),
        };
        Self {
            label: self.label.clone(),
            dates: self.dates[rows.clone()].to_vec(),
            lines: self.lines[rows.clone()].to_vec(),
            series: self.series.iter().map(cut).collect(),
        }
    }

    /// The series of a factor.
    pub fn series(&self, name: &str) -> Option<&Series> {
        self.series.iter().find(|series| series.name == name)
    }
}

impl Series {
    /// Rows with a value and the value, in order of date.
    pub fn quoted(&self) -> impl DoubleEndedIterator<Item = (usize, f64)> {
        self.values.iter().enumerate().filter_map(|(row, value)| Some((row, (*value)?)))
    }

    /// The last value.
    pub fn last(&self) -> Option<f64> {
        self.quoted().next_back().map(|(_, value)| value)
    }
}
