//! Bands, densities and factors ahead: what charts rely on.

use crate::support::*;
use ebbmark_engine::maths::normal_density;
use ebbmark_engine::measures::{
    Density, bands, density, exact_moments, factor_ahead, first_bands, first_densities, first_reading,
    reading,
};
use ebbmark_engine::simulate::DaySample;

/// Ascending, finite, not negative, of area 1.
#[track_caller]
fn check_shape(shape: &Density) {
    assert!(shape.at.len() == shape.density.len() && shape.at.len() >= 3);
    assert!(shape.at.is_sorted());
    assert!(shape.density.iter().all(|height| height.is_finite() && *height >= 0.0));
    let cells = shape.at.windows(2).zip(shape.density.windows(2));
    near(cells.map(|(x, f)| (x[1] - x[0]) * (f[0] + f[1]) / 2.0).sum(), 1.0, 1e-3);
}

fn check_ends(sample: &[f64]) -> Density {
    let shape = density(sample);
    check_shape(&shape);
    let low = sample.iter().copied().fold(f64::INFINITY, f64::min);
    let high = sample.iter().copied().fold(f64::NEG_INFINITY, f64::max);
    assert_eq!([shape.at.first(), shape.at.last()], [Some(&low), Some(&high)]);
    shape
}

#[test]
fn always_a_density_ends_with_its_sample() {
    let normals = sample(&reference_book(), 20_000, 3, 10).values;
    check_ends(&normals);
    check_ends(&sample(&reference_book(), 20_000, 3, 10).falls);
    // A tail a million times as long as the middle, an atom that holds most paths, two values, one far off.
    check_ends(&normals.iter().map(|value| (value / 20.0 - 52.5).exp()).collect::<Vec<_>>());
    check_ends(&normals.iter().map(|value| value.max(1050.0)).collect::<Vec<_>>());
    check_ends(&[1.0, 2.0]);
    check_ends(&[vec![5.0; 999], vec![1e9]].concat());
}

#[test]
fn always_a_density_of_nothing_or_of_one_value_is_drawn() {
    assert!(density(&[]).at.is_empty());
    assert!(density(&[f64::NAN, f64::INFINITY]).at.is_empty());
    check_shape(&density(&[0.0; 100]));
    check_shape(&density(&[-7e6; 3]));
}

#[test]
fn always_a_density_of_a_normal_book_is_the_bell() {
    let book = model(vec![reverting_level(0.0, 0.0, 0.0, 1.0)], &[], vec![part(None, 0.0, &[(0, 1.0)])], 0.0);
    let shape = density(&sample(&book, 100_000, 1, 252).values);
    for (at, height) in shape.at.iter().zip(&shape.density) {
        // Smoothing and noise of 100,000 paths come to a few hundredths of the peak.
        near(*height, normal_density(*at), 0.015);
    }
}

#[test]
fn always_bands_are_nested_and_lie_where_the_var_does() {
    let book = reference_book();
    let run = run_to(&book, 5_000, 1, &[1, 5, 21], None);
    let bands = bands(&run, &[1, 4, 5, 21]);
    assert_eq!(bands.days, [1, 5, 21]);
    assert!(bands.values.iter().all(|row| row.is_sorted()) && bands.falls.iter().all(|row| row.is_sorted()));
    let read = reading(&book, &run.sample(21).unwrap(), &from_today(&["0.95", "0.99"]));
    // Today's value less the band is the VaR up to one rounding.
    near(book.value - bands.values[2][1], read.loss[0].var, 1e-9);
    near(book.value - bands.values[2][0], read.loss[1].var, 1e-9);
    assert_eq!(bands.falls[2][3..], [read.drawdown.quantiles[0].value, read.drawdown.quantiles[1].value]);
}

#[test]
fn always_first_bands_are_those_of_the_first_reading() {
    let days: Vec<u32> = (1..=252).collect();
    let book = reference_book();
    let bands = first_bands(&book, &days);
    assert!(bands.is_closed_form && bands.days == days);
    for day in [1, 2, 17, 63, 100, 252] {
        let read = first_reading(&book, day, &from_today(&["0.99"]));
        let row = day as usize - 1;
        // Interpolation costs less than a hundredth of the sd.
        let reach = 0.01 * exact_moments(&book, day).sd;
        near(book.value - bands.values[row][0], read.loss[0].var, reach);
        near(bands.falls[row][4], read.drawdown.quantiles[0].value, reach);
    }
    assert!(first_bands(&book, &[]).values.is_empty());
    assert_eq!(first_bands(&book, &[9]).values.len(), 1);
}

#[test]
fn always_first_densities_have_area_one() {
    let (values, falls) = first_densities(&reference_book(), 21);
    check_shape(&values);
    check_shape(&falls);
    let still = model(vec![geometric(1.0, 0.0, 0.0)], &[], vec![part(None, 0.0, &[(0, 30.0)])], 30.0);
    let (values, falls) = first_densities(&still, 21);
    check_shape(&values);
    check_shape(&falls);
}

#[test]
fn always_a_factor_ahead_is_the_law_of_its_paths() {
    // A holding of one unit of each factor, so that the book's value is the factor's level (plus today's for a level).
    for (factor, constant) in [
        (geometric(80.0, 0.1, 0.3), 0.0),
        (reverting_log(80.0, 100.0, 4.0, 0.3), 0.0),
        (reverting_level(-2.0, 1.0, 4.0, 3.0), -2.0),
    ] {
        let (weight, today) = if factor.diffusion.is_log() { (80.0, 80.0) } else { (1.0, constant) };
        let ahead = factor_ahead(&factor, DAYS_PER_YEAR, &[21]);
        let book = model(vec![factor], &[], vec![part(None, constant, &[(0, weight)])], today);
        close(ahead.mean[0], exact_moments(&book, 21).mean, RELATIVE);
        let DaySample { values, .. } = sample(&book, 20_000, 1, 21);
        let share = |[low, high]: [f64; 2]| {
            values.iter().filter(|value| (low..high).contains(*value)).count() as f64 / values.len() as f64
        };
        // Four binomial standard errors.
        near(share(ahead.half[0]), 0.5, 4.0 * f64::sqrt(0.25 / 20_000.0));
        near(share(ahead.ninety[0]), 0.9, 4.0 * f64::sqrt(0.09 / 20_000.0));
    }
}
