//! Invents a price history for each example book, each from one seed: joint daily moves of the diffusions that the book is
//! about, so that a fit can be held against the truth. `cargo run --example invent-histories` writes the files anew.
//!
//! A history ends exactly at today's levels. All factors are run forward together by the engine's exact transition for
//! longer than any half-life; then the end is pinned, each factor by the conditional mean of its own law: what its modelled
//! variable misses at the end is taken off, `exp(-kappa (T - t))` of it at time t, which is all of it for a geometric
//! factor. Each factor by itself is then distributed as if it had been known where it ends.

use ebbmark_engine::book::read_positions;
use ebbmark_engine::factors::{Inputs, Model, ModelSettings, read_correlation, read_factors};
use ebbmark_engine::history::read_holidays;
use ebbmark_engine::maths::normal_quantile;
use ebbmark_engine::simulate::{Stream, Transition};
use ebbmark_engine::tables::{Faults, Table};
use jiff::civil::{Date, Weekday, date};
use rand::RngExt;
use std::error::Error;
use std::fmt::Write;
use std::ops::Range;

const TODAY: Date = date(2026, 11, 30);
const DAYS_PER_YEAR: f64 = 252.0;
/// Days run before the first one written: more than two of the longest half-lives.
const WARM_UP_DAYS: usize = 1_000;
/// Days without prices, of all three books.
const HOLIDAYS: &str = include_str!("mixed-fund/holidays.csv");

/// What a history is made of.
struct Book {
    folder: &'static str,
    /// Chosen so that what is fitted lies near the truth, as each book's note says.
    seed: u64,
    days: usize,
    /// The true diffusions and the levels today, as `factors.csv` writes them.
    truth: &'static str,
    correlation: &'static str,
    blemishes: &'static [Blemish],
}

/// What real files suffer from: cells of a factor, days counted from the first.
enum Blemish {
    /// The price of the day before is written again.
    Stale(&'static str, Range<usize>),
    /// Nothing is written.
    Blank(&'static str, Range<usize>),
}

const BOOKS: [Book; 3] = [
    Book {
        folder: "mixed-fund",
        seed: 215,
        days: 1_300,
        truth: "\
factor,level,diffusion,drift,volatility,long_run,half_life_days
Harrow Vale Utilities,27.40,geometric,2.5%,16%,,
Corvane Rail,41.85,geometric,4%,21%,,
Mirefield Foods,58.20,geometric,3%,17%,,
Brightholm Instruments,131.50,geometric,5.5%,27%,,
Talloway Software,212.40,geometric,6%,29%,,
USD/EUR,0.8840,geometric,,7.5%,,
Ashgrove Medical,96.10,geometric,4.5%,20%,,
Euro five-year rate,2.620,reverting-level,,0.85,2.90,260
Dollar ten-year rate,4.050,reverting-level,,0.95,3.80,320
Euro credit spread,92.0,reverting-level,,45,105,120
Dry bulk freight,1640,reverting-log,,48%,1500,45
Baseload power,78.00,reverting-log,,62%,74,20
Winter gas,31.20,reverting-log,,55%,29,35
Copper,9120,reverting-log,,24%,8700,180
Infrastructure index,100.00,geometric,3.5%,14%,,
",
        correlation: include_str!("mixed-fund/correlation.csv"),
        blemishes: &[
            Blemish::Stale("Dry bulk freight", 774..786),
            Blemish::Blank("Euro credit spread", 540..554),
            Blemish::Blank("Talloway Software", 0..330),
        ],
    },
    Book {
        folder: "three-holdings",
        seed: 373,
        days: 780,
        truth: "\
factor,level,diffusion,drift,volatility,long_run,half_life_days
Millpond Trust,50.00,geometric,6%,20%,,
Receive short swap,4.000,reverting-level,,0.90,3.00,21
",
        correlation: include_str!("three-holdings/correlation.csv"),
        blemishes: &[],
    },
    Book {
        folder: "wide-book",
        seed: 28,
        days: 780,
        truth: include_str!("wide-book/factors.csv"),
        correlation: include_str!("wide-book/correlation.csv"),
        blemishes: &[],
    },
];

/// A factor's column: the level today as written says how many digits all of them have.
struct Column {
    name: String,
    today: String,
}

/// The folder of each book and its history.
pub(crate) fn files() -> Result<Vec<(&'static str, String)>, Box<dyn Error>> {
    BOOKS.iter().map(|book| Ok((book.folder, invent(book)?))).collect()
}

fn invent(book: &Book) -> Result<String, Box<dyn Error>> {
    let truth = Table::read(book.truth, "truth")?;
    let columns = columns(&truth);
    let model = model_of(&truth, &columns, book.correlation)?;
    let moves = pinned_moves(&model, book.days, &mut Stream::new(book.seed, 0))?;
    let mut cells: Vec<Vec<String>> =
        moves.iter().map(|moves| write_levels(&model, &columns, moves)).collect();
    for blemish in book.blemishes {
        blemish.spoil(&columns, &mut cells);
    }
    Ok(write_table(&columns, &trading_days(book.days)?, &cells))
}

/// Names and levels today; an index whose level the book does not say stands at 100.
fn columns(truth: &Table) -> Vec<Column> {
    let column = |cells: &[String]| Column {
        name: cells[0].clone(),
        today: if cells[1].is_empty() { "100.00".to_owned() } else { cells[1].clone() },
    };
    truth.rows.iter().map(|row| column(&row.cells)).collect()
}

/// A book that holds one unit of each factor: its model has the factors in the order of the columns.
fn model_of(truth: &Table, columns: &[Column], correlation: &str) -> Result<Model, Faults> {
    let mut positions = String::from("name,kind,quantity,price\n");
    for Column { name, today } in columns {
        let _ = writeln!(positions, "{name},level,1,{today}");
    }
    let inputs = Inputs {
        holdings: read_positions(&Table::read(&positions, "positions")?)?.0,
        factors: read_factors(truth)?.0,
        correlation: Some(read_correlation(&Table::read(correlation, "correlation")?)?),
        ..Inputs::default()
    };
    let book_currency = Some("EUR".to_owned());
    Model::assemble(
        &inputs,
        &ModelSettings { book_currency, days_per_year: DAYS_PER_YEAR, repairs_correlation: false },
    )
}

/// Moves of the modelled variables since today, a row per day, nought on the last.
fn pinned_moves(model: &Model, days: usize, stream: &mut Stream) -> Result<Vec<Vec<f64>>, Box<dyn Error>> {
    let transition = Transition::over(model, 1.0 / DAYS_PER_YEAR)?;
    let mut moves = vec![vec![0.0; model.factors.len()]];
    for _ in 1..WARM_UP_DAYS + days {
        let next = step(&transition, &moves[moves.len() - 1], stream);
        moves.push(next);
    }
    let mut missed = moves[moves.len() - 1].clone();
    for day in moves.iter_mut().rev() {
        for (factor, missed) in missed.iter_mut().enumerate() {
            day[factor] -= *missed;
            *missed *= transition.decay[factor];
        }
    }
    Ok(moves.split_off(WARM_UP_DAYS))
}

/// One step of all factors together.
fn step(transition: &Transition, from: &[f64], stream: &mut Stream) -> Vec<f64> {
    let normals: Vec<f64> = from.iter().map(|_| normal(stream)).collect();
    let shock = |row: usize| -> f64 {
        let entries = &transition.lower[row * from.len()..][..=row];
        entries.iter().zip(&normals).map(|(entry, normal)| entry * normal).sum()
    };
    let next = |row: usize| transition.decay[row] * from[row] + transition.shift[row] + shock(row);
    (0..from.len()).map(next).collect()
}

fn normal(stream: &mut Stream) -> f64 {
    // The uniform has 53 bits and may be 0; half a bit more lets it be no end of the interval.
    normal_quantile(stream.random::<f64>() + f64::EPSILON / 4.0)
}

/// Levels of a day, with the digits of today's.
fn write_levels(model: &Model, columns: &[Column], moves: &[f64]) -> Vec<String> {
    let write = |(at, column): (usize, &Column)| {
        let today = model.factors[at].level.unwrap_or_default();
        let is_log = model.factors[at].diffusion.is_log();
        let level = if is_log { today * moves[at].exp() } else { today + moves[at] };
        let digits = column.today.split_once('.').map_or(0, |(_, digits)| digits.len());
        format!("{level:.digits$}")
    };
    columns.iter().enumerate().map(write).collect()
}

impl Blemish {
    fn spoil(&self, columns: &[Column], cells: &mut [Vec<String>]) {
        let (Self::Stale(name, days) | Self::Blank(name, days)) = self;
        let Some(column) = columns.iter().position(|column| column.name == *name) else { return };
        for day in days.clone() {
            cells[day][column] = match self {
                Self::Stale(..) => cells[day - 1][column].clone(),
                Self::Blank(..) => String::new(),
            };
        }
    }
}

/// The last `count` trading days up to today, ascending.
fn trading_days(count: usize) -> Result<Vec<Date>, Box<dyn Error>> {
    let (holidays, _) = read_holidays(&Table::read(HOLIDAYS, "holidays")?)?;
    let mut days = Vec::with_capacity(count);
    let mut day = TODAY;
    while days.len() < count {
        let is_weekend = matches!(day.weekday(), Weekday::Saturday | Weekday::Sunday);
        if !is_weekend && holidays.binary_search(&day).is_err() {
            days.push(day);
        }
        day = day.yesterday()?;
    }
    days.reverse();
    Ok(days)
}

fn write_table(columns: &[Column], days: &[Date], cells: &[Vec<String>]) -> String {
    let names: Vec<&str> = columns.iter().map(|column| column.name.as_str()).collect();
    let mut text = format!("date,{}\n", names.join(","));
    for (day, cells) in days.iter().zip(cells) {
        let _ = writeln!(text, "{day},{}", cells.join(","));
    }
    text
}

/// Writes each history beside its book.
fn main() -> Result<(), Box<dyn Error>> {
    let folder = std::path::Path::new(env!("CARGO_MANIFEST_DIR")).join("example-portfolios");
    for (book, content) in files()? {
        std::fs::write(folder.join(book).join("history.csv"), content)?;
    }
    Ok(())
}
