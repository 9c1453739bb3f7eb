//! The nearest valid matrix in place of an impossible one, and what it changes: shown before it is taken, told when it is.

use super::Correlation;
use crate::maths::{NearestError, nearest_correlation};

/// Pairs told.
const MOST_TOLD: usize = 10;

/// A repaired correlation matrix beside the one it stands for.
#[derive(Debug, Clone, PartialEq)]
pub struct Repair {
    /// The nearest valid matrix.
    pub correlation: Correlation,
    /// Frobenius norm of the change over all cells.
    pub distance: f64,
    /// Smallest eigenvalue of the matrix that was given.
    pub smallest_eigenvalue_before: f64,
    /// The most changed pairs, at most ten, the most changed first.
    pub changes: Vec<PairChange>,
}

/// A pair before and after.
#[derive(Debug, Clone, PartialEq)]
pub struct PairChange {
    /// One factor.
    pub one: String,
    /// The other.
    pub other: String,
    /// Correlation given.
    pub before: f64,
    /// Correlation taken.
    pub after: f64,
}

impl Repair {
    /// Repairs the matrix `cells` (n x n, row per factor) of some factors. `weights`, one a factor and above 0, make a
    /// factor's correlations dear to move; `held` pairs stay as they are.
    ///
    /// # Errors
    /// [`NearestError::Held`] where the held pairs allow no valid matrix.
    pub fn of(
        names: &[&str],
        cells: &[f64],
        smallest_eigenvalue_before: f64,
        weights: Option<&[f64]>,
        held: &[(usize, usize)],
    ) -> Result<Self, NearestError> {
        let n = names.len();
        let nearest = nearest_correlation(n, cells, weights, held)?;
        let mut changes: Vec<PairChange> = (0..n)
            .flat_map(|row| (0..row).map(move |column| (row, column)))
            .map(|(row, column)| PairChange {
                one: names[row].to_owned(),
                other: names[column].to_owned(),
                before: cells[row * n + column],
                after: nearest.cells[row * n + column],
            })
            .collect();
        changes.sort_by(|one, other| other.size().total_cmp(&one.size()));
        changes.truncate(MOST_TOLD);
        changes.retain(|change| change.size() > 0.0);
        // Lifted above rounding, so that the matrix is valid; held cells may keep it from that.
        let Ok(correlation) = Correlation::new(n, nearest.cells) else { return Err(NearestError::Held) };
        Ok(Self { correlation, distance: nearest.distance, smallest_eigenvalue_before, changes })
    }

    /// What was changed, a sentence.
    pub fn words(&self) -> String {
        let told: Vec<String> = self.changes.iter().map(PairChange::words).collect();
        format!(
            "The nearest valid correlation matrix is used, {:.4} away (smallest eigenvalue before {:.4}); most changed: {}.",
            self.distance,
            self.smallest_eigenvalue_before,
            told.join(", ")
        )
    }
}

impl PairChange {
    fn size(&self) -> f64 {
        (self.after - self.before).abs()
    }

    /// "A and B 0.900 to 0.872".
    fn words(&self) -> String {
        format!("{} and {} {:.3} to {:.3}", self.one, self.other, self.before, self.after)
    }
}
