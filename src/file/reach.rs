//! How large or small a number of a cavity file may be.
//!
//! Wider than anything that is built, and narrow enough that no sum or product over one part
//! overflows: what a whole path makes of its parts is judged where the cavity is put together.

use crate::quantity::{Kind, Value};

/// Least and greatest magnitude of a number that is not zero, in SI units, and both in words.
fn reach(kind: Kind) -> (f64, f64, &'static str) {
    match kind {
        Kind::Length => (1e-12, 1e10, "between 1e-12 m and 1e10 m, or zero"),
        Kind::Position => (0.0, 1e10, "within 1e10 m to either side"),
        Kind::Radius | Kind::Face => (1e-9, 1e10, "between 1e-9 m and 1e10 m, or \"flat\""),
        Kind::Focal => (1e-9, 1e10, "between 1e-9 m and 1e10 m"),
        Kind::Angle | Kind::SlabAngle => (0.0, 6.3, "within a full turn"),
        Kind::Curvature | Kind::Strength => (0.0, 1e9, "within 1e9 1/m"),
        Kind::Number => (0.0, 1e12, "within 1e12"),
        Kind::Ratio | Kind::Loss => (0.0, 1e9, "within 1e9 1/m"),
        Kind::Frequency => (0.0, 1e21, "within 1e21 Hz"),
        Kind::Power => (0.0, 1e18, "within 1e18 W"),
        Kind::Energy => (0.0, 1e12, "within 1e12 J"),
        Kind::Time => (0.0, 1e10, "within 1e10 s"),
        Kind::Temperature => (0.0, 1e5, "below 1e5 K"),
        Kind::PerWatt => (0.0, 1e9, "within 1e9 1/W"),
        Kind::Damage => (0.0, 1e30, "within 1e30 W/m²"),
    }
}

/// Where numbers of this kind lie, if this one lies elsewhere.
pub(super) fn beyond(value: Value, kind: Kind) -> Option<&'static str> {
    number_beyond(value.number()?, kind)
}

/// The same for a number as written, in SI units.
pub(super) fn number_beyond(number: f64, kind: Kind) -> Option<&'static str> {
    let (least, greatest, words) = reach(kind);
    let magnitude = number.abs();
    let fits = number == 0.0 || (least..=greatest).contains(&magnitude);
    (!fits).then_some(words)
}

/// Greatest refractive index: above that of water for radio waves, with room to spare.
pub(super) const GREATEST_INDEX: f64 = 100.0;
