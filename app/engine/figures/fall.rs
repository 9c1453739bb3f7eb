//! The largest fall from a running peak so far, drawn downwards from zero, and beside it its distribution at the
//! reading line.

use super::figure::{Anchor, Axis, Mark, Panel, Place, Role, Span};
use super::value::{label, longest, money_axis, outline, part};
use super::{Room, Subject, confidence_words, half_range, ticks, with_unit};

/// Shades between quantiles: places of their edges and role.
const SHADES: [(usize, usize, Role); 2] = [(0, 2, Role::InnerFalls), (2, 4, Role::OuterFalls)];
/// Lines and their labels.
const LINES: [(usize, &str, Role); 3] =
    [(0, "50 %", Role::FallMedian), (2, "90 %", Role::FallLine), (4, "99 %", Role::FallLine)];

/// Quantiles of the fall by day; no lines before paths have arrived.
pub fn so_far(subject: &Subject<'_>, up: Span, room: Room, place: Place) -> Panel {
    let across = Span::new(0.0, f64::from(subject.last_day));
    let day = f64::from(subject.day);
    let mut marks = quantiles(subject);
    marks.push(Mark::Upright { role: Role::ReadingLine, across: day });
    marks.extend(subject.fall().map(|fall| Mark::Dot { role: Role::Tail, at: [day, fall.value] }));
    Panel {
        place,
        title: with_unit("Largest fall from a peak so far", &subject.money().unit()),
        note: "not passed by 50, 90, 99 %".to_owned(),
        across: Axis {
            span: across,
            ticks: ticks::days(across, room.across),
            has_words: true,
            name: "trading days".to_owned(),
        },
        up: money_axis(&subject.money(), up, room.up, true),
        beside: Vec::new(),
        marks,
    }
}

/// Distribution of the fall up to the line.
pub fn beside(subject: &Subject<'_>, up: Span, room: Room, place: Place) -> Panel {
    let density = subject.falls;
    let mut marks = Vec::new();
    if let Some(fall) = subject.fall() {
        let error = half_range(fall.value_low, fall.value_high);
        let words =
            format!("{} {}", confidence_words(fall.confidence), subject.money().figure(fall.value, error));
        marks.extend([
            Mark::SideBand { role: Role::FallBody, curve: part(density, 0.0, fall.value) },
            Mark::SideBand { role: Role::Tail, curve: part(density, fall.value, f64::INFINITY) },
            outline(density, Role::FallOutline),
            Mark::Level { role: Role::Var, up: fall.value },
            label(Role::Var, [longest(density), fall.value], Anchor::BelowLeft, words),
        ]);
    }
    let across = Span::new(0.0, longest(density));
    Panel {
        place,
        title: String::new(),
        note: String::new(),
        across: Axis { span: across, ticks: Vec::new(), has_words: false, name: String::new() },
        up: money_axis(&subject.money(), up, room.up, false),
        beside: Vec::new(),
        marks,
    }
}

fn quantiles(subject: &Subject<'_>) -> Vec<Mark> {
    let rows: Vec<(f64, [f64; 5])> = subject.fall_rows().collect();
    let Some((last_day, last)) = rows.last().filter(|_| rows.len() > 1) else { return Vec::new() };
    let shade = |(shallow, deep, role): (usize, usize, Role)| Mark::Band {
        role,
        edges: rows.iter().map(|(day, falls)| [*day, falls[shallow], falls[deep]]).collect(),
    };
    let line = |(place, _, role): (usize, &str, Role)| Mark::Line {
        role,
        points: rows.iter().map(|(day, falls)| [*day, falls[place]]).collect(),
    };
    let words = |(place, words, _): (usize, &str, Role)| {
        label(Role::Note, [*last_day, last[place]], Anchor::AboveLeft, words.to_owned())
    };
    let shades = SHADES.into_iter().map(shade);
    shades.chain(LINES.into_iter().map(line)).chain(LINES.into_iter().map(words)).collect()
}
