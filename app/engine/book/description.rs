//! The cells that describe a factor: the same columns in `positions.csv` and `factors.csv`. What can be said of a cell
//! without knowing the factor's diffusion is checked here, the rest when the model is made.

use super::{Description, DiffusionKind, HalfLife, LevelUnit, TypedFigure};
use crate::tables::Cells;

/// Columns that describe a factor.
pub const DESCRIPTION_COLUMNS: [&str; 5] = ["diffusion", "drift", "volatility", "long_run", "half_life_days"];

const DIFFUSIONS: [(&str, DiffusionKind); 3] = [
    ("geometric", DiffusionKind::Geometric),
    ("reverting-log", DiffusionKind::RevertingLog),
    ("reverting-level", DiffusionKind::RevertingLevel),
];
const UNITS: [(&str, LevelUnit); 3] =
    [("points", LevelUnit::Points), ("percent", LevelUnit::Percent), ("bp", LevelUnit::Bp)];

/// What a row says about its factor.
pub fn read_description(cells: &mut Cells<'_, '_>) -> Description {
    Description {
        diffusion: cells.word("diffusion", &DIFFUSIONS),
        drift: typed(cells, "drift"),
        volatility: volatility(cells),
        long_run: typed(cells, "long_run"),
        half_life: half_life(cells),
    }
}

/// What 1.00 of a level is.
pub fn read_unit(cells: &mut Cells<'_, '_>) -> Option<LevelUnit> {
    cells.word("unit", &UNITS)
}

fn typed(cells: &mut Cells<'_, '_>, column: &str) -> Option<TypedFigure> {
    let number = cells.figure(column)?;
    Some(TypedFigure { value: number.value, has_percent_sign: number.has_percent_sign })
}

fn volatility(cells: &mut Cells<'_, '_>) -> Option<TypedFigure> {
    let figure = typed(cells, "volatility")?;
    if figure.value < 0.0 {
        let text = cells.text("volatility").unwrap_or_default();
        cells.fault("volatility", format!("`{text}`"), "a volatility of 0 or more");
        return None;
    }
    Some(figure)
}

fn half_life(cells: &mut Cells<'_, '_>) -> Option<HalfLife> {
    let text = cells.text("half_life_days")?;
    if text.eq_ignore_ascii_case("none") {
        return Some(HalfLife::None);
    }
    let days = cells.number("half_life_days")?;
    if days <= 0.0 {
        cells.fault("half_life_days", format!("`{text}`"), "trading days above 0, or none");
        return None;
    }
    Some(HalfLife::Days(days))
}
