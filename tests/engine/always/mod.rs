//! Properties that hold for any input.

mod confidence;
mod readings;
mod shapes;
