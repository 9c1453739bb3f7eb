//! Properties that hold for any input: of confidence levels, of readings, and of the shapes that charts draw.

mod confidence;
mod readings;
mod shapes;
