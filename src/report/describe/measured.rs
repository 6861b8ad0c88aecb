//! Numbers of measures for readers.

use crate::cavity::{Bounds, Presence};
use crate::report::number::{
    FREQUENCIES, LENGTHS, NUMBERS, Scale, TIMES, common, plain, significant,
};

const RADIANS: [Scale; 1] = [Scale {
    symbol: "rad",
    size: 1.0,
}];

/// The number of a measure with its unit.
pub(super) fn measured(x: f64, presence: Presence, digits: fn(f64, usize) -> String) -> String {
    match presence {
        Presence::Number => digits(x, 4),
        Presence::Length | Presence::Position => {
            let scale = common([x], &LENGTHS, 1.0);
            format!("{} {}", digits(x / scale.size, 4), scale.symbol)
        }
        Presence::Angle => format!("{} rad", digits(x, 4)),
        Presence::Frequency | Presence::Offset => {
            let (size, unit) = unit_of(x);
            format!("{} {unit}", digits(x / size, 6))
        }
        Presence::Time => {
            // A time is shorter than whatever rounds to nothing elsewhere.
            let fits = TIMES.iter().rev().find(|scale| x.abs() >= scale.size);
            let scale = fits.unwrap_or(&TIMES[0]);
            format!("{} {}", digits(x / scale.size, 4), scale.symbol)
        }
    }
}

/// Where a measure must lie.
pub(super) fn wanted(bounds: Bounds, presence: Presence) -> String {
    let number = |x| measured(x, presence, plain);
    match bounds {
        Bounds::Above(low) => format!("above {}", number(low)),
        Bounds::Below(high) => format!("below {}", number(high)),
        Bounds::Between(low, high) => format!("{} to {}", number(low), number(high)),
    }
}

/// Units for an axis of a measure.
pub(super) fn scales_of(presence: Presence) -> &'static [Scale] {
    match presence {
        Presence::Number => &NUMBERS,
        Presence::Angle => &RADIANS,
        Presence::Length | Presence::Position => &LENGTHS,
        Presence::Frequency | Presence::Offset => &FREQUENCIES,
        Presence::Time => &TIMES,
    }
}

/// A frequency with the unit that fits it.
pub(super) fn frequency(hertz: f64) -> String {
    let (size, unit) = unit_of(hertz);
    format!("{} {unit}", significant(hertz / size, 6))
}

fn unit_of(hertz: f64) -> (f64, &'static str) {
    match hertz.abs() {
        f if f >= 1e12 => (1e12, "THz"),
        f if f >= 1e9 => (1e9, "GHz"),
        f if f >= 1e6 => (1e6, "MHz"),
        f if f >= 1e3 => (1e3, "kHz"),
        _ => (1.0, "Hz"),
    }
}
