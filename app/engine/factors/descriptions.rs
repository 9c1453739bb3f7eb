//! What all rows together say about each factor, in order of first appearance, and who uses it and how.
//! An empty cell describes nothing; two cells that differ are a fault naming both places.

use super::currencies::inverse_rate;
use super::{FactorRow, Fitted, Inputs};
use crate::book::{Description, DiffusionKind, HalfLife, Holding, Kind, LevelUnit, Per, TypedFigure};
use crate::tables::{Fault, Notice, NoticeLevel, Place};

/// A cell that says something, and where it stands.
#[derive(Debug, Clone, PartialEq)]
pub(super) struct Said<T> {
    pub(super) value: T,
    pub(super) place: Place,
}

/// Everything said about one factor.
#[derive(Debug, Clone, Default)]
pub(super) struct Described {
    pub(super) name: String,
    /// The first place that uses it, for what is missing.
    pub(super) place: Place,
    pub(super) level: Option<Said<f64>>,
    pub(super) unit: Option<Said<LevelUnit>>,
    pub(super) diffusion: Option<Said<DiffusionKind>>,
    pub(super) drift: Option<Said<TypedFigure>>,
    pub(super) volatility: Option<Said<TypedFigure>>,
    pub(super) long_run: Option<Said<TypedFigure>>,
    pub(super) half_life: Option<Said<HalfLife>>,
    /// Whether a `level` row uses it.
    pub(super) has_level_row: bool,
    /// Whether what uses it counts moves of the level itself, so that the level must be known.
    pub(super) needs_level: bool,
    /// Whether it is described as the pair the other way round.
    pub(super) is_inverted: bool,
    /// Whether its level is the last of the history.
    pub(super) has_fitted_level: bool,
    /// Rows whose price is another than that.
    pub(super) notices: Vec<Notice>,
}

/// The factors of some inputs.
pub(super) struct Descriptions<'a> {
    inputs: &'a Inputs,
    book_currency: Option<&'a str>,
    factors: Vec<Described>,
    faults: Vec<Fault>,
}

/// Name of the factor that drives a holding; none for cash and exposures.
pub(super) fn factor_of(holding: &Holding) -> Option<&str> {
    match holding.kind {
        Kind::Spot | Kind::Level => Some(holding.factor.as_deref().unwrap_or(&holding.name)),
        Kind::Cash | Kind::Exposure => None,
    }
}

/// Name of the rate of a holding's currency; none in the book's own.
pub(super) fn rate_of(holding: &Holding, book_currency: Option<&str>) -> Option<String> {
    let code = holding.currency.as_deref()?;
    book_currency.filter(|book| *book != code).map(|book| format!("{code}/{book}"))
}

/// Gathers what is said, in order of first appearance: for each holding its factor, then its currency's rate; then the
/// factors of the sensitivities.
pub(super) fn gather(
    inputs: &Inputs,
    fitted: Option<&Fitted>,
    book_currency: Option<&str>,
) -> (Vec<Described>, Vec<Fault>) {
    let mut all = Descriptions { inputs, book_currency, factors: Vec::new(), faults: Vec::new() };
    for holding in &inputs.holdings {
        all.take_holding(holding);
    }
    for exposure in &inputs.exposures {
        let place = all.place(&inputs.files.exposures, exposure.line, "factor");
        let factor = all.factor(&exposure.factor, place);
        factor.needs_level |= exposure.per != Per::OnePercent;
    }
    let rates: Vec<String> =
        inputs.holdings.iter().filter_map(|holding| rate_of(holding, book_currency)).collect();
    for row in &inputs.factors {
        all.take_row(row, &rates);
    }
    all.take_last_levels(fitted);
    all.take_prices();
    all.refuse_both_ways(&rates);
    (all.factors, all.faults)
}

impl Descriptions<'_> {
    fn place(&self, file: &str, line: Option<usize>, column: &str) -> Place {
        Place { file: file.to_owned(), line, column: Some(column.to_owned()) }
    }

    fn factor(&mut self, name: &str, place: Place) -> &mut Described {
        let at = self.factors.iter().position(|factor| factor.name == name).unwrap_or_else(|| {
            self.factors.push(Described { name: name.to_owned(), place, ..Described::default() });
            self.factors.len() - 1
        });
        &mut self.factors[at]
    }

    fn take_holding(&mut self, holding: &Holding) {
        let file = self.inputs.files.positions.clone();
        if let Some(name) = factor_of(holding) {
            let place = self.place(&file, holding.line, "factor");
            let factor = self.factor(name, place);
            factor.has_level_row |= holding.kind == Kind::Level;
            factor.needs_level |= holding.kind == Kind::Level;
            let name = name.to_owned();
            self.describe(&name, &holding.description, &file, holding.line);
            if let Some(unit) = holding.unit.filter(|_| holding.kind == Kind::Level) {
                let said = Said { value: unit, place: self.place(&file, holding.line, "unit") };
                self.say(&name, said, |factor| &mut factor.unit);
            }
        }
        if let Some(rate) = rate_of(holding, self.book_currency) {
            let place = self.place(&file, holding.line, "currency");
            self.factor(&rate, place).needs_level = true;
        }
    }

    fn take_row(&mut self, row: &FactorRow, rates: &[String]) {
        let file = self.inputs.files.factors.clone();
        let inverted = inverse_rate(&row.name).filter(|direct| rates.contains(direct));
        let name = inverted.as_ref().unwrap_or(&row.name).clone();
        let Some(factor) = self.factors.iter_mut().find(|factor| factor.name == name) else {
            return;
        };
        factor.is_inverted |= inverted.is_some();
        self.describe(&name, &row.description, &file, row.line);
        if let Some(level) = row.level {
            let said = Said { value: level, place: self.place(&file, row.line, "level") };
            self.say(&name, said, |factor| &mut factor.level);
        }
        if let Some(unit) = row.unit {
            let said = Said { value: unit, place: self.place(&file, row.line, "unit") };
            self.say(&name, said, |factor| &mut factor.unit);
        }
    }

    fn describe(&mut self, name: &str, says: &Description, file: &str, line: Option<usize>) {
        let place = |column: &str| Place { file: file.to_owned(), line, column: Some(column.to_owned()) };
        if let Some(value) = says.diffusion {
            self.say(name, Said { value, place: place("diffusion") }, |factor| &mut factor.diffusion);
        }
        if let Some(value) = says.drift {
            self.say(name, Said { value, place: place("drift") }, |factor| &mut factor.drift);
        }
        if let Some(value) = says.volatility {
            self.say(name, Said { value, place: place("volatility") }, |factor| &mut factor.volatility);
        }
        if let Some(value) = says.long_run {
            self.say(name, Said { value, place: place("long_run") }, |factor| &mut factor.long_run);
        }
        if let Some(value) = says.half_life {
            self.say(name, Said { value, place: place("half_life_days") }, |factor| &mut factor.half_life);
        }
    }

    /// Keeps what is said first; what is said differently later is a fault.
    fn say<T: Words + PartialEq>(
        &mut self,
        name: &str,
        said: Said<T>,
        of: impl FnOnce(&mut Described) -> &mut Option<Said<T>>,
    ) {
        let Some(factor) = self.factors.iter_mut().find(|factor| factor.name == name) else {
            return;
        };
        match of(factor) {
            Some(first) if !first.value.is_same(&said.value) => {
                let expected =
                    format!("{} as at {}: both describe the factor {name}", first.value.words(), first.place);
                self.faults.push(Fault { place: said.place, found: said.value.words(), expected });
            }
            Some(_) => {}
            none => *none = Some(said),
        }
    }

    /// A factor without a level in `factors.csv` has the last one of the history.
    fn take_last_levels(&mut self, fitted: Option<&Fitted>) {
        let Some(fitted) = fitted else { return };
        for factor in self.factors.iter_mut().filter(|factor| factor.level.is_none()) {
            let Some(known) = fitted.factor(&factor.name) else { continue };
            let value = if factor.is_inverted { known.level.recip() } else { known.level };
            let place = Place { file: fitted.label.clone(), line: None, column: Some(factor.name.clone()) };
            factor.level = Some(Said { value, place });
            factor.has_fitted_level = true;
        }
    }

    /// A factor without a level of its own has the price of the row named like it, else of its only row; `level` rows
    /// share their factor's level.
    fn take_prices(&mut self) {
        let file = self.inputs.files.positions.clone();
        let (names, holdings): (Vec<String>, _) =
            (self.factors.iter().map(|factor| factor.name.clone()).collect(), &self.inputs.holdings);
        for name in names {
            let rows: Vec<&Holding> =
                holdings.iter().filter(|holding| factor_of(holding) == Some(name.as_str())).collect();
            for row in rows.iter().filter(|row| row.kind == Kind::Level) {
                let factor = self.factor(&name, Place::default());
                if factor.has_fitted_level {
                    factor.notices.extend(other_price(factor.level.as_ref(), row));
                    continue;
                }
                let said = Said { value: row.price, place: self.place(&file, row.line, "price") };
                self.say(&name, said, |factor| &mut factor.level);
            }
            let named = rows.iter().find(|row| row.name == name);
            if let Some(row) = named.or(rows.first().filter(|_| rows.len() == 1)) {
                let said = Said { value: row.price, place: self.place(&file, row.line, "price") };
                self.factor(&name, Place::default()).level.get_or_insert(said);
            }
        }
    }

    /// A rate that is described or held both ways round.
    fn refuse_both_ways(&mut self, rates: &[String]) {
        for direct in
            rates.iter().enumerate().filter(|(at, rate)| !rates[..*at].contains(rate)).map(|(_, rate)| rate)
        {
            let Some(other) = inverse_rate(direct) else { continue };
            let row = |name: &str| self.inputs.factors.iter().find(|row| row.name == name);
            let held = self.factors.iter().find(|factor| factor.name == other);
            let place = match (row(&other), row(direct), held) {
                (Some(_), Some(row), _) => self.place(&self.inputs.files.factors, row.line, "factor"),
                (_, _, Some(factor)) => factor.place.clone(),
                _ => continue,
            };
            self.faults.push(Fault {
                place,
                found: format!("the rate both as {other} and as {direct}"),
                expected: format!("one of them; {direct} is what the book needs"),
            });
        }
    }
}

/// A `level` row whose price is not the last level of the history.
fn other_price(last: Option<&Said<f64>>, row: &Holding) -> Option<Notice> {
    let last = last.filter(|last| last.value != row.price)?;
    let text = format!(
        "{}: its price {} is not the last level of the history, {}, which is taken as today's; give the level in \
         factors.csv to keep another.",
        row.name, row.price, last.value
    );
    Some(Notice { level: NoticeLevel::Warning, text })
}

/// How a cell reads in a fault, and when two cells say the same.
trait Words: Sized + PartialEq {
    fn words(&self) -> String;

    fn is_same(&self, other: &Self) -> bool {
        self == other
    }
}

impl Words for f64 {
    fn words(&self) -> String {
        format!("`{self}`")
    }
}

impl Words for TypedFigure {
    fn words(&self) -> String {
        if self.has_percent_sign { format!("`{}%`", self.value * 100.0) } else { format!("`{}`", self.value) }
    }

    fn is_same(&self, other: &Self) -> bool {
        self.value == other.value
    }
}

impl Words for HalfLife {
    fn words(&self) -> String {
        match self {
            Self::Days(days) => format!("`{days}`"),
            Self::None => "`none`".to_owned(),
        }
    }
}

impl Words for LevelUnit {
    fn words(&self) -> String {
        format!("`{}`", self.word())
    }
}

impl Words for DiffusionKind {
    fn words(&self) -> String {
        format!("`{}`", self.word())
    }
}
