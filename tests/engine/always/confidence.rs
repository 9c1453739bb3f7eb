//! Confidence levels: exact decimals in and out, exact ranks, words for what is no confidence.

use crate::support::confidence;
use ebbmark_engine::measures::Confidence;
use proptest::prelude::*;

#[test]
fn always_a_confidence_reads_as_written() {
    for (text, fraction, percent) in [
        ("0.95", "0.95", "95 %"),
        ("97.5%", "0.975", "97.5 %"),
        ("97.50 %", "0.975", "97.5 %"),
        (" .9990", "0.999", "99.9 %"),
        ("0.6", "0.6", "60 %"),
        ("00.51", "0.51", "51 %"),
    ] {
        let level = confidence(text);
        assert_eq!(String::from(level), fraction);
        assert_eq!(level.to_string(), percent);
        assert_eq!(level.value(), fraction.parse::<f64>().unwrap());
        assert_eq!(fraction.parse::<Confidence>().unwrap(), level);
    }
}

#[test]
fn always_what_is_no_confidence_is_refused_with_words() {
    for (text, words) in [
        ("0.5", "above 0.5"),
        ("50%", "above 0.5"),
        ("1", "below 1"),
        ("100%", "below 1"),
        ("99", "below 1"),
        ("0.99%", "above 0.5"),
        ("0.9999999999999999", "at most 15 decimals"),
        ("", "such as 0.99"),
        ("%", "such as 0.99"),
        (".", "such as 0.99"),
        ("-0.9", "such as 0.99"),
        ("9e-1", "such as 0.99"),
        ("0,99", "such as 0.99"),
        ("0.9.9", "such as 0.99"),
        ("NaN", "such as 0.99"),
        ("0.\u{0669}9", "such as 0.99"),
    ] {
        let error = text.parse::<Confidence>().unwrap_err().to_string();
        assert!(error.contains(words), "{text}: {error}");
    }
}

#[test]
fn always_ranks_are_those_of_the_decimal() {
    // floor(n (1 - 0.9)) in doubles is wrong for every n that is a multiple of 10.
    for n in (10..100_000).step_by(10) {
        assert_eq!(confidence("0.9").rank(n), n / 10 * 9);
        assert_eq!(confidence("0.9").tail_count(n), (n / 10) as f64);
    }
    assert_eq!(confidence("0.99").rank(10_000_000), 9_900_000);
    assert_eq!(confidence("0.975").rank(250), 244);
    assert_eq!(confidence("0.975").tail_count(250), 6.25);
}

proptest! {
    #[test]
    fn always_order_is_that_of_the_values(left in 501_u32..1000, right in 5001_u32..10000) {
        let (small, large) = (confidence(&format!("0.{left}")), confidence(&format!("0.{right}")));
        let expected = (left * 10).cmp(&right);
        prop_assert_eq!(small.cmp(&large), expected);
    }

    #[test]
    fn always_any_text_gives_a_level_or_words(text in "\\PC*") {
        match text.parse::<Confidence>() {
            Ok(level) => prop_assert!(level.value() > 0.5 && level.value() < 1.0),
            Err(error) => prop_assert!(!error.to_string().is_empty()),
        }
    }
}
