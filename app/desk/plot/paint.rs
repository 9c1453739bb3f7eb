//! Draws the panels of the engine's figures on screen: every role gets its colour, weight and dash here, as paper gives it
//! its own. What a panel shows was decided before.

use super::{Frame, axes, marks};
use crate::desk::theme::Palette;
use ebbmark_engine::figures::{Anchor, Mark, Panel, Role};
use egui::{Align2, Color32, Painter, Stroke, pos2, vec2};

/// Where words stand from their point, in points.
const ASIDE: f32 = 8.0;

/// Draws a panel into a frame; the words of its right axis stand in a column `beside_width` wide.
pub fn panel(painter: &Painter, frame: &Frame, palette: &Palette, panel: &Panel, beside_width: f32) {
    axes::ground(painter, frame, palette);
    axes::bottom(painter, frame, palette, &panel.across.ticks, panel.across.has_words);
    axes::left(painter, frame, palette, &panel.up.ticks, panel.up.has_words);
    axes::right(painter, frame, palette, &panel.beside, beside_width);
    if !panel.across.name.is_empty() {
        let at = pos2(frame.rect.right() + 20.0, frame.rect.bottom() + 5.0);
        painter.text(at, Align2::LEFT_TOP, &panel.across.name, axes::font(), palette.soft_ink);
    }
    let inside = painter.with_clip_rect(frame.rect.intersect(painter.clip_rect()));
    for shown in panel.marks.iter().filter(|mark| mark.is_finite()) {
        mark(&inside, frame, palette, shown);
    }
}

fn mark(painter: &Painter, frame: &Frame, palette: &Palette, mark: &Mark) {
    match mark {
        Mark::Band { role, edges } => marks::band(painter, frame, edges, fill(palette, *role)),
        Mark::SideBand { role, curve } => marks::side_band(painter, frame, curve, fill(palette, *role)),
        Mark::Line { role, points } => marks::line(painter, frame, points, stroke(palette, *role)),
        Mark::Level { role, up } if is_dashed(*role) => {
            marks::dashed_level(painter, frame, *up, stroke(palette, *role));
        }
        Mark::Level { role, up } => marks::level(painter, frame, *up, stroke(palette, *role)),
        // The reading line is drawn, and dragged, by the view that it belongs to.
        Mark::Upright { .. } => {}
        Mark::Dot { role, at } => {
            let at = frame.at(at[0], at[1]);
            painter.circle(at, 4.5, fill(palette, *role).to_opaque(), Stroke::new(1.5, palette.panel));
        }
        Mark::Label { role, at, anchor, words } => {
            let at = frame.at(at[0], at[1]);
            let (align, offset) = match anchor {
                Anchor::BelowRight => (Align2::LEFT_TOP, vec2(ASIDE, 4.0)),
                Anchor::BelowLeft => (Align2::RIGHT_TOP, vec2(-ASIDE, 4.0)),
                Anchor::AboveRight => (Align2::LEFT_BOTTOM, vec2(ASIDE, -3.0)),
                Anchor::AboveLeft => (Align2::RIGHT_BOTTOM, vec2(-ASIDE, -3.0)),
                Anchor::Left => (Align2::RIGHT_CENTER, vec2(-ASIDE, 0.0)),
            };
            let bounds = frame.rect.shrink(3.0);
            marks::label(painter, bounds, at + offset, align, words, ink(palette, *role), palette.panel);
        }
    }
}

fn fill(palette: &Palette, role: Role) -> Color32 {
    match role {
        Role::OuterBand => palette.neutral.gamma_multiply(0.16),
        Role::MiddleBand | Role::Body => palette.neutral.gamma_multiply(0.22),
        Role::InnerBand => palette.neutral.gamma_multiply(0.30),
        Role::InnerFalls => palette.loss.gamma_multiply(0.30),
        Role::OuterFalls | Role::FallBody => palette.loss.gamma_multiply(0.16),
        Role::Tail => palette.loss.gamma_multiply(0.75),
        Role::Var => palette.loss,
        _ => palette.neutral,
    }
}

fn stroke(palette: &Palette, role: Role) -> Stroke {
    match role {
        Role::Median | Role::Outline => Stroke::new(1.5, palette.neutral),
        Role::Today => Stroke::new(1.0, palette.soft_ink),
        Role::Limit => Stroke::new(1.5, palette.ink),
        Role::Var | Role::Es | Role::FallOutline => Stroke::new(1.5, palette.loss),
        Role::FallMedian => Stroke::new(1.8, palette.loss),
        Role::FallLine => Stroke::new(1.0, palette.loss),
        _ => Stroke::new(1.0, palette.ink),
    }
}

fn is_dashed(role: Role) -> bool {
    matches!(role, Role::Today | Role::Limit | Role::Es)
}

fn ink(palette: &Palette, role: Role) -> Color32 {
    match role {
        Role::Var | Role::Es | Role::Tail => palette.loss,
        _ => palette.ink,
    }
}
