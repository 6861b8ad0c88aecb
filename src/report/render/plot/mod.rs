//! A figure or a chart as a picture: SVG text, and that text as PNG.
//!
//! It is first laid out as a [`Scene`] of lines and texts at their places, which can be
//! judged without looking, and then painted.

mod cells;
mod chart;
mod clip;
mod curves;
mod dashes;
mod glyph;
mod labels;
mod layout;
mod names;
mod page;
mod paint;
mod place;
mod ramp;
#[cfg(feature = "png")]
mod raster;
mod scene;
mod spread;
mod text;
mod ticks;

use std::fmt;

use crate::report::chart::Chart;
use crate::report::figure::Figure;
pub use scene::{Anchor, Ink, Item, LEVELS, Rect, Scene};

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

/// A neutral description that can be painted.
pub trait Picture {
    /// Everything of it at its place on a page, with the bundled font at hand.
    fn lay_out(&self) -> Scene;
}

impl Picture for Figure {
    fn lay_out(&self) -> Scene {
        layout::scene(self)
    }
}

impl Picture for Chart {
    fn lay_out(&self) -> Scene {
        chart::scene(self)
    }
}

/// The picture laid out.
///
/// # Errors
/// A fault of the bundled font, which no picture can cause.
pub fn scene(picture: &dyn Picture) -> Result<Scene, PaintError> {
    text::register_font()?;
    Ok(picture.lay_out())
}

/// The picture as the text of an SVG file.
///
/// # Errors
/// A fault of the painter, which no picture can cause.
pub fn svg(picture: &dyn Picture) -> Result<String, PaintError> {
    paint::svg(&scene(picture)?)
}

/// The picture as the bytes of a PNG file.
///
/// # Errors
/// A fault of the painter, which no picture can cause.
#[cfg(feature = "png")]
pub fn png(picture: &dyn Picture) -> Result<Vec<u8>, PaintError> {
    let scene = scene(picture)?;
    raster::png(&paint::svg(&scene)?, &scene)
}
