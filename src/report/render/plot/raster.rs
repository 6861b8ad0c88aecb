//! SVG as PNG, with the bundled font and nothing of the machine's.

use std::sync::Arc;

use resvg::tiny_skia::{Pixmap, Transform};
use resvg::usvg::{Options, Tree, fontdb::Database};

use super::PaintError;
use super::scene::Scene;
use super::text::FONT;

/// Pixels to one of a screen at its plain size, for print and fine screens.
const FINE: f64 = 2.0;
/// Most pixels in a row.
const WIDEST: f64 = 12_000.0;

/// The bytes of a PNG file.
pub(super) fn png(svg: &str, scene: &Scene) -> Result<Vec<u8>, PaintError> {
    let mut fonts = Database::new();
    fonts.load_font_data(FONT.to_vec());
    fonts.set_sans_serif_family("DejaVu Sans");
    let options = Options {
        fontdb: Arc::new(fonts),
        font_family: "DejaVu Sans".into(),
        ..Options::default()
    };
    let tree = Tree::from_str(svg, &options).map_err(PaintError::because)?;
    let scale = FINE.min(WIDEST / scene.width);
    let pixels = |size: f64| (size.ceil() * scale).round() as u32;
    let mut image = Pixmap::new(pixels(scene.width), pixels(scene.height))
        .ok_or_else(|| PaintError::because("the picture has no size"))?;
    let transform = Transform::from_scale(scale as f32, scale as f32);
    resvg::render(&tree, transform, &mut image.as_mut());
    image.encode_png().map_err(PaintError::because)
}
