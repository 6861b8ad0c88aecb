//! Curves, apertures and marks within the panels, and what is written at them.

use super::layout::Placed;
use super::place::{Candidate, Occupied};
use super::scene::{Anchor, Ink, Item, Rect, Scene};
use super::text;
use crate::report::figure::{Glyph, Stroke};

const LABEL: f64 = 12.5;
const WAIST: f64 = 11.0;
const LINE: f64 = 2.0;
const DASH: (f64, f64) = (9.0, 5.0);
const DOT: f64 = 3.2;
/// Length of the piece of line before a curve's name.
const SAMPLE: f64 = 30.0;
/// Heights at which a waist's radius may stand, from near to far.
const STEPS: [f64; 11] = [
    13.0, 20.0, 28.0, 40.0, 54.0, 70.0, 88.0, 108.0, 130.0, 160.0, 200.0,
];

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
            let at = placed.point(*at);
            for (ink, filled) in match stroke {
                Stroke::Solid => [(Ink::Solid, true), (Ink::Solid, false)],
                Stroke::Dashed => [(Ink::Paper, true), (Ink::Dashed, false)],
            } {
                scene.items.push(Item::Dot {
                    at,
                    radius: DOT,
                    ink,
                    filled,
                });
            }
        }
    }
}

fn stroke(scene: &mut Scene, points: &[[f64; 2]], stroke: Stroke, width: f64) {
    let (ink, dashes) = match stroke {
        Stroke::Solid => (Ink::Solid, None),
        Stroke::Dashed => (Ink::Dashed, Some(DASH)),
    };
    scene.items.push(Item::Line {
        points: points.to_vec(),
        ink,
        width,
        dashes,
    });
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

/// Writes the radii of waists, then the names of the curves; gives back how many radii found no
/// room.
pub(super) fn name(scene: &mut Scene, occupied: &mut Occupied, panels: &[Placed<'_>]) -> usize {
    for placed in panels {
        for (_, at) in placed.panel.marks.iter().flat_map(|mark| &mark.places) {
            let [x, y] = placed.point(*at);
            let dot = Rect {
                left: x - DOT,
                right: x + DOT,
                top: y - DOT,
                bottom: y + DOT,
            };
            occupied.add_box(dot);
        }
    }
    let mut named: Vec<&str> = Vec::new();
    // The widest panel first: a curve is named once.
    let mut by_width: Vec<&Placed<'_>> = panels.iter().collect();
    by_width.sort_by(|a, b| b.panel.share.total_cmp(&a.panel.share));
    for placed in by_width {
        for curve in &placed.panel.curves {
            if !named.contains(&curve.label.as_str())
                && name_curve(scene, occupied, placed, &curve.label, curve.stroke)
            {
                named.push(&curve.label);
            }
        }
    }
    let mut unnamed = 0;
    for placed in panels {
        for mark in &placed.panel.marks {
            let points = mark.places.iter().map(|(_, at)| placed.point(*at));
            let corner = points.reduce(|a, b| [0.5 * (a[0] + b[0]), a[1].max(b[1])]);
            if !corner.is_some_and(|at| name_mark(scene, occupied, placed, at, &mark.label)) {
                unnamed += 1;
            }
        }
    }
    unnamed
}

fn name_mark(
    scene: &mut Scene,
    occupied: &mut Occupied,
    placed: &Placed<'_>,
    [x, y]: [f64; 2],
    label: &str,
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
    let Some(chosen) = occupied.take(placed.area.grown(-2.0), candidates) else {
        return false;
    };
    if let Some(leader) = chosen.leader {
        scene.line(&leader, Ink::Grey, 0.7);
    }
    let middle = 0.5 * (chosen.area.top + chosen.area.bottom);
    let at = [chosen.area.left, middle];
    scene.text(at, Anchor::Start, WAIST, Ink::Black, label);
    true
}

fn name_curve(
    scene: &mut Scene,
    occupied: &mut Occupied,
    placed: &Placed<'_>,
    label: &str,
    style: Stroke,
) -> bool {
    const PLACES: i32 = 40;
    const STEEP: f64 = 60.0;
    let points: Vec<[f64; 2]> = placed
        .panel
        .curves
        .iter()
        .filter(|curve| curve.label == label)
        .flat_map(|curve| curve.points.iter().map(|point| placed.point(*point)))
        .collect();
    let length = SAMPLE + 6.0 + text::length(label, LABEL);
    let half = 0.5 * text::height(LABEL);
    let width = placed.area.right - placed.area.left;
    // From the middle outwards, because the ends are crowded with optics.
    let mut shares: Vec<f64> = (1..PLACES)
        .map(|place| f64::from(place) / f64::from(PLACES))
        .collect();
    shares.sort_by(|a, b| (a - 0.5).abs().total_cmp(&(b - 0.5).abs()));
    let up_first = match style {
        Stroke::Solid => [-1.0, 1.0],
        Stroke::Dashed => [1.0, -1.0],
    };
    let candidates: Vec<Candidate> = [14.0, 18.0, 24.0]
        .into_iter()
        .flat_map(|step| up_first.map(|side| (step, side)))
        .flat_map(|(step, side)| shares.iter().map(move |share| (step, side, *share)))
        .filter_map(|(step, side, share)| {
            let x = placed.area.left + share * width;
            let height = |x: f64| points.iter().find(|p| p[0] >= x).map(|p| p[1]);
            let (here, before, after) = (
                height(x)?,
                height(x - 0.5 * length)?,
                height(x + 0.5 * length)?,
            );
            // Beside a steep curve a name seems to belong to nothing.
            if (before - here).abs().max((after - here).abs()) > STEEP {
                return None;
            }
            let y = here + side * step;
            Some(Candidate {
                area: Rect {
                    left: x - 0.5 * length,
                    right: x + 0.5 * length,
                    top: y - half,
                    bottom: y + half,
                },
                leader: None,
            })
        })
        .collect();
    let Some(chosen) = occupied.take(placed.area.grown(-2.0), candidates) else {
        return false;
    };
    let area = chosen.area;
    let y = 0.5 * (area.top + area.bottom);
    let sample = [[area.left, y], [area.left + SAMPLE, y]];
    stroke(scene, &sample, style, LINE);
    let at = [area.left + SAMPLE + 6.0, y];
    scene.text(at, Anchor::Start, LABEL, Ink::Black, label);
    true
}
