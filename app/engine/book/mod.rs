//! What is held, as it was written: holdings and their sensitivities. What moves them is not decided here.

/// One holding, and what its row says about its factor.
pub mod holding;

pub use holding::{
    Description, DiffusionKind, Exposure, HalfLife, Holding, Kind, LevelUnit, Per, TypedFigure,
};
