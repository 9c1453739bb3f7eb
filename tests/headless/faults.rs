//! Bad files: every fault listed with file, line, column, what was found and what was expected; exit code 2.

use super::support::{call, write};

/// A positions file with a fault in each of these places.
const BAD_POSITIONS: &str = "\
name,kind,quantity,price,volatility,diffusion,half_life_days
Brook,spot,many,50,20%,,
Weir,spot,10,-4,20%,,
Lock,spot,10,40,-0.1,,
Sluice,spot,10,40,20%,sideways,
Mill,barge,10,40,20%,,
Brook,spot,10,40,20%,,
";

#[test]
fn exact_every_fault_of_a_file_is_listed() {
    let bad = write("faults", "bad.csv", BAD_POSITIONS);
    let call = call(&["read", "--positions", &bad]);
    assert_eq!((call.code, call.out.as_str()), (2, ""));
    for (line, column, found) in [
        (2, "quantity", "many"),
        (3, "price", "-4"),
        (4, "volatility", "-0.1"),
        (5, "diffusion", "sideways"),
        (6, "kind", "barge"),
        (7, "name", "Brook"),
    ] {
        let row = call.err.lines().find(|text| text.contains(&format!("line {line},")));
        let row = row.unwrap_or_else(|| panic!("no fault at line {line}:\n{}", call.err));
        for words in ["bad.csv", column, found, "expected"] {
            assert!(row.contains(words), "{row} lacks {words}");
        }
    }
}

#[test]
fn exact_faults_of_all_files_are_listed() {
    let positions = write("faults", "two.csv", "name,quantity,price,volatility\nBrook,ten,50,20%\n");
    let correlation = write("faults", "correlation.csv", ",Brook,Weir\nBrook,1,1.5\nWeir,1.5,1\n");
    let call = call(&["read", "--positions", &positions, "--correlation", &correlation]);
    assert_eq!(call.code, 2);
    assert!(call.err.contains("two.csv") && call.err.contains("correlation.csv"), "{}", call.err);
}

#[test]
fn exact_impossible_correlation_is_refused_unless_it_may_be_repaired() {
    let shares = "name,quantity,price,volatility\nA,1,50,20%\nB,1,50,20%\nC,1,50,20%\n";
    let positions = write("faults", "three.csv", shares);
    // Eigenvalues 1 + 0.9, 1 + 0.9 and 1 - 1.8.
    let matrix = ",A,B,C\nA,1,-0.9,-0.9\nB,-0.9,1,-0.9\nC,-0.9,-0.9,1\n";
    let correlation = write("faults", "impossible.csv", matrix);
    let line = ["read", "--positions", &positions, "--correlation", &correlation];
    let refused = call(&line);
    assert_eq!((refused.code, refused.out.as_str()), (2, ""));
    assert!(refused.err.contains("-0.8000") && refused.err.contains("--repair"), "{}", refused.err);
    // Three equal correlations of three factors can't be below -1/2, and by symmetry that is the nearest.
    let repaired = call(&[&line[..], &["--repair"]].concat());
    assert_eq!(repaired.code, 0, "{}", repaired.err);
    assert!(
        repaired.err.contains("A and B -0.900 to -0.500")
            || repaired.err.contains("B and A -0.900 to -0.500")
    );
    assert!(repaired.err.contains("-0.8000"), "{}", repaired.err);
}

#[test]
fn exact_bonds_and_options_are_pointed_to_exposures() {
    let bond = "name,kind,quantity,price,coupon,maturity,coupons_per_year\nLoan,bond,100,99,3%,5,1\n";
    let call = call(&["read", "--positions", &write("faults", "bond.csv", bond)]);
    assert_eq!(call.code, 2);
    assert!(call.err.contains("not yet") && call.err.contains("exposures.csv"), "{}", call.err);
}

#[test]
fn exact_files_that_are_no_tables_are_refused() {
    for (name, content) in
        [("empty.csv", ""), ("header.csv", "name,quantity,price\n"), ("words.csv", "hello\n")]
    {
        let file = write("faults", name, content);
        for line in [&["read", "--positions", file.as_str()][..], &[file.as_str()]] {
            let call = call(line);
            assert_eq!((call.code, call.out.as_str()), (2, ""), "{name}");
            assert!(call.err.contains(name), "{}", call.err);
        }
    }
    let file = write("faults", "bytes.csv", "");
    std::fs::write(&file, b"name,quantity,price\nBr\xff,1,2\n").unwrap();
    assert_eq!(call(&["read", "--positions", &file]).code, 2);
}
