//! Fits: against worked examples and other programs' figures, and what is refused.

mod evidence;
mod geometric;
mod refusals;
mod reverting;
