//! Charts as finished descriptions: axes, marks, roles, words. No colours, no pixels.
