//! Invents the wide book: 400 holdings on 60 factors in three currencies, from one seed, to the byte.
//! `cargo run --example invent-wide-book` writes the files beside this one anew. Only sums, products
//! and quotients touch the numbers, all of them exactly rounded, so every machine writes the same bytes.

use ebbmark_engine::simulate::Stream;
use rand::RngExt;
use std::fmt::Write;

const SEED: u64 = 20_261_130;
const REGIONS: [(&str, &str); 5] =
    [("European", "EUR"), ("Nordic", "EUR"), ("British", "GBP"), ("American", "USD"), ("Pacific", "USD")];
const SECTORS: [&str; 8] =
    ["banks", "energy", "health", "industry", "materials", "retail", "software", "utilities"];
const PROPERTY: [(&str, &str); 3] = [("European", "EUR"), ("British", "GBP"), ("American", "USD")];
/// Name, currency, and about where it stands today.
type Level = (&'static str, &'static str, f64);
const RATES: [Level; 8] = [
    ("Euro two-year rate", "EUR", 2.1),
    ("Euro five-year rate", "EUR", 2.4),
    ("Euro ten-year rate", "EUR", 2.8),
    ("Sterling five-year rate", "GBP", 3.8),
    ("Sterling ten-year rate", "GBP", 4.2),
    ("Dollar two-year rate", "USD", 3.6),
    ("Dollar five-year rate", "USD", 3.8),
    ("Dollar ten-year rate", "USD", 4.1),
];
const SPREADS: [Level; 3] = [
    ("Euro credit spread", "EUR", 90.0),
    ("Sterling credit spread", "GBP", 115.0),
    ("Dollar credit spread", "USD", 105.0),
];
const GOODS: [Level; 4] = [
    ("Dry bulk freight", "USD", 1_650.0),
    ("Baseload power", "EUR", 80.0),
    ("Winter gas", "GBP", 95.0),
    ("Sawn timber", "USD", 540.0),
];
const CURRENCY_RATES: [(&str, f64); 2] = [("USD/EUR", 0.884), ("GBP/EUR", 1.152)];
const PLACES: [&str; 20] = [
    "Aldmere",
    "Brinewick",
    "Carrowby",
    "Dunlacey",
    "Eskholme",
    "Farrowdale",
    "Glimster",
    "Hollinsea",
    "Inverloch",
    "Jarrowmoor",
    "Kestleby",
    "Lorncastle",
    "Marwhistle",
    "Netherby",
    "Orrelstone",
    "Pellingham",
    "Quillhaven",
    "Rothersea",
    "Stanmoor",
    "Thornleigh",
];
const TRADES: [&str; 15] = [
    "Assurance",
    "Bearings",
    "Ceramics",
    "Dredging",
    "Electric",
    "Foundry",
    "Glass",
    "Haulage",
    "Instruments",
    "Joinery",
    "Kilns",
    "Logistics",
    "Mills",
    "Optics",
    "Paper",
];
/// Common drivers of the correlation: all shares, five regions, eight sectors, rates, credit, energy, the dollar.
const DRIVERS: usize = 1 + 5 + 8 + 4;
const RATES_DRIVER: usize = 14;
const CREDIT_DRIVER: usize = 15;
const ENERGY_DRIVER: usize = 16;
const DOLLAR_DRIVER: usize = 17;

/// The diffusion of a factor as `factors.csv` writes it.
struct Factor {
    name: String,
    currency: &'static str,
    /// Everything after the name.
    columns: String,
    /// Level today as written; empty where none is needed.
    level: String,
    /// Correlation of two factors: the product of their loadings.
    loadings: [f64; DRIVERS],
}

/// The book's files: name and content.
pub(crate) fn files() -> [(&'static str, String); 3] {
    let factors = invent_factors(&mut Stream::new(SEED, 0));
    let positions = invent_positions(&factors, &mut Stream::new(SEED, 1));
    [
        ("positions.csv", positions),
        ("factors.csv", write_factors(&factors)),
        ("correlation.csv", write_correlation(&factors)),
    ]
}

fn between(stream: &mut Stream, low: f64, high: f64) -> f64 {
    low + (high - low) * stream.random::<f64>()
}

fn invent_factors(stream: &mut Stream) -> Vec<Factor> {
    let mut factors = Vec::with_capacity(60);
    for (region, (adjective, currency)) in REGIONS.into_iter().enumerate() {
        for (sector, trade) in SECTORS.into_iter().enumerate() {
            let drivers = [(0, 0.62), (1 + region, 0.34), (6 + sector, 0.36)];
            factors.push(share_index(format!("{adjective} {trade}"), currency, &drivers, stream));
        }
    }
    for (adjective, currency) in PROPERTY {
        let drivers = [(0, 0.55), (RATES_DRIVER, -0.34), (CREDIT_DRIVER, -0.22)];
        factors.push(share_index(format!("{adjective} property"), currency, &drivers, stream));
    }
    factors.extend(RATES.map(|about| rate(about, stream)));
    factors.extend(SPREADS.map(|about| spread(about, stream)));
    factors.extend(GOODS.map(|about| good(about, stream)));
    factors.extend(CURRENCY_RATES.map(|(name, today)| currency_rate(name, today, stream)));
    factors
}

fn share_index(
    name: String,
    currency: &'static str,
    drivers: &[(usize, f64)],
    stream: &mut Stream,
) -> Factor {
    let (drift, volatility) = (between(stream, 1.5, 6.5), between(stream, 13.0, 31.0));
    let columns = format!(",geometric,{drift:.1}%,{volatility:.0}%,,");
    Factor { name, currency, columns, level: String::new(), loadings: loadings(drivers, stream) }
}

fn rate((name, currency, about): Level, stream: &mut Stream) -> Factor {
    let (today, gap) = (about + between(stream, -0.15, 0.15), between(stream, -0.7, 0.7));
    let (volatility, half_life) = (between(stream, 0.65, 1.05), between(stream, 180.0, 420.0));
    let columns = format!("percent,reverting-level,,{volatility:.2},{:.2},{half_life:.0}", today + gap);
    let loadings = loadings(&[(RATES_DRIVER, 0.84), (0, 0.10)], stream);
    Factor { name: name.into(), currency, columns, level: format!("{today:.2}"), loadings }
}

fn spread((name, currency, about): Level, stream: &mut Stream) -> Factor {
    let (today, gap) = (about + between(stream, -8.0, 8.0), between(stream, -10.0, 25.0));
    let (volatility, half_life) = (between(stream, 35.0, 55.0), between(stream, 90.0, 160.0));
    let columns = format!("bp,reverting-level,,{volatility:.0},{:.0},{half_life:.0}", today + gap);
    let loadings = loadings(&[(CREDIT_DRIVER, 0.70), (0, -0.52)], stream);
    Factor { name: name.into(), currency, columns, level: format!("{today:.0}"), loadings }
}

fn good((name, currency, about): Level, stream: &mut Stream) -> Factor {
    let (today, ratio) = (about * between(stream, 0.94, 1.06), between(stream, 0.85, 1.10));
    let (volatility, half_life) = (between(stream, 28.0, 60.0), between(stream, 20.0, 90.0));
    let columns = format!("points,reverting-log,,{volatility:.0}%,{:.2},{half_life:.0}", today * ratio);
    let loadings = loadings(&[(ENERGY_DRIVER, 0.66), (0, 0.14)], stream);
    Factor { name: name.into(), currency, columns, level: format!("{today:.2}"), loadings }
}

fn currency_rate(name: &str, today: f64, stream: &mut Stream) -> Factor {
    let columns = format!(",geometric,,{:.1}%,,", between(stream, 5.5, 8.5));
    let loadings = loadings(&[(DOLLAR_DRIVER, 0.64), (0, -0.16)], stream);
    Factor { name: name.into(), currency: "", columns, level: format!("{today:.4}"), loadings }
}

/// The given loadings, each moved a little.
fn loadings(drivers: &[(usize, f64)], stream: &mut Stream) -> [f64; DRIVERS] {
    let mut loadings = [0.0; DRIVERS];
    for &(driver, loading) in drivers {
        loadings[driver] = loading + between(stream, -0.08, 0.08);
    }
    loadings
}

fn invent_positions(factors: &[Factor], stream: &mut Stream) -> String {
    let (indices, others) = factors.split_at(REGIONS.len() * SECTORS.len() + PROPERTY.len());
    let (rates, others) = others.split_at(RATES.len());
    let (spreads, others) = others.split_at(SPREADS.len());
    let goods = &others[..GOODS.len()];

    let mut text = String::from("name,group,kind,quantity,price,multiplier,unit,currency,factor\n");
    write_shares(&mut text, indices, stream);
    for (factors, each, word, terms, money) in [
        (rates, 6, "position", "100,percent", (400.0, 1_700.0)),
        (spreads, 7, "position", ",bp", (800.0, 3_200.0)),
        (goods, 7, "delivery", ",points", (300.0, 1_500.0)),
    ] {
        write_levels(&mut text, factors, each, word, terms, money, stream);
    }
    text.push_str("Cash EUR,Cash,cash,9400000,,,,EUR,\nCash USD,Cash,cash,4100000,,,,USD,\n");
    text.push_str("Cash GBP,Cash,cash,-1250000,,,,GBP,\n");
    text
}

/// 300 shares, each driven by the index of its region and trade.
fn write_shares(text: &mut String, indices: &[Factor], stream: &mut Stream) {
    for share in 0..PLACES.len() * TRADES.len() {
        let (place, trade) = (PLACES[share % PLACES.len()], TRADES[share / PLACES.len()]);
        let Factor { name: index, currency, .. } = &indices[share % indices.len()];
        let price = between(stream, 4.0, 160.0);
        let quantity = signed(stream, 0.06) * between(stream, 150_000.0, 900_000.0) / price;
        let region = index.split(' ').next().unwrap_or_default();
        let kind = if index.ends_with("property") { "Property" } else { "Equities" };
        let group = format!("{kind}/{region}");
        let _ = writeln!(text, "{place} {trade},{group},spot,{quantity:.0},{price:.2},,,{currency},{index}");
    }
}

/// So many `level` rows on each factor, long and short.
fn write_levels(
    text: &mut String,
    factors: &[Factor],
    each: usize,
    word: &str,
    multiplier_and_unit: &str,
    (least, most): (f64, f64),
    stream: &mut Stream,
) {
    let group = if word == "delivery" { "Freight and energy" } else { "Rates and spreads" };
    for Factor { name, currency, level, .. } in factors {
        for number in 1..=each {
            let quantity = signed(stream, 0.6) * between(stream, least, most);
            let row = format!("{name} {word} {number},{group},level,{quantity:.0},{level}");
            let _ = writeln!(text, "{row},{multiplier_and_unit},{currency},{name}");
        }
    }
}

/// -1 with the given chance, else 1.
fn signed(stream: &mut Stream, chance_of_short: f64) -> f64 {
    if stream.random::<f64>() < chance_of_short { -1.0 } else { 1.0 }
}

fn write_factors(factors: &[Factor]) -> String {
    let mut text = String::from("factor,level,unit,diffusion,drift,volatility,long_run,half_life_days\n");
    for Factor { name, level, columns, .. } in factors {
        let _ = writeln!(text, "{name},{level},{columns}");
    }
    text
}

fn write_correlation(factors: &[Factor]) -> String {
    let mut text = String::new();
    for factor in factors {
        text.push(',');
        text.push_str(&factor.name);
    }
    text.push('\n');
    for (row, one) in factors.iter().enumerate() {
        text.push_str(&one.name);
        for (column, other) in factors.iter().enumerate() {
            let product: f64 = one.loadings.iter().zip(&other.loadings).map(|(a, b)| a * b).sum();
            let cell = if row == column { 1.0 } else { product };
            // A product that rounds to zero is written without its sign.
            let written = format!("{cell:.3}").replace("-0.000", "0.000");
            let _ = write!(text, ",{written}");
        }
        text.push('\n');
    }
    text
}

/// Writes the files beside this one.
fn main() -> std::io::Result<()> {
    let folder = std::path::Path::new(env!("CARGO_MANIFEST_DIR")).join("example-portfolios/wide-book");
    for (name, content) in files() {
        std::fs::write(folder.join(name), content)?;
    }
    Ok(())
}
