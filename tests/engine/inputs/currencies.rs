//! Books in several currencies: which one is the book's, and rates given the other way round.

use super::{Texts, model, positions, refused};
use crate::support::close;
use ebbmark_engine::factors::{Diffusion, Model};

const BOOK: &str = "name,quantity,price,volatility,currency\nHome,1,100,20%,EUR\nAway,10,20,30%,USD\n";

fn with_rate(factors: &str, correlation: &str) -> Model {
    let currency = Some("EUR");
    model(Texts { positions: BOOK, factors, correlation, currency, ..Texts::default() }).unwrap()
}

#[test]
fn always_the_book_currency_is_the_only_one_named_or_asked_for() {
    let one = BOOK.replace("USD", "EUR");
    assert_eq!(model(positions(&one)).unwrap().currency.as_deref(), Some("EUR"));
    refused(
        positions(BOOK),
        &["column currency: found 2 currencies (EUR, USD), expected the book's currency"],
    );
    refused(positions(&BOOK.replace("USD", "")), &["found EUR on some rows and no currency on others"]);
    let named_by_rate = Texts { factors: "factor,level,volatility\nUSD/EUR,.9,.1\n", ..positions(&one) };
    refused(named_by_rate, &["found 2 currencies"]);
    let none = "name,quantity,price,volatility\nA,1,1,.2\n";
    assert_eq!(model(positions(none)).unwrap().currency, None);
    refused(Texts { currency: Some("euro"), ..positions(none) }, &["book currency `euro`"]);
}

#[test]
fn always_a_foreign_holding_needs_its_rate() {
    refused(
        Texts { currency: Some("EUR"), ..positions(BOOK) },
        &["column level: found no level for the factor USD/EUR", "column volatility: found no volatility"],
    );
}

#[test]
fn agree_an_inverted_rate_is_the_direct_one() {
    let correlation = |rate: &str, sign: &str| format!(",Away,{rate}\nAway,1,\n{rate},{sign}0.4,1\n");
    let direct =
        with_rate("factor,level,drift,volatility\nUSD/EUR,0.8,0.03,10%\n", &correlation("USD/EUR", "-"));
    // 1 / 0.8 dollars for a euro; sigma^2 - drift = 0.01 - 0.03.
    let inverted =
        with_rate("factor,level,drift,volatility\nEUR/USD,1.25,-0.02,10%\n", &correlation("EUR/USD", ""));
    assert!(
        inverted.notices.iter().any(|notice| notice.text.starts_with("EUR/USD is read inverted, as USD/EUR"))
    );
    assert_eq!(inverted.factors[2].name, "USD/EUR");
    close(inverted.value, direct.value, 1e-14);
    close(inverted.correlation.at(1, 2), direct.correlation.at(1, 2), 1e-14);
    close(inverted.correlation.at(1, 2), -0.4, 1e-14);
    let Diffusion::Geometric { drift, volatility } = inverted.factors[2].diffusion else {
        panic!("not geometric")
    };
    close(drift, 0.03, 1e-12);
    close(volatility, 0.1, 1e-14);
}

#[test]
fn always_a_rate_both_ways_or_inverted_by_level_is_refused() {
    let with = |factors| Texts { positions: BOOK, factors, currency: Some("EUR"), ..Texts::default() };
    refused(
        with("factor,level,volatility\nEUR/USD,1.25,.1\nUSD/EUR,1.25,.1\n"),
        &["factors.csv, line 3, column factor: found the rate both as EUR/USD and as USD/EUR"],
    );
    refused(
        with("factor,level,volatility,diffusion,half_life_days\nEUR/USD,1.25,.1,reverting-level,none\n"),
        &["factors.csv, line 2, column diffusion: found an inverted rate with `reverting-level`"],
    );
}
