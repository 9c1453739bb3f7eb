//! How amounts are written for a reader: the size they are counted in, thousands apart, and no more digits than their
//! error allows. What an amount means is not known here.

/// Whole units are written below this; above it, millions.
const FROM_MILLIONS: f64 = 1e7;
/// Above this, thousands of millions.
const FROM_BILLIONS: f64 = 1e10;
/// Most decimals of an amount.
const MOST_DECIMALS: usize = 4;

/// What amounts of one book are counted in, so that all of them compare at a glance.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Scale {
    /// One of it, in money.
    pub size: f64,
    /// Behind the currency: empty, `m` or `bn`.
    pub word: &'static str,
}

impl Scale {
    /// The one for a book in which amounts up to `largest_money` appear.
    pub fn for_amounts_up_to(largest_money: f64) -> Self {
        match largest_money.abs() {
            large if large >= FROM_BILLIONS => Self { size: 1e9, word: "bn" },
            large if large >= FROM_MILLIONS => Self { size: 1e6, word: "m" },
            _ => Self { size: 1.0, word: "" },
        }
    }

    /// "EUR m", "EUR", "m", or nothing.
    pub fn unit(self, currency: Option<&str>) -> String {
        [currency.unwrap_or(""), self.word].join(" ").trim().to_owned()
    }

    /// An amount with that many decimals, in this size and without its unit.
    pub fn figure(self, money: f64, decimals: usize) -> String {
        grouped(money / self.size, decimals)
    }

    /// Decimals of an amount known to within `error_money`: the last digit is about the size of the error.
    pub fn decimals(self, error_money: f64) -> usize {
        decimals_for(error_money / self.size)
    }
}

/// Decimals of a figure known to within `error`: the last digit is about the size of the error. None for an error of
/// 0 or one that is not a number.
pub fn decimals_for(error: f64) -> usize {
    let digits = -error.abs().log10();
    if digits.is_finite() { digits.ceil().clamp(0.0, MOST_DECIMALS as f64) as usize } else { 0 }
}

/// A number with `decimals` decimals and its thousands apart: `-1,234.50`. What rounds to zero has no sign.
pub fn grouped(number: f64, decimals: usize) -> String {
    if !number.is_finite() {
        return "\u{2013}".to_owned();
    }
    let text = format!("{:.decimals$}", number.abs());
    let whole = text.split('.').next().unwrap_or(&text).len();
    let mut out = String::with_capacity(text.len() + whole / 3 + 1);
    if number < 0.0 && text.bytes().any(|digit| (b'1'..=b'9').contains(&digit)) {
        out.push('-');
    }
    for (place, digit) in text.chars().enumerate() {
        if place > 0 && place < whole && (whole - place) % 3 == 0 {
            out.push(',');
        }
        out.push(digit);
    }
    out
}

/// A fraction in per cent: `5.49 %`.
pub fn percent(fraction: f64, decimals: usize) -> String {
    format!("{} %", grouped(fraction * 100.0, decimals))
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn exact_thousands_stand_apart() {
        for (number, decimals, expected) in [
            (0.0, 0, "0"),
            (999.4, 0, "999"),
            (999.6, 0, "1,000"),
            (-1234.5, 2, "-1,234.50"),
            (1_234_567.0, 0, "1,234,567"),
            (-0.004, 2, "0.00"),
            (f64::NAN, 2, "\u{2013}"),
        ] {
            assert_eq!(grouped(number, decimals), expected);
        }
    }

    #[test]
    fn exact_digits_follow_the_error() {
        for (error, expected) in
            [(41.0, 0), (0.5, 1), (0.041, 2), (0.001, 3), (1e-9, 4), (0.0, 0), (f64::NAN, 0)]
        {
            assert_eq!(decimals_for(error), expected, "{error}");
        }
    }

    #[test]
    fn exact_sizes() {
        let check = |largest: f64, unit: &str, figure: &str| {
            let scale = Scale::for_amounts_up_to(largest);
            assert_eq!((scale.unit(Some("EUR")).as_str(), scale.figure(largest, 1).as_str()), (unit, figure));
        };
        check(80_000.0, "EUR", "80,000.0");
        check(84_310_450.0, "EUR m", "84.3");
        check(-2.5e10, "EUR bn", "-25.0");
        assert_eq!(Scale::for_amounts_up_to(1.0).unit(None), "");
    }
}
