//! Confidence levels as exact decimals, so that ranks are exact.

/// A confidence in (0.5, 1), kept as the decimal it was written as.
#[derive(Debug, Clone, Copy, PartialEq, Eq, PartialOrd, Ord, Hash)]
pub struct Confidence {
    numerator: u64,
    denominator: u64,
}

impl Confidence {
    /// Nearest double.
    pub fn value(self) -> f64 {
        self.numerator as f64 / self.denominator as f64
    }
}
