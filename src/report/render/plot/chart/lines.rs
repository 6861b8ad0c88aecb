//! Lines and marks: reference lines, sticks, curves, points.

use super::frame::Placed;
use super::labels::Unnamed;
use crate::report::chart::{Across, Curve, Layer, Meaning, Points, Reference, Stick};
use crate::report::figure::Stroke;
use crate::report::render::plot::clip;
use crate::report::render::plot::curves::{self, DOT, LINE};
use crate::report::render::plot::dashes;
use crate::report::render::plot::place::Occupied;
use crate::report::render::plot::scene::{Ink, Item, Rect, Scene};

/// Distance, length of the little lines on the forbidden side of a limit.
const HATCH: (f64, f64) = (12.0, 7.0);
/// How much wider the paper around a line over a map is.
const CASING: f64 = 2.0;
/// Half the width of the ends of error bars.
const CAP: f64 = 3.0;
/// More sticks than this have no dots on their heads.
const MANY_STICKS: usize = 80;

/// Draws all lines and marks.
pub(super) fn draw(
    scene: &mut Scene,
    occupied: &mut Occupied,
    placed: &Placed<'_>,
    unnamed: &mut Unnamed,
) {
    for layer in &placed.panel.layers {
        match layer {
            Layer::Reference(line) => reference(scene, occupied, placed, line, unnamed),
            Layer::Sticks(sticks) => draw_sticks(scene, occupied, placed, sticks),
            _ => {}
        }
    }
    for layer in &placed.panel.layers {
        if let Layer::Curve(curve) = layer {
            for points in visible(placed, curve) {
                if placed.has_map() {
                    scene.line(&points, Ink::Paper, LINE + CASING);
                }
                dashes::stroke(scene, &points, curve.stroke, LINE);
                occupied.add_curve(points);
            }
        }
    }
    for layer in &placed.panel.layers {
        match layer {
            Layer::Points(points) => draw_points(scene, occupied, placed, points),
            Layer::Mark(mark) => {
                for (stroke, at) in &mark.places {
                    let at = placed.point(*at);
                    if is_within(placed.area, at) {
                        if placed.has_map() {
                            scene.items.push(Item::Dot {
                                at,
                                radius: DOT + 0.8 * CASING,
                                ink: Ink::Paper,
                                filled: true,
                            });
                        }
                        curves::dot(scene, at, *stroke);
                        occupied.add_box(around(at, DOT));
                    }
                }
            }
            _ => {}
        }
    }
}

/// What of a curve lies within the frame, in pixels.
pub(super) fn visible(placed: &Placed<'_>, curve: &Curve) -> Vec<Vec<[f64; 2]>> {
    let pieces = curve.pieces.iter().flat_map(|piece| {
        piece
            .split(|[x, y]| x.is_nan() || y.is_nan())
            .map(|piece| thinned(piece.iter().map(|point| placed.point(*point))))
    });
    pieces
        .flat_map(|points| clip::line(&points, placed.area))
        .collect()
}

/// Without samples closer than the eye can tell, which only make files large.
fn thinned(points: impl Iterator<Item = [f64; 2]>) -> Vec<[f64; 2]> {
    let mut kept: Vec<[f64; 2]> = Vec::new();
    for point in points {
        let is_new = kept
            .last()
            .is_none_or(|[x, y]| (point[0] - x).abs() + (point[1] - y).abs() > 0.05);
        if is_new {
            kept.push(point);
        }
    }
    kept
}

pub(super) fn is_within(area: Rect, [x, y]: [f64; 2]) -> bool {
    (area.left..=area.right).contains(&x) && (area.top..=area.bottom).contains(&y)
}

pub(super) fn around([x, y]: [f64; 2], reach: f64) -> Rect {
    Rect {
        left: x - reach,
        right: x + reach,
        top: y - reach,
        bottom: y + reach,
    }
}

/// The ink of what is written at a line.
pub(super) fn label_ink(meaning: Meaning) -> Ink {
    match meaning {
        Meaning::Nominal | Meaning::Guide => Ink::Black,
        Meaning::AtMost | Meaning::AtLeast => Ink::Alarm,
    }
}

fn reference(
    scene: &mut Scene,
    occupied: &mut Occupied,
    placed: &Placed<'_>,
    line: &Reference,
    unnamed: &mut Unnamed,
) {
    let area = placed.area;
    // Upright lines run downwards: larger values then lie to the left of the way, as they do of
    // lines from left to right.
    let points = match line.across {
        Across::X => {
            let x = placed.x(line.at);
            [[x, area.top], [x, area.bottom]]
        }
        Across::Y => {
            let y = placed.y(line.at);
            [[area.left, y], [area.right, y]]
        }
    };
    if !line.at.is_finite() || !points.iter().all(|point| is_within(area, *point)) {
        if !line.label.is_empty() {
            unnamed.outside(&line.label, placed);
        }
        return;
    }
    meant(scene, area, &points, line.meaning, placed.has_map());
    occupied.add_curve(points.to_vec());
}

/// Draws a line by what it means; larger values lie to the left of its way.
pub(super) fn meant(
    scene: &mut Scene,
    area: Rect,
    points: &[[f64; 2]],
    meaning: Meaning,
    on_map: bool,
) {
    let dashes_of_limits = (!on_map).then_some((9.0, 3.0));
    let (ink, width, dashes) = match meaning {
        Meaning::Nominal => (Ink::Black, 1.3, None),
        Meaning::Guide if on_map => (Ink::Black, 1.2, None),
        Meaning::Guide => (Ink::Grey, 1.1, Some((4.0, 3.0))),
        Meaning::AtMost | Meaning::AtLeast => (Ink::Alarm, 1.6, dashes_of_limits),
    };
    let hatching = match meaning {
        Meaning::AtMost => hatching(points, 1.0),
        Meaning::AtLeast => hatching(points, -1.0),
        Meaning::Nominal | Meaning::Guide => Vec::new(),
    };
    let hatching: Vec<Vec<[f64; 2]>> = hatching
        .iter()
        .flat_map(|tick| clip::line(tick, area))
        .collect();
    if on_map {
        scene.line(points, Ink::Paper, width + CASING);
        for tick in &hatching {
            scene.line(tick, Ink::Paper, 1.0 + CASING);
        }
    }
    scene.items.push(Item::Line {
        points: points.to_vec(),
        ink,
        width,
        dashes,
    });
    for tick in &hatching {
        scene.line(tick, ink, 1.0);
    }
}

/// Little slanted lines on one side of a line: 1 for the left of its way, −1 for the right.
fn hatching(points: &[[f64; 2]], side: f64) -> Vec<[[f64; 2]; 2]> {
    let (distance, length) = HATCH;
    let mut found = Vec::new();
    let mut until = 0.5 * distance;
    for pair in points.windows(2) {
        let [dx, dy] = [pair[1][0] - pair[0][0], pair[1][1] - pair[0][1]];
        let whole = dx.hypot(dy);
        while until < whole {
            let share = until / whole;
            let foot = [pair[0][0] + share * dx, pair[0][1] + share * dy];
            let [along, across] = [[dx / whole, dy / whole], [dy / whole, -dx / whole]];
            let tip = [0, 1]
                .map(|axis| foot[axis] + length * (0.7 * along[axis] + 0.7 * side * across[axis]));
            found.push([foot, tip]);
            until += distance;
        }
        until -= whole;
    }
    found
}

/// Where sticks and bars begin: at zero, or at the foot of the frame.
fn ground(placed: &Placed<'_>) -> f64 {
    placed.y(0.0).clamp(placed.area.top, placed.area.bottom)
}

fn draw_sticks(scene: &mut Scene, occupied: &mut Occupied, placed: &Placed<'_>, sticks: &[Stick]) {
    let ground = ground(placed);
    let is_log = placed.panel.y.as_ref().is_some_and(|axis| axis.from > 0.0);
    let foot = if is_log { placed.area.bottom } else { ground };
    for stick in sticks.iter().filter(|stick| stick.height.is_finite()) {
        let [x, y] = placed.point([stick.at, stick.height]);
        for points in clip::line(&[[x, foot], [x, y]], placed.area) {
            dashes::stroke(scene, &points, stick.stroke, 1.8);
            occupied.add_curve(points);
        }
        if sticks.len() <= MANY_STICKS && is_within(placed.area, [x, y]) {
            curves::dot(scene, [x, y], stick.stroke);
            occupied.add_box(around([x, y], DOT));
        }
    }
}

fn draw_points(scene: &mut Scene, occupied: &mut Occupied, placed: &Placed<'_>, points: &Points) {
    let ink = dashes::ink(points.stroke);
    for point in &points.points {
        let [x, y] = placed.point([point.x, point.y]);
        let mut bars = Vec::new();
        if let Some([from, to]) = point.y_range {
            let (from, to) = (placed.y(from), placed.y(to));
            bars.push([[x, from], [x, to]]);
            bars.extend([from, to].map(|y| [[x - CAP, y], [x + CAP, y]]));
        }
        if let Some([from, to]) = point.x_range {
            let (from, to) = (placed.x(from), placed.x(to));
            bars.push([[from, y], [to, y]]);
            bars.extend([from, to].map(|x| [[x, y - CAP], [x, y + CAP]]));
        }
        for points in bars.iter().flat_map(|bar| clip::line(bar, placed.area)) {
            scene.line(&points, ink, 1.0);
            occupied.add_curve(points);
        }
        if is_within(placed.area, [x, y]) {
            shape(scene, [x, y], points.stroke);
            occupied.add_box(around([x, y], DOT));
        }
    }
}

/// A shape for each stroke: a disc, a ring, and the same with corners.
pub(super) fn shape(scene: &mut Scene, [x, y]: [f64; 2], stroke: Stroke) {
    const REACH: f64 = 4.2;
    if matches!(stroke, Stroke::Solid | Stroke::Dashed) {
        return curves::dot(scene, [x, y], stroke);
    }
    let ink = dashes::ink(stroke);
    let corners = [
        [x - REACH, y],
        [x, y - REACH],
        [x + REACH, y],
        [x, y + REACH],
    ];
    let is_filled = stroke == Stroke::Dotted;
    scene.area(&corners, if is_filled { ink } else { Ink::Paper });
    let mut outline = corners.to_vec();
    outline.push(corners[0]);
    scene.line(&outline, ink, 1.4);
}
