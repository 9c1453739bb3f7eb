//! The shipped fonts as bytes, for screen and paper alike, so that a picture is the same on any machine.
//! How they were made stands beside them in `assets/font`.

/// Name of the family that both cuts belong to.
pub const FAMILY: &str = "Inter";
/// For ordinary text; its digits have one width.
pub const REGULAR: &[u8] = include_bytes!("../../assets/font/Inter-Regular.ttf");
/// For headings and figures that stand out; its digits have one width.
pub const SEMIBOLD: &[u8] = include_bytes!("../../assets/font/Inter-SemiBold.ttf");
