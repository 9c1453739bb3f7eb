//! Printed and standard tables, their source in each test.

use crate::support::*;
use ebbmark_engine::fit::Refusal;
use ebbmark_engine::fit::reverting::fit_reverting;
use ebbmark_engine::maths::{UpperTail, normal_quantile, rank_range, sample_moments};
use ebbmark_engine::measures::first_reading;

/// A tail probability on either side of a 95 % range.
const MISS: f64 = 0.025;

#[test]
fn table_losses_of_a_normal_position() {
    // McNeil, Frey and Embrechts, Quantitative Risk Management, 1st ed., table 2.1 (from memory): a position of 10,000
    // with a yearly volatility of 20 % over one of 250 days; printed to one decimal.
    let mut book = model(
        vec![reverting_level(0.0, 0.0, 0.0, 0.2)],
        &[],
        vec![part(None, 10_000.0, &[(0, 10_000.0)])],
        10_000.0,
    );
    book.days_per_year = 250.0;
    let levels = ["0.90", "0.95", "0.975", "0.99", "0.995"];
    let printed = [(162.1, 222.0), (208.1, 260.9), (247.9, 295.7), (294.3, 337.1), (325.8, 365.8)];
    let rows = first_reading(&book, 1, &from_today(&levels)).loss;
    for (row, (var, es)) in rows.iter().zip(printed) {
        near(row.var, var, 0.05);
        near(row.es, es, 0.05);
    }
}

#[test]
fn table_two_currencies() {
    // Jorion, Value at Risk, 3rd ed., chapter 7 (from memory): 2m in a currency of 5 % and 1m in one of 12 %,
    // uncorrelated. sd 156,205; 257,738 at z = 1.65, which the book rounds 95 % to.
    let book = model(
        vec![reverting_level(1.0, 1.0, 0.0, 0.05), reverting_level(1.0, 1.0, 0.0, 0.12)],
        &[],
        vec![part(None, 3e6, &[(0, 2e6), (1, 1e6)])],
        3e6,
    );
    let read = first_reading(&book, 252, &from_today(&["0.95"]));
    let sd = read.moments.sd.exact.unwrap();
    near(sd, 156_205.0, 0.5);
    near(1.65 * sd, 257_738.0, 0.5);
    near(read.loss[0].var, normal_quantile(0.95) * sd, 1e-6);
}

#[test]
fn table_normal_quantiles_and_shortfalls() {
    // Standard normal z and phi(z) / p, as in any table; here to six decimals.
    let book = model(vec![reverting_level(0.0, 0.0, 0.0, 1.0)], &[], vec![part(None, 0.0, &[(0, 1.0)])], 0.0);
    let printed = [
        ("0.95", 1.644854, 2.062713),
        ("0.975", 1.959964, 2.337803),
        ("0.99", 2.326348, 2.665214),
        ("0.999", 3.090232, 3.367090),
    ];
    for (level, z, es) in printed {
        let row = first_reading(&book, 252, &from_today(&[level])).loss[0];
        near(row.var, z, 6e-7);
        near(row.es, es, 6e-7);
    }
}

#[test]
fn table_normal_quantile_of_as241() {
    // Wichura, Applied Statistics 37 (1988), and values of scipy 1.17.
    for (p, z) in [
        (0.25, -0.6744897501960817),
        (0.001, -3.090232306167813),
        (1e-20, -9.262340089798405),
        (0.5, 0.0),
        (0.99, 2.3263478740408408),
    ] {
        near(normal_quantile(p), z, 1e-15 * z.abs());
    }
    assert_eq!([normal_quantile(0.0), normal_quantile(1.0)], [f64::NEG_INFINITY, f64::INFINITY]);
    assert!(normal_quantile(-0.1).is_nan() && normal_quantile(f64::NAN).is_nan());
}

#[test]
fn table_ranks_of_order_statistics() {
    // Binomial ranks, computed with scipy 1.17 (tests/reference/ranks.py).
    for (n, p, low, high) in [
        (1_000, 0.99, Some(983), Some(997)),
        (10_000, 0.99, Some(9_880), Some(9_920)),
        (100_000, 0.99, Some(98_938), Some(99_062)),
        (250, 0.99, Some(244), None),
    ] {
        let range = rank_range(n, p, MISS);
        assert_eq!((range.low, range.high), (low, high), "{n} at {p}");
    }
}

#[test]
fn table_shortfall_splits_the_atom() {
    // Losses 1..10 (Acerbi and Tasche 2002, from memory): at .75 VaR 8 and ES 9.2, at .9 ES 10.
    let losses: Vec<f64> = (1..=10).map(f64::from).collect();
    for (level, var, es) in [("0.75", 8.0, 9.2), ("0.9", 9.0, 10.0)] {
        let level = confidence(level);
        let rank = level.rank(10);
        let tail = UpperTail::from_rank(losses.clone(), rank);
        assert_eq!(tail.order_statistic(rank), Some(var));
        near(tail.mean_beyond(rank, level.tail_count(10)).unwrap().value, es, 1e-14);
    }
}

#[test]
fn table_hard_cases_of_nist() {
    // NIST Statistical Reference Datasets, NumAcc2 to NumAcc4: 1,001 values, certified mean base + 0.2 and standard
    // deviation 0.1 (divisor n - 1). In doubles the values of the last are themselves rounded by 6e-10 of the deviation.
    for base in [1.0, 1e6, 1e7] {
        let values: Vec<f64> =
            std::iter::once(0.2).chain([0.1, 0.3].repeat(500)).map(|part| base + part).collect();
        let moments = sample_moments(&values);
        near(moments.mean.value, base + 0.2, 1e-8);
        near(moments.sd.value * (1001.0_f64 / 1000.0).sqrt(), 0.1, 1e-9);
        // Its lag-1 autocorrelation is certified as -0.999; the regression of each value on the one before drops the
        // last square and has slope -999 / 998.999 by hand.
        let found = fit_reverting(&path(&values, &[1; 1000], 1.0 / 252.0), false, 252.0);
        let Err(Refusal::NoMemory { slope }) = found else { panic!("{found:?}") };
        near(slope, -999.0 / 998.999, 1e-8);
    }
}
