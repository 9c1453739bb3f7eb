//! What each holding adds to the book: its part of the valuation, in its own currency, and its value today.

use super::descriptions::{factor_of, rate_of};
use super::{CurrencyPart, CurrencyRate, Inputs, ModelHolding, RiskFactor, Term};
use crate::book::{Exposure, Holding, Kind, LevelUnit, Per};
use crate::tables::{Fault, Notice, NoticeLevel, Place};

/// The checked factors and the inputs that holdings are priced with.
pub(super) struct Pricing<'a> {
    pub(super) inputs: &'a Inputs,
    pub(super) factors: &'a [RiskFactor],
    pub(super) book_currency: Option<&'a str>,
}

impl Pricing<'_> {
    /// Every holding's part, in order.
    pub(super) fn holdings(&self) -> Result<Vec<ModelHolding>, Vec<Fault>> {
        let mut faults = self.stray_exposures();
        let mut priced = Vec::with_capacity(self.inputs.holdings.len());
        for holding in &self.inputs.holdings {
            match self.price(holding) {
                Ok(holding) => priced.push(holding),
                Err(more) => faults.extend(more),
            }
        }
        if faults.is_empty() { Ok(priced) } else { Err(faults) }
    }

    fn price(&self, holding: &Holding) -> Result<ModelHolding, Vec<Fault>> {
        let size = holding.quantity * holding.multiplier;
        let worth = match holding.kind {
            Kind::Spot => size * holding.price,
            Kind::Cash => holding.quantity,
            Kind::Exposure => holding.price,
            Kind::Level => 0.0,
        };
        if !(size * holding.price).is_finite() {
            let place = self.place(holding.line, "quantity");
            let found = format!("quantity x price x multiplier of {} beyond any number", holding.name);
            return Err(vec![Fault { place, found, expected: "a finite product".to_owned() }]);
        }
        let (constant, terms) = match (holding.kind, factor_of(holding).and_then(|name| self.find(name))) {
            (Kind::Spot, Some((at, factor))) => spot(worth, size, at, factor),
            (Kind::Level, Some((at, factor))) => moves(size, at, factor),
            (Kind::Exposure, _) => self.sensitivities(holding)?,
            _ => (worth, Vec::new()),
        };
        let rate = rate_of(holding, self.book_currency)
            .and_then(|name| self.find(&name))
            .map(|(factor, rate)| CurrencyRate { factor, today: rate.level.unwrap_or(1.0) });
        let part = CurrencyPart { rate, constant, income_per_year: holding.carry * worth, terms };
        Ok(ModelHolding {
            name: holding.name.clone(),
            group: holding.group.clone(),
            currency: holding.currency.clone().or_else(|| self.book_currency.map(str::to_owned)),
            value: worth * rate.map_or(1.0, |rate| rate.today),
            part,
        })
    }

    fn find(&self, name: &str) -> Option<(usize, &RiskFactor)> {
        self.factors.iter().enumerate().find(|(_, factor)| factor.name == name)
    }

    fn place(&self, line: Option<usize>, column: &str) -> Place {
        Place { file: self.inputs.files.positions.clone(), line, column: Some(column.to_owned()) }
    }

    /// Linear in its factors: `money x number of moves`.
    fn sensitivities(&self, holding: &Holding) -> Result<(f64, Vec<Term>), Vec<Fault>> {
        let mut faults = Vec::new();
        let mut sum =
            CurrencyPart { rate: None, constant: holding.price, income_per_year: 0.0, terms: Vec::new() };
        for exposure in self.inputs.exposures.iter().filter(|row| row.holding == holding.name) {
            let Some((at, factor)) = self.find(&exposure.factor) else { continue };
            match money_per_level(exposure, factor) {
                Ok(size) => {
                    let (constant, terms) = moves(size, at, factor);
                    sum.add(&CurrencyPart { rate: None, constant, income_per_year: 0.0, terms });
                }
                Err((found, expected)) => {
                    let place = Place {
                        file: self.inputs.files.exposures.clone(),
                        line: exposure.line,
                        column: Some("per".to_owned()),
                    };
                    faults.push(Fault { place, found: found.to_owned(), expected });
                }
            }
        }
        if faults.is_empty() { Ok((sum.constant, sum.terms)) } else { Err(faults) }
    }

    fn stray_exposures(&self) -> Vec<Fault> {
        let is_exposure = |name: &str| {
            self.inputs.holdings.iter().any(|holding| holding.name == name && holding.kind == Kind::Exposure)
        };
        let strays = self.inputs.exposures.iter().filter(|row| !is_exposure(&row.holding));
        strays
            .map(|row| Fault {
                place: Place {
                    file: self.inputs.files.exposures.clone(),
                    line: row.line,
                    column: Some("holding".to_owned()),
                },
                found: format!("`{}`", row.holding),
                expected: "the name of a holding of kind exposure in the positions".to_owned(),
            })
            .collect()
    }
}

/// What a linear reading leaves out, and exposures that nothing moves.
pub(super) fn notices(inputs: &Inputs) -> Vec<Notice> {
    let exposures = || inputs.holdings.iter().filter(|holding| holding.kind == Kind::Exposure);
    let is_moved = |holding: &Holding| inputs.exposures.iter().any(|row| row.holding == holding.name);
    let count = exposures().filter(|holding| is_moved(holding)).count();
    let linear = (count > 0).then(|| Notice {
        level: NoticeLevel::Info,
        text: format!(
            "{count} {} read by {} sensitivities alone, linear in the factors: convexity, ageing and carry are not \
             modelled for {}.",
            if count == 1 { "holding is" } else { "holdings are" },
            if count == 1 { "its" } else { "their" },
            if count == 1 { "it" } else { "them" },
        ),
    });
    let still = exposures().filter(|holding| !is_moved(holding)).map(|holding| Notice {
        level: NoticeLevel::Warning,
        text: format!("{} has no sensitivities: its value stays what it is today.", holding.name),
    });
    linear.into_iter().chain(still).collect()
}

/// The price moves by `S_h / S_0` of a log factor, by `X_h - X_0` of a level factor.
fn spot(worth: f64, size: f64, at: usize, factor: &RiskFactor) -> (f64, Vec<Term>) {
    if factor.diffusion.is_log() {
        (0.0, vec![Term { factor: at, weight: worth }])
    } else {
        (worth, vec![Term { factor: at, weight: size }])
    }
}

/// `size x (level - level today)`: with `level = level today x y` for a log factor, `level today + y` for a level factor.
fn moves(size: f64, at: usize, factor: &RiskFactor) -> (f64, Vec<Term>) {
    if factor.diffusion.is_log() {
        let weight = size * factor.level.unwrap_or(1.0);
        (-weight, vec![Term { factor: at, weight }])
    } else {
        (0.0, vec![Term { factor: at, weight: size }])
    }
}

/// Money for a move of 1.00 of the factor's level, or what is wrong with the sensitivity.
fn money_per_level(row: &Exposure, factor: &RiskFactor) -> Result<f64, (&'static str, String)> {
    match (row.per, factor.unit) {
        // 100 (S_h / S_0 - 1) moves: a move of the level by 1.00 is 100 / S_0 of them.
        (Per::OnePercent, _) if factor.diffusion.is_log() => {
            Ok(row.money * 100.0 / factor.level.unwrap_or(1.0))
        }
        (Per::OnePercent, _) => {
            Err(("`+1%`", format!("+1bp or +1.00: {} has a reverting-level diffusion", factor.name)))
        }
        (Per::OneBasisPoint, LevelUnit::Percent) => Ok(row.money * 100.0),
        (Per::OneBasisPoint, LevelUnit::Bp) | (Per::OneUnit, _) => Ok(row.money),
        (Per::OneBasisPoint, LevelUnit::Points) => {
            Err(("`+1bp`", format!("+1.00, or a unit of percent or bp: {} is in points", factor.name)))
        }
    }
}
