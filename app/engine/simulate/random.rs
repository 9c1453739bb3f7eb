//! Random numbers by address: Philox4x32-10, a counter-based generator. The numbers depend on (seed, path, step, lane)
//! alone, so any path can be drawn again by itself. Nothing here knows what the numbers are for.
//!
//! Source: Salmon, Moraes, Dror, Shaw, "Parallel random numbers: as easy as 1, 2, 3", SC'11.

use rand::rand_core::{TryRng, utils};
use std::convert::Infallible;

const MULTIPLIERS: [u64; 2] = [0xD251_1F53, 0xCD9E_8D57];
const KEY_BUMPS: [u32; 2] = [0x9E37_79B9, 0xBB67_AE85];
const ROUNDS: usize = 10;
const LOW_WORD: u64 = 0xFFFF_FFFF;

/// Lane of the uniforms that place the highest and lowest value within a step; factor pairs have lanes 0, 1, 2, ...
pub(super) const BRIDGE_LANE: u32 = 0x8000_0000;
/// First of the lanes that cut an early day into parts.
pub(super) const PART_LANE: u32 = 0x8000_0001;

/// Ten rounds on `L` counters at once. A word is the low half of its 64-bit lane; what stands above it is of no meaning.
#[inline(always)]
pub(super) fn philox<const L: usize>(counter: [[u64; L]; 4], seed: u64) -> [[u64; L]; 4] {
    let mut words = counter;
    let mut keys = [seed as u32, (seed >> 32) as u32];
    for _ in 0..ROUNDS {
        let [first, second] = keys.map(u64::from);
        for lane in 0..L {
            let [a, b, c, d] = [words[0][lane], words[1][lane], words[2][lane], words[3][lane]];
            let left = MULTIPLIERS[0] * (a & LOW_WORD);
            let right = MULTIPLIERS[1] * (c & LOW_WORD);
            words[0][lane] = (right >> 32) ^ b ^ first;
            words[1][lane] = right;
            words[2][lane] = (left >> 32) ^ d ^ second;
            words[3][lane] = left;
        }
        keys = [keys[0].wrapping_add(KEY_BUMPS[0]), keys[1].wrapping_add(KEY_BUMPS[1])];
    }
    words
}

/// Two uniforms in (0, 1) for each of `L` paths: `(k + 1/2) 2^-52` with a 52-bit `k`, exact, never 0 or 1.
#[inline(always)]
pub(super) fn uniforms<const L: usize>(seed: u64, paths: &[u64; L], step: u32, lane: u32) -> [[f64; L]; 2] {
    let low = paths.map(|path| path & LOW_WORD);
    let high = paths.map(|path| path >> 32);
    let words = philox([low, high, [u64::from(step); L], [u64::from(lane); L]], seed);
    [unit_interval(&words[0], &words[1]), unit_interval(&words[2], &words[3])]
}

#[inline(always)]
fn unit_interval<const L: usize>(low: &[u64; L], high: &[u64; L]) -> [f64; L] {
    // The 52 bits become the mantissa of a number in [1, 2); what is taken off leaves (k + 1/2) 2^-52 without rounding.
    const ONE: u64 = 1023 << 52;
    const BELOW_ONE: f64 = 1.0 - f64::EPSILON / 2.0;
    let mut uniform = [0.0; L];
    for lane in 0..L {
        let bits = ((low[lane] & LOW_WORD) | (high[lane] << 32)) >> 12;
        uniform[lane] = f64::from_bits(bits | ONE) - BELOW_ONE;
    }
    uniform
}

/// The generator as a stream of numbers, for whatever is drawn one after another rather than by address.
/// Its counters have step 0 and so never meet those of a path.
#[derive(Debug, Clone)]
pub struct Stream {
    seed: u64,
    number: u32,
    block: u64,
    unused: Vec<u32>,
}

impl Stream {
    /// Stream `number` of a seed.
    pub fn new(seed: u64, number: u32) -> Self {
        Self { seed, number, block: 0, unused: Vec::with_capacity(4) }
    }

    fn next_word(&mut self) -> u32 {
        if self.unused.is_empty() {
            let counter = [self.block & LOW_WORD, self.block >> 32, 0, u64::from(self.number)];
            let words = philox(counter.map(|word| [word]), self.seed);
            self.unused.extend(words.iter().rev().map(|word| word[0] as u32));
            self.block += 1;
        }
        self.unused.pop().unwrap_or_default()
    }
}

impl TryRng for Stream {
    type Error = Infallible;

    fn try_next_u32(&mut self) -> Result<u32, Infallible> {
        Ok(self.next_word())
    }

    fn try_next_u64(&mut self) -> Result<u64, Infallible> {
        Ok(u64::from(self.next_word()) | (u64::from(self.next_word()) << 32))
    }

    fn try_fill_bytes(&mut self, bytes: &mut [u8]) -> Result<(), Infallible> {
        utils::fill_bytes_via_next_word(bytes, || self.try_next_u32())
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    fn check(counter: [u64; 4], seed: u64, expected: [u64; 4]) {
        let words = philox(counter.map(|word| [word; 3]), seed);
        assert_eq!(words.map(|word| word.map(|lane| lane & LOW_WORD)), expected.map(|word| [word; 3]));
    }

    /// Known answers of the generator's authors (recomputed).
    #[test]
    fn table_known_answers() {
        check([0; 4], 0, [0x6627_e8d5, 0xe169_c58d, 0xbc57_ac4c, 0x9b00_dbd8]);
        check([LOW_WORD; 4], u64::MAX, [0x408f_276d, 0x41c8_3b0e, 0xa20b_c7c6, 0x6d54_51fd]);
        check(
            [0x243f_6a88, 0x85a3_08d3, 0x1319_8a2e, 0x0370_7344],
            0x299f_31d0_a409_3822,
            [0xd16c_fe09, 0x94fd_cceb, 0x5001_e420, 0x2412_6ea1],
        );
    }

    #[test]
    fn exact_ends_of_the_unit_interval() {
        assert_eq!(unit_interval(&[0], &[0]), [f64::EPSILON / 2.0]);
        assert_eq!(unit_interval(&[LOW_WORD], &[LOW_WORD]), [1.0 - f64::EPSILON / 2.0]);
    }

    #[test]
    fn always_addresses_do_not_depend_on_their_neighbours() {
        let together = uniforms(7, &[3, 1 << 40, 5], 11, 2);
        for (lane, path) in [3, 1 << 40, 5].into_iter().enumerate() {
            assert_eq!(uniforms(7, &[path], 11, 2), together.map(|uniform| [uniform[lane]]));
        }
    }
}
