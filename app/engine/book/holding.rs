//! The rows of `positions.csv` and `exposures.csv` as data. Reading and checking them is done next door.

use serde::{Deserialize, Serialize};

/// What a holding is, and so how its value follows its factor.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Default, Serialize, Deserialize)]
#[serde(rename_all = "kebab-case")]
pub enum Kind {
    /// Worth quantity x price x multiplier.
    #[default]
    Spot,
    /// No value today; earns quantity x multiplier x (level - level today).
    Level,
    /// Worth its quantity.
    Cash,
    /// Known by its sensitivities.
    Exposure,
}

/// What 1.00 of a level is.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Default, Serialize, Deserialize)]
#[serde(rename_all = "kebab-case")]
pub enum LevelUnit {
    /// Points of an index or a price.
    #[default]
    Points,
    /// Per cent.
    Percent,
    /// Basis points.
    Bp,
}

/// The three diffusions.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Serialize, Deserialize)]
#[serde(rename_all = "kebab-case")]
pub enum DiffusionKind {
    /// `dS/S = mu dt + sigma dW`.
    Geometric,
    /// The logarithm reverts.
    RevertingLog,
    /// The level itself reverts.
    RevertingLevel,
}

impl LevelUnit {
    /// As written in files.
    pub fn word(self) -> &'static str {
        match self {
            Self::Points => "points",
            Self::Percent => "percent",
            Self::Bp => "bp",
        }
    }
}

impl DiffusionKind {
    /// As written in files.
    pub fn word(self) -> &'static str {
        match self {
            Self::Geometric => "geometric",
            Self::RevertingLog => "reverting-log",
            Self::RevertingLevel => "reverting-level",
        }
    }
}

/// Time in which the gap to the long-run level halves.
#[derive(Debug, Clone, Copy, PartialEq, Serialize, Deserialize)]
pub enum HalfLife {
    /// Trading days, above 0.
    Days(f64),
    /// No reversion: a random walk without drift in the modelled variable.
    None,
}

/// A number as it was typed. `18%` is the value 0.18 written with a sign.
#[derive(Debug, Clone, Copy, PartialEq, Serialize, Deserialize)]
pub struct TypedFigure {
    /// The number, the sign taken into account.
    pub value: f64,
    /// Whether a `%` stood behind it.
    pub has_percent_sign: bool,
}

/// What one place says about a factor; what is empty is not described there.
#[derive(Debug, Clone, PartialEq, Default, Serialize, Deserialize)]
pub struct Description {
    /// Kind of diffusion.
    pub diffusion: Option<DiffusionKind>,
    /// Geometric drift `mu` per year.
    pub drift: Option<TypedFigure>,
    /// `sigma`: per square-root year, of the log or in level units.
    pub volatility: Option<TypedFigure>,
    /// Long-run level (the median for `reverting-log`), in the factor's own units.
    pub long_run: Option<TypedFigure>,
    /// Half-life.
    pub half_life: Option<HalfLife>,
}

/// One row of `positions.csv`.
#[derive(Debug, Clone, PartialEq, Serialize, Deserialize)]
pub struct Holding {
    /// Unique name.
    pub name: String,
    /// What it is.
    pub kind: Kind,
    /// Signed quantity; negative is short.
    pub quantity: f64,
    /// Price, level or value today, as `kind` says; 1 for cash.
    pub price: f64,
    /// Free text for subtotals, `/` nests.
    pub group: String,
    /// ISO 4217 code; none means the book's currency.
    pub currency: Option<String>,
    /// Named factor; none means its own name (spot, level) or that it has none (cash, exposure).
    pub factor: Option<String>,
    /// Contract size.
    pub multiplier: f64,
    /// Unit of the level, for `level` rows that name one.
    pub unit: Option<LevelUnit>,
    /// Income less financing per year, as a fraction of today's value.
    pub carry: f64,
    /// What the row says about its factor.
    pub description: Description,
    /// Line in the file it came from; none when it was added in the window.
    pub line: Option<usize>,
    /// Names and cells of columns that are not known: kept, not used.
    #[serde(default)]
    pub other_columns: Vec<(String, String)>,
}

/// The move of a factor that a sensitivity counts.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Serialize, Deserialize)]
pub enum Per {
    /// `+1%` of a factor with a log diffusion.
    OnePercent,
    /// `+1bp` of a level in percent or bp.
    OneBasisPoint,
    /// `+1.00` of a level.
    OneUnit,
}

/// One row of `exposures.csv`: what a holding earns for a move of a factor.
#[derive(Debug, Clone, PartialEq, Serialize, Deserialize)]
pub struct Exposure {
    /// Name of the `exposure` holding.
    pub holding: String,
    /// Name of the factor.
    pub factor: String,
    /// Money of the holding's currency per move.
    pub money: f64,
    /// The move.
    pub per: Per,
    /// Line in the file it came from.
    pub line: Option<usize>,
}
