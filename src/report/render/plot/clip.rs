//! What lies within a frame of a line or an area that may leave it.

use super::scene::Rect;

/// The pieces of a line within a rectangle, cut exactly at its edges.
pub(super) fn line(points: &[[f64; 2]], within: Rect) -> Vec<Vec<[f64; 2]>> {
    let mut pieces: Vec<Vec<[f64; 2]>> = Vec::new();
    let mut is_open = false;
    for pair in points.windows(2) {
        let [a, b] = [pair[0], pair[1]];
        let Some([from, to]) = shares(a, b, within) else {
            is_open = false;
            continue;
        };
        let at = |share: f64| {
            // Rounding does not leave the frame either.
            let [x, y] = [0, 1].map(|axis| a[axis] + share * (b[axis] - a[axis]));
            [
                x.clamp(within.left, within.right),
                y.clamp(within.top, within.bottom),
            ]
        };
        if !(is_open && from == 0.0) {
            pieces.push(vec![at(from)]);
        }
        if let Some(piece) = pieces.last_mut() {
            piece.push(at(to));
        }
        is_open = to == 1.0;
    }
    pieces
}

/// From which to which share of its length a straight line lies within.
fn shares(a: [f64; 2], b: [f64; 2], within: Rect) -> Option<[f64; 2]> {
    let (mut from, mut to) = (0.0_f64, 1.0_f64);
    let bounds = [[within.left, within.right], [within.top, within.bottom]];
    for axis in [0, 1] {
        let (start, step) = (a[axis], b[axis] - a[axis]);
        let [low, high] = bounds[axis];
        if step == 0.0 {
            if !(low..=high).contains(&start) {
                return None;
            }
            continue;
        }
        let (one, other) = ((low - start) / step, (high - start) / step);
        from = from.max(one.min(other));
        to = to.min(one.max(other));
    }
    (from <= to).then_some([from, to])
}

/// The part of a polygon within a rectangle; parts that hang together only outside are joined
/// along the edge.
pub(super) fn area(points: &[[f64; 2]], within: Rect) -> Vec<[f64; 2]> {
    let edges = [
        (0, within.left, 1.0),
        (0, within.right, -1.0),
        (1, within.top, 1.0),
        (1, within.bottom, -1.0),
    ];
    edges
        .into_iter()
        .fold(points.to_vec(), |points, (axis, edge, inwards)| {
            let depth = |point: [f64; 2]| inwards * (point[axis] - edge);
            let mut kept = Vec::with_capacity(points.len() + 4);
            let last = points.last().copied();
            let mut before = last;
            for point in points {
                if let Some(before) = before {
                    let (there, here) = (depth(before), depth(point));
                    if (there < 0.0) != (here < 0.0) {
                        let share = there / (there - here);
                        let mut cut = [0, 1].map(|k| before[k] + share * (point[k] - before[k]));
                        cut[axis] = edge;
                        kept.push(cut);
                    }
                }
                if depth(point) >= 0.0 {
                    kept.push(point);
                }
                before = Some(point);
            }
            kept
        })
}

#[cfg(test)]
mod tests {
    use super::*;

    const FRAME: Rect = Rect {
        left: 0.0,
        top: 0.0,
        right: 10.0,
        bottom: 10.0,
    };

    #[test]
    fn a_line_is_cut_at_the_frame_and_comes_back_in_a_piece_of_its_own() {
        let zigzag = [[-5.0, 5.0], [5.0, 5.0], [5.0, 25.0], [9.0, 5.0], [9.0, 9.0]];
        let pieces = line(&zigzag, FRAME);
        assert_eq!(pieces.len(), 2);
        assert_eq!(pieces[0], [[0.0, 5.0], [5.0, 5.0], [5.0, 10.0]]);
        assert_eq!(pieces[1], [[8.0, 10.0], [9.0, 5.0], [9.0, 9.0]]);
        assert!(line(&[[-1.0, -1.0], [-5.0, 20.0]], FRAME).is_empty());
    }

    #[test]
    fn an_area_keeps_its_part_inside() {
        let square = [[5.0, 5.0], [15.0, 5.0], [15.0, 15.0], [5.0, 15.0]];
        let mut kept = area(&square, FRAME);
        kept.sort_by(|a, b| a[0].total_cmp(&b[0]).then(a[1].total_cmp(&b[1])));
        assert_eq!(kept, [[5.0, 5.0], [5.0, 10.0], [10.0, 5.0], [10.0, 10.0]]);
        assert!(area(&square, FRAME.grown(-6.0)).is_empty());
    }
}
