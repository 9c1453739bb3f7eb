//! Round a chart: its ground, the grid through its ticks, and the ticks' words.

use super::{Frame, Tick};
use crate::desk::theme::{self, Palette};
use egui::{Align2, FontFamily, FontId, Painter, Stroke, pos2};

/// Room between a tick's words and the chart.
const GAP: f32 = 5.0;

/// Draws ground and edge.
pub fn ground(painter: &Painter, frame: &Frame, palette: &Palette) {
    painter.rect_filled(frame.rect, 0.0, palette.panel);
    painter.rect_stroke(frame.rect, 0.0, Stroke::new(1.0, palette.hairline), egui::StrokeKind::Inside);
}

/// Grid lines across, words on the left.
pub fn left(painter: &Painter, frame: &Frame, palette: &Palette, ticks: &[Tick], has_words: bool) {
    for tick in ticks {
        let y = painter.round_to_pixel_center(frame.y(tick.value));
        painter.hline(frame.rect.x_range(), y, Stroke::new(1.0, palette.grid));
        if has_words {
            let at = pos2(frame.rect.left() - GAP, y);
            painter.text(at, Align2::RIGHT_CENTER, &tick.words, font(), palette.soft_ink);
        }
    }
}

/// Short marks and words on the right, right-aligned in a column `width` wide.
pub fn right(painter: &Painter, frame: &Frame, palette: &Palette, ticks: &[Tick], width: f32) {
    for tick in ticks {
        let y = painter.round_to_pixel_center(frame.y(tick.value));
        let right = frame.rect.right();
        painter.hline(right - 4.0..=right, y, Stroke::new(1.0, palette.soft_ink));
        painter.text(pos2(right + width, y), Align2::RIGHT_CENTER, &tick.words, font(), palette.soft_ink);
    }
}

/// Grid lines up, words below.
pub fn bottom(painter: &Painter, frame: &Frame, palette: &Palette, ticks: &[Tick], has_words: bool) {
    for tick in ticks {
        let x = painter.round_to_pixel_center(frame.x(tick.value));
        painter.vline(x, frame.rect.y_range(), Stroke::new(1.0, palette.grid));
        if has_words {
            painter.text(
                pos2(x, frame.rect.bottom() + GAP),
                Align2::CENTER_TOP,
                &tick.words,
                font(),
                palette.soft_ink,
            );
        }
    }
}

/// Width of a tick's words.
pub fn width(painter: &Painter, words: &str) -> f32 {
    painter.layout_no_wrap(words.to_owned(), font(), Default::default()).size().x
}

/// Font of ticks and labels.
pub fn font() -> FontId {
    FontId::new(theme::SMALL_POINTS, FontFamily::Proportional)
}
