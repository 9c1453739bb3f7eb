//! Figures as PNG, from their SVG and with the shipped fonts alone, so that the picture is the same on any machine.

use super::{Look, fonts, svg};
use ebbmark_engine::figures::Figure;
use resvg::tiny_skia::{Pixmap, Transform};
use resvg::usvg::{Options, Tree, fontdb::Database};
use std::io;
use std::sync::Arc;

/// A figure as a PNG file of `look`'s size.
///
/// # Errors
/// A page too large for memory, or what the renderer refused.
pub fn png(figure: &Figure, look: Look) -> io::Result<Vec<u8>> {
    render(&svg(figure, look), look.width, look.height)?.encode_png().map_err(io::Error::other)
}

/// An SVG of a given size as pixels: red, green, blue and opacity, a byte each, row by row.
///
/// # Errors
/// As [`png`].
pub fn pixels(svg: &str, width: u32, height: u32) -> io::Result<Vec<u8>> {
    let pixels = render(svg, width, height)?;
    Ok(pixels
        .pixels()
        .iter()
        .map(|pixel| pixel.demultiply())
        .flat_map(|p| [p.red(), p.green(), p.blue(), p.alpha()])
        .collect())
}

fn render(svg: &str, width: u32, height: u32) -> io::Result<Pixmap> {
    let mut faces = Database::new();
    faces.load_font_data(fonts::REGULAR.to_vec());
    faces.load_font_data(fonts::SEMIBOLD.to_vec());
    faces.set_sans_serif_family(fonts::FAMILY);
    let options = Options { fontdb: Arc::new(faces), ..Options::default() };
    let tree = Tree::from_str(svg, &options).map_err(io::Error::other)?;
    let mut pixels = Pixmap::new(width, height)
        .ok_or_else(|| io::Error::other(format!("no room for {width} x {height} pixels")))?;
    resvg::render(&tree, Transform::identity(), &mut pixels.as_mut());
    Ok(pixels)
}
