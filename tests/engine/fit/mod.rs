//! Fits: against worked examples and other programs' figures, and what is refused.

mod evidence;
mod geometric;
mod open_data;
mod refusals;
mod reverting;
