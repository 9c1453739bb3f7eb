//! A chart as a finished description: axes, marks, roles, words. Whoever draws it, on screen or on paper, decides colours
//! and pixels and nothing else.

/// Values at the two ends of an axis, left to right or bottom to top; may run downwards.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Span {
    /// At the left or the bottom.
    pub from: f64,
    /// At the right or the top.
    pub to: f64,
}

/// A tick: its value and its words.
#[derive(Debug, Clone, PartialEq)]
pub struct Tick {
    /// Value on the axis.
    pub value: f64,
    /// Words beside it.
    pub words: String,
}

/// An axis.
#[derive(Debug, Clone, PartialEq)]
pub struct Axis {
    /// Values at its ends.
    pub span: Span,
    /// Round values along it.
    pub ticks: Vec<Tick>,
    /// Whether the ticks' words are written, or only their lines drawn.
    pub has_words: bool,
    /// Name with unit, where it is not said by the panel's title.
    pub name: String,
}

/// What a mark stands for; whoever draws gives it its colour, weight and dash.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum Role {
    /// The widest band of value.
    OuterBand,
    /// The band inside it.
    MiddleBand,
    /// The narrowest band of value.
    InnerBand,
    /// Median of the value.
    Median,
    /// Value today.
    Today,
    /// The loss limit.
    Limit,
    /// The horizon that is read.
    ReadingLine,
    /// Value-at-risk at the chosen confidence.
    Var,
    /// Expected shortfall at the chosen confidence.
    Es,
    /// Falls between the lesser quantiles.
    InnerFalls,
    /// Falls between the greater quantiles.
    OuterFalls,
    /// Median of the falls.
    FallMedian,
    /// Another quantile of the falls.
    FallLine,
    /// A distribution within the chosen confidence.
    Body,
    /// The distribution of falls within the chosen confidence.
    FallBody,
    /// A distribution beyond the chosen confidence.
    Tail,
    /// Outline of a distribution.
    Outline,
    /// Outline of the distribution of falls.
    FallOutline,
    /// Words about no mark in particular.
    Note,
}

/// Where a label stands to its point.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum Anchor {
    /// Below, to the right.
    BelowRight,
    /// Below, to the left.
    BelowLeft,
    /// Above, to the right.
    AboveRight,
    /// Above, to the left.
    AboveLeft,
    /// On its height, to the left.
    Left,
}

/// Something drawn inside a panel, in the values of its axes.
#[derive(Debug, Clone, PartialEq)]
pub enum Mark {
    /// The strip between two edges: `[across, low, high]`.
    Band {
        /// What it stands for.
        role: Role,
        /// Edges, across ascending.
        edges: Vec<[f64; 3]>,
    },
    /// The strip between the panel's left side and a curve: `[up, length]`.
    SideBand {
        /// What it stands for.
        role: Role,
        /// Curve, up ascending.
        curve: Vec<[f64; 2]>,
    },
    /// A line through `[across, up]`.
    Line {
        /// What it stands for.
        role: Role,
        /// Points.
        points: Vec<[f64; 2]>,
    },
    /// A line along a value of the up axis.
    Level {
        /// What it stands for.
        role: Role,
        /// The value.
        up: f64,
    },
    /// A line along a value of the across axis.
    Upright {
        /// What it stands for.
        role: Role,
        /// The value.
        across: f64,
    },
    /// A dot.
    Dot {
        /// What it stands for.
        role: Role,
        /// `[across, up]`.
        at: [f64; 2],
    },
    /// Words beside a point.
    Label {
        /// What they speak of.
        role: Role,
        /// `[across, up]`.
        at: [f64; 2],
        /// Where they stand to the point.
        anchor: Anchor,
        /// The words.
        words: String,
    },
}

/// A part of a figure's body, in shares of its width and height from the upper left.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Place {
    /// Left side.
    pub left: f64,
    /// Upper side.
    pub top: f64,
    /// Right side.
    pub right: f64,
    /// Lower side.
    pub bottom: f64,
}

/// One chart of a figure.
#[derive(Debug, Clone, PartialEq)]
pub struct Panel {
    /// Its inside; the words of its axes stand round it.
    pub place: Place,
    /// What it shows, with its unit.
    pub title: String,
    /// How to read it, in small beside the title.
    pub note: String,
    /// Along the bottom.
    pub across: Axis,
    /// Along the left side.
    pub up: Axis,
    /// The same axis counted otherwise, along the right side.
    pub beside: Vec<Tick>,
    /// From back to front.
    pub marks: Vec<Mark>,
}

/// A figure for the page.
#[derive(Debug, Clone, PartialEq)]
pub struct Figure {
    /// What is shown.
    pub title: String,
    /// The figures in words.
    pub subtitle: String,
    /// The charts.
    pub panels: Vec<Panel>,
    /// Model, run, assumptions and caution, a line each.
    pub foot: Vec<String>,
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

    /// With air above and below: a share of its length.
    pub fn with_air(self, share: f64) -> Self {
        let air = (self.to - self.from) * share;
        Self { from: self.from - air, to: self.to + air }
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

    /// Where a value lies: 0 at `from`, 1 at `to`.
    pub fn share(self, value: f64) -> f64 {
        (value - self.from) / (self.to - self.from)
    }
}

impl Mark {
    /// Whether it stands anywhere: a level, an upright, a dot or a label at a number. Points of bands and lines that are
    /// no numbers are left out one by one by whoever draws.
    pub fn is_finite(&self) -> bool {
        match self {
            Self::Level { up, .. } => up.is_finite(),
            Self::Upright { across, .. } => across.is_finite(),
            Self::Dot { at, .. } | Self::Label { at, .. } => at.iter().all(|value| value.is_finite()),
            Self::Band { .. } | Self::SideBand { .. } | Self::Line { .. } => true,
        }
    }
}
