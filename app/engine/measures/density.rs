//! The shape of a sample, for a chart: binned and smoothed where the sample is dense, and to its very ends.

/// A density on a grid.
#[derive(Debug, Clone, PartialEq)]
pub struct Density {
    /// Grid, ascending, money.
    pub at: Vec<f64>,
    /// Density at the grid's points, per unit of money.
    pub density: Vec<f64>,
}

/// Points of a grid.
const POINTS: usize = 241;
/// Interquartile range of the standard normal law.
const NORMAL_QUARTILE_RANGE: f64 = 1.349;
/// Share of a value's size, or of 1, that a sample of one value is drawn wide.
const WIDTH_OF_ONE_VALUE: f64 = 1e-3;

impl Density {
    /// A narrow triangle of area 1: the shape of a single value.
    pub fn of_one_value(value: f64) -> Self {
        let width = value.abs().max(1.0) * WIDTH_OF_ONE_VALUE;
        Self { at: vec![value - width, value, value + width], density: vec![0.0, 1.0 / width, 0.0] }
    }
}

/// Density of a sample, finite and with a trapezoid area of 1. It ends at the sample's ends (of a sample of one value: see
/// [`Density::of_one_value`]); an empty sample has no points.
///
/// The sample is binned and smoothed by a normal kernel on the scale `u = asinh((x - median) / spread)`, straight in the
/// middle and logarithmic in the tails, so that a long tail neither takes the middle's bins nor falls apart. The kernel's
/// width is the normal reference rule's `1.06 n^(-1/5)` in units of the spread (Silverman, Density Estimation, 1986, section 3.4;
/// from memory); at the
/// ends it is reflected.
pub fn density(sample: &[f64]) -> Density {
    let mut sample: Vec<f64> = sample.iter().copied().filter(|value| value.is_finite()).collect();
    if sample.is_empty() {
        return Density { at: Vec::new(), density: Vec::new() };
    }
    let (low, high) = sample
        .iter()
        .fold((f64::INFINITY, f64::NEG_INFINITY), |(low, high), value| (low.min(*value), high.max(*value)));
    if low == high {
        return Density::of_one_value(low);
    }
    let scale = Scale::of(&mut sample, high - low);
    let (from, to) = (scale.at(low), scale.at(high));
    let step = (to - from) / (POINTS - 1) as f64;
    let mut shares = vec![0.0; POINTS];
    for value in &sample {
        share_between_points(&mut shares, (scale.at(*value) - from) / step);
    }
    let width = (1.06 * (sample.len() as f64).powf(-0.2) / step).max(1.0);
    let places = (0..POINTS).map(|k| from + k as f64 * step);
    // The ends are the sample's own, whatever the rounding of the scale.
    let mut at: Vec<f64> = places.clone().map(|u| scale.back(u).clamp(low, high)).collect();
    (at[0], at[POINTS - 1]) = (low, high);
    let heights = smoothed(&shares, width).into_iter().zip(places).map(|(share, u)| share * scale.slope(u));
    with_area_one(at, heights.collect())
}

/// `u = asinh((x - centre) / spread)`.
struct Scale {
    centre: f64,
    spread: f64,
}

impl Scale {
    /// Median and normal-equivalent interquartile range; a part of the whole range where half the sample is one value.
    fn of(sample: &mut [f64], range: f64) -> Self {
        let last = sample.len() - 1;
        let [low, centre, high] =
            [1, 2, 3].map(|quarter| *sample.select_nth_unstable_by(last * quarter / 4, f64::total_cmp).1);
        let spread = (high - low) / NORMAL_QUARTILE_RANGE;
        Self { centre, spread: if spread > 0.0 { spread } else { range / 6.0 } }
    }

    fn at(&self, x: f64) -> f64 {
        ((x - self.centre) / self.spread).asinh()
    }

    fn back(&self, u: f64) -> f64 {
        self.centre + self.spread * u.sinh()
    }

    /// `du/dx`.
    fn slope(&self, u: f64) -> f64 {
        1.0 / (self.spread * u.cosh())
    }
}

/// Gives one value to the two grid points it lies between, by its distance from them.
fn share_between_points(shares: &mut [f64], place: f64) {
    let left = (place.max(0.0) as usize).min(shares.len() - 2);
    let right_share = (place - left as f64).clamp(0.0, 1.0);
    shares[left] += 1.0 - right_share;
    shares[left + 1] += right_share;
}

/// Convolution with a normal kernel of `width` grid steps, reflected at the ends.
fn smoothed(shares: &[f64], width: f64) -> Vec<f64> {
    let reach = (4.0 * width).ceil() as usize;
    let kernel: Vec<f64> = (0..=reach).map(|k| (-0.5 * (k as f64 / width).powi(2)).exp()).collect();
    let last = shares.len() - 1;
    let reflected = |place: isize| {
        let place = place.unsigned_abs() % (2 * last);
        place.min(2 * last - place)
    };
    let mut smooth = vec![0.0; shares.len()];
    for (centre, share) in shares.iter().enumerate() {
        for offset in -(reach as isize)..=reach as isize {
            smooth[reflected(centre as isize + offset)] += share * kernel[offset.unsigned_abs()];
        }
    }
    // A reflection piles on an end point what it spreads over pairs inside.
    smooth[0] *= 2.0;
    smooth[last] *= 2.0;
    smooth
}

fn with_area_one(at: Vec<f64>, density: Vec<f64>) -> Density {
    let cells = at.windows(2).zip(density.windows(2));
    let area: f64 = cells.map(|(x, f)| (x[1] - x[0]) * (f[0] + f[1]) / 2.0).sum();
    let density = density.into_iter().map(|height| height / area).collect();
    Density { at, density }
}
