//! The bundled font: how long a text is, and where it is cut.

use std::sync::OnceLock;

use plotters::style::{FontFamily, FontStyle, IntoFont, register_font as register};

use super::PaintError;
use super::scene::{Anchor, Rect};

/// DejaVu Sans 2.37, a subset; its licence lies beside it.
pub(super) const FONT: &[u8] = include_bytes!("../fonts/DejaVuSans-subset.ttf");
/// The family under which pictures ask for it, so that a browser may take its own.
pub(super) const FAMILY: &str = "sans-serif";
/// Height of a line over the size of its letters.
const LINE: f64 = 1.2;
/// The plotting crate counts sizes by the height of a line and writes letters smaller by this.
pub(super) const PER_LETTER: f64 = 1.24;

/// Makes the font known to the plotting crate, once.
pub(super) fn register_font() -> Result<(), PaintError> {
    static REGISTERED: OnceLock<bool> = OnceLock::new();
    if *REGISTERED.get_or_init(|| register(FAMILY, FontStyle::Normal, FONT).is_ok()) {
        Ok(())
    } else {
        Err(PaintError::because("the bundled font cannot be read"))
    }
}

/// Length of a text.
pub(super) fn length(content: &str, size: f64) -> f64 {
    // Measured large, because whole pixels are returned.
    const LARGE: f64 = 50.0;
    let font = (FontFamily::from(FAMILY), LARGE * size * PER_LETTER).into_font();
    match font.box_size(content) {
        Ok((width, _)) => f64::from(width) / LARGE,
        Err(_) => size * content.chars().count() as f64,
    }
}

/// Height of a line of text.
pub(super) fn height(size: f64) -> f64 {
    LINE * size
}

/// The place that a text takes.
pub(super) fn place(
    [x, y]: [f64; 2],
    anchor: Anchor,
    upright: bool,
    size: f64,
    content: &str,
) -> Rect {
    let (length, half) = (length(content, size), 0.5 * height(size));
    let before = match anchor {
        Anchor::Start => 0.0,
        Anchor::Middle => 0.5 * length,
        Anchor::End => length,
    };
    if upright {
        Rect {
            left: x - half,
            right: x + half,
            top: y + before - length,
            bottom: y + before,
        }
    } else {
        Rect {
            left: x - before,
            right: x - before + length,
            top: y - half,
            bottom: y + half,
        }
    }
}

/// The text, or as much of its beginning as fits.
pub(super) fn shortened(content: &str, size: f64, room: f64) -> String {
    if length(content, size) <= room {
        return content.into();
    }
    let mut text: String = content.chars().take(200).collect();
    while text.pop().is_some() {
        let cut = format!("{}…", text.trim_end());
        if length(&cut, size) <= room {
            return cut;
        }
    }
    String::new()
}

/// The text in lines that fit.
pub(super) fn wrapped(content: &str, size: f64, room: f64) -> Vec<String> {
    let mut lines = vec![String::new()];
    for word in content.split_whitespace() {
        let longer = match lines.last() {
            Some(line) if !line.is_empty() => format!("{line} {word}"),
            _ => word.to_string(),
        };
        if length(&longer, size) <= room {
            lines.pop();
            lines.push(longer);
        } else {
            lines.push(shortened(word, size, room));
        }
    }
    lines.retain(|line| !line.is_empty());
    lines
}
