//! Bands of the book's value and of its largest fall, day by day.

/// Quantiles per day, money of the book's currency.
#[derive(Debug, Clone, PartialEq)]
pub struct Bands {
    /// Days, ascending.
    pub days: Vec<u32>,
    /// Book value at 1, 5, 25, 50, 75, 95, 99 %, per day.
    pub values: Vec<[f64; 7]>,
    /// Largest fall from a running peak at 50, 75, 90, 95, 99 %, per day.
    pub falls: Vec<[f64; 5]>,
    /// Whether they come from the closed form instead of paths.
    pub is_closed_form: bool,
}
