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
    /// Fit diffusions and correlation to a history (not yet)
    Fit(NotYet),
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
    /// How the run is made and the answer printed
    #[command(flatten)]
    pub output: OutputArguments,
    /// Options that later versions honour
    #[command(flatten)]
    pub later: LaterArguments,
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
    /// Accepted; an impossible correlation matrix is still refused
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

/// Options that this version does not honour yet: each is answered with "not yet".
#[derive(Debug, Default, Args)]
#[command(next_help_heading = "Not yet")]
pub struct LaterArguments {
    /// Dated levels of the factors
    #[arg(long, value_name = "FILE")]
    pub history: Option<String>,
    /// Limits to hold the figures against
    #[arg(long, value_name = "FILE")]
    pub limits: Option<String>,
    /// A second positions file on the same paths
    #[arg(long, value_name = "FILE")]
    pub against: Option<String>,
    /// Read the book absolute, relative to the other, or as the surplus over it
    #[arg(long, value_name = "HOW")]
    pub read_as: Option<String>,
    /// Ranges from the fit's errors
    #[arg(long, value_name = "DRAWS", num_args = 0..=1, default_missing_value = "")]
    pub parameter_range: Option<String>,
    /// Estimator of the correlation
    #[arg(long, value_name = "NAME")]
    pub estimator: Option<String>,
    /// Half-life of the estimator's weights, in trading days
    #[arg(long, value_name = "DAYS")]
    pub weight_half_life: Option<String>,
    /// Trading days that a return spans
    #[arg(long, value_name = "DAYS")]
    pub change_days: Option<String>,
    /// First date of the history used
    #[arg(long, value_name = "DATE")]
    pub since: Option<String>,
    /// Last date of the history used
    #[arg(long, value_name = "DATE")]
    pub until: Option<String>,
    /// Trading days between two rows of the history
    #[arg(long, value_name = "N")]
    pub row_days: Option<String>,
    /// Diffusion of all factors
    #[arg(long, value_name = "NAME")]
    pub model: Option<String>,
    /// What to do with missing values of the history
    #[arg(long, value_name = "HOW")]
    pub missing: Option<String>,
    /// Drift that a fit gives
    #[arg(long, value_name = "HOW")]
    pub drift: Option<String>,
}

/// What a loss is counted from, as it is typed.
#[derive(Debug, Clone, Copy, PartialEq, Eq, ValueEnum)]
pub enum LossFromName {
    /// Today's value
    Today,
    /// Expected value at the horizon
    Mean,
}

impl LaterArguments {
    /// The first of them that was given, as it is typed. `--read-as absolute` is what is done anyway.
    pub fn first_given(&self) -> Option<&'static str> {
        let read_as = self.read_as.clone().filter(|how| how != "absolute");
        let given = [
            ("--history", &self.history),
            ("--limits", &self.limits),
            ("--against", &self.against),
            ("--read-as", &read_as),
            ("--parameter-range", &self.parameter_range),
            ("--estimator", &self.estimator),
            ("--weight-half-life", &self.weight_half_life),
            ("--change-days", &self.change_days),
            ("--since", &self.since),
            ("--until", &self.until),
            ("--row-days", &self.row_days),
            ("--model", &self.model),
            ("--missing", &self.missing),
            ("--drift", &self.drift),
        ];
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
