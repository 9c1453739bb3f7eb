//! How the history is fitted: one setting at a time, each kept within what a fit can use.

use super::finite;
use crate::desk::commands::FitChange;
use ebbmark_engine::fit::FitSettings;

/// Changes one setting; none where the value can't be taken.
pub fn change(settings: &mut FitSettings, change: FitChange) -> Option<()> {
    match change {
        FitChange::Since(date) => settings.since = date,
        FitChange::Until(date) => settings.until = date,
        FitChange::RowDays(days) => settings.row_days = days.filter(|days| *days > 0),
        FitChange::Model(model) => settings.model = model,
        FitChange::Drift(drift) => settings.drift = drift,
        FitChange::Estimator(estimator) => settings.estimator = estimator,
        FitChange::WeightHalfLife(days) => {
            settings.weight_half_life_days = finite(days).filter(|days| *days > 0.0)?;
        }
        FitChange::ChangeDays(rows) => {
            settings.change_days = Some(rows).filter(|rows| [1, 5, 10].contains(rows))?;
        }
        FitChange::Missing(missing) => settings.missing = missing,
    }
    Some(())
}
