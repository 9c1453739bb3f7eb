//! Round numbers along an axis: 1, 2 or 5 times a power of ten, as many as there is room for.

use super::{Span, Tick};

/// Most ticks of an axis, whatever is asked for.
const MOST_TICKS: usize = 60;

/// Distance between round numbers of which at most `most` lie in a span.
pub fn step(span: Span, most: usize) -> f64 {
    let (low, high) = span.ends();
    let rough = (high - low) / most.max(1) as f64;
    let power = 10f64.powf(rough.log10().floor());
    let step =
        [1.0, 2.0, 5.0, 10.0].map(|times| times * power).into_iter().find(|step| *step >= rough * 0.999_999);
    step.filter(|step| step.is_finite() && *step > 0.0).unwrap_or(1.0)
}

/// Multiples of `step` inside a span, counted from `origin`.
pub fn multiples(span: Span, step: f64, origin: f64) -> Vec<f64> {
    let (low, high) = span.ends();
    let first = ((low - origin) / step).ceil();
    let last = ((high - origin) / step).floor();
    if !(first.is_finite() && last.is_finite()) {
        return Vec::new();
    }
    (0..MOST_TICKS)
        .map(|place| first + place as f64)
        .take_while(|count| *count <= last)
        .map(|count| origin + count * step)
        .collect()
}

/// Decimals that tell neighbours `step` apart.
pub fn decimals(step: f64) -> usize {
    let digits = -step.log10();
    if digits.is_finite() { (digits - 1e-9).ceil().clamp(0.0, 6.0) as usize } else { 0 }
}

/// Distance in days between the ticks of a time axis of which at most `most` fit: round parts of a trading year.
pub fn day_step(days: f64, most: usize) -> f64 {
    let steps = [1.0, 2.0, 5.0, 10.0, 21.0, 42.0, 63.0, 126.0, 252.0];
    steps.into_iter().find(|step| days / step <= most.max(1) as f64).unwrap_or(252.0)
}

/// Multiples of `step` inside a span with their words.
pub fn along(span: Span, step: f64, origin: f64, words: impl Fn(f64) -> String) -> Vec<Tick> {
    multiples(span, step, origin).into_iter().map(|value| Tick { value, words: words(value) }).collect()
}

/// Ticks of a time axis of which at most `most` fit, today among them.
pub fn days(span: Span, most: usize) -> Vec<Tick> {
    let step = day_step(span.to, most);
    along(span, step, 0.0, |day| if day == 0.0 { "today".to_owned() } else { format!("{day}") })
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn exact_steps_are_round() {
        for (low, high, most, expected) in
            [(0.0, 10.0, 5, 2.0), (64.0, 106.0, 9, 5.0), (0.0, 0.03, 4, 0.01), (-1.0, 1.0, 2, 1.0)]
        {
            assert!((step(Span::new(low, high), most) - expected).abs() < 1e-12 * expected, "{low} {high}");
        }
    }

    #[test]
    fn always_inside_and_few() {
        let span = Span::new(105.0, 63.0);
        let ticks = multiples(span, 5.0, 0.0);
        assert_eq!(ticks.first(), Some(&65.0));
        assert_eq!(ticks.len(), 9);
        assert!(ticks.iter().all(|tick| span.holds(*tick)));
        assert!(multiples(Span::new(0.0, 1e9), 1.0, 0.0).len() <= MOST_TICKS);
    }
}
