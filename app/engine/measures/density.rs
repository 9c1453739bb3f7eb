//! The shape of a sample, for a chart.

/// A density on a grid.
#[derive(Debug, Clone, PartialEq)]
pub struct Density {
    /// Grid, ascending, money.
    pub at: Vec<f64>,
    /// Density at the grid's points, per unit of money.
    pub density: Vec<f64>,
}
