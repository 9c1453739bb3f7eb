//! Elementary functions on lanes of paths: the same digits whatever the instruction set, since every operation is an
//! IEEE one (fused multiply-add included) in a fixed order. Contracts: `ln` takes (0, 1); `exp` clamps its argument to
//! [-708, 709] and so is always finite and positive; nothing here takes or gives a NaN.

/// Paths worked side by side.
pub(super) const LANES: usize = 16;

/// One number a path.
#[derive(Debug, Clone, Copy, PartialEq)]
#[repr(C, align(64))]
pub(super) struct Lanes(pub [f64; LANES]);

impl Lanes {
    /// The same number for every path.
    pub(super) const fn splat(value: f64) -> Self {
        Self([value; LANES])
    }

    /// A number a path from its lane.
    #[inline(always)]
    pub(super) fn each(of: impl Fn(usize) -> f64) -> Self {
        let mut lanes = [0.0; LANES];
        for (lane, value) in lanes.iter_mut().enumerate() {
            *value = of(lane);
        }
        Self(lanes)
    }
}

/// Adding and taking off this number rounds to the nearest integer and leaves it in the low bits of the sum.
const ROUNDER: f64 = 6_755_399_441_055_744.0;

/// Natural logarithm of a number in (0, 1). Coefficients: fdlibm `e_log.c` (Sun Microsystems, from memory).
#[inline(always)]
pub(super) fn ln(u: f64) -> f64 {
    const MANTISSA: u64 = (1 << 52) - 1;
    const TWO_52: f64 = 4_503_599_627_370_496.0;
    const LN_2_HIGH: f64 = 6.931_471_803_691_238_164_90e-1;
    const LN_2_LOW: f64 = 1.908_214_929_270_587_700_02e-10;
    const L: [f64; 7] = [
        6.666_666_666_666_735_13e-1,
        3.999_999_999_940_941_908e-1,
        2.857_142_874_366_239_149e-1,
        2.222_219_843_214_978_396e-1,
        1.818_357_216_161_805_012e-1,
        1.531_383_769_920_937_332e-1,
        1.479_819_860_511_658_591e-1,
    ];
    let bits = u.to_bits();
    let mantissa = f64::from_bits((bits & MANTISSA) | (1023 << 52));
    let biased = f64::from_bits((bits >> 52) | TWO_52.to_bits()) - TWO_52;
    let is_upper = mantissa > std::f64::consts::SQRT_2;
    let m = if is_upper { 0.5 * mantissa } else { mantissa };
    let exponent = biased - if is_upper { 1022.0 } else { 1023.0 };
    let f = m - 1.0;
    let s = f / (2.0 + f);
    let z = s * s;
    let mut polynomial = L[6];
    for coefficient in L[..6].iter().rev() {
        polynomial = polynomial.mul_add(z, *coefficient);
    }
    let half_square = 0.5 * f * f;
    let correction = s.mul_add(z.mul_add(polynomial, half_square), exponent * LN_2_LOW);
    exponent.mul_add(LN_2_HIGH, f - (half_square - correction))
}

/// `exp(x)` by reduction to `|r| <= ln 2 / 2` and a polynomial of degree 11: Chebyshev's interpolation there, within
/// 2e-17 of the exponential.
#[inline(always)]
pub(super) fn exp(x: f64) -> f64 {
    const LN_2_HIGH: f64 = 6.931_471_803_691_238_164_90e-1;
    const LN_2_LOW: f64 = 1.908_214_929_270_587_700_02e-10;
    const P: [f64; 12] = [
        1.0,
        1.0,
        5.000_000_000_000_018_9e-1,
        1.666_666_666_666_668_0e-1,
        4.166_666_666_648_809_2e-2,
        8.333_333_333_319_601_1e-3,
        1.388_888_895_231_481_2e-3,
        1.984_126_989_004_714_3e-4,
        2.480_148_548_228_773_1e-5,
        2.755_724_091_854_762_5e-6,
        2.763_263_965_412_375_8e-7,
        2.511_003_761_756_205_0e-8,
    ];
    let above = if x > -708.0 { x } else { -708.0 };
    let clamped = if above < 709.0 { above } else { 709.0 };
    let shifted = clamped.mul_add(std::f64::consts::LOG2_E, ROUNDER);
    let power = shifted - ROUNDER;
    let r = (-power).mul_add(LN_2_LOW, (-power).mul_add(LN_2_HIGH, clamped));
    let mut polynomial = P[11];
    for coefficient in P[..11].iter().rev() {
        polynomial = polynomial.mul_add(r, *coefficient);
    }
    f64::from_bits(polynomial.to_bits().wrapping_add(shifted.to_bits() << 52))
}

/// `(sin, cos)` of `2 pi turn` for a turn in (0, 1). Coefficients: fdlibm `k_sin.c`, `k_cos.c` (from memory).
#[inline(always)]
pub(super) fn sin_cos_of_turn(turn: f64) -> (f64, f64) {
    const S: [f64; 6] = [
        -1.666_666_666_666_663_243_48e-1,
        8.333_333_333_322_489_461_24e-3,
        -1.984_126_982_985_794_931_34e-4,
        2.755_731_370_707_006_767_89e-6,
        -2.505_076_025_340_686_341_95e-8,
        1.589_690_995_211_550_102_21e-10,
    ];
    const C: [f64; 6] = [
        4.166_666_666_666_660_190_37e-2,
        -1.388_888_888_887_410_957_49e-3,
        2.480_158_728_947_672_941_78e-5,
        -2.755_731_435_139_066_330_35e-7,
        2.087_572_321_298_174_827_9e-9,
        -1.135_964_755_778_819_482_65e-11,
    ];
    let quarters = 4.0 * turn;
    let nearest = (quarters + ROUNDER) - ROUNDER;
    let angle = (quarters - nearest) * std::f64::consts::FRAC_PI_2;
    let z = angle * angle;
    let mut sine = S[5];
    let mut cosine = C[5];
    for power in (0..5).rev() {
        sine = sine.mul_add(z, S[power]);
        cosine = cosine.mul_add(z, C[power]);
    }
    let sine = (sine * z).mul_add(angle, angle);
    let cosine = (cosine * z).mul_add(z, (-0.5_f64).mul_add(z, 1.0));
    let is_odd = (nearest == 1.0) | (nearest == 3.0);
    let (s, c) = if is_odd { (cosine, sine) } else { (sine, cosine) };
    let s = if (nearest == 2.0) | (nearest == 3.0) { -s } else { s };
    let c = if (nearest == 1.0) | (nearest == 2.0) { -c } else { c };
    (s, c)
}

/// Two independent standard normals a path from two uniforms (Box and Muller 1958).
#[inline(always)]
pub(super) fn normal_pair(uniforms: &[[f64; LANES]; 2]) -> [Lanes; 2] {
    let mut pair = [Lanes::splat(0.0); 2];
    for lane in 0..LANES {
        let radius = (-2.0 * ln(uniforms[0][lane])).sqrt();
        let (sine, cosine) = sin_cos_of_turn(uniforms[1][lane]);
        pair[0].0[lane] = radius * cosine;
        pair[1].0[lane] = radius * sine;
    }
    pair
}

#[cfg(test)]
mod tests {
    use super::*;

    /// Four units in the last place: twice what the polynomials were found to need.
    const TOLERANCE: f64 = 4.0 * f64::EPSILON;

    fn grid(count: u32) -> impl Iterator<Item = f64> {
        (1..count).map(move |index| f64::from(index) / f64::from(count))
    }

    #[test]
    fn agree_ln_with_the_standard_library() {
        let small = [f64::EPSILON / 2.0, 1e-9, 1.0 - f64::EPSILON / 2.0];
        for u in grid(100_000).chain(small) {
            assert!((ln(u) - u.ln()).abs() <= TOLERANCE * u.ln().abs(), "{u}");
        }
    }

    #[test]
    fn agree_exp_with_the_standard_library() {
        for x in grid(100_000).map(|u| 1_400.0 * (u - 0.5)).chain(grid(100_000).map(|u| u - 0.5)) {
            assert!((exp(x) / x.exp() - 1.0).abs() <= TOLERANCE, "{x}");
        }
        assert!(exp(1e9).is_finite() && exp(-1e9) > 0.0);
    }

    #[test]
    fn agree_sin_cos_with_the_standard_library() {
        for turn in grid(100_000) {
            let (sine, cosine) = sin_cos_of_turn(turn);
            let (s, c) = (std::f64::consts::TAU * turn).sin_cos();
            assert!((sine - s).abs() <= TOLERANCE && (cosine - c).abs() <= TOLERANCE, "{turn}");
        }
    }
}
