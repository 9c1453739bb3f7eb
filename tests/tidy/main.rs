//! The house rules, held by reading manifests, `use` lines and opening words. What the compiler already holds
//! (the engine can't see the program) is not checked again.

#![allow(clippy::unwrap_used, reason = "a test that can't go on has failed")]

mod house;
mod papers;
mod rules;
mod source;
