//! What rows say about factors: who describes them, where two disagree, and what a diffusion needs.

use super::{Texts, model, positions, refused};
use ebbmark_engine::book::HalfLife;
use ebbmark_engine::factors::Diffusion;

#[test]
fn always_two_rows_that_describe_a_factor_differently_are_told_with_both_lines() {
    let book = "name,quantity,price,factor,volatility\nA,1,1,F,20%\nB,1,1,F,\nC,1,1,F,0.3\n";
    refused(
        positions(book),
        &[
            "positions.csv, line 4, column volatility: found `0.3`, expected `20%` as at positions.csv, line 2",
        ],
    );
    let texts = Texts {
        positions: "name,quantity,price,volatility\nA,1,1,20%\n",
        factors: "factor,volatility\nA,0.21\n",
        ..Texts::default()
    };
    refused(
        texts,
        &["factors.csv, line 2, column volatility: found `0.21`, expected `20%` as at positions.csv, line 2"],
    );
    // The same figure written otherwise is no disagreement.
    let texts = Texts { factors: "factor,volatility\nA,0.2\n", ..texts };
    assert!(model(texts).is_ok());
}

#[test]
fn always_a_percentage_written_without_its_sign_is_refused() {
    let book = |volatility: &str| format!("name,quantity,price,volatility\nA,1,1,{volatility}\n");
    refused(
        positions(&book("18")),
        &[
            "line 2, column volatility: found `18`, expected a fraction or a % sign (18 means 1,800 % a year; write 18% or 0.18)",
        ],
    );
    for (text, expected) in [("3.2", 3.2), ("5", 5.0), ("600%", 6.0), ("0", 0.0)] {
        let model = model(positions(&book(text))).unwrap();
        assert_eq!(
            model.factors[0].diffusion,
            Diffusion::Geometric { drift: 0.0, volatility: expected },
            "{text}"
        );
    }
}

#[test]
fn always_a_reverting_level_takes_no_percent_sign() {
    let header = "name,kind,quantity,price,volatility,long_run,half_life_days";
    for row in ["R,level,1,3,90%,2,40", "R,level,1,3,0.9,2%,40"] {
        refused(positions(&format!("{header}\n{row}\n")), &["expected a number without %"]);
    }
    // In its own units 18 is 18.
    assert!(model(positions(&format!("{header}\nR,level,1,3,18,2,40\n"))).is_ok());
}

#[test]
fn always_missing_parameters_are_asked_for_by_name() {
    let header = "name,kind,quantity,price,diffusion,volatility,long_run,half_life_days";
    refused(
        positions(&format!(
            "{header}\nA,spot,1,1,,,,\nB,level,1,1,,,2,40\nC,spot,1,1,reverting-log,.2,,\nD,level,1,1,,.2,,40\n"
        )),
        &[
            "line 2, column volatility: found no volatility for the factor A",
            "line 3, column volatility",
            "line 4, column half_life_days: found no half_life_days for the factor C",
            "line 5, column long_run: found no long_run for the factor D",
        ],
    );
}

#[test]
fn exact_no_reversion_needs_no_long_run() {
    let book = "name,kind,quantity,price,volatility,half_life_days\nR,level,1,3,0.9,none\n";
    let expected = Diffusion::RevertingLevel { volatility: 0.9, long_run: 3.0, half_life: HalfLife::None };
    assert_eq!(model(positions(book)).unwrap().factors[0].diffusion, expected);
}

#[test]
fn always_levels_that_share_a_factor_agree() {
    let book = "name,kind,quantity,price,factor,volatility,half_life_days\nA,level,1,3,F,.5,none\nB,level,2,3.1,F,,\n";
    refused(
        positions(book),
        &["line 3, column price: found `3.1`, expected `3` as at positions.csv, line 2, column price"],
    );
    let same = book.replace("3.1", "3");
    assert_eq!(model(positions(&same)).unwrap().factors[0].level, Some(3.0));
}

#[test]
fn always_a_level_is_asked_for_only_where_it_matters() {
    // Two spot rows share a factor named like neither: geometric needs no level, a reverting one does.
    let book = |diffusion: &str| {
        format!(
            "name,quantity,price,factor,diffusion,volatility,long_run,half_life_days\nA,1,10,F,{diffusion},.2,5,9\nB,1,20,F,,,,\n"
        )
    };
    assert_eq!(model(positions(&book("geometric"))).unwrap().factors[0].level, None);
    refused(positions(&book("reverting-log")), &["column level: found no level for the factor F"]);
    let texts =
        Texts { positions: &book("reverting-log"), factors: "factor,level\nF,7\n", ..Texts::default() };
    assert_eq!(model(texts).unwrap().factors[0].level, Some(7.0));
}

#[test]
fn always_factors_stand_in_order_of_first_appearance() {
    let texts = Texts {
        positions: "name,quantity,price,kind,currency,factor,volatility\nA,1,1,spot,USD,F,.2\nX,1,5,exposure,GBP,,\nB,1,1,spot,EUR,G,.2\n",
        exposures: "holding,factor,money,per\nX,H,1,+1%\nX,F,1,+1%\n",
        factors: "factor,level,volatility\nunused,1,.1\nH,,.3\nGBP/EUR,1.1,.1\nUSD/EUR,.9,.1\n",
        currency: Some("EUR"),
        ..Texts::default()
    };
    let names: Vec<String> = model(texts).unwrap().factors.into_iter().map(|factor| factor.name).collect();
    assert_eq!(names, ["F", "USD/EUR", "GBP/EUR", "G", "H"]);
}
