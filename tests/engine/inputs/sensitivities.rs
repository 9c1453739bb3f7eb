//! Holdings known by what they earn for a move of a factor, under each diffusion and unit of it, and moves that it does not
//! have.

use super::{Texts, model, refused};
use ebbmark_engine::factors::{CurrencyPart, Term};

const BOOK: &str = "name,quantity,price,kind\nUnits,1,1000,exposure\n";

fn part(exposure: &str, factor: &str) -> CurrencyPart {
    let exposures = format!("holding,factor,money,per\nUnits,F,{exposure}\n");
    let factors = format!("factor,level,unit,diffusion,volatility,half_life_days\nF,{factor}\n");
    let texts = Texts { positions: BOOK, exposures: &exposures, factors: &factors, ..Texts::default() };
    model(texts).unwrap().valuation.parts.remove(0)
}

/// Money for a move of 1.00 of a level factor's `x`, or of the level's growth less one of a log factor.
#[test]
fn exact_moves_by_their_kind() {
    for (exposure, factor, weight, is_log) in [
        ("5,+1%", ",,geometric,.2,", 500.0, true),
        ("5,+1%", "40,,reverting-log,.2,none", 500.0, true),
        ("5,+1.00", "40,points,geometric,.2,", 200.0, true),
        ("5,+1.00", "3,points,reverting-level,.2,none", 5.0, false),
        ("5,+1bp", "3,percent,reverting-level,.2,none", 500.0, false),
        ("5,+1bp", "3,percent,reverting-log,.2,none", 1500.0, true),
        ("5,+1bp", "120,bp,reverting-level,9,none", 5.0, false),
    ] {
        let part = part(exposure, factor);
        let Term { weight: found, .. } = part.terms[0];
        assert!((found - weight).abs() < 1e-9, "{exposure} of {factor}: {found}");
        let expected = if is_log { 1000.0 - weight } else { 1000.0 };
        assert!((part.constant - expected).abs() < 1e-9, "{exposure} of {factor}: {}", part.constant);
    }
}

#[test]
fn always_moves_that_a_factor_does_not_have_are_refused() {
    let check = |exposure: &str, factor: &str, words: &str| {
        let exposures = format!("holding,factor,money,per\nUnits,F,{exposure}\n");
        let factors = format!("factor,level,unit,diffusion,volatility,half_life_days\nF,{factor}\n");
        let texts = Texts { positions: BOOK, exposures: &exposures, factors: &factors, ..Texts::default() };
        refused(texts, &[words]);
    };
    check("5,+1%", "3,percent,reverting-level,.2,none", "exposures.csv, line 2, column per: found `+1%`");
    check("5,+1bp", "3,points,reverting-level,.2,none", "exposures.csv, line 2, column per: found `+1bp`");
    check("5,+1.00", ",,geometric,.2,", "column level: found no level for the factor F");
    let texts = Texts {
        positions: BOOK,
        exposures: "holding,factor,money,per\nOthers,F,1,+1%\n",
        factors: "factor,volatility\nF,.2\n",
        ..Texts::default()
    };
    refused(texts, &["exposures.csv, line 2, column holding: found `Others`"]);
}

#[test]
fn always_a_linear_reading_is_told() {
    let texts = Texts {
        positions: BOOK,
        exposures: "holding,factor,money,per\nUnits,F,1,+1%\nUnits,G,1,+1%\n",
        factors: "factor,volatility\nF,.2\nG,.2\n",
        ..Texts::default()
    };
    let notices = model(texts).unwrap().notices;
    assert!(
        notices.iter().any(|notice| notice.text.starts_with("1 holding is read by its sensitivities alone"))
    );
}
