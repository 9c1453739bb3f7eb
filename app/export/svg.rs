//! Figures as SVG, the only drawer for paper: text stays text, in the shipped family. Sizes are pixels at 1080 lines and
//! grow with the page.

use super::fonts;
use super::look::{Colours, Look, Stroke};
use super::text::{escaped, shortened};
use ebbmark_engine::figures::{Anchor, Axis, Figure, Mark, Panel, Role, Tick};
use std::fmt::Write;

/// Lines of the page that all sizes are for.
const LINES: f64 = 1080.0;
const MARGIN: f64 = 64.0;
const TITLE: f64 = 42.0;
const SUBTITLE: f64 = 25.0;
const HEADING: f64 = 23.0;
const LABEL: f64 = 20.0;
/// The smallest text.
const SMALL: f64 = 18.0;
/// Room above the body, for the titles.
const HEAD: f64 = 164.0;
/// Room below the body, for the foot.
const FOOT: f64 = 150.0;
/// Width of a column of changes from today.
const BESIDE: f64 = 196.0;

/// A figure as an SVG document.
pub fn svg(figure: &Figure, look: Look) -> String {
    let scale = f64::from(look.height) / LINES;
    let (width, height) = (f64::from(look.width) / scale, LINES);
    let mut page = Page { out: String::new(), colours: look.colours(), width, height };
    page.open(look, scale);
    page.head(figure);
    for (number, panel) in figure.panels.iter().enumerate() {
        page.panel(number, panel);
    }
    page.foot(&figure.foot);
    page.out.push_str("</g>\n</svg>\n");
    page.out
}

struct Page {
    out: String,
    colours: &'static Colours,
    width: f64,
    height: f64,
}

/// A panel's inside on the page.
#[derive(Clone, Copy)]
struct Inside<'a> {
    left: f64,
    top: f64,
    right: f64,
    bottom: f64,
    panel: &'a Panel,
}

/// Words with their place and look.
struct Words<'a> {
    at: [f64; 2],
    size: f64,
    colour: &'a str,
    /// `start`, `middle` or `end`.
    anchor: &'a str,
    is_heavy: bool,
}

impl Inside<'_> {
    fn x(&self, value: f64) -> f64 {
        self.left + self.panel.across.span.share(value) * (self.right - self.left)
    }

    /// Far outside, at most a panel's height away.
    fn y(&self, value: f64) -> f64 {
        self.bottom - self.panel.up.span.share(value).clamp(-1.0, 2.0) * (self.bottom - self.top)
    }

    fn path(&self, points: impl Iterator<Item = [f64; 2]>) -> String {
        let points = points.filter(|point| point.iter().all(|value| value.is_finite()));
        let pairs: Vec<String> =
            points.map(|[across, up]| format!("{:.2} {:.2}", self.x(across), self.y(up))).collect();
        if pairs.is_empty() { String::new() } else { format!("M{}", pairs.join("L")) }
    }
}

impl Page {
    fn put(&mut self, text: std::fmt::Arguments<'_>) {
        // Writing to a string does not fail.
        let _ = self.out.write_fmt(text);
    }

    fn open(&mut self, look: Look, scale: f64) {
        let (ground, family) = (self.colours.ground, fonts::FAMILY);
        let (width, height) = (look.width, look.height);
        self.put(format_args!(
            "<svg xmlns=\"http://www.w3.org/2000/svg\" width=\"{width}\" height=\"{height}\" \
             viewBox=\"0 0 {width} {height}\" font-family=\"{family}\">\n\
             <rect width=\"{width}\" height=\"{height}\" fill=\"{ground}\"/>\n<g transform=\"scale({scale})\">\n"
        ));
    }

    fn head(&mut self, figure: &Figure) {
        let room = self.width - 2.0 * MARGIN;
        let (ink, soft) = (self.colours.ink, self.colours.soft_ink);
        let title = Words { at: [MARGIN, 82.0], size: TITLE, colour: ink, anchor: "start", is_heavy: true };
        self.words(&title, &shortened(&figure.title, TITLE, room, true));
        let subtitle =
            Words { at: [MARGIN, 122.0], size: SUBTITLE, colour: soft, anchor: "start", is_heavy: false };
        self.words(&subtitle, &shortened(&figure.subtitle, SUBTITLE, room, false));
    }

    fn foot(&mut self, lines: &[String]) {
        let room = self.width - 2.0 * MARGIN;
        let colour = self.colours.soft_ink;
        let top = self.height - 30.0 - 25.0 * (lines.len().saturating_sub(1)) as f64;
        for (number, line) in lines.iter().enumerate() {
            let at = [MARGIN, top + 25.0 * number as f64];
            let words = Words { at, size: SMALL, colour, anchor: "start", is_heavy: false };
            self.words(&words, &shortened(line, SMALL, room, false));
        }
    }

    fn panel(&mut self, number: usize, panel: &Panel) {
        let (left, right) = (MARGIN, self.width - MARGIN);
        let (top, bottom) = (HEAD, self.height - FOOT);
        let place = panel.place;
        let inside = Inside {
            left: left + place.left * (right - left),
            top: top + place.top * (bottom - top),
            right: left + place.right * (right - left),
            bottom: top + place.bottom * (bottom - top),
            panel,
        };
        self.axes(&inside);
        let (width, height) = (inside.right - inside.left, inside.bottom - inside.top);
        let (x, y) = (inside.left, inside.top);
        self.put(format_args!(
            "<clipPath id=\"panel{number}\"><rect x=\"{x:.2}\" y=\"{y:.2}\" width=\"{width:.2}\" \
             height=\"{height:.2}\"/></clipPath>\n<g clip-path=\"url(#panel{number})\">\n"
        ));
        for mark in panel.marks.iter().filter(|mark| mark.is_finite()) {
            self.mark(&inside, mark);
        }
        self.put(format_args!("</g>\n"));
    }

    fn axes(&mut self, inside: &Inside<'_>) {
        let Inside { left, top, right, bottom, panel } = *inside;
        let (ink, soft) = (self.colours.ink, self.colours.soft_ink);
        self.grid(inside, &panel.across, &panel.up);
        let (hairline, width, height) = (self.colours.hairline, right - left, bottom - top);
        self.put(format_args!(
            "<rect x=\"{left:.2}\" y=\"{top:.2}\" width=\"{width:.2}\" height=\"{height:.2}\" fill=\"none\" \
             stroke=\"{hairline}\" stroke-width=\"1.5\"/>\n"
        ));
        let start = if panel.up.has_words { MARGIN } else { left };
        let title =
            Words { at: [start, top - 14.0], size: HEADING, colour: ink, anchor: "start", is_heavy: true };
        self.words(&title, &shortened(&panel.title, HEADING, right - start, true));
        let note =
            Words { at: [right, top - 14.0], size: SMALL, colour: soft, anchor: "end", is_heavy: false };
        self.words(&note, &panel.note);
        let name = Words {
            at: [right + 36.0, bottom + 28.0],
            size: SMALL,
            colour: soft,
            anchor: "start",
            is_heavy: false,
        };
        let is_wide = right > self.width - MARGIN - 1.0;
        if is_wide {
            let below = Words { at: [right, bottom + 56.0], anchor: "end", ..name };
            self.words(&below, &panel.across.name);
        } else {
            self.words(&name, &panel.across.name);
        }
    }

    fn grid(&mut self, inside: &Inside<'_>, across: &Axis, up: &Axis) {
        let Inside { left, top, right, bottom, panel } = *inside;
        let (grid, soft) = (self.colours.grid, self.colours.soft_ink);
        let line = Stroke { colour: grid, width: 1.5, dashes: None };
        let words = |at: [f64; 2], anchor| Words { at, size: LABEL, colour: soft, anchor, is_heavy: false };
        for Tick { value, words: text } in &across.ticks {
            let x = inside.x(*value);
            self.stroke(&format!("M{x:.2} {top:.2}V{bottom:.2}"), line);
            if across.has_words {
                self.words(&words([x, bottom + 28.0], "middle"), text);
            }
        }
        for Tick { value, words: text } in &up.ticks {
            let y = inside.y(*value);
            self.stroke(&format!("M{left:.2} {y:.2}H{right:.2}"), line);
            if up.has_words {
                self.words(&words([left - 10.0, y + 0.35 * LABEL], "end"), text);
            }
        }
        for Tick { value, words: text } in &panel.beside {
            let y = inside.y(*value);
            self.words(&words([right + BESIDE, y + 0.35 * LABEL], "end"), text);
        }
    }

    fn mark(&mut self, inside: &Inside<'_>, mark: &Mark) {
        match mark {
            Mark::Band { role, edges } => {
                let there = edges.iter().map(|[across, low, _]| [*across, *low]);
                let back = edges.iter().rev().map(|[across, _, high]| [*across, *high]);
                self.area(*role, &inside.path(there.chain(back)));
            }
            Mark::SideBand { role, curve } => {
                let start = inside.panel.across.span.from;
                let there = curve.iter().map(|[up, length]| [*length, *up]);
                let back = curve.iter().rev().map(|[up, _]| [start, *up]);
                self.area(*role, &inside.path(there.chain(back)));
            }
            Mark::Line { role, points } => {
                self.stroke(&inside.path(points.iter().copied()), self.colours.stroke(*role));
            }
            Mark::Level { role, up } => {
                let (y, stroke) = (inside.y(*up), self.colours.stroke(*role));
                self.stroke(&format!("M{:.2} {y:.2}H{:.2}", inside.left, inside.right), stroke);
            }
            Mark::Upright { role, across } => {
                let (x, stroke) = (inside.x(*across), self.colours.stroke(*role));
                self.stroke(&format!("M{x:.2} {:.2}V{:.2}", inside.top, inside.bottom), stroke);
            }
            Mark::Dot { role, at } => {
                let (x, y, ground) = (inside.x(at[0]), inside.y(at[1]), self.colours.ground);
                let (fill, _) = self.colours.fill(*role);
                self.put(format_args!(
                    "<circle cx=\"{x:.2}\" cy=\"{y:.2}\" r=\"8\" fill=\"{fill}\" stroke=\"{ground}\" \
                     stroke-width=\"2.5\"/>\n"
                ));
            }
            Mark::Label { role, at, anchor, words } => self.label(inside, *role, *at, *anchor, words),
        }
    }

    /// Words on their own ground, so that they read over whatever lies below; moved to stay inside the panel.
    fn label(&mut self, inside: &Inside<'_>, role: Role, at: [f64; 2], anchor: Anchor, text: &str) {
        let is_heavy = matches!(role, Role::Var | Role::Es);
        let (width, height) = (fonts::width(text, is_heavy) * LABEL, LABEL * 1.25);
        let (x, y) = (inside.x(at[0]), inside.y(at[1]));
        let (left, top) = match anchor {
            Anchor::BelowRight => (x + 14.0, y + 6.0),
            Anchor::BelowLeft => (x - 14.0 - width, y + 6.0),
            Anchor::AboveRight => (x + 14.0, y - 6.0 - height),
            Anchor::AboveLeft => (x - 14.0 - width, y - 6.0 - height),
            Anchor::Left => (x - 14.0 - width, y - height / 2.0),
        };
        let within = |start: f64, size: f64, from: f64, to: f64| start.min(to - size - 4.0).max(from + 4.0);
        let (left, top) =
            (within(left, width, inside.left, inside.right), within(top, height, inside.top, inside.bottom));
        if anchor != Anchor::Left {
            let ground = self.colours.ground;
            self.put(format_args!(
                "<rect x=\"{:.2}\" y=\"{top:.2}\" width=\"{:.2}\" height=\"{height:.2}\" rx=\"4\" fill=\"{ground}\" \
                 fill-opacity=\"0.8\"/>\n",
                left - 4.0,
                width + 8.0
            ));
        }
        let colour = self.colours.words(role);
        let is_leftwards = matches!(anchor, Anchor::BelowLeft | Anchor::AboveLeft | Anchor::Left);
        let (x, anchor) = if is_leftwards { (left + width, "end") } else { (left, "start") };
        let at = [x, top + LABEL * 0.97];
        self.words(&Words { at, size: LABEL, colour, anchor, is_heavy }, text);
    }

    fn area(&mut self, role: Role, path: &str) {
        let (fill, opacity) = self.colours.fill(role);
        if !path.is_empty() {
            self.put(format_args!("<path d=\"{path}Z\" fill=\"{fill}\" fill-opacity=\"{opacity}\"/>\n"));
        }
    }

    fn stroke(&mut self, path: &str, stroke: Stroke) {
        let Stroke { colour, width, dashes } = stroke;
        let dashes = dashes.map_or_else(String::new, |dashes| format!(" stroke-dasharray=\"{dashes}\""));
        if !path.is_empty() {
            self.put(format_args!(
                "<path d=\"{path}\" fill=\"none\" stroke=\"{colour}\" stroke-width=\"{width}\" \
                 stroke-linejoin=\"round\"{dashes}/>\n"
            ));
        }
    }

    fn words(&mut self, look: &Words<'_>, text: &str) {
        let Words { at: [x, y], size, colour, anchor, is_heavy } = look;
        let weight = if *is_heavy { " font-weight=\"600\"" } else { "" };
        if !text.is_empty() {
            self.put(format_args!(
                "<text x=\"{x:.2}\" y=\"{y:.2}\" font-size=\"{size}\" fill=\"{colour}\" \
                 text-anchor=\"{anchor}\"{weight}>{}</text>\n",
                escaped(text)
            ));
        }
    }
}
