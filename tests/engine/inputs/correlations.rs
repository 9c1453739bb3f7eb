//! Correlation files: their cells, and matrices that no set of factors can have.

use super::{Texts, model, refused};

const BOOK: &str = "name,quantity,price,volatility\nA,1,1,.2\nB,1,1,.2\nC,1,1,.2\n";

fn with(correlation: &str) -> Texts<'_> {
    Texts { positions: BOOK, correlation, ..Texts::default() }
}

#[test]
fn always_a_wrong_cell_is_told_with_its_place() {
    for (text, words) in [
        (",A,B\nA,1,.5\nB,.4,1\n", "line 3, column A: found 0.4 against 0.5"),
        (",A,B\nA,.9,.5\nB,,1\n", "line 2, column A: found `.9` on the diagonal"),
        (",A,B\nA,1,-1.01\nB,,1\n", "line 2, column B: found `-1.01`"),
        (",A,B\nA,1,x\nB,,1\n", "line 2, column B: found `x`"),
        (",A,B\nA,1,\nB,,1\n", "line 3, column A: found nothing for B and A"),
        (",A,Z\nA,1,.5\nZ,,1\n", "line 3, column Z: found `Z`, expected the name of a factor"),
        (",A,B\nA,1,.5\n", "line 1, column B: found `B` without a row"),
        (",A,A\nA,1,.5\n", "line 1, column A: found `A` a second time"),
        (",A,B\nA,1,.5\nB,.5\n", "line 3: found 2 cells, expected 3"),
    ] {
        let faults = model(with(text)).unwrap_err();
        assert!(faults.to_string().contains(&format!("correlation.csv, {words}")), "{faults}");
    }
}

#[test]
fn always_one_triangle_in_any_order_will_do() {
    let model = model(with("factor,C,A\nA,.25,\nC,1,\n")).unwrap();
    assert_eq!((model.correlation.at(0, 2), model.correlation.at(2, 0)), (0.25, 0.25));
    assert!(model.notices.iter().any(|notice| notice.text.contains("taken as uncorrelated: B.")));
}

/// Smallest eigenvalue of (.95, -.9, .2): the methods sheet's -.412322.
#[test]
fn table_an_impossible_matrix_is_diagnosed() {
    refused(
        with(",A,B,C\nA,1,.95,-.9\nB,,1,.2\nC,,,1\n"),
        &[
            "not positive semi-definite (smallest eigenvalue -0.4123), expected correlations that can hold together; it shows at C",
        ],
    );
    // What would round to zero gets more places.
    let faults = model(with(",A,B,C\nA,1,1,0.5\nB,,1,0.501\nC,,,1\n")).unwrap_err().to_string();
    let digits = faults.split("eigenvalue -").nth(1).and_then(|rest| rest.split(')').next()).unwrap();
    assert!(digits.parse::<f64>().unwrap() > 0.0 && digits.len() > "0.0000".len(), "{faults}");
}

#[test]
fn always_semi_definite_matrices_are_taken() {
    let ones = ",A,B,C\nA,1,1,-1\nB,1,1,-1\nC,-1,-1,1\n";
    assert!(model(with(ones)).unwrap().correlation.smallest_eigenvalue().abs() < 1e-12);
    // C is a mix of A and B: (A + B) / sqrt(2).
    let mix = ",A,B,C\nA,1,0,0.7071067811865476\nB,,1,0.7071067811865476\nC,,,1\n";
    assert!(model(with(mix)).is_ok());
}
