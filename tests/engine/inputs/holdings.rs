//! What a holding is worth and how it moves, by its kind.

use super::{model, positions, refused};
use ebbmark_engine::factors::{Model, Term};

fn only(text: &str) -> Model {
    model(positions(text)).unwrap()
}

#[test]
fn exact_parts_of_every_kind() {
    let header = "name,kind,quantity,price,multiplier,carry,diffusion,volatility,half_life_days,long_run";
    for (row, value, constant, income, weight) in [
        ("A,spot,-3,100,2,5%,,20%,,", -600.0, 0.0, -30.0, Some(-600.0)),
        ("A,spot,3,100,2,,reverting-level,9,none,", 600.0, 600.0, 0.0, Some(6.0)),
        ("A,level,3,-1.5,2,,,0.5,40,2", 0.0, 0.0, 0.0, Some(6.0)),
        ("A,level,3,50,2,,geometric,20%,,", 0.0, -300.0, 0.0, Some(300.0)),
        ("A,cash,-70,,,1%,,,,", -70.0, -70.0, -0.7, None),
        ("A,spot,0,100,,,,20%,,", 0.0, 0.0, 0.0, Some(0.0)),
    ] {
        let model = only(&format!("{header}\n{row}\n"));
        let part = &model.holdings[0].part;
        assert_eq!((model.value, part.constant), (value, constant), "{row}");
        assert!((part.income_per_year - income).abs() < 1e-12, "{row}");
        let terms: Vec<Term> = weight.into_iter().map(|weight| Term { factor: 0, weight }).collect();
        assert_eq!(part.terms, terms, "{row}");
    }
}

#[test]
fn always_what_is_not_read_yet_says_what_to_do() {
    refused(
        positions("name,quantity,price,kind\nLoan,1,100,bond\nCall,1,3,option\n"),
        &["line 2, column kind: found `bond`", "not yet, give its sensitivities in exposures.csv"],
    );
}

#[test]
fn always_products_and_quantities_that_make_no_sense_are_refused() {
    refused(
        positions("name,quantity,price,volatility\nA,1e200,1e200,.2\n"),
        &["column quantity: found `1e200`"],
    );
    refused(
        positions("name,quantity,price,kind\nA,2,100,exposure\n"),
        &["column quantity: found `2`, expected 1"],
    );
    refused(
        positions("name,quantity,price,kind,factor\nA,2,,cash,F\n"),
        &["column factor: found `F`, expected nothing"],
    );
}

#[test]
fn always_holdings_on_one_factor_are_one_term() {
    let model = only("name,quantity,price,factor,volatility\nA,1,100,F,20%\nB,2,50,F,\nC,1,10,G,10%\n");
    assert_eq!(model.factors.len(), 2);
    assert_eq!(
        model.valuation.parts[0].terms,
        [Term { factor: 0, weight: 200.0 }, Term { factor: 1, weight: 10.0 }]
    );
}
