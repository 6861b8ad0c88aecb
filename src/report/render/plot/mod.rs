//! A figure as a picture: SVG text, and that text as PNG.
//!
//! A figure is first laid out as a [`Scene`] of lines and texts at their places, which can be
//! judged without looking, and then painted.

mod curves;
mod dashes;
mod glyph;
mod labels;
mod layout;
mod names;
mod paint;
mod place;
#[cfg(feature = "png")]
mod raster;
mod scene;
mod spread;
mod text;
mod ticks;

use std::fmt;

use crate::report::figure::Figure;
pub use scene::{Anchor, Ink, Item, Rect, Scene};

/// Why a picture could not be painted: a fault of this program, not of its input.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct PaintError(String);

impl fmt::Display for PaintError {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        f.write_str(&self.0)
    }
}

impl std::error::Error for PaintError {}

impl PaintError {
    fn because(error: impl fmt::Display) -> Self {
        PaintError(error.to_string())
    }
}

/// The figure laid out.
///
/// # Errors
/// A fault of the bundled font, which no figure can cause.
pub fn scene(figure: &Figure) -> Result<Scene, PaintError> {
    text::register_font()?;
    Ok(layout::scene(figure))
}

/// The figure as the text of an SVG file.
///
/// # Errors
/// A fault of the painter, which no figure can cause.
pub fn svg(figure: &Figure) -> Result<String, PaintError> {
    paint::svg(&scene(figure)?)
}

/// The figure as the bytes of a PNG file.
///
/// # Errors
/// A fault of the painter, which no figure can cause.
#[cfg(feature = "png")]
pub fn png(figure: &Figure) -> Result<Vec<u8>, PaintError> {
    let scene = scene(figure)?;
    raster::png(&paint::svg(&scene)?, &scene)
}
