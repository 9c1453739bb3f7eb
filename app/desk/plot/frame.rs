//! A chart's inside: where a pair of values stands on screen, and which values a point on screen stands for.
//! Values that are not numbers stand nowhere: whoever draws leaves them out.

use ebbmark_engine::figures::Span;
use egui::{Pos2, Rect, pos2};

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

impl Frame {
    /// Where a value along the bottom stands.
    pub fn x(&self, value: f64) -> f32 {
        self.rect.left() + self.across.share(value) as f32 * self.rect.width()
    }

    /// Where a value along the side stands; far outside, at most a chart's height away.
    pub fn y(&self, value: f64) -> f32 {
        self.rect.bottom() - self.up.share(value).clamp(-1.0, 2.0) as f32 * self.rect.height()
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
