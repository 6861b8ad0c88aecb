//! The value of a quantity, beside its spread and the text it came from.

use super::Spread;

/// The sense of a curved face as seen from outside the glass it belongs to.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Sense {
    /// Bulging towards the observer.
    Convex,
    /// Hollow towards the observer.
    Concave,
}

impl Sense {
    /// The word used in files.
    pub fn name(self) -> &'static str {
        match self {
            Sense::Convex => "convex",
            Sense::Concave => "concave",
        }
    }
}

/// The nominal value of a quantity. Numbers are finite.
#[derive(Clone, Copy, Debug, PartialEq)]
pub enum Value {
    /// A number in the SI unit of its kind: m, rad, Hz, W, J, s, K, 1/m, 1/W, or a plain number.
    /// Of a mirror's radius of curvature: positive where concave, never zero.
    Scalar(f64),
    /// A surface without curvature. Its spread is one of curvature, in 1/m.
    Flat,
    /// A curved face, the sense in words.
    Face {
        /// Radius of curvature in metres, positive.
        radius: f64,
        /// Convex or concave, as seen from outside.
        sense: Sense,
    },
    /// A loss per length: the attenuation α in 1/m, of which a path L loses 1 − exp(−αL).
    PerLength(f64),
    /// Power per area, in W/m².
    Intensity(f64),
    /// Energy per area, in J/m².
    Fluence(f64),
    /// Brewster's angle, whatever the indices make it.
    Brewster,
}

impl Value {
    /// The number, in SI units; of a face its radius without sense. `None` for a flat and for
    /// Brewster's angle.
    pub fn number(self) -> Option<f64> {
        match self {
            Value::Scalar(x)
            | Value::PerLength(x)
            | Value::Intensity(x)
            | Value::Fluence(x)
            | Value::Face { radius: x, .. } => Some(x),
            Value::Flat | Value::Brewster => None,
        }
    }

    /// The reciprocal in 1/m of a radius or a focal length; 0 for a flat.
    ///
    /// A mirror's is positive where concave, as its radius is; a face's is positive where convex.
    /// `None` for values that have no reciprocal.
    pub fn curvature(self) -> Option<f64> {
        let curvature = match self {
            Value::Flat => 0.0,
            Value::Scalar(radius) => 1.0 / radius,
            Value::Face { radius, sense } => match sense {
                Sense::Convex => 1.0 / radius,
                Sense::Concave => -1.0 / radius,
            },
            _ => return None,
        };
        curvature.is_finite().then_some(curvature)
    }
}

/// A quantity: its value in SI units, its spread, and the text it was read from.
#[derive(Clone, Debug, PartialEq)]
pub struct Quantity {
    /// The nominal value.
    pub value: Value,
    /// The spread about it.
    pub spread: Spread,
    /// The text as it was written.
    pub text: String,
}
