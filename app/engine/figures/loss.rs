//! The distribution of the loss at the reading line: gains to the left, losses to the right, the tail beyond VaR shaded.

use super::figure::{Anchor, Axis, Mark, Panel, Place, Role, Span};
use super::value::{label, longest, money_axis, part};
use super::{Room, Subject, ticks, with_unit};
use crate::measures::Density;

/// The chart.
pub fn distribution(subject: &Subject<'_>, room: Room, place: Place) -> Panel {
    let losses = mirrored(subject.values, subject.loss_base());
    let ends = (losses.at.first().copied().unwrap_or(0.0), losses.at.last().copied().unwrap_or(0.0));
    let across = Span::new(ends.0, ends.1).with_air(0.02);
    let up = Span::new(0.0, longest(&losses));
    let axis = money_axis(&subject.money(), across, room.across, true);
    Panel {
        place,
        title: with_unit("Loss", &subject.money().unit()),
        note: "the higher the curve, the likelier; losses to the right, gains below zero".to_owned(),
        across: Axis { name: with_unit("loss", &subject.money().unit()), ..axis },
        up: Axis {
            span: up,
            ticks: ticks::along(up, ticks::step(up, room.up), 0.0, |_| String::new()),
            has_words: false,
            name: String::new(),
        },
        beside: Vec::new(),
        marks: marks(subject, &losses, up.to),
    }
}

fn marks(subject: &Subject<'_>, losses: &Density, top: f64) -> Vec<Mark> {
    let Some(row) = subject.loss() else { return Vec::new() };
    let band = |role: Role, low: f64, high: f64| Mark::Band {
        role,
        edges: part(losses, low, high).into_iter().map(|[loss, height]| [loss, 0.0, height]).collect(),
    };
    let outline = losses.at.iter().zip(&losses.density).map(|(loss, height)| [*loss, *height]).collect();
    let mut marks = vec![
        band(Role::Body, f64::NEG_INFINITY, row.var),
        band(Role::Tail, row.var, f64::INFINITY),
        Mark::Line { role: Role::Outline, points: outline },
        Mark::Upright { role: Role::Today, across: 0.0 },
        Mark::Upright { role: Role::Var, across: row.var },
        Mark::Upright { role: Role::Es, across: row.es },
    ];
    if let Some(limit) = limit_loss(subject) {
        let words = format!("loss limit {}", subject.money().figure(limit, 0.0));
        let anchor = if limit < row.var { Anchor::BelowLeft } else { Anchor::BelowRight };
        marks.push(Mark::Upright { role: Role::Limit, across: limit });
        marks.push(label(Role::Limit, [limit, top * 0.74], anchor, words));
    }
    // Words come last and at heights of their own, so that no line crosses them.
    marks.push(label(Role::Var, [row.var, top * 0.94], Anchor::BelowRight, subject.var_words()));
    marks.push(label(Role::Es, [row.es, top * 0.84], Anchor::BelowRight, subject.es_words()));
    marks
}

/// The limit on the axis of this chart, which may count from the mean.
fn limit_loss(subject: &Subject<'_>) -> Option<f64> {
    subject.limit_value().map(|value| subject.loss_base() - value)
}

/// From a distribution of values to that of losses.
fn mirrored(values: &Density, base: f64) -> Density {
    Density {
        at: values.at.iter().rev().map(|value| base - value).collect(),
        density: values.density.iter().rev().copied().collect(),
    }
}
