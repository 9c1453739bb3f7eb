//! Where a parameter range comes from, in words. What it is, the measures say.

use super::percent;
use crate::measures::ParameterRange;

/// "correlation 22 %; Euro five-year rate: half-life 18 %", the `most` largest shares.
pub fn source_words(range: &ParameterRange, most: usize) -> String {
    let words = range.most_from.iter().take(most).map(|source| {
        let whose = source.factor.as_ref().map(|factor| format!("{factor}: ")).unwrap_or_default();
        format!("{whose}{} {}", source.parameter, percent(source.share, 0))
    });
    words.collect::<Vec<_>>().join("; ")
}
