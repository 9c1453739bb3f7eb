//! The range of the losses at the line over the fit's parameters: asked for by a press, dropped when what it belongs to
//! changes.

use super::Session;
use crate::desk::worker::{RangeTask, Ranging, Request};
use ebbmark_engine::measures::parameter_range::USUAL_DRAWS;
use std::sync::Arc;

impl Session {
    /// Whether there is something to be ranged: a history that gave figures, and a reading.
    pub fn can_range(&self) -> bool {
        let live = &self.live;
        let has_fitted = |model: &ebbmark_engine::factors::Model| {
            model.factors.iter().any(|factor| factor.origins.has_fitted())
                || model.history.as_ref().is_some_and(|history| history.estimator.is_some())
        };
        live.fit.is_some() && live.at_line.is_some() && live.model.as_deref().is_some_and(has_fitted)
    }

    /// Asks for the range of what the line shows.
    pub(super) fn range(&mut self) -> Vec<Request> {
        let Some(at_line) = self.live.at_line.as_ref().filter(|_| self.can_range()) else {
            return Vec::new();
        };
        self.asked_range += 1;
        let task = RangeTask {
            number: self.asked_range,
            document: Arc::clone(&self.document),
            day: at_line.day,
            conventions: at_line.conventions.clone(),
            losses: at_line.reading.loss.iter().map(|row| (row.var, row.es)).collect(),
        };
        self.live.ranging = Some(Ranging::Running { done: 0, whole: USUAL_DRAWS });
        vec![Request::Range(Box::new(task))]
    }

    /// Drops the range; a running one is stopped.
    pub(super) fn drop_range(&mut self) -> Vec<Request> {
        let is_running = matches!(self.live.ranging, Some(Ranging::Running { .. }));
        self.live.ranging = None;
        self.asked_range += 1;
        if is_running { vec![Request::StopRange] } else { Vec::new() }
    }

    /// Takes what came back of the newest wish.
    pub(super) fn take_ranging(&mut self, number: u64, ranging: Ranging) {
        if number != self.asked_range {
            return;
        }
        match ranging {
            Ranging::Failed(sentence) => {
                self.live.ranging = None;
                self.notices.tell_failure(sentence);
            }
            Ranging::Running { done, .. } if self.done_draws() > Some(done) => {}
            other => self.live.ranging = Some(other),
        }
    }

    /// Draws known to be done: threads tell of theirs in any order.
    fn done_draws(&self) -> Option<usize> {
        match &self.live.ranging {
            Some(Ranging::Running { done, .. }) => Some(*done),
            _ => None,
        }
    }
}
