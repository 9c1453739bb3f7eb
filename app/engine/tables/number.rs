//! Numbers as people write them in files: plain digits, a point or a decimal comma, perhaps a `%`. No thousands
//! separators, nothing infinite.

/// A number and whether a `%` stood behind it; the sign is taken into account (`18%` is 0.18).
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct ParsedNumber {
    /// The number.
    pub value: f64,
    /// Whether it was written with `%`.
    pub has_percent_sign: bool,
}

/// Reads a number; the error says what was expected.
pub(super) fn parse(text: &str, has_decimal_comma: bool) -> Result<ParsedNumber, &'static str> {
    let (digits, has_percent_sign) = match text.strip_suffix('%') {
        Some(digits) => (digits.trim_end(), true),
        None => (text, false),
    };
    let plain = if has_decimal_comma { digits.replacen(',', ".", 1) } else { digits.to_owned() };
    if !is_plain(&plain) {
        return Err(if has_thousands(digits) { "a number without thousands separators" } else { "a number" });
    }
    match plain.parse::<f64>() {
        Ok(value) if value.is_finite() => {
            Ok(ParsedNumber { value: if has_percent_sign { value / 100.0 } else { value }, has_percent_sign })
        }
        _ => Err("a finite number"),
    }
}

/// Whether a cell is a number written with a point, so that commas in the same file are not decimal ones.
pub(super) fn has_point(text: &str) -> bool {
    text.contains('.') && parse(text, false).is_ok()
}

/// Sign, digits with at most one point, exponent.
fn is_plain(text: &str) -> bool {
    let unsigned = text.strip_prefix(['+', '-']).unwrap_or(text);
    let (mantissa, exponent) = match unsigned.split_once(['e', 'E']) {
        Some((mantissa, exponent)) => (mantissa, Some(exponent.strip_prefix(['+', '-']).unwrap_or(exponent))),
        None => (unsigned, None),
    };
    let is_digits = |text: &str| text.bytes().all(|byte| byte.is_ascii_digit());
    let (whole, fraction) = mantissa.split_once('.').unwrap_or((mantissa, ""));
    let has_digits = !(whole.is_empty() && fraction.is_empty());
    has_digits
        && is_digits(whole)
        && is_digits(fraction)
        && exponent.is_none_or(|digits| !digits.is_empty() && is_digits(digits))
}

/// Digits with separators in between: commas, points, blanks (also hard ones) or apostrophes.
fn has_thousands(text: &str) -> bool {
    let is_separator =
        |letter: char| matches!(letter, ',' | '.' | '\'' | '\u{2019}') || letter.is_whitespace();
    let unsigned = text.strip_prefix(['+', '-']).unwrap_or(text);
    unsigned.starts_with(|first: char| first.is_ascii_digit())
        && unsigned.contains(is_separator)
        && unsigned.chars().all(|letter| letter.is_ascii_digit() || is_separator(letter))
}
