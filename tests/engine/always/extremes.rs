//! Inputs that no one means but anyone may type: volatilities of 2,000 %, amounts at the end of the doubles, half-lives of
//! nothing and of for ever. Figures may then be infinite or missing; nothing panics, hangs, or tells a risk as none.

use crate::support::*;
use ebbmark_engine::factors::Model;
use ebbmark_engine::figures::{Subject, distribution_figure, horizon_figure};
use ebbmark_engine::measures::{
    Bands, Conventions, Density, LossFrom, Reading, bands, density, exact_moments, factor_ahead, first_bands,
    first_densities, first_reading, reading,
};

const DAYS: [u32; 3] = [1, 21, 504];

fn extremes() -> Vec<Model> {
    let alone = |factor, weight: f64, value: f64| {
        model(vec![factor], &[], vec![part(None, 0.0, &[(0, weight)])], value)
    };
    vec![
        alone(geometric(50.0, 0.0, 20.0), 50.0, 50.0),
        alone(geometric(50.0, 0.0, 20.0), -50.0, -50.0),
        alone(geometric(50.0, 1000.0, 0.2), 50.0, 50.0),
        alone(geometric(50.0, -1000.0, 0.2), 50.0, 50.0),
        alone(geometric(1e300, 0.0, 0.2), 1e300, 1e300),
        alone(geometric(1e-300, 0.0, 0.2), 1e-300, 1e-300),
        alone(geometric(50.0, 0.0, 1e-200), 50.0, 50.0),
        alone(reverting_log(50.0, 1e300, 1e300, 0.2), 50.0, 50.0),
        alone(reverting_log(50.0, 60.0, 1e-300, 0.2), 50.0, 50.0),
        alone(reverting_level(3.0, -1e300, 2.0, 0.8), -100.0, 0.0),
        alone(reverting_level(3.0, 4.0, 2.0, 1e300), 1e8, 0.0),
        alone(reverting_level(3.0, 3.0, 0.0, 0.0), 1.0, 0.0),
    ]
}

fn conventions(loss_from: LossFrom) -> Conventions {
    Conventions { loss_from, loss_limit: Some(5.0), ..from_today(&["0.95", "0.999"]) }
}

/// Reads and draws the paths and the closed form; what comes out is for the caller to judge.
fn read_and_draw(model: &Model, day: u32, loss_from: LossFrom) -> [Reading; 2] {
    let conventions = conventions(loss_from);
    let run = run_to(model, 300, 1, &DAYS, conventions.loss_limit);
    let sample = run.sample(day).unwrap();
    let sampled = reading(model, &sample, &conventions);
    draw(model, day, &sampled, &bands(&run, &DAYS), [&density(&sample.values), &density(&sample.falls)]);
    let first = first_reading(model, day, &conventions);
    let (values, falls) = first_densities(model, day);
    draw(model, day, &first, &first_bands(model, &DAYS), [&values, &falls]);
    [sampled, first]
}

fn draw(model: &Model, day: u32, reading: &Reading, bands: &Bands, [values, falls]: [&Density; 2]) {
    let subject = Subject {
        book: "Extreme",
        model,
        base: Some(50.0),
        as_of: None,
        date: None,
        has_holidays: false,
        bands,
        last_day: 504,
        day,
        reading,
        values,
        falls,
        confidence: 0.95,
        loss_from: LossFrom::Today,
        loss_limit: Some(5.0),
        paths: None,
        seed: 1,
    };
    for figure in [horizon_figure(&subject), distribution_figure(&subject)] {
        assert!(!figure.panels.is_empty());
    }
}

#[test]
fn always_extremes_are_read_and_drawn_without_panic() {
    for model in extremes() {
        for day in DAYS {
            for loss_from in [LossFrom::Today, LossFrom::Mean] {
                for reading in read_and_draw(&model, day, loss_from) {
                    for row in &reading.loss {
                        assert!(row.es >= row.var || !row.es.is_finite(), "{model:?} at {day}: {row:?}");
                    }
                }
            }
            factor_ahead(&model.factors[0], model.days_per_year, &[day]);
        }
    }
}

#[test]
fn always_a_risk_too_large_for_a_double_is_not_told_as_none() {
    // Variance exp(800) and more: no double holds it.
    let wild = &extremes()[0];
    assert!(!exact_moments(wild, 504).sd.is_finite());
    assert_eq!(exact_moments(wild, 504).skewness.filter(|skewness| skewness.is_finite()), None);
}
