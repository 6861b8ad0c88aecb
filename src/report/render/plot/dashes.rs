//! How lines of each stroke are broken, so that they differ in print.

use super::scene::{Ink, Item, Scene};
use crate::report::figure::Stroke;

const DASH: (f64, f64) = (9.0, 5.0);
const DOTS: (f64, f64) = (2.2, 3.6);
/// Dash, space, dot, space.
const DASH_DOT: [f64; 4] = [11.0, 4.0, 2.2, 4.0];

pub(super) fn ink(stroke: Stroke) -> Ink {
    match stroke {
        Stroke::Solid => Ink::Solid,
        Stroke::Dashed => Ink::Dashed,
        Stroke::Dotted => Ink::Dotted,
        Stroke::DashDotted => Ink::DashDotted,
    }
}

/// Draws a line of a stroke in that stroke's ink.
pub(super) fn stroke(scene: &mut Scene, points: &[[f64; 2]], stroke: Stroke, width: f64) {
    let ink = ink(stroke);
    let mut push = |points: Vec<[f64; 2]>, dashes| {
        scene.items.push(Item::Line {
            points,
            ink,
            width,
            dashes,
        });
    };
    match stroke {
        Stroke::Solid => push(points.to_vec(), None),
        Stroke::Dashed => push(points.to_vec(), Some(DASH)),
        Stroke::Dotted => push(points.to_vec(), Some(DOTS)),
        Stroke::DashDotted => {
            for piece in broken(points, &DASH_DOT) {
                push(piece, None);
            }
        }
    }
}

/// The drawn pieces of a line by a pattern of lengths, drawn and left out in turn.
pub(super) fn broken(points: &[[f64; 2]], pattern: &[f64]) -> Vec<Vec<[f64; 2]>> {
    let mut pieces = Vec::new();
    let Some(first) = points.first() else {
        return pieces;
    };
    let mut turn = 0;
    let mut left = pattern[0];
    let mut piece = vec![*first];
    for pair in points.windows(2) {
        let [mut from, to] = [pair[0], pair[1]];
        loop {
            let length = (to[0] - from[0]).hypot(to[1] - from[1]);
            let is_drawn = turn % 2 == 0;
            if length < left {
                left -= length;
                if is_drawn {
                    piece.push(to);
                }
                break;
            }
            let share = left / length;
            from = [
                from[0] + share * (to[0] - from[0]),
                from[1] + share * (to[1] - from[1]),
            ];
            if is_drawn {
                piece.push(from);
                pieces.push(std::mem::take(&mut piece));
            } else {
                piece = vec![from];
            }
            turn = (turn + 1) % pattern.len();
            left = pattern[turn];
        }
    }
    if piece.len() > 1 {
        pieces.push(piece);
    }
    pieces
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn a_pattern_goes_round_corners() {
        let line = [[0.0, 0.0], [3.0, 0.0], [3.0, 9.0]];
        let pieces = broken(&line, &[4.0, 2.0, 1.0, 2.0]);
        let ends: Vec<[[f64; 2]; 2]> = pieces.iter().map(|p| [p[0], p[p.len() - 1]]).collect();
        assert_eq!(
            ends,
            [
                [[0.0, 0.0], [3.0, 1.0]],
                [[3.0, 3.0], [3.0, 4.0]],
                [[3.0, 6.0], [3.0, 9.0]]
            ]
        );
    }
}
