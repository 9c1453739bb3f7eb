//! Which currency a book is in, and which factor is the rate of another one. A rate is named with the book's currency
//! last: `USD/EUR` in a euro book is euros for one dollar.

use super::{Inputs, ModelSettings};
use crate::tables::{Fault, Place};

/// Three capital letters, as in ISO 4217.
fn is_code(text: &str) -> bool {
    text.len() == 3 && text.bytes().all(|letter| letter.is_ascii_uppercase())
}

/// The two codes of a name like `USD/EUR`.
fn pair(name: &str) -> Option<(&str, &str)> {
    name.split_once('/').filter(|(left, right)| is_code(left) && is_code(right))
}

/// The same pair the other way round, for the name of a currency rate.
pub fn inverse_rate(rate: &str) -> Option<String> {
    pair(rate).map(|(left, right)| format!("{right}/{left}"))
}

/// The book's currency: the one set, else the only one named, provided that no row's is empty and no rate names
/// another; none where no currency is named anywhere. `columns` are the history's, rates among them.
pub(super) fn book_currency(
    inputs: &Inputs,
    columns: &[String],
    settings: &ModelSettings,
) -> Result<Option<String>, Fault> {
    if let Some(code) = &settings.book_currency {
        let fault = || {
            ask(inputs, format!("book currency `{code}`"), "a code of three capital letters, like EUR".into())
        };
        return if is_code(code) { Ok(Some(code.clone())) } else { Err(fault()) };
    }
    let of_rows = inputs.holdings.iter().filter_map(|holding| holding.currency.as_deref());
    let names = inputs.factors.iter().map(|row| &row.name).chain(columns);
    let of_rates = names.filter_map(|name| pair(name)).flat_map(|(left, right)| [left, right]);
    let mut named: Vec<&str> = Vec::new();
    for code in of_rows.chain(of_rates) {
        if !named.contains(&code) {
            named.push(code);
        }
    }
    let has_empty = inputs.holdings.iter().any(|holding| holding.currency.is_none());
    match named.as_slice() {
        [] => Ok(None),
        [only] if !has_empty => Ok(Some((*only).to_owned())),
        [only] => Err(ask(
            inputs,
            format!("{only} on some rows and no currency on others"),
            "the book's currency: name it (--book-currency)".into(),
        )),
        several => Err(ask(
            inputs,
            format!("{} currencies ({})", several.len(), several.join(", ")),
            "the book's currency: name it (--book-currency)".into(),
        )),
    }
}

fn ask(inputs: &Inputs, found: String, expected: String) -> Fault {
    let place = Place { file: inputs.files.positions.clone(), line: None, column: Some("currency".into()) };
    Fault { place, found, expected }
}
