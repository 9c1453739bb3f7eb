//! Tests of a random walk and variance ratios, against figures computed elsewhere.

use crate::support::*;
use ebbmark_engine::fit::evidence::{Evidence, critical_values};

#[test]
fn table_critical_values_of_mackinnon() {
    // MacKinnon (2010), constant case, as evaluated by statsmodels; four decimals.
    for (n, printed) in [(100.0, [-3.4975, -2.8909, -2.5824]), (250.0, [-3.4568, -2.8732, -2.5730])] {
        for (value, printed) in critical_values(n).into_iter().zip(printed) {
            near(value, printed, 5e-5);
        }
    }
}

#[test]
fn agree_variance_ratios_with_numpy() {
    // Lo and MacKinlay's formulas written out in numpy for y_i = sin(0.7 i) + 0.5 cos(1.9 i) + 0.05 i, i = 0 to 64.
    let values: Vec<f64> =
        (0..65).map(f64::from).map(|i| (0.7 * i).sin() + 0.5 * (1.9 * i).cos() + 0.05 * i).collect();
    let evidence = Evidence::of(&path(&values, &[1; 64], 1.0 / 252.0), None);
    let two = evidence.variance_ratios[0];
    assert_eq!(two.span, 2);
    near(two.ratio, 1.164_385, 5e-7);
    near(two.z, 1.315_080, 5e-7);
    near(two.robust_z, 1.576_698, 5e-7);
    let spans: Vec<usize> = evidence.variance_ratios.iter().map(|ratio| ratio.span).collect();
    assert_eq!(spans, [2, 5, 10, 21]);
}
