//! The command line: every option with its unit and its bounds. Nothing is done with them here.

use clap::{ArgGroup, Args, Parser, Subcommand, ValueEnum};
use ebbmark_engine::figures::CAUTION;
use ebbmark_engine::measures::Confidence;
use jiff::civil::Date;
use std::path::PathBuf;

/// How much a book of positions can lose, at every horizon at once.
///
/// Without a command the window opens: with the files named, else the last workspace, else the built-in example book.
#[derive(Debug, Parser)]
#[command(name = "ebbmark", version, args_conflicts_with_subcommands = true, after_help = CAUTION)]
pub struct Arguments {
    /// Files to open in the window: tables told apart by their headers, or one workspace
    pub files: Vec<PathBuf>,
    /// What to do without a window
    #[command(subcommand)]
    pub command: Option<Command>,
}

/// A command that needs no screen.
#[derive(Debug, Subcommand)]
pub enum Command {
    /// Print the loss table, drawdowns and moments of a book at one horizon
    #[command(after_help = CAUTION)]
    Read(Box<ReadArguments>),
    /// Fit diffusions and correlation to a history, with errors and evidence
    #[command(after_help = CAUTION)]
    Fit(Box<CommandFitArguments>),
    /// Read a book under stresses, beside the base (not yet)
    Stress(NotYet),
    /// Hold past forecasts against what happened (not yet)
    Backtest(NotYet),
    /// Write figures, tables and a one-file report (not yet)
    Report(NotYet),
}

/// Whatever stands behind a command that does not exist yet.
#[derive(Debug, Args)]
#[command(disable_help_flag = true)]
pub struct NotYet {
    /// Not looked at
    #[arg(trailing_var_arg = true, allow_hyphen_values = true, hide = true)]
    pub rest: Vec<std::ffi::OsString>,
}

/// `ebbmark read`.
#[derive(Debug, Default, Args)]
pub struct ReadArguments {
    /// Which book
    #[command(flatten)]
    pub source: SourceArguments,
    /// How it is read; what is not given is the workspace's, else the default
    #[command(flatten)]
    pub settings: SettingArguments,
    /// How its history is fitted
    #[command(flatten)]
    pub fit: FitArguments,
    /// Add the range of VaR and ES over the fit's 95 % parameter range, from 200 simulated histories fitted again
    #[arg(long, help_heading = "Fit (with a history)")]
    pub parameter_range: bool,
    /// How the run is made and the answer printed
    #[command(flatten)]
    pub output: OutputArguments,
    /// Options that later versions honour
    #[command(flatten)]
    pub later: LaterArguments,
}

/// `ebbmark fit`.
#[derive(Debug, Default, Args)]
pub struct CommandFitArguments {
    /// Which history, and the book whose typed diffusions stand above the choice
    #[command(flatten)]
    pub source: SourceArguments,
    /// How it is fitted; what is not given is the workspace's, else the default
    #[command(flatten)]
    pub fit: FitArguments,
    /// Trading days in a year, by which days become years [default: 252]
    #[arg(long, value_name = "N", value_parser = parse_positive, help_heading = "Fit (with a history)")]
    pub days_per_year: Option<f64>,
    /// Currency that the book is valued in, an ISO 4217 code such as EUR
    #[arg(long, value_name = "CUR", value_parser = parse_currency, help_heading = "Fit (with a history)")]
    pub book_currency: Option<String>,
    /// Print one JSON object instead of a table
    #[arg(long, help_heading = "Output")]
    pub json: bool,
    /// No notices on standard error; errors still
    #[arg(long, help_heading = "Output")]
    pub quiet: bool,
}

/// The files of a book, by role.
#[derive(Debug, Default, Args)]
#[command(next_help_heading = "Book (the built-in example without any of these)")]
#[command(group = ArgGroup::new("book").args(["positions", "workspace"]))]
pub struct SourceArguments {
    /// What is held
    #[arg(long, value_name = "FILE")]
    pub positions: Option<PathBuf>,
    /// Holdings known by their sensitivities
    #[arg(long, value_name = "FILE", requires = "positions")]
    pub exposures: Option<PathBuf>,
    /// Risk factors described once, currency rates among them
    #[arg(long, value_name = "FILE", requires = "positions")]
    pub factors: Option<PathBuf>,
    /// Correlations of the factors' Brownian motions
    #[arg(long, value_name = "FILE", requires = "positions")]
    pub correlation: Option<PathBuf>,
    /// Levels of the factors by date: fits what the other files leave open
    #[arg(long, value_name = "FILE", conflicts_with = "workspace")]
    pub history: Option<PathBuf>,
    /// Days without trading; trading days are weekdays without it
    #[arg(long, value_name = "FILE", requires = "positions")]
    pub holidays: Option<PathBuf>,
    /// A saved workspace (.ron): the book with all its settings, over which the options here stand
    #[arg(long, value_name = "FILE")]
    pub workspace: Option<PathBuf>,
}

/// What decides the figures beside the book.
#[derive(Debug, Default, Args)]
#[command(next_help_heading = "Reading")]
pub struct SettingArguments {
    /// How far ahead to read, in trading days, 1 to 504 [default: 21]
    #[arg(long, value_name = "DAYS", value_parser = clap::value_parser!(u32).range(1..=504))]
    pub horizon: Option<u32>,
    /// Confidence levels, each a fraction or a percentage between 0.5 and 1 [default: 0.95,0.99]
    #[arg(long, value_name = "LEVELS", value_delimiter = ',', value_parser = parse_confidence)]
    pub confidence: Option<Vec<Confidence>>,
    /// Number of simulated paths, 1000 to 10000000 [default: 100000]
    #[arg(long, value_name = "N", value_parser = clap::value_parser!(u64).range(1_000..=10_000_000))]
    pub paths: Option<u64>,
    /// Seed of the random numbers, a whole number [default: 1]
    #[arg(long, value_name = "N")]
    pub seed: Option<u64>,
    /// What a loss is counted from: today's value or the expected value at the horizon [default: today]
    #[arg(long, value_name = "FROM")]
    pub loss_from: Option<LossFromName>,
    /// Trading days in a year, by which days become years [default: 252]
    #[arg(long, value_name = "N", value_parser = parse_positive)]
    pub days_per_year: Option<f64>,
    /// Date of the prices, YYYY-MM-DD; without it no date is printed
    #[arg(long, value_name = "DATE", value_parser = parse_date)]
    pub as_of: Option<Date>,
    /// Currency that the book is valued in, an ISO 4217 code such as EUR
    #[arg(long, value_name = "CUR", value_parser = parse_currency)]
    pub book_currency: Option<String>,
    /// Base of every percentage, in money of the book's currency [default: today's value when positive]
    #[arg(long, value_name = "MONEY", value_parser = parse_positive)]
    pub capital: Option<f64>,
    /// Loss from today's value whose chance of being passed is wanted, in money of the book's currency
    #[arg(long, value_name = "MONEY", value_parser = parse_positive)]
    pub loss_limit: Option<f64>,
    /// Take the nearest valid correlation matrix where the one given is impossible, and name what it changes most
    #[arg(long)]
    pub repair: bool,
}

/// How the run is made and the answer printed.
#[derive(Debug, Default, Args)]
#[command(next_help_heading = "Run and output")]
pub struct OutputArguments {
    /// Threads to work on, 1 or more; the figures do not depend on it [default: all cores]
    #[arg(long, value_name = "N", value_parser = parse_threads)]
    pub threads: Option<usize>,
    /// Print one JSON object instead of a table
    #[arg(long)]
    pub json: bool,
    /// No notices and no progress on standard error; errors still
    #[arg(long)]
    pub quiet: bool,
}

/// How a history is fitted.
#[derive(Debug, Default, Args)]
#[command(next_help_heading = "Fit (with a history)")]
pub struct FitArguments {
    /// First date of the history used, YYYY-MM-DD [default: its first]
    #[arg(long, value_name = "DATE", value_parser = parse_date)]
    pub since: Option<Date>,
    /// Last date of the history used, YYYY-MM-DD [default: its last]
    #[arg(long, value_name = "DATE", value_parser = parse_date)]
    pub until: Option<Date>,
    /// Trading days from one row to the next, such as 21 for months or 63 for quarters [default: 1 where the median gap is
    /// at most four calendar days, else by the calendar]
    #[arg(long, value_name = "N", value_parser = clap::value_parser!(u32).range(1..=10_000))]
    pub row_days: Option<u32>,
    /// Diffusions to choose from: one of the log models, or reverting-level [default: by the evidence]
    #[arg(long, value_name = "MODEL")]
    pub model: Option<ModelName>,
    /// Drift that a geometric factor takes where none is typed, per year [default: zero]
    #[arg(long, value_name = "DRIFT")]
    pub drift: Option<DriftName>,
    /// Estimator of the correlation [default: sample]
    #[arg(long, value_name = "NAME")]
    pub estimator: Option<EstimatorName>,
    /// Half-life of the weights of `--estimator weighted`, in trading days [default: 63]
    #[arg(long, value_name = "DAYS", value_parser = parse_positive)]
    pub weight_half_life: Option<f64>,
    /// Rows that a change spans for the correlation, overlapping: 1, 5 or 10 [default: 1]
    #[arg(long, value_name = "ROWS", value_parser = parse_change_days)]
    pub change_days: Option<u32>,
    /// What to do with missing values: dates that all factors have, or for each pair those that both have [default: common]
    #[arg(long, value_name = "HOW")]
    pub missing: Option<MissingName>,
}

/// Options that this version does not honour yet: each is answered with "not yet".
#[derive(Debug, Default, Args)]
#[command(next_help_heading = "Not yet")]
pub struct LaterArguments {
    /// Limits to hold the figures against
    #[arg(long, value_name = "FILE")]
    pub limits: Option<String>,
    /// A second positions file on the same paths
    #[arg(long, value_name = "FILE")]
    pub against: Option<String>,
    /// Read the book absolute, relative to the other, or as the surplus over it
    #[arg(long, value_name = "HOW")]
    pub read_as: Option<String>,
}

/// Diffusions to choose from, as they are typed.
#[derive(Debug, Clone, Copy, PartialEq, Eq, ValueEnum)]
pub enum ModelName {
    /// A log model for all
    Log,
    /// reverting-level for all
    Level,
}

/// Drift of the fit, as it is typed.
#[derive(Debug, Clone, Copy, PartialEq, Eq, ValueEnum)]
pub enum DriftName {
    /// None
    Zero,
    /// The fitted one
    Fitted,
}

/// Estimator, as it is typed.
#[derive(Debug, Clone, Copy, PartialEq, Eq, ValueEnum)]
pub enum EstimatorName {
    /// Every change counts the same
    Sample,
    /// Recent changes count more, no mean removed
    Weighted,
    /// Shrunk towards equal variances without correlation
    ShrunkIdentity,
    /// Shrunk towards one correlation for all pairs
    ShrunkConstant,
}

/// Missing values, as they are treated.
#[derive(Debug, Clone, Copy, PartialEq, Eq, ValueEnum)]
pub enum MissingName {
    /// Dates that all factors have
    Common,
    /// For each pair the dates that both have
    Pairs,
}

/// What a loss is counted from, as it is typed.
#[derive(Debug, Clone, Copy, PartialEq, Eq, ValueEnum)]
pub enum LossFromName {
    /// Today's value
    Today,
    /// Expected value at the horizon
    Mean,
}

impl FitArguments {
    /// The first of them that was given, as it is typed.
    pub fn first_given(&self) -> Option<&'static str> {
        let given = [
            ("--since", self.since.is_some()),
            ("--until", self.until.is_some()),
            ("--row-days", self.row_days.is_some()),
            ("--model", self.model.is_some()),
            ("--drift", self.drift == Some(DriftName::Fitted)),
            ("--estimator", self.estimator.is_some()),
            ("--weight-half-life", self.weight_half_life.is_some()),
            ("--change-days", self.change_days.is_some()),
            ("--missing", self.missing.is_some()),
        ];
        given.into_iter().find(|(_, is_given)| *is_given).map(|(name, _)| name)
    }
}

impl LaterArguments {
    /// The first of them that was given, as it is typed. `--read-as absolute` is what is done anyway.
    pub fn first_given(&self) -> Option<&'static str> {
        let read_as = self.read_as.clone().filter(|how| how != "absolute");
        let given = [("--limits", &self.limits), ("--against", &self.against), ("--read-as", &read_as)];
        given.into_iter().find(|(_, value)| value.is_some()).map(|(name, _)| name)
    }
}

fn parse_confidence(text: &str) -> Result<Confidence, String> {
    text.trim().parse::<Confidence>().map_err(|error| error.to_string())
}

fn parse_positive(text: &str) -> Result<f64, String> {
    let number = text.trim().parse::<f64>().ok().filter(|number| number.is_finite() && *number > 0.0);
    number.ok_or_else(|| "expected a number above 0, such as 2500000".into())
}

fn parse_change_days(text: &str) -> Result<u32, String> {
    text.parse().ok().filter(|rows| [1, 5, 10].contains(rows)).ok_or_else(|| "expected 1, 5 or 10".into())
}

fn parse_threads(text: &str) -> Result<usize, String> {
    text.parse().ok().filter(|count| *count >= 1).ok_or_else(|| "expected a whole number, 1 or more".into())
}

fn parse_date(text: &str) -> Result<Date, String> {
    text.trim().parse::<Date>().ok().ok_or_else(|| "expected a date written YYYY-MM-DD".into())
}

fn parse_currency(text: &str) -> Result<String, String> {
    let is_code = text.len() == 3 && text.bytes().all(|letter| letter.is_ascii_uppercase());
    is_code.then(|| text.to_owned()).ok_or_else(|| "expected three capital letters, such as EUR".into())
}
