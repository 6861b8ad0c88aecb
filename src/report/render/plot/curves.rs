//! Curves, apertures and marks within the panels.

use super::dashes::{self, stroke};
use super::layout::Placed;
use super::place::Occupied;
use super::scene::{Ink, Item, Scene};
use crate::report::figure::{Glyph, Stroke};

pub(super) const LINE: f64 = 2.0;
pub(super) const DOT: f64 = 3.2;

/// Draws curves, apertures and marks.
pub(super) fn draw(scene: &mut Scene, occupied: &mut Occupied, panels: &[Placed<'_>]) {
    for placed in panels {
        apertures(scene, occupied, placed);
        for curve in &placed.panel.curves {
            let mut points: Vec<[f64; 2]> = Vec::with_capacity(curve.points.len());
            for point in &curve.points {
                let point = placed.point(*point);
                // Samples closer than the eye can tell only make files large.
                let is_new = points
                    .last()
                    .is_none_or(|[x, y]| (point[0] - x).abs() + (point[1] - y).abs() > 0.05);
                if is_new {
                    points.push(point);
                }
            }
            stroke(scene, &points, curve.stroke, LINE);
            occupied.add_curve(points);
        }
    }
    for placed in panels {
        for (stroke, at) in placed.panel.marks.iter().flat_map(|mark| &mark.places) {
            dot(scene, placed.point(*at), *stroke);
        }
    }
}

/// A marked place on a curve: filled on a solid one, open on the others.
pub(super) fn dot(scene: &mut Scene, at: [f64; 2], stroke: Stroke) {
    let ink = dashes::ink(stroke);
    let within = if stroke == Stroke::Solid {
        ink
    } else {
        Ink::Paper
    };
    for (ink, filled) in [(within, true), (ink, false)] {
        scene.items.push(Item::Dot {
            at,
            radius: DOT,
            ink,
            filled,
        });
    }
}

/// What an aperture takes away of the height, where the axis reaches that far.
fn apertures(scene: &mut Scene, occupied: &mut Occupied, placed: &Placed<'_>) {
    for symbol in &placed.panel.symbols {
        let (Glyph::Aperture(half), Some(axis)) = (symbol.glyph, placed.y) else {
            continue;
        };
        if !(axis.from..=axis.to).contains(&half) {
            continue;
        }
        let (x, edge) = (placed.x(symbol.from), placed.y(half));
        let bar = [[x, placed.area.top], [x, edge]];
        scene.line(&bar, Ink::Black, 4.0);
        occupied.add_curve(bar.to_vec());
    }
}
