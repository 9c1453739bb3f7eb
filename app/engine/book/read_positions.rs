//! From a table of positions to holdings: every row checked by itself, every bad cell gathered. What rows say together
//! is checked when the model is made.

use super::description::{DESCRIPTION_COLUMNS, read_description, read_unit};
use super::{Description, Holding, Kind};
use crate::tables::{Cells, Columns, Fault, Faults, Notice, NoticeLevel, Table};
use std::collections::HashMap;
use std::collections::hash_map::Entry;

const COLUMNS: [&str; 10] =
    ["name", "quantity", "price", "kind", "group", "currency", "factor", "multiplier", "unit", "carry"];
/// Columns of kinds that are not read yet; their rows are refused by their kind.
const LATER_COLUMNS: [&str; 9] = [
    "coupon",
    "maturity",
    "coupons_per_year",
    "right",
    "strike",
    "expiry",
    "implied_volatility",
    "rate",
    "dividend_yield",
];
const KINDS: [(&str, Option<Kind>); 6] = [
    ("spot", Some(Kind::Spot)),
    ("level", Some(Kind::Level)),
    ("cash", Some(Kind::Cash)),
    ("exposure", Some(Kind::Exposure)),
    ("bond", None),
    ("option", None),
];

/// Reads `positions.csv`.
///
/// # Errors
/// Every bad cell of every row, a name given twice, or no row at all.
pub fn read_positions(table: &Table) -> Result<(Vec<Holding>, Vec<Notice>), Faults> {
    let known = [COLUMNS.as_slice(), &DESCRIPTION_COLUMNS, &LATER_COLUMNS].concat();
    let columns = Columns::find(table, &known, &["name", "quantity"])?;
    let mut faults = table.faults.clone();
    let mut notices: Vec<Notice> = columns.notice_of_unknown(table).into_iter().collect();
    let mut holdings: Vec<Holding> = Vec::new();
    let mut first_lines: HashMap<&str, usize> = HashMap::new();
    for row in &table.rows {
        let mut cells = Cells::of(table, &columns, row, &mut faults);
        if let Some(name) = cells.text("name") {
            match first_lines.entry(name) {
                Entry::Vacant(entry) => drop(entry.insert(row.line)),
                Entry::Occupied(entry) => {
                    let expected = format!("a name of its own: line {} has it already", entry.get());
                    cells.fault("name", format!("`{name}`"), expected);
                }
            }
        }
        if let Some(holding) = read_row(&mut cells) {
            notices.extend(unused_cells(&cells, &holding));
            let other_columns = columns.unknown_cells(table, row);
            holdings.push(Holding { other_columns, ..holding });
        }
    }
    if table.rows.is_empty() && faults.is_empty() {
        let place = table.place(None, None);
        faults.push(Fault { place, found: "no holding".to_owned(), expected: "at least one row".to_owned() });
    }
    Faults::unless_any(faults, (holdings, notices))
}

fn read_row(cells: &mut Cells<'_, '_>) -> Option<Holding> {
    let name = cells.needed_text("name", "the name of the holding");
    let kind = match cells.text("kind") {
        None => Some(Kind::Spot),
        Some(text) => match cells.word("kind", &KINDS)? {
            Some(kind) => Some(kind),
            None => {
                let expected =
                    "spot, level, cash or exposure: not yet, give its sensitivities in exposures.csv";
                cells.fault("kind", format!("`{text}`"), expected);
                None
            }
        },
    }?;
    let quantity = cells.needed_number("quantity", "a number");
    let price = read_price(cells, kind);
    let multiplier = cells.number("multiplier").unwrap_or(1.0);
    let carry = cells.figure("carry").map_or(0.0, |figure| figure.value);
    let currency = read_currency(cells);
    let unit = read_unit(cells);
    let description = read_description(cells);
    refuse_factor(cells, kind);
    let (name, quantity, price) = (name?, quantity?, price?);
    check_size(cells, kind, quantity, price, multiplier);
    Some(Holding {
        name: name.to_owned(),
        kind,
        quantity,
        price,
        group: cells.text("group").unwrap_or_default().to_owned(),
        currency,
        factor: cells.text("factor").map(str::to_owned),
        multiplier,
        unit,
        carry,
        description,
        line: Some(cells.line()),
        other_columns: Vec::new(),
    })
}

fn read_price(cells: &mut Cells<'_, '_>, kind: Kind) -> Option<f64> {
    let expected = match kind {
        Kind::Spot => "a price above 0",
        Kind::Level => "the level today",
        Kind::Exposure => "the value today",
        Kind::Cash => {
            let has_price = cells.text("price").is_some();
            return if has_price { cells.number("price").map(|_| 1.0) } else { Some(1.0) };
        }
    };
    let price = cells.needed_number("price", expected)?;
    if kind == Kind::Spot && price <= 0.0 {
        let text = cells.text("price").unwrap_or_default();
        cells.fault("price", format!("`{text}`"), expected);
        return None;
    }
    Some(price)
}

fn read_currency(cells: &mut Cells<'_, '_>) -> Option<String> {
    let text = cells.text("currency")?;
    if text.len() == 3 && text.bytes().all(|letter| letter.is_ascii_alphabetic()) {
        return Some(text.to_ascii_uppercase());
    }
    cells.fault("currency", format!("`{text}`"), "a code of three letters, like EUR");
    None
}

fn refuse_factor(cells: &mut Cells<'_, '_>, kind: Kind) {
    let expected = match kind {
        Kind::Cash => "nothing: cash has no factor",
        Kind::Exposure => "nothing: its factors stand in exposures.csv",
        Kind::Spot | Kind::Level => return,
    };
    if let Some(text) = cells.text("factor") {
        cells.fault("factor", format!("`{text}`"), expected);
    }
}

fn check_size(cells: &mut Cells<'_, '_>, kind: Kind, quantity: f64, price: f64, multiplier: f64) {
    let text = cells.text("quantity").unwrap_or_default();
    if kind == Kind::Exposure && quantity != 1.0 {
        cells.fault("quantity", format!("`{text}`"), "1: the price of an exposure row is its whole value");
    } else if !(quantity * price * multiplier).is_finite() {
        cells.fault("quantity", format!("`{text}`"), "a finite quantity x price x multiplier");
    }
}

/// Cells that a row's kind has no use for.
fn unused_cells(cells: &Cells<'_, '_>, holding: &Holding) -> Option<Notice> {
    let is_still = matches!(holding.kind, Kind::Cash | Kind::Exposure);
    let mut unused: Vec<&str> = Vec::new();
    unused.extend(cells.text("unit").filter(|_| holding.kind != Kind::Level).map(|_| "unit"));
    unused.extend((is_still && holding.multiplier != 1.0).then_some("multiplier"));
    unused.extend((holding.kind == Kind::Level && holding.carry != 0.0).then_some("carry"));
    unused.extend(
        (is_still && holding.description != Description::default()).then_some("the diffusion's columns"),
    );
    let is_priced_cash = holding.kind == Kind::Cash && cells.text("price").is_some_and(|price| price != "1");
    unused.extend(is_priced_cash.then_some("price"));
    (!unused.is_empty()).then(|| Notice {
        level: NoticeLevel::Warning,
        text: format!("{}: {} given but not used for its kind.", holding.name, unused.join(", ")),
    })
}
