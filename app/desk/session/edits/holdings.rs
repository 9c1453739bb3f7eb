//! Edits of holdings. A holding takes what refers to it along; what no longer refers to anything goes.

use super::{correlation, finite};
use crate::desk::commands::HoldingChange;
use ebbmark_engine::book::{Description, Holding, Kind};
use ebbmark_engine::factors::Inputs;

/// The factor that drives a holding directly; none for cash and exposures.
pub fn factor_of(holding: &Holding) -> Option<&str> {
    match holding.kind {
        Kind::Spot | Kind::Level => Some(holding.factor.as_deref().unwrap_or(&holding.name)),
        Kind::Cash | Kind::Exposure => None,
    }
}

/// Adds a holding at the end; a name that is taken is given a number.
pub fn add(inputs: &mut Inputs, holding: &Holding) {
    let is_taken = |name: &str| inputs.holdings.iter().any(|other| other.name == name);
    let numbered =
        |number| if number == 1 { holding.name.clone() } else { format!("{} {number}", holding.name) };
    let name = (1..).map(numbered).find(|name| !is_taken(name)).unwrap_or_default();
    inputs.holdings.push(Holding { name, ..holding.clone() });
}

/// Removes a holding, its sensitivities, and its factor's correlations where nothing else names the factor.
pub fn remove(inputs: &mut Inputs, row: usize) -> Option<()> {
    inputs.holdings.get(row)?;
    let holding = inputs.holdings.remove(row);
    let left: Vec<String> = factors_named_by(inputs, &holding);
    inputs.exposures.retain(|exposure| exposure.holding != holding.name);
    correlation::forget_unnamed(inputs, &left);
    Some(())
}

/// Changes a holding; none where there is no such row or the value can't be taken.
pub fn change(inputs: &mut Inputs, row: usize, change: &HoldingChange) -> Option<()> {
    let holding = inputs.holdings.get_mut(row)?;
    match change {
        HoldingChange::Name(name) => return rename(inputs, row, name),
        HoldingChange::Kind(kind) => return set_kind(inputs, row, *kind),
        HoldingChange::Price(price) => return set_price(inputs, row, finite(*price)?),
        HoldingChange::Factor(factor) => return set_factor(inputs, row, factor.clone()),
        HoldingChange::Quantity(quantity) => {
            // The quantity of a holding known by its sensitivities is 1.
            holding.quantity = finite(*quantity).filter(|_| holding.kind != Kind::Exposure)?;
        }
        HoldingChange::Group(group) => holding.group.clone_from(group),
        HoldingChange::Currency(currency) => holding.currency.clone_from(currency),
        HoldingChange::Multiplier(multiplier) => holding.multiplier = finite(*multiplier)?,
        HoldingChange::Unit(unit) => holding.unit = *unit,
        HoldingChange::Carry(carry) => holding.carry = finite(*carry)?,
    }
    Some(())
}

/// A factor that was named like the holding keeps its name where others know it by it.
fn rename(inputs: &mut Inputs, row: usize, name: &str) -> Option<()> {
    let name = name.trim();
    let is_taken = inputs.holdings.iter().enumerate().any(|(at, other)| at != row && other.name == name);
    if name.is_empty() || is_taken {
        return None;
    }
    let old = std::mem::replace(&mut inputs.holdings[row].name, name.to_owned());
    let had_own_factor = inputs.holdings[row].factor.is_none() && factor_of(&inputs.holdings[row]).is_some();
    if had_own_factor && is_factor_named(inputs, &old) {
        inputs.holdings[row].factor = Some(old.clone());
    }
    for exposure in inputs.exposures.iter_mut().filter(|exposure| exposure.holding == old) {
        name.clone_into(&mut exposure.holding);
    }
    Some(())
}

/// What the new kind does not have is cleared, so that the row stays valid.
fn set_kind(inputs: &mut Inputs, row: usize, kind: Kind) -> Option<()> {
    let left = factors_named_by(inputs, &inputs.holdings[row]);
    let holding = &mut inputs.holdings[row];
    holding.kind = kind;
    holding.unit = None;
    if matches!(kind, Kind::Cash | Kind::Exposure) {
        holding.factor = None;
        holding.multiplier = 1.0;
        holding.description = Description::default();
    }
    match kind {
        Kind::Cash => holding.price = 1.0,
        Kind::Exposure => holding.quantity = 1.0,
        // A level of any sign may have stood there; a price is positive.
        Kind::Spot if holding.price <= 0.0 => holding.price = 1.0,
        Kind::Spot | Kind::Level => {}
    }
    let name = holding.name.clone();
    if kind != Kind::Exposure {
        inputs.exposures.retain(|exposure| exposure.holding != name);
    }
    correlation::forget_unnamed(inputs, &left);
    Some(())
}

/// A level is one for all `level` rows of its factor, and for the factor's own row where that states it.
fn set_price(inputs: &mut Inputs, row: usize, price: f64) -> Option<()> {
    match inputs.holdings[row].kind {
        Kind::Spot => inputs.holdings[row].price = Some(price).filter(|price| *price > 0.0)?,
        Kind::Exposure => inputs.holdings[row].price = price,
        Kind::Level => {
            let factor = factor_of(&inputs.holdings[row])?.to_owned();
            set_level(inputs, &factor, price);
        }
        Kind::Cash => return None,
    }
    Some(())
}

/// Sets the level of a factor wherever it is stated already: its `level` rows and its own row.
pub fn set_level(inputs: &mut Inputs, factor: &str, level: f64) {
    for holding in &mut inputs.holdings {
        if holding.kind == Kind::Level && factor_of(holding) == Some(factor) {
            holding.price = level;
        }
    }
    for row in &mut inputs.factors {
        if row.name == factor && row.level.is_some() {
            row.level = Some(level);
        }
    }
}

fn set_factor(inputs: &mut Inputs, row: usize, factor: Option<String>) -> Option<()> {
    let left = factors_named_by(inputs, &inputs.holdings[row]);
    inputs.holdings[row].factor = factor.filter(|name| !name.trim().is_empty());
    correlation::forget_unnamed(inputs, &left);
    Some(())
}

/// Factors that a holding, or its sensitivities, name.
fn factors_named_by(inputs: &Inputs, holding: &Holding) -> Vec<String> {
    let own = factor_of(holding).map(str::to_owned);
    let sensitivities = inputs.exposures.iter().filter(|exposure| exposure.holding == holding.name);
    own.into_iter().chain(sensitivities.map(|exposure| exposure.factor.clone())).collect()
}

/// Whether anything in the inputs knows a factor by a name.
pub fn is_factor_named(inputs: &Inputs, name: &str) -> bool {
    let by_correlation =
        inputs.correlation.as_ref().is_some_and(|table| table.names.iter().any(|n| n == name));
    by_correlation || is_factor_known(inputs, name)
}

/// Whether a holding, a sensitivity or a factor's own row names a factor.
pub fn is_factor_known(inputs: &Inputs, name: &str) -> bool {
    inputs.holdings.iter().any(|holding| factor_of(holding) == Some(name))
        || inputs.exposures.iter().any(|exposure| exposure.factor == name)
        || inputs.factors.iter().any(|row| row.name == name)
}
