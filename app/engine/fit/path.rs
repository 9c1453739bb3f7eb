//! One factor where it was quoted: its values and the steps of time between them. Blanks are gone; nothing is filled in.

use crate::history::{History, Series, Spacing};

/// Values of the modelled variable, oldest first, and the steps between them.
#[derive(Debug, Clone, PartialEq)]
pub struct ObservedPath {
    /// n + 1 values.
    pub values: Vec<f64>,
    /// n steps.
    pub steps: Steps,
}

/// Lengths of successive steps of time: whole units of one length, so that few of them differ.
#[derive(Debug, Clone, PartialEq)]
pub struct Steps {
    /// Units of each step, 1 or more.
    pub units: Vec<u32>,
    /// Length of a unit, years.
    pub years_per_unit: f64,
}

impl ObservedPath {
    /// The path of a series of a history, its blanks left out.
    pub fn of(history: &History, series: &Series, spacing: Spacing, days_per_year: f64) -> Self {
        let quoted: Vec<(usize, f64)> = series.quoted().collect();
        let units = quoted.windows(2).map(|two| spacing.units_between(history, two[0].0, two[1].0)).collect();
        let years_per_unit = spacing.years_per_unit(days_per_year);
        Self {
            values: quoted.into_iter().map(|(_, value)| value).collect(),
            steps: Steps { units, years_per_unit },
        }
    }

    /// The same path of the values' logarithms; none where a value is zero or negative.
    pub fn log(&self) -> Option<Self> {
        let values: Option<Vec<f64>> =
            self.values.iter().map(|value| Some(value.ln()).filter(|_| *value > 0.0)).collect();
        Some(Self { values: values?, steps: self.steps.clone() })
    }

    /// Changes from each value to the next.
    pub fn changes(&self) -> impl Iterator<Item = f64> {
        self.values.windows(2).map(|two| two[1] - two[0])
    }

    /// Whether no value differs from the first.
    pub fn is_constant(&self) -> bool {
        self.values.windows(2).all(|two| two[0] == two[1])
    }
}

impl Steps {
    /// Number of steps.
    pub fn count(&self) -> usize {
        self.units.len()
    }

    /// Years of all steps together.
    pub fn total_years(&self) -> f64 {
        self.units.iter().map(|units| f64::from(*units)).sum::<f64>() * self.years_per_unit
    }

    /// Years of the mean step.
    pub fn mean_years(&self) -> f64 {
        self.total_years() / self.count().max(1) as f64
    }

    /// Years of each step.
    pub fn years(&self) -> impl Iterator<Item = f64> {
        self.units.iter().map(|units| f64::from(*units) * self.years_per_unit)
    }

    /// Whether all steps are equally long.
    pub fn is_regular(&self) -> bool {
        self.units.windows(2).all(|two| two[0] == two[1])
    }
}
