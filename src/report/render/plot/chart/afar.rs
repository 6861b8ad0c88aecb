//! The name of a curve that has no room at it: farther away, with a line to it that crosses no
//! other curve.

use crate::report::figure::Stroke;
use crate::report::render::plot::curves::LINE;
use crate::report::render::plot::dashes;
use crate::report::render::plot::names::{LABEL, SAMPLE};
use crate::report::render::plot::place::{Candidate, Occupied};
use crate::report::render::plot::scene::{Anchor, Ink, Rect, Scene};
use crate::report::render::plot::text;

/// How far away, from near to far.
const STEPS: [f64; 6] = [26.0, 36.0, 50.0, 70.0, 95.0, 125.0];
/// Places along a curve at which it may be named.
const PLACES: usize = 24;

/// Writes a curve's name; gives back whether there was room.
pub(super) fn name_curve(
    scene: &mut Scene,
    occupied: &mut Occupied,
    within: Rect,
    pieces: &[Vec<[f64; 2]>],
    others: &[Vec<[f64; 2]>],
    (label, style): (&str, Stroke),
) -> bool {
    let half = [
        0.5 * (SAMPLE + 6.0 + text::length(label, LABEL)),
        0.5 * text::height(LABEL),
    ];
    let points: Vec<[f64; 2]> = pieces.iter().flatten().copied().collect();
    let feet = (1..PLACES).filter_map(|place| points.get(place * points.len() / PLACES));
    let feet: Vec<[f64; 2]> = feet.copied().collect();
    let candidates = STEPS.iter().flat_map(|step| {
        feet.iter().flat_map(move |[x, y]| {
            [-1.0, 1.0].into_iter().flat_map(move |down| {
                [0.0, 0.4, -0.4, 0.8, -0.8].map(|aside| {
                    let (cx, cy) = (x + aside * half[0], y + down * step);
                    Candidate {
                        area: Rect {
                            left: cx - half[0],
                            right: cx + half[0],
                            top: cy - half[1],
                            bottom: cy + half[1],
                        },
                        leader: Some([[*x, *y], [*x, cy - down * (half[1] + 1.0)]]),
                    }
                })
            })
        })
    });
    let crosses_none = |candidate: &Candidate| {
        candidate.leader.is_some_and(|[from, to]| {
            let thin = Rect {
                left: from[0] - 0.5,
                right: from[0] + 0.5,
                top: from[1].min(to[1]) - 3.0,
                bottom: from[1].max(to[1]) + 3.0,
            };
            let mut lines = others.iter().flat_map(|line| line.windows(2));
            !lines.any(|pair| thin.meets(pair[0], pair[1]))
        })
    };
    let clear = candidates.filter(crosses_none);
    let Some(chosen) = occupied.take_clear(within.grown(-2.0), clear) else {
        return false;
    };
    if let Some(leader) = chosen.leader {
        scene.line(&leader, Ink::Grey, 0.8);
    }
    let area = chosen.area;
    let y = 0.5 * (area.top + area.bottom);
    let sample = [[area.left, y], [area.left + SAMPLE, y]];
    dashes::stroke(scene, &sample, style, LINE);
    let at = [area.left + SAMPLE + 6.0, y];
    scene.text(at, Anchor::Start, LABEL, Ink::Black, label);
    true
}
