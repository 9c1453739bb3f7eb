//! The built program, driven as a person or a script drives it: arguments in, streams and exit code out.
//! What the figures must be is tested with the engine; here it is how they are asked for and answered.

#![allow(clippy::unwrap_used, reason = "a test that can't go on has failed")]

mod examples;
mod exports;
mod faults;
mod figures;
mod fit;
mod no_display;
mod options;
mod schema;
mod streams;
mod support;
mod workspace;
