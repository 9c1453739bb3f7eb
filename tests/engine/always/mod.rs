//! Properties that hold for any input: of confidence levels, of paths, of readings, and of the shapes that charts draw.

mod confidence;
mod extremes;
mod paths;
mod readings;
mod shapes;
