//! Page size and colours of paper, and how each role of a mark is drawn. The screen has its own in the theme; both keep
//! losses vermilion, gains blue and everything neutral slate, and tell lines apart by their dashes too.

use ebbmark_engine::figures::Role;

/// Light or dark ground.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum Tone {
    /// For print and most decks.
    Light,
    /// For dark decks.
    Dark,
}

/// A page.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub struct Look {
    /// Light or dark.
    pub tone: Tone,
    /// Width, pixels.
    pub width: u32,
    /// Height, pixels.
    pub height: u32,
}

impl Look {
    /// 16:9 at 1080 lines on light ground.
    pub const DECK: Self = Self { tone: Tone::Light, width: 1920, height: 1080 };

    pub(super) fn colours(self) -> &'static Colours {
        match self.tone {
            Tone::Light => &LIGHT,
            Tone::Dark => &DARK,
        }
    }
}

/// Colours of a page, as SVG writes them.
pub(super) struct Colours {
    pub(super) ground: &'static str,
    pub(super) ink: &'static str,
    pub(super) soft_ink: &'static str,
    pub(super) hairline: &'static str,
    pub(super) grid: &'static str,
    accent: &'static str,
    loss: &'static str,
    neutral: &'static str,
}

const LIGHT: Colours = Colours {
    ground: "#ffffff",
    ink: "#1c222b",
    soft_ink: "#5a6573",
    hairline: "#c9ced3",
    grid: "#e9ebed",
    accent: "#553c9a",
    loss: "#c24e00",
    neutral: "#4f6b82",
};

const DARK: Colours = Colours {
    ground: "#1b1f27",
    ink: "#e7eaef",
    soft_ink: "#9ca7b5",
    hairline: "#3d4551",
    grid: "#2a303a",
    accent: "#b9a7f2",
    loss: "#f08c4a",
    neutral: "#8ca8bf",
};

/// A line's colour, width in pixels at 1080 lines, and dashes.
#[derive(Debug, Clone, Copy, PartialEq)]
pub(super) struct Stroke {
    pub(super) colour: &'static str,
    pub(super) width: f64,
    pub(super) dashes: Option<&'static str>,
}

impl Colours {
    /// Fill of an area and its opacity.
    pub(super) fn fill(&self, role: Role) -> (&'static str, f64) {
        match role {
            Role::OuterBand => (self.neutral, 0.17),
            Role::MiddleBand => (self.neutral, 0.24),
            Role::InnerBand => (self.neutral, 0.32),
            Role::Body => (self.neutral, 0.25),
            Role::InnerFalls => (self.loss, 0.32),
            Role::OuterFalls | Role::FallBody => (self.loss, 0.17),
            Role::Tail | Role::Var => (self.loss, 0.80),
            _ => (self.neutral, 1.0),
        }
    }

    /// Stroke of a line.
    pub(super) fn stroke(&self, role: Role) -> Stroke {
        let (colour, width, dashes) = match role {
            Role::Median | Role::Outline => (self.neutral, 3.0, None),
            Role::Today => (self.soft_ink, 2.0, Some("3 6")),
            Role::Limit => (self.ink, 2.5, Some("14 8")),
            Role::ReadingLine => (self.accent, 4.0, None),
            Role::Var => (self.loss, 3.0, None),
            Role::Es => (self.loss, 3.0, Some("8 6")),
            Role::FallMedian | Role::FallOutline => (self.loss, 3.0, None),
            Role::FallLine => (self.loss, 1.75, None),
            _ => (self.ink, 1.0, None),
        };
        Stroke { colour, width, dashes }
    }

    /// Colour of words about a mark.
    pub(super) fn words(&self, role: Role) -> &'static str {
        match role {
            Role::Var | Role::Es | Role::Tail => self.loss,
            Role::ReadingLine => self.accent,
            _ => self.ink,
        }
    }
}
