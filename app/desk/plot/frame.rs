//! A chart's inside: where a pair of values stands on screen, and which values a point on screen stands for.
//! Values that are not numbers stand nowhere: whoever draws leaves them out.

use egui::{Pos2, Rect, pos2};

/// From the value at the start of an axis to the one at its end; may run downwards.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Span {
    /// At the left or the bottom.
    pub from: f64,
    /// At the right or the top.
    pub to: f64,
}

/// A chart's inside with the values at its edges.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Frame {
    /// Inside, in points.
    pub rect: Rect,
    /// Along the bottom.
    pub across: Span,
    /// Along the side, from bottom to top.
    pub up: Span,
}

impl Span {
    /// Between two values; one point is widened, so that nothing is ever divided by zero.
    pub fn new(from: f64, to: f64) -> Self {
        if (to - from).abs() > f64::EPSILON * from.abs().max(to.abs()) {
            Self { from, to }
        } else {
            Self { from: from - 1.0, to: to + 1.0 }
        }
    }

    /// Smaller and larger end.
    pub fn ends(self) -> (f64, f64) {
        (self.from.min(self.to), self.from.max(self.to))
    }

    /// Whether a value lies between the ends.
    pub fn holds(self, value: f64) -> bool {
        let (low, high) = self.ends();
        (low..=high).contains(&value)
    }

    fn share(self, value: f64) -> f32 {
        ((value - self.from) / (self.to - self.from)) as f32
    }
}

impl Frame {
    /// Where a value along the bottom stands.
    pub fn x(&self, value: f64) -> f32 {
        self.rect.left() + self.across.share(value) * self.rect.width()
    }

    /// Where a value along the side stands; far outside, at most a chart's height away.
    pub fn y(&self, value: f64) -> f32 {
        self.rect.bottom() - self.up.share(value).clamp(-1.0, 2.0) * self.rect.height()
    }

    /// Where a pair of values stands.
    pub fn at(&self, across: f64, up: f64) -> Pos2 {
        pos2(self.x(across), self.y(up))
    }

    /// Value along the bottom at a point on screen.
    pub fn across_at(&self, x: f32) -> f64 {
        let share = f64::from((x - self.rect.left()) / self.rect.width().max(1.0));
        self.across.from + share * (self.across.to - self.across.from)
    }
}
