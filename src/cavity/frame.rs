//! How the beam's frame is carried around a ring.
//!
//! The frame turns with the beam as an aircraft does that only yaws and pitches. A ring whose
//! folds lie in one plane brings it back as it was; a ring that leaves the plane can bring it back
//! rolled about the beam (parallel transport on the sphere of directions). The roll belongs to
//! the round trip: half a turn is one more flip of each axis, and any other roll than a multiple
//! of half a turn couples the two planes.

use std::f64::consts::PI;

use nalgebra::{Rotation3, Vector3};

use super::part::Side;

/// One reflection: to which side, and by which angle of incidence (radians).
#[derive(Clone, Copy, Debug)]
pub struct Fold {
    /// Side to which the beam turns.
    pub side: Side,
    /// Angle of incidence, in radians.
    pub incidence: f64,
}

/// What a round trip does to the frame.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Return {
    /// Angle by which the frame has turned about the beam, in (−π, π].
    pub roll: f64,
    /// Angle between the first and the last direction, in radians: zero where the ring closes.
    pub opening: f64,
}

/// Carries the frame once around a ring.
///
/// A ring that does not close is closed by the shortest rotation of its last direction onto its
/// first.
pub fn carry(folds: impl Iterator<Item = Fold>) -> Return {
    // Columns of the rotation: ahead (x), left (y), up (z).
    let mut frame = Rotation3::identity();
    for fold in folds {
        let turn = PI - 2.0 * fold.incidence;
        let step = match fold.side {
            Side::Left => Rotation3::from_axis_angle(&Vector3::z_axis(), turn),
            Side::Right => Rotation3::from_axis_angle(&Vector3::z_axis(), -turn),
            // A positive turn about the left axis takes "ahead" downwards.
            Side::Up => Rotation3::from_axis_angle(&Vector3::y_axis(), -turn),
            Side::Down => Rotation3::from_axis_angle(&Vector3::y_axis(), turn),
        };
        frame *= step;
    }
    let ahead = frame * Vector3::x();
    let opening = ahead.cross(&Vector3::x()).norm().atan2(ahead.x);
    // A last direction opposite to the first has no shortest way back; any axis across serves.
    let closing = Rotation3::rotation_between(&ahead, &Vector3::x())
        .unwrap_or_else(|| Rotation3::from_axis_angle(&Vector3::z_axis(), PI));
    let left = closing * (frame * Vector3::y());
    Return {
        roll: left.z.atan2(left.y),
        opening,
    }
}

#[cfg(test)]
mod tests {
    use super::*;
    use approx::assert_abs_diff_eq;

    const ROUNDING: f64 = 1e-14;

    fn fold(side: Side, degrees: f64) -> Fold {
        Fold {
            side,
            incidence: degrees.to_radians(),
        }
    }

    #[test]
    fn a_plane_ring_closes_without_roll() {
        use Side::{Left, Right};
        let bow_tie = [Left, Left, Right, Right].map(|s| fold(s, 8.0));
        let triangle = [fold(Left, 44.0), fold(Left, 2.0), fold(Left, 44.0)];
        for ring in [&bow_tie[..], &triangle[..]] {
            let back = carry(ring.iter().copied());
            assert_abs_diff_eq!(back.roll, 0.0, epsilon = ROUNDING);
            assert_abs_diff_eq!(back.opening, 0.0, epsilon = ROUNDING);
        }
    }

    /// A vector carried around one octant of the sphere turns by its solid angle, π/2; the beam
    /// needs a fourth quarter turn in the plane where it started to be the same octant.
    #[test]
    fn three_right_angles_around_an_octant_roll_a_quarter_turn() {
        use Side::{Left, Up};
        // Directions x → y → z → x: left; up; then, seen by the pilot who climbs with his back
        // to −y, the x axis lies to the right.
        let octant = [fold(Left, 45.0), fold(Up, 45.0), fold(Side::Right, 45.0)];
        let back = carry(octant.into_iter());
        assert_abs_diff_eq!(back.opening, 0.0, epsilon = ROUNDING);
        assert_abs_diff_eq!(back.roll.abs(), PI / 2.0, epsilon = ROUNDING);
    }
}
