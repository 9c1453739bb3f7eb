//! Charts on screen: the scales, marks and axes that panels put together. What a chart shows is decided in the
//! engine's figures and in the panels; nothing here knows a session.

/// Grid, ticks and titles round a chart.
pub mod axes;
/// From values to points on screen and back.
pub mod frame;
/// Bands, lines, labels.
pub mod marks;
/// Panels of the engine's figures.
pub mod paint;
/// Ranges that do not jump while figures arrive.
pub mod settle;

pub use ebbmark_engine::figures::{Span, Tick, ticks};
pub use frame::Frame;
pub use settle::settled;
