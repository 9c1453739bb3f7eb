//! Closed forms: the engine against formulas that need no simulation. Sampled figures stand beside them elsewhere.

mod drawdown;
mod losses;
mod moments;
