//! What the readers of CSV files make sure of row by row, made sure of for rows that come from a workspace: a hand may
//! have been at it. Whether the rows make a model as a whole is for the engine to say.

use super::FormatError;
use ebbmark_engine::book::{HalfLife, Holding, Kind};
use ebbmark_engine::factors::{CorrelationTable, Fitted, Inputs};

/// Checks every row.
///
/// # Errors
/// The first that can't be used.
pub fn check_rows(inputs: &Inputs) -> Result<(), FormatError> {
    unique("holding", inputs.holdings.iter().map(|holding| holding.name.as_str()))?;
    inputs.holdings.iter().try_for_each(check_holding)?;
    for exposure in &inputs.exposures {
        finite(&format!("money of {} for {}", exposure.holding, exposure.factor), exposure.money)?;
    }
    for row in &inputs.factors {
        finite(&format!("level of {}", row.name), row.level.unwrap_or_default())?;
    }
    inputs.correlation.as_ref().map_or(Ok(()), check_correlation)
}

/// Checks every figure that a history gave.
///
/// # Errors
/// The first that can't be used.
pub fn check_fitted(fitted: &Fitted) -> Result<(), FormatError> {
    for factor in &fitted.factors {
        finite(&format!("last level of {}", factor.name), factor.level)?;
        let Some(diffusion) = factor.diffusion else { continue };
        let volatility = diffusion.volatility();
        let found = || format!("fitted volatility {volatility} of {}", factor.name);
        require(volatility.is_finite() && volatility >= 0.0, found, "a volatility of 0 or more")?;
        finite(&format!("fitted drift of {}", factor.name), diffusion.drift())?;
        let (long_run, half_life) = diffusion.reversion().unwrap_or((1.0, HalfLife::None));
        let is_log = diffusion.is_log();
        let found = || format!("fitted long run {long_run} of {}", factor.name);
        require(
            long_run.is_finite() && (long_run > 0.0 || !is_log),
            found,
            "a level, above 0 for a log model",
        )?;
        if let HalfLife::Days(days) = half_life {
            let found = || format!("fitted half-life {days} of {}", factor.name);
            require(days.is_finite() && days > 0.0, found, "trading days above 0")?;
        }
    }
    fitted.correlation.as_ref().map_or(Ok(()), check_correlation)
}

fn check_holding(holding: &Holding) -> Result<(), FormatError> {
    let Holding { name, kind, quantity, price, multiplier, carry, .. } = holding;
    for (what, number) in
        [("quantity", quantity), ("price", price), ("multiplier", multiplier), ("carry", carry)]
    {
        finite(&format!("{what} of {name}"), *number)?;
    }
    let (is_sound, expected) = match kind {
        Kind::Spot => (*price > 0.0, "a positive price of a spot holding"),
        Kind::Cash => (*price == 1.0, "cash at a price of 1"),
        Kind::Exposure => (*quantity == 1.0, "a quantity of 1 of a holding known by its sensitivities"),
        Kind::Level => (true, ""),
    };
    require(is_sound, || format!("{name} with quantity {quantity} and price {price}"), expected)
}

fn check_correlation(table: &CorrelationTable) -> Result<(), FormatError> {
    let CorrelationTable { names, cells, lines } = table;
    let size = names.len();
    unique("factor of the correlation", names.iter().map(String::as_str))?;
    let has_shape = cells.len() == size * size && (lines.is_empty() || lines.len() == size);
    require(has_shape, || format!("{} correlations of {size} factors", cells.len()), "a square matrix")?;
    for (at, cell) in cells.iter().enumerate() {
        let (row, column) = (at / size, at % size);
        let is_sound = if row == column { *cell == 1.0 } else { cell.abs() <= 1.0 };
        let found = || format!("correlation {cell} of {} and {}", names[row], names[column]);
        require(is_sound && *cell == cells[column * size + row], found, "a symmetric matrix from -1 to 1")?;
    }
    Ok(())
}

fn unique<'a>(what: &str, names: impl Iterator<Item = &'a str>) -> Result<(), FormatError> {
    let mut sorted: Vec<&str> = names.collect();
    sorted.sort_unstable();
    let twice = sorted.windows(2).find(|pair| pair[0] == pair[1]).map(|pair| pair[0]);
    require(twice.is_none(), || format!("the {what} {} twice", twice.unwrap_or_default()), "each name once")?;
    require(sorted.iter().all(|name| !name.is_empty()), || format!("a {what} without a name"), "a name")
}

fn finite(what: &str, number: f64) -> Result<(), FormatError> {
    require(number.is_finite(), || format!("{what} {number}"), "a finite number")
}

fn require(is_sound: bool, found: impl Fn() -> String, expected: &str) -> Result<(), FormatError> {
    if is_sound { Ok(()) } else { Err(FormatError::Value { found: found(), expected: expected.to_owned() }) }
}
