//! Ranges that stand still while figures arrive: an axis grows when something would fall outside and shrinks only
//! when most of it has become empty.

use super::Span;
use egui::{Id, Ui};

/// An axis this empty is fitted anew.
const LEAST_FILLED: f64 = 0.6;

/// The span to draw for data between `low` and `high`, given the one drawn before under the same `key`.
pub fn settled(ui: &Ui, key: Id, low: f64, high: f64) -> Span {
    let before = ui.data(|data| data.get_temp::<(f64, f64)>(key));
    let (from, to) = next(before, low, high);
    ui.data_mut(|data| data.insert_temp(key, (from, to)));
    Span::new(from, to)
}

/// Keeps what was drawn while the data fits and fills it; else the data with air round it.
fn next(before: Option<(f64, f64)>, low: f64, high: f64) -> (f64, f64) {
    let air = (high - low) * 0.06;
    match before {
        Some((from, to)) if from <= low && high <= to && high - low >= LEAST_FILLED * (to - from) => {
            (from, to)
        }
        _ => (low - air, high + air),
    }
}

#[cfg(test)]
mod tests {
    use super::next;

    #[test]
    fn always_still_while_the_data_fits() {
        let drawn = next(None, 0.0, 10.0);
        assert_eq!(next(Some(drawn), 0.1, 9.8), drawn);
        assert_eq!(next(Some(drawn), -0.5, 10.4), drawn);
    }

    #[test]
    fn always_grows_and_shrinks_when_it_must() {
        let drawn = next(None, 0.0, 10.0);
        assert!(next(Some(drawn), 0.0, 12.0).1 > 12.0);
        assert!(next(Some(drawn), 4.0, 6.0).1 < 7.0);
    }
}
