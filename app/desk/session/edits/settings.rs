//! Edits of the settings, each brought into its legal range. What they mean lives with the settings.

use crate::desk::commands::SettingChange;
use crate::workspace::Settings;
use crate::workspace::document::{FEWEST_PATHS, LONGEST_HORIZON_DAYS, MOST_PATHS};
use ebbmark_engine::measures::Confidence;

/// Makes a change; none where its value can't be taken.
pub fn change(settings: &mut Settings, change: &SettingChange) -> Option<()> {
    match change {
        SettingChange::BookCurrency(currency) => {
            settings.book_currency =
                currency.as_deref().map(str::trim).filter(|code| !code.is_empty()).map(str::to_uppercase);
        }
        SettingChange::DaysPerYear(days) => settings.days_per_year = positive(*days)?,
        SettingChange::RepairsCorrelation(is_repaired) => settings.repairs_correlation = *is_repaired,
        SettingChange::AsOf(date) => settings.as_of = *date,
        SettingChange::Capital(money) => settings.capital = optional(*money)?,
        SettingChange::LossLimit(money) => settings.loss_limit = optional(*money)?,
        SettingChange::LossFrom(from) => settings.loss_from = *from,
        SettingChange::Confidences(levels) => set_confidences(settings, levels)?,
        SettingChange::ChosenConfidence(level) => choose_confidence(settings, *level),
        SettingChange::Paths(paths) => settings.paths = (*paths).clamp(FEWEST_PATHS, MOST_PATHS),
        SettingChange::Seed(seed) => settings.seed = *seed,
        SettingChange::HorizonDays(days) => {
            settings.horizon_days = (*days).clamp(1, LONGEST_HORIZON_DAYS);
            settings.reading_day = settings.reading_day.min(settings.horizon_days);
        }
        SettingChange::ReadingDay(day) => settings.reading_day = (*day).clamp(1, settings.horizon_days),
    }
    Some(())
}

fn set_confidences(settings: &mut Settings, levels: &[Confidence]) -> Option<()> {
    let mut levels = levels.to_vec();
    levels.sort_unstable();
    levels.dedup();
    let distance = |level: &Confidence| (level.value() - settings.chosen_confidence.value()).abs();
    let nearest = levels.iter().copied().min_by(|a, b| distance(a).total_cmp(&distance(b)))?;
    settings.chosen_confidence = nearest;
    settings.confidences = levels;
    Some(())
}

fn choose_confidence(settings: &mut Settings, level: Confidence) {
    settings.chosen_confidence = level;
    if !settings.confidences.contains(&level) {
        settings.confidences.push(level);
        settings.confidences.sort_unstable();
    }
}

fn positive(number: f64) -> Option<f64> {
    (number.is_finite() && number > 0.0).then_some(number)
}

/// Nothing, or a number above 0.
fn optional(number: Option<f64>) -> Option<Option<f64>> {
    match number {
        None => Some(None),
        Some(number) => positive(number).map(Some),
    }
}
