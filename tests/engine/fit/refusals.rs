//! What no diffusion can be fitted to, with the words shown.

use crate::support::*;
use ebbmark_engine::fit::geometric::fit_geometric;
use ebbmark_engine::fit::reverting::fit_reverting;

fn check(values: &[f64], geometric: &str, reverting: &str) {
    let path = path(values, &vec![1; values.len().saturating_sub(1)], 1.0 / 252.0);
    let words = |refusal: Option<String>| refusal.unwrap_or_else(|| "fitted".to_owned());
    let found = fit_geometric(&path).err().map(|refusal| refusal.to_string());
    assert_eq!(words(found), geometric, "{values:?}");
    let found = fit_reverting(&path, false, 252.0).err().map(|refusal| refusal.to_string());
    assert_eq!(words(found), reverting, "{values:?}");
}

#[test]
fn always_words_for_what_cannot_be_fitted() {
    check(&[], "no value in these dates", "no value in these dates");
    let few = |found: &str, needed: u32| format!("{found} in these dates: this fit needs at least {needed}");
    check(&[1.0], &few("1 value", 3), &few("1 value", 4));
    check(&[1.0, 2.0], &few("2 values", 3), &few("2 values", 4));
    check(&[1.0, 2.0, 1.5], "fitted", &few("3 values", 4));
    let constant = "the value never changes in these dates";
    check(&[7.0; 9], constant, constant);
    check(
        &[1.0, 2.0, 4.1, 8.0, 16.2, 32.0],
        "fitted",
        "no reversion: each value starts from the one before (slope 1.9762, at or beyond 1)",
    );
    check(
        &[1.0, -1.0, 1.1, -0.9, 1.0, -1.0],
        "fitted",
        "values swing back past their mean from one date to the next (slope -1.0139, not positive): no diffusion does so",
    );
    check(
        &[1e300, -1e300, 1e300, 2e299, 1e300],
        "values too large to compute with",
        "values too large to compute with",
    );
}

#[test]
fn always_an_irregular_trend_is_refused_too() {
    let values: Vec<f64> = (0..40).map(|i| 1.07_f64.powi(i) + 0.01 * (f64::from(i) * 2.1).sin()).collect();
    let mut units = vec![1; 39];
    units[7] = 3;
    let refusal = fit_reverting(&path(&values, &units, 1.0 / 252.0), false, 252.0).unwrap_err();
    assert!(refusal.to_string().starts_with("no reversion"), "{refusal}");
}
