//! The book's value ahead as nested bands, and beside it, on the same axis, its distribution at the reading line.

use super::figure::{Anchor, Axis, Mark, Panel, Place, Role, Span, Tick};
use super::{Money, Room, Subject, days_words, percent, signed, ticks, with_unit};
use crate::measures::Density;

/// Bands from the widest to the narrowest: places of their edges, role, and what they hold.
const BANDS: [(usize, usize, Role, &str); 3] =
    [(0, 6, Role::OuterBand, "98 %"), (1, 5, Role::MiddleBand, "90 %"), (2, 4, Role::InnerBand, "50 %")];
const MEDIAN: usize = 3;

/// Bands by day, the reading line, today's value, the limit, and VaR and ES at the line.
pub fn ahead(subject: &Subject<'_>, up: Span, room: Room, place: Place) -> Panel {
    let across = Span::new(0.0, f64::from(subject.last_day));
    Panel {
        place,
        title: with_unit("Book value ahead", &subject.money().unit()),
        note: subject.source_words().to_owned(),
        across: Axis {
            span: across,
            ticks: ticks::days(across, room.across),
            has_words: false,
            name: String::new(),
        },
        up: money_axis(&subject.money(), up, room.up, true),
        beside: changes(subject, up, room.up),
        marks: [bands(subject), levels(subject), line_marks(subject)].concat(),
    }
}

/// Distribution at the line on its side, the tail beyond VaR shaded.
pub fn beside(subject: &Subject<'_>, up: Span, room: Room, place: Place) -> Panel {
    let density = subject.values;
    let mut marks = Vec::new();
    if let Some([var, es]) = subject.tail_values() {
        let right = longest(density);
        marks.extend([
            Mark::SideBand { role: Role::Body, curve: part(density, var, f64::INFINITY) },
            Mark::SideBand { role: Role::Tail, curve: part(density, f64::NEG_INFINITY, var) },
            outline(density, Role::Outline),
            Mark::Level { role: Role::Today, up: subject.today() },
            Mark::Level { role: Role::Var, up: var },
            Mark::Level { role: Role::Es, up: es },
            label(Role::Var, [right, var], Anchor::AboveLeft, subject.var_words()),
            label(Role::Es, [right, es], Anchor::BelowLeft, subject.es_words()),
        ]);
    }
    let across = Span::new(0.0, longest(density));
    Panel {
        place,
        title: format!("At {}", days_words(subject.day)),
        note: String::new(),
        across: Axis { span: across, ticks: Vec::new(), has_words: false, name: String::new() },
        up: money_axis(&subject.money(), up, room.up, false),
        beside: Vec::new(),
        marks,
    }
}

fn bands(subject: &Subject<'_>) -> Vec<Mark> {
    let rows: Vec<(f64, [f64; 7])> = subject.value_rows().collect();
    let band = |(low, high, role, _): (usize, usize, Role, &str)| Mark::Band {
        role,
        edges: rows.iter().map(|(day, values)| [*day, values[low], values[high]]).collect(),
    };
    let mut marks: Vec<Mark> = BANDS.into_iter().map(band).collect();
    let median = rows.iter().map(|(day, values)| [*day, values[MEDIAN]]).collect();
    marks.push(Mark::Line { role: Role::Median, points: median });
    // Words stand in the upper half of a band, between it and the next narrower one.
    if let Some((day, last)) = rows.last() {
        marks.extend(BANDS.into_iter().map(|(_, high, role, words)| {
            let inner = last[high - 1];
            label(role, [*day, (last[high] + inner) / 2.0], Anchor::Left, words.to_owned())
        }));
    }
    marks
}

fn levels(subject: &Subject<'_>) -> Vec<Mark> {
    let mut marks = vec![Mark::Level { role: Role::Today, up: subject.today() }];
    if let (Some(limit), Some(value)) = (subject.loss_limit, subject.limit_value()) {
        let words = format!("loss limit {}", subject.money().figure(limit, 0.0));
        marks.push(Mark::Level { role: Role::Limit, up: value });
        marks.push(label(Role::Limit, [f64::from(subject.last_day), value], Anchor::AboveLeft, words));
    }
    marks
}

fn line_marks(subject: &Subject<'_>) -> Vec<Mark> {
    let day = f64::from(subject.day);
    let mut marks = vec![Mark::Upright { role: Role::ReadingLine, across: day }];
    if let Some([var, _]) = subject.tail_values() {
        let is_late = day > f64::from(subject.last_day) / 2.0;
        let anchor = if is_late { Anchor::BelowLeft } else { Anchor::BelowRight };
        marks.push(Mark::Dot { role: Role::Var, at: [day, var] });
        marks.push(label(Role::Var, [day, var], anchor, subject.var_words()));
    }
    marks
}

/// Round amounts in the book's size.
pub(super) fn money_axis(money: &Money<'_>, span: Span, room: usize, has_words: bool) -> Axis {
    let step = ticks::step(span, room);
    let decimals = ticks::decimals(step / money.scale.size);
    let words = |value: f64| money.scale.figure(value, decimals);
    Axis { span, ticks: ticks::along(span, step, 0.0, words), has_words, name: String::new() }
}

/// Round changes from today, in money and in per cent.
fn changes(subject: &Subject<'_>, up: Span, room: usize) -> Vec<Tick> {
    let (money, today) = (subject.money(), subject.today());
    let change = Span::new(up.from - today, up.to - today);
    let step = ticks::step(change, room);
    let decimals = ticks::decimals(step / money.scale.size);
    let share = |change: f64| {
        let base = money.base?;
        let decimals = ticks::decimals(step / base * 100.0).max(1);
        Some(signed(change, percent(change / base, decimals)))
    };
    let words = |change: f64| {
        let amount = signed(change, money.scale.figure(change, decimals));
        share(change).map_or(amount.clone(), |share| format!("{amount}  {share}"))
    };
    let ticks = ticks::along(change, step, 0.0, words).into_iter();
    ticks.map(|tick| Tick { value: today + tick.value, words: tick.words }).collect()
}

pub(super) fn label(role: Role, at: [f64; 2], anchor: Anchor, words: String) -> Mark {
    Mark::Label { role, at, anchor, words }
}

/// Length that a distribution is drawn on.
pub(super) fn longest(density: &Density) -> f64 {
    density.density.iter().copied().fold(0.0, f64::max) * 1.08
}

/// A distribution's outline on its side.
pub(super) fn outline(density: &Density, role: Role) -> Mark {
    let points = density.at.iter().zip(&density.density).map(|(at, height)| [*height, *at]).collect();
    Mark::Line { role, points }
}

/// The curve `[at, density]` between two values, cut exactly there.
pub(super) fn part(density: &Density, low: f64, high: f64) -> Vec<[f64; 2]> {
    let pairs = density.at.windows(2).zip(density.density.windows(2));
    pairs
        .flat_map(|(at, height)| {
            let cut = |value: f64| {
                let share = if at[1] > at[0] { (value - at[0]) / (at[1] - at[0]) } else { 0.0 };
                [value, height[0] + share * (height[1] - height[0])]
            };
            let (from, to) = (at[0].max(low), at[1].min(high));
            (from <= to).then(|| [cut(from), cut(to)]).into_iter().flatten()
        })
        .collect()
}
