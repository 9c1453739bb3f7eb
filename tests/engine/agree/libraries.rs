//! Our numbers beside those of general-purpose libraries: statrs for distribution functions, rand_distr for normals.

use crate::support::{model, near, part, reverting_level, sample};
use ebbmark_engine::maths::{normal_cdf, normal_quantile, rank_range};
use ebbmark_engine::simulate::Stream;
use rand_distr::{Distribution, StandardNormal};
use statrs::distribution::{Binomial, ContinuousCDF, DiscreteCDF, Normal};

#[test]
fn agree_normal_law_with_statrs() {
    let standard = Normal::new(0.0, 1.0).unwrap();
    for tenth in -60..=60 {
        let z = f64::from(tenth) / 10.0;
        // statrs states 1e-10 or better for its error function.
        near(normal_cdf(z), standard.cdf(z), 1e-10);
        near(normal_quantile(normal_cdf(z)), z, 1e-7);
    }
}

#[test]
fn agree_ranks_with_statrs() {
    for (n, p) in [(1_000_u64, 0.99), (10_000, 0.95), (100_000, 0.975)] {
        let law = Binomial::new(p, n).unwrap();
        let range = rank_range(n as usize, p, 0.025);
        let (low, high) = (range.low.unwrap() as u64, range.high.unwrap() as u64);
        assert!(law.cdf(low - 1) <= 0.025 && law.cdf(low) > 0.025, "{n} {p}");
        assert!(law.sf(high - 1) <= 0.025 && law.sf(high - 2) > 0.025, "{n} {p}");
    }
}

/// Sorted sample of the block loop's normals (a Brownian motion's move over a year in one path each) against one of
/// rand_distr's ziggurat with another seed: two-sample Kolmogorov-Smirnov, false alarm 1 in 1,000, fixed seeds.
#[test]
fn law_normals_are_those_of_rand_distr() {
    const PATHS: usize = 50_000;
    let day_sd = 1.0 / 252.0_f64.sqrt();
    let book = model(vec![reverting_level(0.0, 0.0, 0.0, 1.0)], &[], vec![part(None, 0.0, &[(0, 1.0)])], 0.0);
    let mut ours: Vec<f64> = sample(&book, PATHS, 31, 1).values.iter().map(|value| value / day_sd).collect();
    let mut theirs: Vec<f64> = StandardNormal.sample_iter(Stream::new(37, 1)).take(PATHS).collect();
    ours.sort_by(f64::total_cmp);
    theirs.sort_by(f64::total_cmp);
    let mut most: f64 = 0.0;
    for (at, value) in ours.iter().enumerate() {
        let below = theirs.partition_point(|other| other <= value);
        most = most.max((at as f64 + 1.0 - below as f64).abs() / PATHS as f64);
    }
    assert!(most * (PATHS as f64 / 2.0).sqrt() < 1.9495, "{most}");
}

/// The same words through rand's interface as by address: a stream is the generator, not another one.
#[test]
fn law_stream_feeds_rand_distr() {
    let normals: Vec<f64> = StandardNormal.sample_iter(Stream::new(5, 1)).take(20_000).collect();
    let mean = normals.iter().sum::<f64>() / 20_000.0;
    let square = normals.iter().map(|z| z * z).sum::<f64>() / 20_000.0;
    // Four standard errors: 1 / sqrt(n) and sqrt(2 / n).
    near(mean, 0.0, 4.0 / 20_000.0_f64.sqrt());
    near(square, 1.0, 4.0 * (2.0 / 20_000.0_f64).sqrt());
}
