//! Readings: what holds between their figures for any book and sample.

use crate::support::*;
use ebbmark_engine::factors::Model;
use ebbmark_engine::measures::{Conventions, LossFrom, Reading, first_reading, reading};
use ebbmark_engine::simulate::DaySample;
use proptest::prelude::*;

const LEVELS: [&str; 4] = ["0.75", "0.9", "0.95", "0.99"];

/// One factor of each diffusion, in the book's currency and abroad, with any weights.
fn any_book() -> impl Strategy<Value = Model> {
    let weights = proptest::collection::vec(-1e4..1e4_f64, 5);
    (weights, 0.0..0.8_f64, -1e5..1e5_f64).prop_map(|(weights, volatility, cash)| {
        let factors = vec![
            geometric(100.0, 0.1, volatility),
            reverting_log(5.0, 6.0, 3.0, 0.4),
            reverting_level(2.0, 1.0, 1.0, 0.7),
            geometric(1.2, -0.02, 0.1),
        ];
        let own = part(None, cash, &[(0, weights[0]), (2, weights[1])]);
        let abroad = part(Some((3, 1.2)), weights[2], &[(1, weights[3]), (2, weights[4])]);
        let value = cash + weights[0] + 1.2 * (weights[2] + weights[3]);
        model(factors, &[(0, 1, 0.4), (1, 2, -0.5), (0, 3, 0.3)], vec![own, abroad], value)
    })
}

fn conventions(loss_from: LossFrom) -> Conventions {
    Conventions { loss_from, ..from_today(&LEVELS) }
}

/// ES is never below VaR, both rise with confidence, and ranges hold their figures; the same for drawdowns.
fn check_order(read: &Reading) {
    let is_held = |low: Option<f64>, value: f64, high: Option<f64>| {
        low.is_none_or(|low| low <= value) && high.is_none_or(|high| value <= high)
    };
    for row in &read.loss {
        assert!(row.es >= row.var, "{row:?}");
        assert!(is_held(row.var_low, row.var, row.var_high) && is_held(row.es_low, row.es, row.es_high));
    }
    for row in &read.drawdown.quantiles {
        assert!(row.value >= 0.0 && row.mean_beyond >= row.value, "{row:?}");
        assert!(is_held(row.value_low, row.value, row.value_high));
    }
    assert!(read.loss.is_sorted_by(|left, right| left.var <= right.var && left.es <= right.es));
    let falls = &read.drawdown.quantiles;
    assert!(falls.is_sorted_by(|left, right| left.value <= right.value));
}

proptest! {
    #![proptest_config(ProptestConfig::with_cases(40))]

    #[test]
    fn always_figures_are_in_order(book in any_book(), day in 1_u32..30, is_from_mean: bool) {
        let loss_from = if is_from_mean { LossFrom::Mean } else { LossFrom::Today };
        let conventions = conventions(loss_from);
        check_order(&reading(&book, &sample(&book, 1_000, 1, day), &conventions));
        check_order(&first_reading(&book, day, &conventions));
    }

    #[test]
    fn always_cash_leaves_losses_from_today(book in any_book(), cash in -1e6..1e6_f64) {
        let mut richer = book.clone();
        richer.valuation.parts[0].constant += cash;
        richer.value += cash;
        let read = |book: &Model| reading(book, &sample(book, 1_000, 1, 5), &conventions(LossFrom::Today));
        let (before, after) = (read(&book), read(&richer));
        // Values of up to a few millions carry rounding of about 1e-9.
        for (left, right) in before.loss.iter().zip(&after.loss) {
            near(left.var, right.var, 1e-7);
            near(left.es, right.es, 1e-7);
        }
    }

    #[test]
    fn always_twice_the_book_loses_twice(book in any_book()) {
        // Doubling is exact in binary: so are the figures.
        let mut double = book.clone();
        double.value *= 2.0;
        for part in &mut double.valuation.parts {
            part.constant *= 2.0;
            part.terms.iter_mut().for_each(|term| term.weight *= 2.0);
        }
        let read = |book: &Model| reading(book, &sample(book, 1_000, 1, 5), &conventions(LossFrom::Today));
        let (once, twice) = (read(&book), read(&double));
        for (left, right) in once.loss.iter().zip(&twice.loss) {
            prop_assert_eq!([2.0 * left.var, 2.0 * left.es], [right.var, right.es]);
        }
        prop_assert_eq!(once.moments.skewness.sampled, twice.moments.skewness.sampled);
        prop_assert_eq!(2.0 * once.drawdown.mean, twice.drawdown.mean);
    }
}

#[test]
fn always_a_small_sample_has_no_upper_end() {
    // 250 paths at 99 %: order statistic 244 below, none above; the tail of 2.5 paths has no error of its own.
    let values: Vec<f64> = (1..=250).map(|k| -f64::from(k)).collect();
    let sample =
        DaySample { day: 1, falls: values.iter().map(|value| -value).collect(), values, touched: None };
    let book = model(vec![geometric(1.0, 0.0, 0.2)], &[], vec![part(None, 0.0, &[(0, 1.0)])], 0.0);
    let read = reading(&book, &sample, &from_today(&["0.99"]));
    let (loss, fall) = (read.loss[0], read.drawdown.quantiles[0]);
    assert_eq!([Some(loss.var), loss.var_low, loss.var_high], [Some(248.0), Some(244.0), None]);
    close(loss.es, (250.0 + 249.0 + 0.5 * 248.0) / 2.5, RELATIVE);
    assert_eq!([loss.es_low, loss.es_high], [Some(244.0), None]);
    assert_eq!([fall.value_low, fall.value_high, fall.mean_beyond_error], [Some(244.0), None, None]);
}

#[test]
fn always_a_gain_stays_a_gain() {
    // All paths gain: VaR and ES are negative, and nothing is cut off at 0.
    let values: Vec<f64> = (0..1000).map(|k| 110.0 + f64::from(k) / 1000.0).collect();
    let sample = DaySample { day: 1, falls: vec![0.0; 1000], values, touched: None };
    let book = model(vec![geometric(1.0, 0.0, 0.2)], &[], vec![part(None, 100.0, &[])], 100.0);
    let read = reading(&book, &sample, &from_today(&["0.99"]));
    close(read.loss[0].var, -10.01, RELATIVE);
    assert!(read.loss[0].es > read.loss[0].var && read.loss[0].es < -10.0);
}

#[test]
fn always_the_limit_counts_from_today_and_strictly() {
    // Ten paths, losses 0..9 from today's 100; the mean of the book is 120, which the limit does not look at.
    let values: Vec<f64> = (0..10).map(|k| 100.0 - f64::from(k)).collect();
    let touched = Some(ebbmark_engine::maths::Estimate { value: 0.5, standard_error: 0.1 });
    let sample = DaySample { day: 252, falls: vec![0.0; 10], values, touched };
    let mut book = model(vec![geometric(1.0, 0.0, 0.2)], &[], vec![part(None, 100.0, &[])], 100.0);
    book.valuation.parts[0].income_per_year = 20.0;
    let limited = Conventions { loss_limit: Some(5.0), ..conventions(LossFrom::Mean) };
    let limit = reading(&book, &sample, &limited).limit.unwrap();
    assert_eq!(limit.at_horizon, 0.4);
    close(limit.at_horizon_error, (0.24_f64 / 10.0).sqrt(), RELATIVE);
    assert_eq!([limit.by_horizon, limit.by_horizon_error], [0.5, 0.1]);
    let unwatched = DaySample { touched: None, ..sample };
    assert_eq!(reading(&book, &unwatched, &limited).limit, None);
}

#[test]
fn always_a_still_book_has_no_skewness_and_no_loss() {
    let book = model(vec![geometric(1.0, 0.0, 0.0)], &[], vec![part(None, 50.0, &[(0, 30.0)])], 80.0);
    let limited = Conventions { loss_limit: Some(1.0), ..from_today(&LEVELS) };
    let sampled = reading(&book, &run_to(&book, 1_000, 1, &[21], Some(1.0)).sample(21).unwrap(), &limited);
    for read in [sampled, first_reading(&book, 21, &limited)] {
        assert_eq!(read.moments.sd.exact, Some(0.0));
        let skewness = read.moments.skewness;
        assert_eq!([skewness.exact, skewness.sampled, skewness.standard_error], [None; 3]);
        assert!(read.loss.iter().all(|row| row.var == 0.0 && row.es == 0.0));
        assert!(read.drawdown.quantiles.iter().all(|row| row.value == 0.0 && row.mean_beyond == 0.0));
        let limit = read.limit.unwrap();
        assert_eq!([limit.at_horizon, limit.by_horizon], [0.0, 0.0]);
    }
}

#[test]
fn always_an_empty_sample_is_read_without_panic() {
    let sample = DaySample { day: 1, values: vec![], falls: vec![], touched: None };
    let read = reading(&reference_book(), &sample, &from_today(&LEVELS));
    assert!(read.loss.is_empty() && read.drawdown.quantiles.is_empty());
    assert_eq!(read.moments.skewness.sampled, None);
}
