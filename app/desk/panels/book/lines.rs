//! The lines of the book's list as plain data: groups with subtotals, holdings filtered and sorted, each with its
//! words and what is wrong with it. Knows the session; draws nothing.

use crate::desk::inputs::shown_figure;
use crate::desk::session::Session;
use crate::desk::session::edits::holdings::factor_of;
use crate::workspace::{BookColumn, BookOrder};
use ebbmark_engine::book::{Description, DiffusionKind, HalfLife, Holding, Kind, LevelUnit};
use ebbmark_engine::factors::{Diffusion, Model, RiskFactor};
use std::collections::HashMap;

/// A line of the list.
#[derive(Debug, Clone, PartialEq)]
pub enum BookLine {
    /// A group: its last name, how deep it is nested, and the value of all shown in it.
    Group {
        /// Last part of its name.
        name: String,
        /// 0 for the outermost.
        depth: usize,
        /// Money of the book's currency.
        value: f64,
    },
    /// A holding.
    Holding(HoldingLine),
}

/// A holding's line.
#[derive(Debug, Clone, PartialEq)]
pub struct HoldingLine {
    /// Row in the inputs' holdings.
    pub row: usize,
    /// Value today in the book's currency, as the last valid model has it.
    pub value: Option<f64>,
    /// Its value, or what it earns per step of its level, in figures.
    pub worth: String,
    /// Its diffusion in words.
    pub diffusion: String,
    /// What is wrong with it, in words.
    pub faults: Vec<String>,
}

/// What the list needs of the last valid model, by name.
struct Known<'a> {
    values: HashMap<&'a str, f64>,
    factors: HashMap<&'a str, &'a RiskFactor>,
}

/// All lines to be shown, in order.
pub fn book_lines(session: &Session) -> Vec<BookLine> {
    let inputs = &session.document().inputs;
    let known = Known::of(session.live().model.as_deref());
    let filter = session.view().filter.trim().to_lowercase();
    let lines: Vec<HoldingLine> = (inputs.holdings.iter().enumerate())
        .filter(|(_, holding)| is_shown(holding, &filter))
        .map(|(row, holding)| holding_line(session, &known, row, holding))
        .collect();
    match session.view().order {
        Some(order) => sorted(lines, &inputs.holdings, order),
        None => grouped(lines, &inputs.holdings),
    }
}

impl<'a> Known<'a> {
    fn of(model: Option<&'a Model>) -> Self {
        let holdings = model.map_or(&[][..], |model| &model.holdings);
        let factors = model.map_or(&[][..], |model| &model.factors);
        Self {
            values: holdings.iter().map(|holding| (holding.name.as_str(), holding.value)).collect(),
            factors: factors.iter().map(|factor| (factor.name.as_str(), factor)).collect(),
        }
    }
}

fn is_shown(holding: &Holding, filter: &str) -> bool {
    filter.is_empty()
        || holding.name.to_lowercase().contains(filter)
        || holding.group.to_lowercase().contains(filter)
}

fn holding_line(session: &Session, known: &Known<'_>, row: usize, holding: &Holding) -> HoldingLine {
    let value = known.values.get(holding.name.as_str()).copied();
    HoldingLine {
        row,
        value,
        worth: worth(holding, value),
        diffusion: diffusion(session, known, holding),
        faults: faults(session, holding),
    }
}

/// Value in whole money; what a level earns per basis point or point, since it has no value today.
fn worth(holding: &Holding, value: Option<f64>) -> String {
    let per_unit = holding.quantity * holding.multiplier;
    match (holding.kind, holding.unit.unwrap_or_default()) {
        (Kind::Level, LevelUnit::Percent) => format!("{} per bp", shown_figure((per_unit * 0.01).round())),
        (Kind::Level, LevelUnit::Bp) => format!("{} per bp", shown_figure(per_unit.round())),
        (Kind::Level, LevelUnit::Points) => format!("{} per point", shown_figure(per_unit.round())),
        _ => value.map_or_else(|| "\u{2013}".to_owned(), |value| shown_figure(value.round())),
    }
}

fn diffusion(session: &Session, known: &Known<'_>, holding: &Holding) -> String {
    match (holding.kind, factor_of(holding)) {
        (_, Some(factor)) => match known.factors.get(factor) {
            Some(factor) => diffusion_words(factor),
            None => description_words(&holding.description),
        },
        (Kind::Exposure, None) => {
            let exposures = &session.document().inputs.exposures;
            let mut own = exposures.iter().filter(|exposure| exposure.holding == holding.name);
            match (own.next(), own.count()) {
                (Some(only), 0) => format!("by {}", only.factor),
                (first, more) => format!("{} sensitivities", more + usize::from(first.is_some())),
            }
        }
        _ => match &holding.currency {
            Some(currency) => format!("fixed, in {currency}"),
            None => "fixed".to_owned(),
        },
    }
}

/// "geometric 18 %", "reverting, 40-day half-life", "random walk, 0.9 a year".
pub fn diffusion_words(factor: &RiskFactor) -> String {
    let volatility = factor.diffusion.volatility();
    let size = if factor.diffusion.is_log() { percent(volatility) } else { shown_figure(volatility) };
    match factor.diffusion {
        Diffusion::Geometric { .. } => format!("geometric {size}"),
        Diffusion::RevertingLog { half_life, .. } | Diffusion::RevertingLevel { half_life, .. } => {
            match half_life {
                HalfLife::Days(days) => {
                    format!("reverting, {}-day half-life", shown_figure(round_days(days)))
                }
                HalfLife::None => format!("random walk {size}"),
            }
        }
    }
}

fn description_words(description: &Description) -> String {
    match description.diffusion {
        Some(DiffusionKind::RevertingLog | DiffusionKind::RevertingLevel) => "reverting".to_owned(),
        _ => "geometric".to_owned(),
    }
}

/// A fraction in per cent, as many digits as a volatility is known to.
pub fn percent(fraction: f64) -> String {
    format!("{} %", shown_figure((fraction * 1000.0).round() / 10.0))
}

fn round_days(days: f64) -> f64 {
    if days < 10.0 { (days * 10.0).round() / 10.0 } else { days.round() }
}

/// Faults that point at the holding's line, or name it.
fn faults(session: &Session, holding: &Holding) -> Vec<String> {
    let quoted = format!("\"{}\"", holding.name);
    (session.faults().iter())
        .filter(|fault| {
            let is_its_line = holding.line.is_some() && fault.place.line == holding.line;
            is_its_line || fault.found.contains(&quoted) || fault.expected.contains(&quoted)
        })
        .map(|fault| {
            let column = fault.place.column.as_deref().map(|name| format!("{name}: ")).unwrap_or_default();
            format!("{column}found {}, expected {}", fault.found, fault.expected)
        })
        .collect()
}

/// One flat list in the order of a column; groups are left out, their subtotals would mean nothing.
fn sorted(mut lines: Vec<HoldingLine>, holdings: &[Holding], order: BookOrder) -> Vec<BookLine> {
    let name = |line: &HoldingLine| holdings[line.row].name.to_lowercase();
    match order.column {
        BookColumn::Holding => lines.sort_by_cached_key(name),
        BookColumn::Diffusion => lines.sort_by_cached_key(|line| (line.diffusion.clone(), name(line))),
        BookColumn::Value => {
            let value = |line: &HoldingLine| line.value.unwrap_or(f64::NEG_INFINITY);
            lines.sort_by(|a, b| value(a).total_cmp(&value(b)));
        }
    }
    if !order.is_ascending {
        lines.reverse();
    }
    lines.into_iter().map(BookLine::Holding).collect()
}

/// Holdings under their groups, groups in order of first appearance, `/` nested.
fn grouped(lines: Vec<HoldingLine>, holdings: &[Holding]) -> Vec<BookLine> {
    let mut root = Group::default();
    for line in lines {
        let path: Vec<&str> =
            holdings[line.row].group.split('/').map(str::trim).filter(|part| !part.is_empty()).collect();
        root.add(&path, line);
    }
    let mut list = Vec::new();
    root.list(0, &mut list);
    list
}

/// A node of the tree of groups.
#[derive(Default)]
struct Group {
    name: String,
    value: f64,
    lines: Vec<HoldingLine>,
    groups: Vec<Self>,
}

impl Group {
    fn add(&mut self, path: &[&str], line: HoldingLine) {
        self.value += line.value.unwrap_or(0.0);
        match path {
            [] => self.lines.push(line),
            [part, rest @ ..] => {
                let place = self.groups.iter().position(|group| group.name == *part).unwrap_or_else(|| {
                    self.groups.push(Self { name: (*part).to_owned(), ..Self::default() });
                    self.groups.len() - 1
                });
                self.groups[place].add(rest, line);
            }
        }
    }

    fn list(self, depth: usize, out: &mut Vec<BookLine>) {
        out.extend(self.lines.into_iter().map(BookLine::Holding));
        for group in self.groups {
            out.push(BookLine::Group { name: group.name.clone(), depth, value: group.value });
            group.list(depth + 1, out);
        }
    }
}
