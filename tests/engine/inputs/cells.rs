//! Cells, rows and headers: every bad one at its place, whatever the file.

use super::{Texts, inputs, model, positions, refused};
use ebbmark_engine::history::{date_after, read_holidays};
use ebbmark_engine::tables::{FileKind, Table};
use jiff::civil::date;
use proptest::prelude::*;

/// A row that is good in every column.
const GOOD: [(&str, &str); 15] = [
    ("name", "Brook"),
    ("quantity", "10"),
    ("price", "100"),
    ("kind", "spot"),
    ("group", "Shares"),
    ("currency", "EUR"),
    ("factor", "Brook factor"),
    ("multiplier", "2"),
    ("unit", "points"),
    ("carry", "1%"),
    ("diffusion", "reverting-log"),
    ("drift", "0.01"),
    ("volatility", "20%"),
    ("long_run", "90"),
    ("half_life_days", "40"),
];

fn book_with(column: &str, cell: &str) -> String {
    let header: Vec<&str> = GOOD.iter().map(|(name, _)| *name).collect();
    let row: Vec<&str> = GOOD.iter().map(|(name, good)| if *name == column { cell } else { *good }).collect();
    format!("{}\n{}\n", header.join(","), row.join(","))
}

#[test]
fn always_a_wrong_cell_of_positions_is_told_with_its_place() {
    assert!(model(positions(&book_with("", ""))).is_ok());
    for (column, bad) in [
        ("name", ""),
        ("quantity", "ten"),
        ("quantity", ""),
        ("quantity", "5%"),
        ("price", "0"),
        ("price", "-3"),
        ("price", "1e999"),
        ("kind", "fund"),
        ("currency", "EURO"),
        ("multiplier", "x"),
        ("unit", "metres"),
        ("carry", "1%%"),
        ("diffusion", "jumping"),
        ("drift", "up"),
        ("volatility", "-0.1"),
        ("volatility", "NaN"),
        ("long_run", "inf"),
        ("half_life_days", "0"),
        ("half_life_days", "never"),
    ] {
        let text = book_with(column, bad);
        refused(positions(&text), &[&format!("positions.csv, line 2, column {column}: found")]);
    }
}

#[test]
fn always_a_wrong_cell_of_the_other_files_is_told_with_its_place() {
    let book = "name,quantity,price,kind\nUnits,1,100,exposure\n";
    let exposures =
        ["holding,factor,money,per\nUnits,F,ten,+1%\n", "holding,factor,money,per\nUnits,F,10,+2%\n"];
    for (exposures, column) in exposures.into_iter().zip(["money", "per"]) {
        let texts = Texts { positions: book, exposures, ..Texts::default() };
        refused(texts, &[&format!("exposures.csv, line 2, column {column}: found")]);
    }
    for (column, cell) in [("level", "3%"), ("unit", "x"), ("diffusion", "x"), ("volatility", "-1")] {
        let factors = format!("factor,{column}\nF,{cell}\n");
        let texts = Texts { positions: book, factors: &factors, ..Texts::default() };
        refused(texts, &[&format!("factors.csv, line 2, column {column}: found `{cell}`")]);
    }
}

#[test]
fn always_every_bad_row_is_listed_in_order() {
    let text = "name,quantity,price,volatility\nA,1\nB,x,5,0.2\nC,1,-5,0.2,9\nB,1,1,0.1,,\n";
    refused(
        positions(text),
        &[
            "line 2: found 2 cells, expected 4",
            "line 3, column quantity: found `x`",
            "line 4: found 5 cells, expected 4",
            "line 5, column name: found `B`, expected a name of its own: line 3",
        ],
    );
}

#[test]
fn always_a_column_given_twice_or_missing_is_refused() {
    refused(
        positions("name,quantity,Price,price \nA,1,1,1\n"),
        &["line 1, column price: found the column `price` a second"],
    );
    refused(positions("name,price\nA,1\n"), &["line 1, column quantity: found no column `quantity`"]);
    refused(positions("name,quantity,price\n"), &["found no holding"]);
    refused(positions("\u{feff}\n \n"), &["found an empty file"]);
}

#[test]
fn always_numbers_as_people_write_them() {
    let quantity = |text: &str, separator: char| {
        let book = format!(
            "name{separator}quantity{separator}price{separator}volatility\nA{separator}{text}{separator}2{separator}20%\n"
        );
        inputs(positions(&book)).map(|inputs| inputs.holdings[0].quantity).ok()
    };
    for (text, separator, expected) in [
        ("1.5", ',', Some(1.5)),
        ("-1.5e3", ',', Some(-1500.0)),
        ("+.5", ';', Some(0.5)),
        ("1,5", ';', Some(1.5)),
        ("1,5", '\t', Some(1.5)),
        ("\"1,5\"", ',', None),
        ("1,234.5", ';', None),
        ("1.234,5", ';', None),
        ("1'234", ',', None),
        ("1 234", ',', None),
        ("0x10", ',', None),
        ("1_000", ',', None),
        ("infinity", ',', None),
    ] {
        assert_eq!(quantity(text, separator), expected, "{text} {separator:?}");
    }
    // A point anywhere takes the comma its meaning away.
    refused(
        positions("name;quantity;price;volatility\nA;1,5;2.5;20%\n"),
        &["line 2, column quantity: found `1,5`"],
    );
}

#[test]
fn always_marks_blanks_and_unknown_columns_are_tolerated() {
    let book = "\u{feff} Price ,NAME, Quantity,volatility,desk\r\n 2 , Brook ,10,20%,north\r\n\r\n";
    let holding = inputs(positions(book)).unwrap().holdings.remove(0);
    assert_eq!((holding.name.as_str(), holding.quantity, holding.price), ("Brook", 10.0, 2.0));
    assert_eq!(holding.other_columns, [("desk".to_owned(), "north".to_owned())]);
    assert_eq!(holding.line, Some(2));
}

#[test]
fn always_bytes_that_are_no_text_are_refused_with_their_line() {
    let faults = Table::from_bytes(b"name\nA\n\xff\n", "book.csv").unwrap_err();
    assert!(faults.to_string().starts_with("book.csv, line 3: found bytes that are not UTF-8"), "{faults}");
}

#[test]
fn always_files_are_told_apart_by_their_headers() {
    for (text, expected) in [
        ("price,name,quantity\n", Some(FileKind::Positions)),
        ("holding,factor,money,per\n", Some(FileKind::Exposures)),
        ("factor,level\nF,1\n", Some(FileKind::Factors)),
        (",A,B\nA,1,0\nB,0,1\n", Some(FileKind::Correlation)),
        ("factor,A,B\nB,0,1\nA,1,0\n", Some(FileKind::Correlation)),
        ("Date\n2026-01-01\n", Some(FileKind::Holidays)),
        ("date,A\n2026-01-01,1\n", Some(FileKind::History)),
        ("measure,confidence,horizon_days,limit,unit\n", Some(FileKind::Limits)),
        ("apples,pears\n1,2\n", None),
    ] {
        assert_eq!(FileKind::of(&Table::read(text, "file").unwrap()).ok(), expected, "{text}");
    }
}

/// Christmas 2026 falls on a Friday.
#[test]
fn exact_trading_days_leave_out_weekends_and_holidays() {
    let (holidays, _) =
        read_holidays(&Table::read("date\n2027-01-01\n2026-12-25\n", "holidays.csv").unwrap()).unwrap();
    let thursday = date(2026, 12, 24);
    for (days, holidays, expected) in [
        (0, holidays.as_slice(), thursday),
        (1, holidays.as_slice(), date(2026, 12, 28)),
        (1, [].as_slice(), date(2026, 12, 25)),
        (6, holidays.as_slice(), date(2027, 1, 5)),
    ] {
        assert_eq!(date_after(thursday, days, holidays), Some(expected));
    }
    assert_eq!(date_after(jiff::civil::Date::MAX, 1, &[]), None);
}

proptest! {
    #[test]
    fn always_any_text_is_read_or_refused(text in "[ -~\\n,;\"\\t\u{e4}]{0,200}") {
        // Neither way may panic; a book that is read holds something.
        if let Ok(inputs) = inputs(positions(&text)) {
            prop_assert!(!inputs.holdings.is_empty());
        }
    }

    #[test]
    fn always_an_injected_bad_number_is_told_at_its_line(rows in 1_usize..30, bad in 0_usize..30) {
        let bad = bad % rows;
        let row = |at: usize| format!("H{at},{},1,20%\n", if at == bad { "oops".to_owned() } else { at.to_string() });
        let text: String = (0..rows).map(row).collect();
        let faults = inputs(positions(&format!("name,quantity,price,volatility\n{text}"))).unwrap_err();
        prop_assert_eq!(faults.0.len(), 1);
        prop_assert_eq!(faults.0[0].place.line, Some(bad + 2));
        prop_assert_eq!(faults.0[0].place.column.as_deref(), Some("quantity"));
    }
}
