//! What is written at curves and marks: the radii of waists, then the names of the curves.

use super::curves::{DOT, LINE};
use super::dashes::stroke;
use super::layout::Placed;
use super::place::{Candidate, Occupied};
use super::scene::{Anchor, Ink, Rect, Scene};
use super::text;
use crate::report::figure::{Curve, Stroke};

pub(super) const LABEL: f64 = 12.5;
const WAIST: f64 = 11.0;
/// How near another line makes it doubtful whose name it is.
const NEAR: f64 = 12.0;
/// Length of the piece of line before a curve's name.
pub(super) const SAMPLE: f64 = 30.0;
/// Heights at which a waist's radius may stand, from near to far.
const STEPS: [f64; 11] = [
    13.0, 20.0, 28.0, 40.0, 54.0, 70.0, 88.0, 108.0, 130.0, 160.0, 200.0,
];

/// Writes what finds room; gives back notes about what does not.
pub(super) fn write(
    scene: &mut Scene,
    occupied: &mut Occupied,
    panels: &[Placed<'_>],
) -> Vec<String> {
    for placed in panels {
        for (_, at) in placed.panel.marks.iter().flat_map(|mark| &mark.places) {
            let [x, y] = placed.point(*at);
            let dot = Rect {
                left: x,
                right: x,
                top: y,
                bottom: y,
            };
            occupied.add_box(dot.grown(DOT));
        }
    }
    let mut notes = Vec::new();
    match write_marks(scene, occupied, panels) {
        0 => {}
        1 => notes.push("one waist is marked without its radius, for want of room".into()),
        n => notes.push(format!(
            "{n} waists are marked without their radius, for want of room"
        )),
    }
    for curve in write_curves(scene, occupied, panels) {
        notes.push(format!("{} line: {}", curve.stroke.name(), curve.label));
    }
    notes
}

/// Gives back how many marks found no room for their label.
fn write_marks(scene: &mut Scene, occupied: &mut Occupied, panels: &[Placed<'_>]) -> usize {
    let mut unnamed = 0;
    for placed in panels {
        for mark in &placed.panel.marks {
            let points = mark.places.iter().map(|(_, at)| placed.point(*at));
            let lowest = points.reduce(|a, b| [0.5 * (a[0] + b[0]), a[1].max(b[1])]);
            if !lowest.is_some_and(|at| {
                name_mark(scene, occupied, placed.area, at, &mark.label, Ground::Never)
            }) {
                unnamed += 1;
            }
        }
    }
    unnamed
}

/// Gives back the curves that found no room for their name.
fn write_curves<'a>(
    scene: &mut Scene,
    occupied: &mut Occupied,
    panels: &[Placed<'a>],
) -> Vec<&'a Curve> {
    // The widest panel first: a curve is named once.
    let mut by_width: Vec<&Placed<'a>> = panels.iter().collect();
    by_width.sort_by(|a, b| b.panel.share.total_cmp(&a.panel.share));
    let mut named: Vec<&str> = Vec::new();
    let mut unnamed: Vec<&Curve> = Vec::new();
    for placed in by_width {
        for curve in &placed.panel.curves {
            if named.contains(&curve.label.as_str()) {
                continue;
            }
            let points: Vec<[f64; 2]> = placed
                .panel
                .curves
                .iter()
                .filter(|other| other.label == curve.label)
                .flat_map(|curve| curve.points.iter().map(|point| placed.point(*point)))
                .collect();
            let name = (curve.label.as_str(), curve.stroke);
            if name_curve(
                scene,
                occupied,
                placed.area,
                (&points, &[]),
                name,
                Ground::Never,
            ) {
                named.push(&curve.label);
                unnamed.retain(|other| other.label != curve.label);
            } else if !unnamed.iter().any(|other| other.label == curve.label) {
                unnamed.push(curve);
            }
        }
    }
    unnamed
}

/// Writes what a mark means near it, with a line to it where it is far.
pub(super) fn name_mark(
    scene: &mut Scene,
    occupied: &mut Occupied,
    within: Rect,
    [x, y]: [f64; 2],
    label: &str,
    ground: Ground,
) -> bool {
    let length = text::length(label, WAIST);
    let half = 0.5 * text::height(WAIST);
    let candidates = STEPS.into_iter().flat_map(|step| {
        [1.0, -1.0].into_iter().flat_map(move |down| {
            [0.0, 0.35, -0.35, 0.6, -0.6].into_iter().map(move |aside| {
                let (cx, cy) = (x + aside * length, y + down * step);
                let area = Rect {
                    left: cx - 0.5 * length,
                    right: cx + 0.5 * length,
                    top: cy - half,
                    bottom: cy + half,
                };
                let foot = [x, y + down * (DOT + 1.0)];
                let head = [cx.clamp(area.left, area.right), cy - down * (half + 2.0)];
                Candidate {
                    area,
                    leader: (step > 25.0).then_some([foot, head]),
                }
            })
        })
    });
    let Some(chosen) = occupied.take(within.grown(-2.0), candidates) else {
        return false;
    };
    if let Some(leader) = chosen.leader {
        scene.line(&leader, Ink::Grey, 0.7);
    }
    ground.lay(scene, occupied, chosen.area);
    let middle = 0.5 * (chosen.area.top + chosen.area.bottom);
    let (at, anchor) = if ground == Ground::Never {
        (chosen.area.left, Anchor::Start)
    } else {
        (0.5 * (chosen.area.left + chosen.area.right), Anchor::Middle)
    };
    scene.text([at, middle], anchor, WAIST, Ink::Black, label);
    true
}

/// Writes a curve's name over, under or beside it, with a piece of its line.
///
/// The points run from left to right, closely. A place that is as near to another line is only
/// the second choice.
pub(super) fn name_curve(
    scene: &mut Scene,
    occupied: &mut Occupied,
    within: Rect,
    (points, others): (&[[f64; 2]], &[Vec<[f64; 2]>]),
    (label, style): (&str, Stroke),
    ground: Ground,
) -> bool {
    const PLACES: i32 = 40;
    const STEEP: f64 = 60.0;
    let length = SAMPLE + 6.0 + text::length(label, LABEL);
    let half = 0.5 * text::height(LABEL);
    let width = within.right - within.left;
    // From the middle outwards, because the ends are crowded with optics.
    let mut shares: Vec<f64> = (1..PLACES)
        .map(|place| f64::from(place) / f64::from(PLACES))
        .collect();
    shares.sort_by(|a, b| (a - 0.5).abs().total_cmp(&(b - 0.5).abs()));
    let up_first = match style {
        Stroke::Solid | Stroke::Dotted => [-1.0, 1.0],
        Stroke::Dashed | Stroke::DashDotted => [1.0, -1.0],
    };
    let height = |x: f64| points.iter().find(|p| p[0] >= x).map(|p| p[1]);
    let at = |x: f64, y: f64| Candidate {
        area: Rect {
            left: x - 0.5 * length,
            right: x + 0.5 * length,
            top: y - half,
            bottom: y + half,
        },
        leader: None,
    };
    let mut candidates: Vec<Candidate> = Vec::new();
    for (step, side) in [14.0, 18.0, 24.0]
        .into_iter()
        .flat_map(|step| up_first.map(|side| (step, side)))
    {
        candidates.extend(shares.iter().filter_map(|share| {
            let x = within.left + share * width;
            let ends = [height(x - 0.5 * length)?, height(x + 0.5 * length)?];
            let here = height(x)?;
            // Over or under a steep curve a name seems to belong to nothing.
            let is_steep = ends.iter().any(|end| (end - here).abs() > STEEP);
            (!is_steep).then(|| at(x, here + side * step))
        }));
    }
    // Beside a steep curve there is room where over and under it there is none.
    for side in [1.0, -1.0] {
        candidates.extend(shares.iter().filter_map(|share| {
            let x = within.left + share * width;
            Some(at(x + side * (0.5 * length + 10.0), height(x)?))
        }));
    }
    let is_plain = |area: Rect| {
        let area = area.grown(NEAR);
        let mut pieces = others.iter().flat_map(|line| line.windows(2));
        !pieces.any(|pair| area.meets(pair[0], pair[1]))
    };
    let plain: Vec<Candidate> = candidates
        .iter()
        .copied()
        .filter(|candidate| is_plain(candidate.area))
        .collect();
    let within = within.grown(-2.0);
    let Some(chosen) = occupied
        .take_clear(within, plain)
        .or_else(|| occupied.take_clear(within, candidates))
    else {
        return false;
    };
    let area = chosen.area;
    ground.lay(scene, occupied, area);
    let y = 0.5 * (area.top + area.bottom);
    let sample = [[area.left, y], [area.left + SAMPLE, y]];
    stroke(scene, &sample, style, LINE);
    let at = [area.left + SAMPLE + 6.0, y];
    scene.text(at, Anchor::Start, LABEL, Ink::Black, label);
    true
}

/// When a label has paper behind it.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub(super) enum Ground {
    /// Where curves may be seen through it.
    Never,
    /// Where it would lie over a curve.
    OverCurves,
    /// Over a map.
    Always,
}

impl Ground {
    /// Lays the paper where it is needed.
    pub(super) fn lay(self, scene: &mut Scene, occupied: &Occupied, area: Rect) {
        let is_needed = match self {
            Ground::Never => false,
            Ground::OverCurves => occupied.hides(area),
            Ground::Always => true,
        };
        if !is_needed {
            return;
        }
        let area = area.grown(1.5);
        let corners = [
            [area.left, area.bottom],
            [area.right, area.bottom],
            [area.right, area.top],
            [area.left, area.top],
        ];
        scene.area(&corners, Ink::Paper);
    }
}
