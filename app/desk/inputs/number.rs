//! A number that is dragged, stepped or typed in place, shown with thousands separators and its unit.
//! How a number is stored and how it is shown part here: a fraction 0.18 is shown and typed as 18 %.

use crate::desk::theme;
use ebbmark_engine::figures::grouped;
use egui::{DragValue, Response, Ui};
use std::ops::RangeInclusive;

/// How a stored number stands on screen.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum Shown {
    /// As it is.
    Plain,
    /// A fraction as per cent.
    Percent,
    /// A whole number.
    Whole,
}

/// A number to be edited.
#[derive(Debug, Clone)]
pub struct NumberField<'a> {
    /// Accessible name, unique in the window.
    pub name: &'a str,
    /// Unit behind the number, as read out and shown; may be empty.
    pub unit: &'a str,
    /// How it is shown.
    pub shown: Shown,
    /// What can be set, as stored.
    pub range: RangeInclusive<f64>,
    /// Change per point dragged, as a share of the number's size.
    pub pull: f64,
    /// Decimals that always stand, zeros too.
    pub decimals: usize,
    /// Digits shown of a number that was computed; none to show all that were typed.
    pub digits: Option<usize>,
    /// Whether it stands as plain text until it is pointed at.
    pub is_quiet: bool,
}

impl<'a> NumberField<'a> {
    /// A field of that name and unit for any finite number.
    pub fn new(name: &'a str, unit: &'a str) -> Self {
        Self {
            name,
            unit,
            shown: Shown::Plain,
            range: f64::MIN..=f64::MAX,
            pull: 0.005,
            decimals: 0,
            digits: None,
            is_quiet: false,
        }
    }

    /// Shown in that way.
    pub fn shown(self, shown: Shown) -> Self {
        Self { shown, ..self }
    }

    /// Held inside `range`, in the number's own unit.
    pub fn range(self, range: RangeInclusive<f64>) -> Self {
        Self { range, ..self }
    }

    /// Changes by that share of the number's size per point dragged; around zero, by that much.
    pub fn pulled(self, pull: f64) -> Self {
        Self { pull, ..self }
    }

    /// With at least that many decimals.
    pub fn decimals(self, decimals: usize) -> Self {
        Self { decimals, ..self }
    }

    /// With no more digits than that, for a number that was computed rather than typed.
    pub fn digits(self, digits: usize) -> Self {
        Self { digits: Some(digits), ..self }
    }

    /// Plain text until it is pointed at, for tables.
    pub fn quiet(self) -> Self {
        Self { is_quiet: true, ..self }
    }

    /// Draws it; a change comes back in the number's own unit.
    pub fn ui(self, ui: &mut Ui, value: f64) -> Option<f64> {
        self.response_ui(ui, value).1
    }

    /// Draws it; for those who hang a tooltip on it.
    pub fn response_ui(self, ui: &mut Ui, value: f64) -> (Response, Option<f64>) {
        let scale = if self.shown == Shown::Percent { 100.0 } else { 1.0 };
        let before = value * scale;
        let mut after = before;
        let suffix = if self.unit.is_empty() { String::new() } else { format!(" {}", self.unit) };
        let widget = DragValue::new(&mut after)
            .speed(self.speed(before))
            .range(self.range.start() * scale..=self.range.end() * scale)
            .clamp_existing_to_range(false)
            .update_while_editing(false)
            .max_decimals(if self.shown == Shown::Whole { 0 } else { 6 })
            .custom_formatter(|number, _| self.words(number))
            .custom_parser(read_figure)
            .suffix(suffix);
        let response = ui.scope(|ui| {
            if self.is_quiet {
                theme::quiet_fields(ui);
            }
            ui.add(widget)
        });
        let response = response.inner.accessible_name(self.name);
        // The text of an edited field is rounded for reading: leaving it unchanged must not round the number.
        let is_changed = response.changed() && after.is_finite() && self.words(after) != self.words(before);
        let edit = is_changed.then_some(after / scale);
        (response, edit)
    }

    /// The number as it stands on screen.
    fn words(&self, number: f64) -> String {
        let Some(digits) = self.digits.filter(|_| number != 0.0) else {
            return padded_figure(number, self.decimals);
        };
        let before_point = number.abs().log10().floor() as i32 + 1;
        grouped(number, (digits as i32 - before_point).clamp(0, 6) as usize)
    }

    /// Points dragged move a large number by more than a small one.
    fn speed(&self, shown: f64) -> f64 {
        match self.shown {
            Shown::Whole => (shown.abs() * self.pull).max(0.1),
            Shown::Percent => 0.1,
            Shown::Plain if shown.abs() < 1.0 => self.pull,
            Shown::Plain => shown.abs() * self.pull,
        }
    }
}

/// A figure as it is typed: up to six decimals, none of them trailing zeros, thousands apart.
pub fn shown_figure(value: f64) -> String {
    let text = grouped(value, 6);
    match text.split_once('.') {
        Some(_) => text.trim_end_matches('0').trim_end_matches('.').to_owned(),
        None => text,
    }
}

/// A figure as it is typed, with at least `decimals` decimals.
fn padded_figure(value: f64, decimals: usize) -> String {
    let short = shown_figure(value);
    let has = short.split_once('.').map_or(0, |(_, decimals)| decimals.len());
    if has < decimals { grouped(value, decimals) } else { short }
}

/// A typed figure: thousands separators, blanks, a per cent sign or a unit behind it do no harm.
pub fn read_figure(text: &str) -> Option<f64> {
    let kept: String = text
        .chars()
        .map(|sign| if sign == '\u{2212}' { '-' } else { sign })
        .filter(|sign| !sign.is_whitespace() && *sign != ',' && *sign != '\'')
        .collect();
    let number = kept.trim_end_matches(|sign: char| sign == '%' || (sign.is_alphabetic() && sign != 'e'));
    number.parse().ok().filter(|value: &f64| value.is_finite())
}
