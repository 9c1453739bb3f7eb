//! Text for paper: cut where it would run off the page, and safe inside XML.

use super::fonts;

/// Cut with an ellipsis where it would not fit.
pub(super) fn shortened(text: &str, size: f64, room: f64, is_heavy: bool) -> String {
    let fits = |text: &str| fonts::width(text, is_heavy) * size <= room;
    if fits(text) {
        return text.to_owned();
    }
    let letters: Vec<char> = text.chars().collect();
    let with_ellipsis = |kept: usize| {
        let start: String = letters[..kept].iter().collect();
        format!("{}\u{2026}", start.trim_end())
    };
    // The longest start that fits: widths only grow with the letters kept.
    let (mut fitting, mut too_long) = (0, letters.len());
    while too_long - fitting > 1 {
        let middle = usize::midpoint(fitting, too_long);
        *if fits(&with_ellipsis(middle)) { &mut fitting } else { &mut too_long } = middle;
    }
    with_ellipsis(fitting)
}

/// What XML would take for markup, escaped; what it can't hold at all, left out.
pub(super) fn escaped(text: &str) -> String {
    let mut out = String::with_capacity(text.len());
    for letter in text.chars() {
        match letter {
            '&' => out.push_str("&amp;"),
            '<' => out.push_str("&lt;"),
            '>' => out.push_str("&gt;"),
            '"' => out.push_str("&quot;"),
            letter if letter.is_control() || matches!(letter, '\u{fffe}' | '\u{ffff}') => out.push(' '),
            letter => out.push(letter),
        }
    }
    out
}
