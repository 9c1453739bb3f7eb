//! What is held, as it was written: holdings and their sensitivities. What moves them is not decided here.

/// One holding, and what its row says about its factor.
pub mod holding;
/// From a table of positions to holdings.
pub mod read_positions;
/// From a table of exposures to sensitivities.
pub mod read_exposures;
/// The cells that describe a factor, wherever they stand.
pub mod description;

pub use holding::{
    Description, DiffusionKind, Exposure, HalfLife, Holding, Kind, LevelUnit, Per, TypedFigure,
};
pub use read_exposures::read_exposures;
pub use read_positions::read_positions;
