//! The example portfolios: each opens, the small one has the figures of its note, the wide one and all histories are what
//! their programs write, byte for byte.

use super::support::{call, read_json, without_seconds};

#[allow(dead_code, reason = "its main writes the files that are compared here")]
#[path = "../../example-portfolios/wide-book/invent.rs"]
mod invent;

#[allow(dead_code, reason = "its main writes the files that are compared here")]
#[path = "../../example-portfolios/invent-histories.rs"]
mod invent_histories;

const MIXED: [&str; 16] = [
    "--positions",
    "example-portfolios/mixed-fund/Ellerwick.csv",
    "--exposures",
    "example-portfolios/mixed-fund/exposures.csv",
    "--factors",
    "example-portfolios/mixed-fund/factors.csv",
    "--correlation",
    "example-portfolios/mixed-fund/correlation.csv",
    "--history",
    "example-portfolios/mixed-fund/history.csv",
    "--holidays",
    "example-portfolios/mixed-fund/holidays.csv",
    "--book-currency",
    "EUR",
    "--as-of",
    "2026-11-30",
];
const WIDE: [&str; 8] = [
    "--positions",
    "example-portfolios/wide-book/positions.csv",
    "--factors",
    "example-portfolios/wide-book/factors.csv",
    "--correlation",
    "example-portfolios/wide-book/correlation.csv",
    "--book-currency",
    "EUR",
];

#[test]
fn agree_built_in_example_and_its_files() {
    let named = without_seconds(read_json(&MIXED));
    let built_in = without_seconds(read_json(&[]));
    // Notices name the files, which stand elsewhere.
    let text = named.to_string().replace("example-portfolios/mixed-fund/", "built-in example/");
    assert_eq!(text, built_in.to_string());
    let value = named["book"]["value"].as_f64().unwrap();
    assert!((60e6..90e6).contains(&value), "{value}");
    assert_eq!(named["horizon"]["date"], "2026-12-30");
}

/// The figures of the note, worked by hand and checked with numpy.
#[test]
fn exact_three_holdings_have_the_figures_of_their_note() {
    let answer = read_json(&[
        "--positions",
        "example-portfolios/three-holdings/positions.csv",
        "--correlation",
        "example-portfolios/three-holdings/correlation.csv",
    ]);
    let exact = |moment: &str| answer["moments"][moment]["exact"].as_f64().unwrap();
    // Relative to the digits that numpy printed.
    assert!((exact("mean") / 82_250.626_042_970_05 - 1.0).abs() < 1e-12);
    assert!((exact("sd") / 3_178.500_468_287_298 - 1.0).abs() < 1e-12);
    let change = answer["moments"]["expected_change"].as_f64().unwrap();
    assert!((change - 2_250.626_042_970_05).abs() < 1e-6);
}

#[test]
fn exact_wide_book_is_what_its_program_writes() {
    for (name, content) in invent::files() {
        let path = format!("{}/example-portfolios/wide-book/{name}", env!("CARGO_MANIFEST_DIR"));
        assert!(
            std::fs::read_to_string(&path).unwrap() == content,
            "{name} differs: run the example that writes it"
        );
    }
}

#[test]
fn exact_histories_are_what_their_program_writes() {
    let files = invent_histories::files().unwrap();
    assert_eq!(files.len(), 3);
    for (folder, content) in files {
        let path = format!("{}/example-portfolios/{folder}/history.csv", env!("CARGO_MANIFEST_DIR"));
        assert!(
            std::fs::read_to_string(&path).unwrap() == content,
            "{folder} differs: run the example that writes it"
        );
    }
}

#[test]
fn exact_wide_book_is_as_wide_as_it_says() {
    let [(_, positions), (_, factors), (_, correlation)] = invent::files();
    assert_eq!(positions.lines().count(), 1 + 400);
    assert_eq!(factors.lines().count(), 1 + 60);
    assert_eq!(factors.lines().filter(|line| line.contains("reverting-")).count(), 15);
    assert_eq!(correlation.lines().count(), 1 + 60);
    let mut currencies: Vec<&str> =
        positions.lines().skip(1).filter_map(|line| line.split(',').nth(7)).collect();
    currencies.sort_unstable();
    currencies.dedup();
    assert_eq!(currencies, ["EUR", "GBP", "USD"]);
}

#[test]
fn exact_wide_book_opens() {
    let answer = read_json(&WIDE);
    assert!(answer["loss"][1]["var"].as_f64().unwrap() > 0.0);
    let table = call(&[&["read", "--paths", "1000"], &WIDE[..]].concat());
    assert_eq!(table.code, 0, "{}", table.err);
}
