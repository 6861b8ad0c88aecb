//! Horizontal bars with their names at the left.

use super::areas::corners;
use super::frame::Placed;
use crate::report::chart::{Bar, Layer, Panel};
use crate::report::render::plot::clip;
use crate::report::render::plot::page::{NUMBER, SMALL};
use crate::report::render::plot::place::{Candidate, Occupied};
use crate::report::render::plot::scene::{Anchor, Ink, Rect, Scene};
use crate::report::render::plot::text;

/// Height of a row, and half the heights of both bars and of a whisker's ends.
const ROW: f64 = 25.0;
const FILLED: f64 = 6.0;
const OUTLINED: f64 = 9.0;
const WHISKER: f64 = 4.0;
/// Space over the first and under the last row.
const AROUND: f64 = 5.0;
/// The longest name, as a share of the panel's width.
const NAMES: f64 = 0.34;

fn all(panel: &Panel) -> impl Iterator<Item = &Bar> {
    panel.layers.iter().flat_map(|layer| match layer {
        Layer::Bars(bars) => bars.as_slice(),
        _ => &[],
    })
}

/// Height of a frame for all bars.
pub(super) fn height(panel: &Panel) -> f64 {
    all(panel).count().max(2) as f64 * ROW + 2.0 * AROUND
}

/// Width for the names.
pub(super) fn names_width(panel: &Panel, width: f64) -> f64 {
    let longest = all(panel)
        .map(|bar| text::length(&bar.name, NUMBER))
        .fold(0.0, f64::max);
    longest.min(NAMES * width)
}

/// The middle of a row.
fn middle(placed: &Placed<'_>, index: usize) -> f64 {
    placed.area.top + AROUND + ROW * (index as f64 + 0.5)
}

/// Writes what stands at the ends of the bars.
pub(super) fn write(scene: &mut Scene, occupied: &mut Occupied, placed: &Placed<'_>) {
    for (index, bar) in all(placed.panel).enumerate() {
        write_end(scene, occupied, placed, bar, middle(placed, index));
    }
}

/// Draws the bars and their names.
pub(super) fn draw(scene: &mut Scene, placed: &Placed<'_>) {
    let area = placed.area;
    // Rounding must not cut the longest name.
    let names = area.left - placed.start - 6.5;
    for (index, bar) in all(placed.panel).enumerate() {
        let y = middle(placed, index);
        let name = text::shortened(&bar.name, NUMBER, names);
        scene.text([area.left - 7.0, y], Anchor::End, NUMBER, Ink::Black, &name);
        let values = [Some(bar.value), bar.total].into_iter().flatten();
        for (value, half) in values.zip([FILLED, OUTLINED]) {
            let points = corners(reach(placed, [0.0, value], y, half));
            if half == FILLED {
                let inside = clip::area(&points, area);
                if inside.len() > 2 {
                    scene.area(&inside, Ink::Bar);
                }
            }
            let mut around = points.to_vec();
            around.push(points[0]);
            let (ink, width) = if half == FILLED {
                (Ink::Solid, 1.0)
            } else {
                (Ink::Black, 1.2)
            };
            for points in clip::line(&around, area) {
                scene.line(&points, ink, width);
            }
        }
        if let Some([from, to]) = bar.whisker {
            let (left, right) = (placed.x(from), placed.x(to));
            for line in [
                [[left, y], [right, y]],
                [[left, y - WHISKER], [left, y + WHISKER]],
                [[right, y - WHISKER], [right, y + WHISKER]],
            ] {
                for points in clip::line(&line, area) {
                    scene.line(&points, Ink::Black, 1.4);
                }
            }
        }
    }
}

fn reach(placed: &Placed<'_>, [from, to]: [f64; 2], y: f64, half: f64) -> Rect {
    let (from, to) = (placed.x(from), placed.x(to));
    Rect {
        left: from.min(to),
        right: from.max(to),
        top: y - half,
        bottom: y + half,
    }
}

/// What is written at the end of a bar: beyond it, else on its other side, else over it.
fn write_end(scene: &mut Scene, occupied: &mut Occupied, placed: &Placed<'_>, bar: &Bar, y: f64) {
    if bar.label.is_empty() {
        return;
    }
    let area = placed.area;
    let ends = [0.0, bar.value]
        .into_iter()
        .chain(bar.total)
        .chain(bar.whisker.into_iter().flatten())
        .map(|value| placed.x(value).clamp(area.left, area.right));
    let (left, right) = ends.fold((f64::INFINITY, f64::NEG_INFINITY), |(least, most), x| {
        (least.min(x), most.max(x))
    });
    let (length, half) = (text::length(&bar.label, SMALL), 0.5 * text::height(SMALL));
    let beyond = [right + 6.0, left - 6.0 - length];
    let over = [right - 8.0 - length, left + 8.0];
    let mut starts = [beyond[0], beyond[1], over[0], over[1]];
    if bar.total.unwrap_or(bar.value) < 0.0 {
        starts = [starts[1], starts[0], starts[3], starts[2]];
    }
    let candidates = starts.map(|left| Candidate {
        area: Rect {
            left,
            right: left + length,
            top: y - half,
            bottom: y + half,
        },
        leader: None,
    });
    // The order counts for more than a guide that is hidden.
    let chosen = candidates
        .into_iter()
        .find_map(|candidate| occupied.take(area.grown(-2.0), [candidate]));
    if let Some(chosen) = chosen {
        let at = [chosen.area.left, y];
        let is_over_bar = chosen.area.left < right && left < chosen.area.right;
        if is_over_bar || occupied.hides(chosen.area) {
            scene.area(&corners(chosen.area.grown(1.0)), Ink::Paper);
        }
        scene.text(at, Anchor::Start, SMALL, Ink::Black, &bar.label);
    }
}
