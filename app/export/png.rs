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
    let mut fonts = Database::new();
    fonts.load_font_data(fonts::REGULAR.to_vec());
    fonts.load_font_data(fonts::SEMIBOLD.to_vec());
    fonts.set_sans_serif_family(fonts::FAMILY);
    let options = Options { fontdb: Arc::new(fonts), ..Options::default() };
    let tree = Tree::from_str(&svg(figure, look), &options).map_err(io::Error::other)?;
    let mut pixels = Pixmap::new(look.width, look.height)
        .ok_or_else(|| io::Error::other(format!("no room for {} x {} pixels", look.width, look.height)))?;
    resvg::render(&tree, Transform::identity(), &mut pixels.as_mut());
    pixels.encode_png().map_err(io::Error::other)
}
