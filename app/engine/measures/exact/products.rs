//! The book's value as a sum of products of log and level moves, equal products gathered. No moments here.

use crate::factors::{CurrencyPart, Model};
use std::collections::BTreeMap;

/// `coefficient x exp(sum of the log factors' moves) x product of the level factors' moves`.
#[derive(Debug, Clone, PartialEq)]
pub(super) struct Product {
    pub(super) moves: Moves,
    pub(super) coefficient: f64,
}

/// Factors of a product, ascending, at most two in all.
#[derive(Debug, Clone, PartialEq, Eq, PartialOrd, Ord, Default)]
pub(super) struct Moves {
    pub(super) logs: Vec<usize>,
    pub(super) levels: Vec<usize>,
}

/// All products of the book after `years`; the one without moves is what nothing moves.
pub(super) fn products(model: &Model, years: f64) -> Vec<Product> {
    let mut sums: BTreeMap<Moves, f64> = BTreeMap::new();
    for part in &model.valuation.parts {
        let rate = rate_products(model, part);
        for local in local_products(model, part, years) {
            for rate in &rate {
                *sums.entry(joined(&local.moves, &rate.moves)).or_default() +=
                    local.coefficient * rate.coefficient;
            }
        }
    }
    sums.into_iter().map(|(moves, coefficient)| Product { moves, coefficient }).collect()
}

/// Change of the book's value over `years` that no factor brings: carry at today's rates of exchange.
pub(super) fn income(model: &Model, years: f64) -> f64 {
    let rate = |part: &CurrencyPart| part.rate.map_or(1.0, |rate| rate.today);
    model.valuation.parts.iter().map(|part| rate(part) * part.income_per_year * years).sum()
}

fn rate_products(model: &Model, part: &CurrencyPart) -> Vec<Product> {
    let constant = |coefficient| Product { moves: Moves::default(), coefficient };
    match part.rate {
        None => vec![constant(1.0)],
        Some(rate) if model.factors[rate.factor].diffusion.is_log() => {
            vec![Product { moves: moves_of(model, rate.factor), coefficient: rate.today }]
        }
        Some(rate) => {
            vec![constant(rate.today), Product { moves: moves_of(model, rate.factor), coefficient: 1.0 }]
        }
    }
}

fn local_products(model: &Model, part: &CurrencyPart, years: f64) -> Vec<Product> {
    let constant = part.constant + part.income_per_year * years;
    let terms = part
        .terms
        .iter()
        .map(|term| Product { moves: moves_of(model, term.factor), coefficient: term.weight });
    [Product { moves: Moves::default(), coefficient: constant }].into_iter().chain(terms).collect()
}

fn moves_of(model: &Model, factor: usize) -> Moves {
    if model.factors[factor].diffusion.is_log() {
        Moves { logs: vec![factor], levels: vec![] }
    } else {
        Moves { logs: vec![], levels: vec![factor] }
    }
}

fn joined(left: &Moves, right: &Moves) -> Moves {
    let sorted = |left: &[usize], right: &[usize]| {
        let mut all = [left, right].concat();
        all.sort_unstable();
        all
    };
    Moves { logs: sorted(&left.logs, &right.logs), levels: sorted(&left.levels, &right.levels) }
}
