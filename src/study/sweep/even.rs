//! In what a quantity is swept evenly.

use crate::quantity::Kind;

/// In what a quantity is swept evenly, and along which an axis counts.
#[derive(Clone, Copy, Debug, PartialEq)]
pub enum Even {
    /// In the number that is kept: the quantity itself, or the curvature of what passes flat.
    Kept,
    /// In the radius or focal length as written, which is this sign over the number kept.
    AsWritten {
        /// Minus for a concave face, whose radius is written without a sign.
        sign: f64,
    },
}

impl Even {
    /// As written, where that is possible: a radius has no even steps through flat.
    pub(super) fn between(kind: Kind, from: f64, to: f64) -> Even {
        if !kind.is_reciprocal() || from * to <= 0.0 {
            return Even::Kept;
        }
        let is_concave_face = kind == Kind::Face && from < 0.0;
        Even::AsWritten {
            sign: if is_concave_face { -1.0 } else { 1.0 },
        }
    }

    /// The number on the axis, from the number kept.
    pub fn shown(self, kept: f64) -> f64 {
        match self {
            Even::Kept => kept,
            Even::AsWritten { sign } => sign / kept,
        }
    }

    /// The numbers kept at even places of the axis, rising there, both ends exactly.
    pub(super) fn values(self, from: f64, to: f64, points: usize) -> Vec<f64> {
        let (from, to) = if self.shown(from) <= self.shown(to) {
            (from, to)
        } else {
            (to, from)
        };
        let (first, last) = (self.shown(from), self.shown(to));
        (0..points)
            .map(|index| match index {
                0 => from,
                index if index + 1 == points => to,
                index => {
                    let share = index as f64 / (points - 1) as f64;
                    let shown = first + (last - first) * share;
                    match self {
                        Even::Kept => shown,
                        Even::AsWritten { sign } => sign / shown,
                    }
                }
            })
            .collect()
    }
}

#[cfg(test)]
mod tests {
    use super::*;
    use approx::assert_relative_eq;

    #[test]
    fn a_radius_goes_in_even_steps_of_itself() {
        let even = Even::between(Kind::Radius, 20.0, 5.0);
        let radii: Vec<f64> = even
            .values(20.0, 5.0, 4)
            .iter()
            .map(|kept| 1.0 / kept)
            .collect();
        for (radius, expected) in radii.iter().zip([0.05, 0.1, 0.15, 0.2]) {
            assert_relative_eq!(*radius, expected, max_relative = 1e-14);
        }
    }

    #[test]
    fn through_flat_it_goes_in_even_steps_of_curvature() {
        let even = Even::between(Kind::Radius, 10.0, -10.0);
        assert_eq!(even, Even::Kept);
        assert_eq!(even.values(10.0, -10.0, 3), [-10.0, 0.0, 10.0]);
    }

    #[test]
    fn a_concave_face_rises_with_its_radius() {
        let even = Even::between(Kind::Face, -20.0, -5.0);
        assert_eq!(even.shown(-20.0), 0.05);
        assert_eq!(even.values(-5.0, -20.0, 2), [-20.0, -5.0]);
    }
}
