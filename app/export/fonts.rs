//! The shipped fonts as bytes, for screen and paper alike, so that a picture is the same on any machine.
//! How they were made stands beside them in `assets/font`.

/// Name of the family that both cuts belong to.
pub const FAMILY: &str = "Inter";
/// For ordinary text; its digits have one width.
pub const REGULAR: &[u8] = include_bytes!("../../assets/font/Inter-Regular.ttf");
/// For headings and figures that stand out; its digits have one width.
pub const SEMIBOLD: &[u8] = include_bytes!("../../assets/font/Inter-SemiBold.ttf");

/// Width of a line of text in the shipped font, in units of its size; a letter that the font lacks counts as a wide one.
pub(super) fn width(text: &str, is_heavy: bool) -> f64 {
    let bytes = if is_heavy { SEMIBOLD } else { REGULAR };
    let Ok(face) = ttf_parser::Face::parse(bytes, 0) else { return text.chars().count() as f64 };
    let em = f64::from(face.units_per_em());
    let advance = |letter| face.glyph_hor_advance(face.glyph_index(letter)?);
    text.chars().map(|letter| advance(letter).map_or(1.0, |units| f64::from(units) / em)).sum()
}
