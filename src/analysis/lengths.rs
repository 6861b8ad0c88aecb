//! Geometric, optical and group length of a round trip, and the free spectral range.

use crate::cavity::{Cavity, Element, Form, Index, Piece};
use crate::numeric::Real;

/// Speed of light in vacuum, in m/s; exact by the definition of the metre.
pub const SPEED_OF_LIGHT: f64 = 299_792_458.0;

/// Lengths of one round trip, in metres.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct RoundTripLengths<T> {
    /// Along the beam.
    pub geometric: T,
    /// Weighted with the phase index.
    pub optical: T,
    /// Weighted with the group index (the phase index where no group index is known).
    pub group: T,
}

impl<T: Real> RoundTripLengths<T> {
    /// The lengths with the given values in the address book's slots.
    pub fn of(cavity: &Cavity, values: &[T]) -> Self {
        let zero = T::constant(0.0);
        let mut sum = RoundTripLengths {
            geometric: zero,
            optical: zero,
            group: zero,
        };
        let mut add = |length: T, index: Index| {
            sum.geometric = sum.geometric + length;
            sum.optical = sum.optical + length * index.phase(values);
            sum.group = sum.group + length * index.group(values);
        };
        cavity.walk(values, |leg| {
            let part = &cavity.parts()[leg.part];
            match (&part.element, &leg.piece) {
                (Element::Matrix { length, .. }, _) => add(length.of(values), Index::VACUUM),
                (Element::Gap { medium, .. }, _) => add(leg.length(), *medium),
                (Element::Slab(slab), Piece::Stretch(_)) => add(leg.length(), slab.index),
                (Element::Duct { index, .. }, _) => add(leg.length(), *index),
                _ => {}
            }
        });
        let ways = match cavity.form() {
            Form::Ring => 1.0,
            Form::Standing => 2.0,
        };
        RoundTripLengths {
            geometric: sum.geometric * ways,
            optical: sum.optical * ways,
            group: sum.group * ways,
        }
    }

    /// Free spectral range c/Σ(n_g ℓ), in hertz.
    pub fn free_spectral_range(&self) -> T {
        T::constant(SPEED_OF_LIGHT) / self.group
    }
}
