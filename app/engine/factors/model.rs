//! The checked model of a book: holdings with their values, factors in order, correlation, valuation.

use super::descriptions::{self, Described};
use super::parts::{self, Pricing};
use super::{
    Correlation, CurrencyPart, Fitted, HistorySource, Inputs, Repair, RiskFactor, TypedFactor, Valuation,
};
use super::{currencies, pairing, resolution};
use crate::tables::{Fault, Faults, Notice, NoticeLevel, Place};

/// What the caller sets about a model beside its inputs.
#[derive(Debug, Clone, PartialEq)]
pub struct ModelSettings {
    /// The book's currency, where the caller names it.
    pub book_currency: Option<String>,
    /// Trading days in a year.
    pub days_per_year: f64,
    /// Whether an impossible correlation matrix is taken as the nearest valid one.
    pub repairs_correlation: bool,
}

/// A holding of a model.
#[derive(Debug, Clone, PartialEq)]
pub struct ModelHolding {
    /// Name.
    pub name: String,
    /// Group, `/` nests.
    pub group: String,
    /// ISO code; none where money has no currency name.
    pub currency: Option<String>,
    /// Value today in the book's currency.
    pub value: f64,
    /// What it adds to the book: a part of its own, in its currency.
    pub part: CurrencyPart,
}

/// Everything the simulation and the measures need, valid as a whole.
#[derive(Debug, Clone, PartialEq)]
pub struct Model {
    /// ISO code of the book's currency; none where money has no name.
    pub currency: Option<String>,
    /// Trading days in a year.
    pub days_per_year: f64,
    /// In order of first appearance.
    pub factors: Vec<RiskFactor>,
    /// Of the factors' Brownian motions, in the factors' order.
    pub correlation: Correlation,
    /// What made it valid, where it was not.
    pub repair: Option<Repair>,
    /// In order of the positions.
    pub holdings: Vec<ModelHolding>,
    /// The book's value as a function of the factors' moves.
    pub valuation: Valuation,
    /// The book's value today.
    pub value: f64,
    /// The history behind what nobody typed; none without one.
    pub history: Option<HistorySource>,
    /// What is worth telling about it.
    pub notices: Vec<Notice>,
}

impl Model {
    /// Checks inputs as a whole and makes the model of them: factors in order of first appearance (for each holding its
    /// factor, then its currency's rate; then those of the sensitivities), with their diffusions and their correlation,
    /// and the book's value as a function of their moves.
    ///
    /// # Errors
    /// Every fault found; those of the correlation only where the factors stand.
    pub fn assemble(inputs: &Inputs, settings: &ModelSettings) -> Result<Self, Faults> {
        Self::assemble_fitted(inputs, None, settings)
    }

    /// [`Model::assemble`] with a history's figures for what nobody typed, parameter by parameter.
    ///
    /// # Errors
    /// As [`Model::assemble`].
    pub fn assemble_fitted(
        inputs: &Inputs,
        fitted: Option<&Fitted>,
        settings: &ModelSettings,
    ) -> Result<Self, Faults> {
        check_settings(inputs, settings)?;
        let columns = fitted.map_or([].as_slice(), |fitted| &fitted.columns);
        let currency =
            currencies::book_currency(inputs, columns, settings).map_err(|fault| Faults(vec![fault]))?;
        let (described, mut faults) = descriptions::gather(inputs, fitted, currency.as_deref());
        let mut notices: Vec<Notice> = described.iter().filter_map(inversion).collect();
        notices.extend(described.iter().flat_map(|said| said.notices.iter().cloned()));
        notices.extend(fitted.iter().flat_map(|fitted| fitted.notices.iter().cloned()));
        let mut factors = Vec::with_capacity(described.len());
        for said in &described {
            let known = fitted.and_then(|fitted| fitted.factor(&said.name));
            match resolution::resolve(said, known, &mut notices) {
                Ok(factor) => factors.push(factor),
                Err(more) => faults.extend(more),
            }
        }
        if !faults.is_empty() {
            return Err(Faults(faults));
        }
        let pricing = Pricing { inputs, factors: &factors, book_currency: currency.as_deref() };
        let correlation =
            pairing::pair_up(inputs, fitted, &factors, settings.repairs_correlation, &mut notices);
        let (holdings, (correlation, repair)) = match (pricing.holdings(), correlation) {
            (Ok(holdings), Ok(correlation)) => (holdings, correlation),
            (holdings, correlation) => {
                let faults =
                    [holdings.err().unwrap_or_default(), correlation.err().unwrap_or_default()].concat();
                return Err(Faults(faults));
            }
        };
        notices.extend(parts::notices(inputs));
        let valuation = Valuation::sum(holdings.iter().map(|holding| &holding.part));
        let is_log: Vec<bool> = factors.iter().map(|factor| factor.diffusion.is_log()).collect();
        let value = valuation.value(&is_log, &vec![0.0; factors.len()], 0.0);
        let days_per_year = settings.days_per_year;
        let history = fitted.map(|fitted| fitted.source(&factors, inputs.correlation.as_ref()));
        Ok(Self {
            currency,
            days_per_year,
            factors,
            correlation,
            repair,
            holdings,
            valuation,
            value,
            history,
            notices,
        })
    }

    /// Years from today to a day.
    pub fn years(&self, day: u32) -> f64 {
        f64::from(day) / self.days_per_year
    }
}

/// The book's currency and its factors in their order, with what a fit has to leave alone. `columns` are the names of the
/// history's columns. What is wrong with the inputs is not told here: the model does that.
///
/// # Errors
/// The fault of a currency that has to be named.
pub fn typed_factors(
    inputs: &Inputs,
    columns: &[String],
    settings: &ModelSettings,
) -> Result<Vec<TypedFactor>, Faults> {
    let currency =
        currencies::book_currency(inputs, columns, settings).map_err(|fault| Faults(vec![fault]))?;
    let (described, _) = descriptions::gather(inputs, None, currency.as_deref());
    let typed = described.into_iter().map(|said| TypedFactor {
        diffusion: resolution::typed_kind(&said),
        half_life: said.half_life.map(|said| said.value),
        name: said.name,
    });
    Ok(typed.collect())
}

fn check_settings(inputs: &Inputs, settings: &ModelSettings) -> Result<(), Faults> {
    let fault = |found: String, expected: &str| {
        let place = Place { file: inputs.files.positions.clone(), line: None, column: None };
        Err(Faults(vec![Fault { place, found, expected: expected.to_owned() }]))
    };
    if !(settings.days_per_year > 0.0 && settings.days_per_year.is_finite()) {
        return fault(format!("{} trading days a year", settings.days_per_year), "a number above 0");
    }
    if inputs.holdings.is_empty() {
        return fault("no holding".to_owned(), "at least one");
    }
    Ok(())
}

fn inversion(said: &Described) -> Option<Notice> {
    let given = currencies::inverse_rate(&said.name).filter(|_| said.is_inverted)?;
    let text = format!(
        "{given} is read inverted, as {}: level, drift, long run and correlations are turned.",
        said.name
    );
    Some(Notice { level: NoticeLevel::Info, text })
}
