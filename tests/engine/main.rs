//! Tests of the engine, by the name of their truth: exact (closed form), table (printed or standard table), agree (two
//! roads to one number), law (distribution tests), always (properties).
#![allow(clippy::unwrap_used, reason = "a test that can't go on has failed")]

mod agree;
mod always;
mod exact;
mod fit;
mod inputs;
mod law;
mod matrices;
mod support;
mod table;
