//! How far one quantity may move while all others stay, before the cavity ceases to be stable.
//!
//! The edges of a ring are the roots of h = ±1. A standing cavity has h = AD + BC with the matrix
//! of one way, and its edges are the roots of A, B, C and D: where two of them vanish together
//! the half-trace only *touches* ±1, which a search of h for changes of sign would miss. A touch
//! ends a range all the same, and is named so.

mod probe;
mod within;

use self::probe::Probe;
use super::eigenmode::EDGE;
use crate::cavity::{Cavity, Slot};
use crate::optics::Plane;

pub use within::{Within, stable_within};

/// Where a range ends.
#[derive(Clone, Copy, Debug, PartialEq)]
pub enum End {
    /// |half-trace| reaches 1 there.
    Edge {
        /// The quantity's value, in SI units (1/R for a radius, 1/f for a focal length).
        at: f64,
        /// The plane that becomes unstable.
        plane: Plane,
        /// Whether the cavity is stable again beyond.
        touch: bool,
    },
    /// A length, its own or a tied one, reaches zero first.
    Zero {
        /// The quantity's value there.
        at: f64,
    },
    /// No edge as far as was searched.
    Open,
}

impl End {
    /// The value of the quantity, if the range ends.
    pub fn value(self) -> Option<f64> {
        match self {
            End::Edge { at, .. } | End::Zero { at } => Some(at),
            End::Open => None,
        }
    }
}

/// A stretch of values of one quantity over which the cavity is stable.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Range {
    /// Its lower end.
    pub from: End,
    /// Its upper end.
    pub to: End,
}

/// What is known about one quantity.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct QuantityRange {
    /// The quantity.
    pub slot: Slot,
    /// Its nominal value, in SI units (1/R for a radius, 1/f for a focal length).
    pub nominal: f64,
    /// The range that holds the nominal value or, where the cavity is not stable, the nearest one;
    /// none where no value of this quantity alone makes it stable.
    pub range: Option<Range>,
    /// How much of a change brings the cavity to the range, relative to the quantity itself; zero
    /// where it is stable.
    pub change_needed: f64,
}

/// The range of every quantity that a builder can move, in the order of the file.
pub fn stable_ranges(cavity: &Cavity) -> Vec<QuantityRange> {
    cavity
        .book()
        .iter()
        .filter(|(slot, entry)| {
            let movable = entry.shapes_the_mode()
                && entry.origin == crate::cavity::Origin::Written
                && (entry.part.is_some() || *slot == Cavity::PUMP);
            movable && cavity.moves_rays(*slot)
        })
        .map(|(slot, _)| stable_range(cavity, slot))
        .collect()
}

/// The range of one quantity.
pub fn stable_range(cavity: &Cavity, slot: Slot) -> QuantityRange {
    let mut probe = Probe::new(cavity, slot);
    let nominal = probe.nominal;
    let (upwards, downwards) = (probe.search(1.0), probe.search(-1.0));
    let stable = probe.margin(nominal) > EDGE;
    let range = if stable {
        // Both searches begin inside the range.
        upwards.zip(downwards).map(|(up, down)| Range {
            from: down.1,
            to: up.1,
        })
    } else {
        let distance = |found: &(End, End)| {
            found
                .0
                .value()
                .map_or(f64::INFINITY, |x| (x - nominal).abs())
        };
        let up = upwards.map(|found| {
            (
                distance(&found),
                Range {
                    from: found.0,
                    to: found.1,
                },
            )
        });
        let down = downwards.map(|found| {
            (
                distance(&found),
                Range {
                    from: found.1,
                    to: found.0,
                },
            )
        });
        match (up, down) {
            (Some(up), Some(down)) => Some(if up.0 <= down.0 { up.1 } else { down.1 }),
            (up, down) => up.or(down).map(|found| found.1),
        }
    };
    let change_needed = match range {
        Some(range) if !stable => {
            let nearest = [range.from, range.to]
                .into_iter()
                .filter_map(End::value)
                .map(|x| (x - nominal).abs())
                .fold(f64::INFINITY, f64::min);
            let own = nominal.abs();
            nearest / if own > 0.0 { own } else { probe.scale }
        }
        _ => 0.0,
    };
    QuantityRange {
        slot,
        nominal,
        range,
        change_needed,
    }
}
