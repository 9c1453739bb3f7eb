//! Which diffusion is taken of a fit, by a cautious rule, and the evidence in a sentence.

use super::evidence::LEAST_SPEED_TIMES_YEARS;
use super::{Evidence, FactorFit, ModelChoice};
use crate::book::DiffusionKind;

/// The diffusion typed for the factor, where one is. Else, where every value is positive, `reverting-log` if
/// Dickey-Fuller's t of the log lies below its 5 % point and speed x years is at least 14, otherwise `geometric`. Where
/// a value is zero or negative, `reverting-level`. None where the one so named was refused.
pub fn choose(fit: &FactorFit, model: ModelChoice, typed: Option<DiffusionKind>) -> Option<DiffusionKind> {
    if typed.is_some() {
        return typed;
    }
    let level = || fit.reverting_level.is_ok().then_some(DiffusionKind::RevertingLevel);
    match model {
        ModelChoice::Level => level(),
        ModelChoice::Chosen if !fit.is_positive() => level(),
        _ if !fit.is_positive() => None,
        _ => {
            let reverts = fit.evidence.as_ref().is_some_and(Evidence::speaks_for_reversion);
            let kind = if reverts { DiffusionKind::RevertingLog } else { DiffusionKind::Geometric };
            (reverts || fit.geometric.is_ok()).then_some(kind)
        }
    }
}

/// The evidence in a sentence for the reader, and what was taken of it.
pub(super) fn judgement(fit: &FactorFit, is_typed: bool) -> String {
    let Some(chosen) = fit.chosen else {
        return format!("Nothing can be fitted: {}.", why_not(fit));
    };
    let taken = match (is_typed, chosen) {
        (true, kind) => format!("{} stands as typed", kind.word()),
        (false, kind) => format!("{} is taken", kind.word()),
    };
    match fit.evidence.as_ref().and_then(words) {
        Some(words) => format!("{words}; {taken}."),
        None => format!("Too few values to tell reversion from a random walk; {taken}."),
    }
}

fn why_not(fit: &FactorFit) -> String {
    let refusal = if fit.is_positive() { fit.geometric.err() } else { fit.reverting_level.err() };
    refusal.or(fit.reverting_level.err()).map(|refusal| refusal.to_string()).unwrap_or_default()
}

fn words(evidence: &Evidence) -> Option<String> {
    let test = evidence.dickey_fuller?;
    let speed = evidence.speed_times_years;
    Some(match speed {
        None => format!("No pull back to a level at all (t {:.2})", test.t),
        Some(speed) if evidence.speaks_for_reversion() => format!(
            "Reverts: a random walk is rejected at {} (t {:.2}), and speed x years of {speed:.0} is beyond what one shows",
            if test.t < test.critical_1 { "1 %" } else { "5 %" },
            test.t
        ),
        Some(speed) if evidence.rejects_random_walk() => format!(
            "A random walk is rejected (t {:.2}), but speed x years of {speed:.1} is below {LEAST_SPEED_TIMES_YEARS}, as one \
             often shows",
            test.t
        ),
        Some(speed) => format!(
            "A random walk can't be rejected (t {:.2}, 5 % point {:.2}; speed x years {speed:.1}), which is no proof of one",
            test.t, test.critical_5
        ),
    })
}
