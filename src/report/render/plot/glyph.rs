//! Optics as seen from above, on a straight line that stands for the beam: a mirror that turns
//! the beam stands beside the line, which goes to it and comes back.

use super::scene::{Ink, Scene};
use crate::report::figure::{Curvature, Glyph};

/// Half the height of the row of optics.
pub(super) const REACH: f64 = 20.0;
/// Half the height of mirrors, lenses and bodies.
const MIRROR: f64 = 14.0;
const LENS: f64 = 14.0;
const BODY: f64 = 9.0;
/// How far a fold mirror stands beside the line, and how thick a mirror is.
const BESIDE: f64 = 11.0;
const THICK: f64 = 6.0;
/// Least width of a body.
const LEAST: f64 = 4.0;
const OUTLINE: f64 = 1.2;

/// Draws one optic between `from` and `to` on the line at height `y`; thin optics may take `half`
/// to either side.
pub(super) fn draw(scene: &mut Scene, glyph: Glyph, [from, to]: [f64; 2], y: f64, half: f64) {
    let middle = 0.5 * (from + to);
    let reach = (0.5 * (to - from)).max(0.5 * LEAST);
    let (left, right) = (middle - reach, middle + reach);
    match glyph {
        Glyph::FirstMirror(curvature) => end_mirror(scene, curvature, from, y, 1.0),
        Glyph::LastMirror(curvature) => end_mirror(scene, curvature, from, y, -1.0),
        Glyph::FoldMirror(curvature) => fold_mirror(scene, curvature, middle, y, half),
        Glyph::Lens(curvature) => lens(scene, curvature, middle, y, half),
        Glyph::Slab { tilted } => {
            let lean = if tilted { 0.5 * BODY } else { 0.0 };
            body(scene, [left, right], y, lean);
        }
        Glyph::Duct => {
            body(scene, [left, right], y, 0.0);
            for height in [-0.5, 0.0, 0.5] {
                let line = y + height * BODY;
                scene.line(&[[left, line], [right, line]], Ink::Grey, 0.7);
            }
        }
        Glyph::Unseen => {
            body(scene, [left, right], y, 0.0);
            scene.line(&[[left, y - BODY], [right, y + BODY]], Ink::Black, 0.7);
            scene.line(&[[left, y + BODY], [right, y - BODY]], Ink::Black, 0.7);
        }
        Glyph::Aperture(_) => {
            for side in [-1.0, 1.0] {
                let bar = [[middle, y + side * 4.0], [middle, y + side * 16.0]];
                scene.line(&bar, Ink::Black, 3.0);
            }
        }
    }
}

fn body(scene: &mut Scene, [left, right]: [f64; 2], y: f64, lean: f64) {
    let corners = [
        [left - lean, y + BODY],
        [left + lean, y - BODY],
        [right + lean, y - BODY],
        [right - lean, y + BODY],
    ];
    filled(scene, &corners, Ink::Tint);
}

fn filled(scene: &mut Scene, corners: &[[f64; 2]], ink: Ink) {
    scene.area(corners, ink);
    let mut outline = corners.to_vec();
    outline.extend(corners.first());
    scene.line(&outline, Ink::Black, OUTLINE);
}

/// How far the rim of a mirror lies in front of its middle.
fn sag(curvature: Curvature) -> f64 {
    match curvature {
        Curvature::Focusing => 3.5,
        Curvature::Flat => 0.0,
        Curvature::Defocusing => -3.5,
    }
}

/// An arc through shares from −1 to 1 of a height, as a parabola.
fn arc(point: impl Fn(f64) -> [f64; 2]) -> Vec<[f64; 2]> {
    const PIECES: i32 = 8;
    (-PIECES..=PIECES)
        .map(|piece| point(f64::from(piece) / f64::from(PIECES)))
        .collect()
}

/// A mirror across the line; the beam is on the side of `ahead`.
fn end_mirror(scene: &mut Scene, curvature: Curvature, x: f64, y: f64, ahead: f64) {
    let sag = sag(curvature);
    let face = arc(|t| [x + ahead * sag * t * t, y + MIRROR * t]);
    let back = x - ahead * (THICK - sag.min(0.0));
    let mut corners = face.clone();
    corners.extend([[back, y + MIRROR], [back, y - MIRROR]]);
    scene.area(&corners, Ink::Grey);
    scene.line(&face, Ink::Black, 2.2);
}

/// A mirror beside the line.
fn fold_mirror(scene: &mut Scene, curvature: Curvature, x: f64, y: f64, half: f64) {
    let (width, top) = (half.max(3.0), y - BESIDE);
    let sag = sag(curvature) * (width / 9.0).min(1.0);
    // The line turns aside to the mirror.
    let gap = [[x - width, y], [x + width, y]];
    scene.line(&gap, Ink::Paper, 3.0);
    scene.line(&[[x - width, y], [x, top], [x + width, y]], Ink::Black, 1.0);
    let face = arc(|t| [x + width * t, top + sag * t * t]);
    let back = top - THICK + sag.min(0.0);
    let mut corners = face.clone();
    corners.extend([[x + width, back], [x - width, back]]);
    scene.area(&corners, Ink::Grey);
    scene.line(&face, Ink::Black, 2.2);
}

fn lens(scene: &mut Scene, curvature: Curvature, x: f64, y: f64, half: f64) {
    let thick = half.clamp(2.5, 5.0);
    let (middle, rim) = match curvature {
        Curvature::Focusing => (thick, 0.0),
        Curvature::Flat => (1.5, 1.5),
        Curvature::Defocusing => (1.0, thick),
    };
    let side = |sign: f64| {
        arc(move |t| {
            [
                x + sign * (middle + (rim - middle) * t * t),
                y + sign * LENS * t,
            ]
        })
    };
    let mut corners = side(1.0);
    corners.extend(side(-1.0));
    filled(scene, &corners, Ink::Tint);
}
