//! What is filled: tinted ranges, bands, histograms.

use super::frame::Placed;
use crate::report::chart::{Band, Histogram, Layer};
use crate::report::render::plot::clip;
use crate::report::render::plot::dashes;
use crate::report::render::plot::place::Occupied;
use crate::report::render::plot::scene::{Ink, Item, Rect, Scene};

/// Width of an area's outline.
const OUTLINE: f64 = 1.0;
/// Narrower bins have no line between them, which would fill them.
const NARROW: f64 = 5.0;

pub(super) fn corners(area: Rect) -> [[f64; 2]; 4] {
    [
        [area.left, area.bottom],
        [area.right, area.bottom],
        [area.right, area.top],
        [area.left, area.top],
    ]
}

/// The tinted stretches, beneath everything.
pub(super) fn ranges(scene: &mut Scene, occupied: &mut Occupied, placed: &Placed<'_>) {
    for layer in &placed.panel.layers {
        let Layer::Range(range) = layer else { continue };
        let Some(area) = stretch(placed, range.from, range.to) else {
            continue;
        };
        scene.area(&corners(area), Ink::Tint);
        // An edge that is the frame's own is no end of the range.
        for x in [area.left, area.right] {
            if placed.area.left < x && x < placed.area.right {
                let edge = [[x, area.top], [x, area.bottom]];
                scene.line(&edge, Ink::Grey, 0.8);
                occupied.add_edge(edge);
            }
        }
    }
}

/// What of a stretch of the horizontal axis lies within the frame.
pub(super) fn stretch(placed: &Placed<'_>, from: f64, to: f64) -> Option<Rect> {
    let (from, to) = (placed.x(from.min(to)), placed.x(from.max(to)));
    let area = Rect {
        left: from.max(placed.area.left),
        right: to.min(placed.area.right),
        ..placed.area
    };
    (area.left < area.right).then_some(area)
}

/// Bands and histograms.
pub(super) fn draw(scene: &mut Scene, occupied: &mut Occupied, placed: &Placed<'_>) {
    for layer in &placed.panel.layers {
        match layer {
            Layer::Band(band) => draw_band(scene, placed, band),
            Layer::Histogram(histogram) => draw_histogram(scene, occupied, placed, histogram),
            _ => {}
        }
    }
}

fn draw_band(scene: &mut Scene, placed: &Placed<'_>, band: &Band) {
    let ink = dashes::ink(band.stroke);
    for piece in &band.pieces {
        let is_finite = |edge: &&[f64; 3]| edge.iter().all(|x| x.is_finite());
        let edge = |which: usize| -> Vec<[f64; 2]> {
            let edges = piece.iter().filter(is_finite);
            edges.map(|e| placed.point([e[0], e[which]])).collect()
        };
        let (low, high) = (edge(1), edge(2));
        let around: Vec<[f64; 2]> = low.iter().chain(high.iter().rev()).copied().collect();
        let points = clip::area(&around, placed.area);
        if points.len() > 2 {
            scene.items.push(Item::Wash { points, ink });
        }
        for edge in [low, high] {
            for points in clip::line(&edge, placed.area) {
                scene.line(&points, ink, 0.6);
            }
        }
    }
}

/// Ends and heights of the bins.
pub(super) fn bins(histogram: &Histogram) -> impl Iterator<Item = ([f64; 2], f64)> + '_ {
    let ends = histogram.edges.windows(2).map(|ends| [ends[0], ends[1]]);
    ends.zip(histogram.heights.iter().copied())
        .filter(|([from, to], height)| from < to && height.is_finite())
}

fn draw_histogram(
    scene: &mut Scene,
    occupied: &mut Occupied,
    placed: &Placed<'_>,
    histogram: &Histogram,
) {
    let ground = placed.area.bottom;
    let zero = placed.y(0.0).min(ground);
    let mut outline: Vec<[f64; 2]> = Vec::new();
    for ([from, to], height) in bins(histogram) {
        let (left, right, top) = (placed.x(from), placed.x(to), placed.y(height));
        let bar = [[left, zero], [left, top], [right, top], [right, zero]];
        let points = clip::area(&bar, placed.area);
        if height != 0.0 && points.len() > 2 {
            scene.area(&points, Ink::Bar);
        }
        // Where bins do not touch, the outline goes to the ground between them.
        if outline
            .last()
            .is_none_or(|last| (last[0] - left).abs() > 0.01)
        {
            outline.extend(outline.last().map(|last| [last[0], zero]));
            outline.push([left, zero]);
        }
        outline.extend([[left, top], [right, top]]);
        if right - left > NARROW && outline.len() > 3 {
            let between = [[left, zero], [left, top]];
            for points in clip::line(&between, placed.area) {
                scene.line(&points, Ink::Solid, 0.5);
            }
        }
    }
    outline.extend(outline.last().map(|last| [last[0], zero]));
    for points in clip::line(&outline, placed.area) {
        scene.line(&points, Ink::Solid, OUTLINE);
        occupied.add_curve(points);
    }
}
