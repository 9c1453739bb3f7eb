//! A fixed block of paths, worked on one thread, and the choice of the instruction set it is worked with.

use super::elementary::LANES;
use super::program::Program;
use super::tile::Tile;
use pulp::{Simd, WithSimd};

/// Paths in a block, a whole number of tiles.
pub(super) const BLOCK_PATHS: usize = 1024;

/// What a block leaves behind: per kept day the values and falls of its paths, and the limit's survival.
#[derive(Debug, PartialEq)]
pub(super) struct Block {
    pub(super) paths: usize,
    /// kept days x paths, a row per day.
    pub(super) values: Vec<f64>,
    /// kept days x paths, a row per day.
    pub(super) falls: Vec<f64>,
    /// Sum over the paths of the probability of having touched the limit, per kept day.
    pub(super) touched: Vec<f64>,
    /// Sum of its squares, per kept day.
    pub(super) touched_squares: Vec<f64>,
}

/// Instruction sets that the inner loop can be worked with. All give the same digits.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum InstructionSet {
    /// The best that this processor has.
    Best,
    /// No vectors.
    Scalar,
    /// AVX2 and FMA, 256 bits.
    #[cfg(target_arch = "x86_64")]
    Avx2,
    /// AVX-512, 512 bits.
    #[cfg(target_arch = "x86_64")]
    Avx512,
}

impl InstructionSet {
    /// Those that this processor has, each by name.
    pub fn available() -> Vec<Self> {
        let mut sets = vec![Self::Best, Self::Scalar];
        #[cfg(target_arch = "x86_64")]
        {
            sets.extend(pulp::x86::V3::try_new().map(|_| Self::Avx2));
            sets.extend(pulp::x86::V4::try_new().map(|_| Self::Avx512));
        }
        sets
    }

    fn work<Task: WithSimd>(self, task: Task) -> Task::Output {
        match self {
            Self::Best => pulp::Arch::new().dispatch(task),
            Self::Scalar => Simd::vectorize(pulp::Scalar, task),
            #[cfg(target_arch = "x86_64")]
            Self::Avx2 => match pulp::x86::V3::try_new() {
                Some(simd) => Simd::vectorize(simd, task),
                None => Simd::vectorize(pulp::Scalar, task),
            },
            #[cfg(target_arch = "x86_64")]
            Self::Avx512 => match pulp::x86::V4::try_new() {
                Some(simd) => Simd::vectorize(simd, task),
                None => Simd::vectorize(pulp::Scalar, task),
            },
        }
    }
}

impl Block {
    /// Works these paths from today to the last kept day.
    pub(super) fn work(program: &Program, paths: &[u64], set: InstructionSet) -> Self {
        set.work(BlockTask { program, paths })
    }
}

struct BlockTask<'a> {
    program: &'a Program,
    paths: &'a [u64],
}

impl WithSimd for BlockTask<'_> {
    type Output = Block;

    #[inline(always)]
    fn with_simd<S: Simd>(self, simd: S) -> Block {
        let (days, paths) = (self.program.kept_days.len(), self.paths.len());
        let mut block = Block {
            paths,
            values: vec![0.0; days * paths],
            falls: vec![0.0; days * paths],
            touched: vec![0.0; days],
            touched_squares: vec![0.0; days],
        };
        let mut tile = Tile::new(self.program);
        for (number, numbers) in self.paths.chunks(LANES).enumerate() {
            // A last tile with fewer paths is worked whole; what its spare lanes find is not kept.
            let first = numbers[0];
            tile.start(simd, std::array::from_fn(|lane| numbers.get(lane).copied().unwrap_or(first)));
            let mut day = 0;
            for (row, &kept_day) in self.program.kept_days.iter().enumerate() {
                while day < kept_day {
                    day += 1;
                    tile.step(simd, day);
                }
                block.keep(row, number * LANES, numbers.len(), &tile);
            }
        }
        block
    }
}

impl Block {
    #[inline(always)]
    fn keep(&mut self, row: usize, first: usize, count: usize, tile: &Tile<'_>) {
        let at = row * self.paths + first;
        self.values[at..at + count].copy_from_slice(&tile.value.0[..count]);
        self.falls[at..at + count].copy_from_slice(&tile.falls.largest.0[..count]);
        for survival in &tile.falls.survival.0[..count] {
            let touched = 1.0 - survival;
            self.touched[row] += touched;
            self.touched_squares[row] += touched * touched;
        }
    }
}
