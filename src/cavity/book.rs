//! The address book: every number of a cavity under the name a builder knows it by.
//!
//! A cavity's structure refers to its numbers by [`Slot`]; the numbers themselves lie in one flat
//! list, so that any of them can be read, set, varied or differentiated without touching the
//! structure. Radii of curvature and focal lengths are kept as their reciprocals (curvature,
//! dioptric power), which pass through "flat" without a break.

use std::collections::HashMap;

use crate::numeric::Real;
use crate::quantity::{Kind, Spread};

/// The place of one number in a cavity's list of values.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Hash, PartialOrd, Ord)]
pub struct Slot(pub(super) usize);

impl Slot {
    /// Its index in a list of values.
    pub fn index(self) -> usize {
        self.0
    }

    /// Its value in a list of values.
    #[inline(always)]
    pub fn of<T: Copy>(self, values: &[T]) -> T {
        values[self.0]
    }
}

/// Where a number came from.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Origin {
    /// Written by the builder, in the part itself or in the defaults for its kind.
    Written,
    /// Not written: the format's own default.
    Implied,
    /// Computed from other numbers by a tie.
    Tied,
}

/// One number of a cavity.
#[derive(Clone, Debug)]
pub struct Entry {
    /// The name, such as `M2.roc` or `wavelength`.
    pub address: String,
    /// Index of the part it belongs to, if it belongs to one.
    pub part: Option<usize>,
    /// The key within that part, or the name itself.
    pub key: &'static str,
    /// What it measures, and so how it is written.
    pub kind: Kind,
    /// Nominal value in SI units; the reciprocal for radii and focal lengths.
    pub value: f64,
    /// Spread of the number *as written* (of a radius in metres, unless it is flat).
    pub spread: Spread,
    /// Where it came from.
    pub origin: Origin,
}

impl Entry {
    /// Whether the value kept is the reciprocal of the one written.
    pub fn is_reciprocal(&self) -> bool {
        self.kind.is_reciprocal()
    }

    /// The value kept when the number as written lies `by` off its nominal value.
    ///
    /// `by` counts as a [`Spread`] does: on the number as written (metres, for a radius; without
    /// its sense, for a face), and in 1/m where that number is flat.
    pub fn displaced<T: Real>(&self, by: T) -> T {
        if !self.is_reciprocal() || self.value == 0.0 {
            return by + self.value;
        }
        // A face's radius has no sign of its own: the curvature carries its sense.
        let per_metre = match self.kind {
            Kind::Face => self.value.abs(),
            _ => self.value,
        };
        (by * per_metre + 1.0).recip() * self.value
    }

    /// What its spread is measured in: of a radius that is flat, curvatures.
    pub fn spread_kind(&self) -> Kind {
        if self.is_reciprocal() && self.value == 0.0 {
            Kind::Curvature
        } else {
            self.kind
        }
    }

    /// The least and the greatest value kept between its limits; none without limits.
    ///
    /// Of a radius these are curvatures in 1/m, so that its lower limit makes the greatest.
    pub fn kept_limits(&self) -> Option<(f64, f64)> {
        let Spread::Limits { below, above } = self.spread else {
            return None;
        };
        let (a, b) = (self.displaced(-below), self.displaced(above));
        Some((a.min(b), a.max(b)))
    }

    /// Whether moving this number alone changes the round trip of rays and the builder can move
    /// it: lengths, thicknesses, radii, thermal powers and focal lengths.
    pub fn shapes_the_mode(&self) -> bool {
        matches!(
            self.key,
            "length"
                | "thickness"
                | "roc"
                | "roc_tangential"
                | "roc_sagittal"
                | "entrance"
                | "exit"
                | "focal"
                | "focal_tangential"
                | "focal_sagittal"
                | "thermal"
                | "thermal_tangential"
                | "thermal_sagittal"
                | "pump"
        )
    }
}

/// A number that follows others: Σ factor·number + constant, all as written.
///
/// Where the target is a radius, one term at the most may be a radius; it then follows as
/// κ/(factor + constant·κ), finite through flat.
#[derive(Clone, Debug)]
pub struct Tie {
    /// The number that follows.
    pub target: Slot,
    /// Factor and number followed.
    pub terms: Vec<(f64, Slot)>,
    /// What is added, in SI units.
    pub constant: f64,
    /// The relation as written.
    pub text: String,
}

/// All numbers of a cavity and the ties among them.
#[derive(Clone, Debug, Default)]
pub struct Book {
    entries: Vec<Entry>,
    by_address: HashMap<String, Slot>,
    /// In an order in which each follows only numbers already known.
    ties: Vec<Tie>,
}

impl Book {
    /// Enters a number and returns its slot; an address entered twice keeps its first slot.
    pub fn enter(&mut self, entry: Entry) -> Slot {
        let slot = Slot(self.entries.len());
        self.by_address.entry(entry.address.clone()).or_insert(slot);
        self.entries.push(entry);
        slot
    }

    /// The slot of an address.
    pub fn find(&self, address: &str) -> Option<Slot> {
        self.by_address.get(address).copied()
    }

    /// The entry in a slot.
    pub fn entry(&self, slot: Slot) -> &Entry {
        &self.entries[slot.0]
    }

    /// All slots with their entries, in the order of the file.
    pub fn iter(&self) -> impl Iterator<Item = (Slot, &Entry)> {
        self.entries.iter().enumerate().map(|(i, e)| (Slot(i), e))
    }

    /// The slots with a spread and their entries, in the order of the file; a tied number has none
    /// of its own.
    pub fn spread_slots(&self) -> impl Iterator<Item = (Slot, &Entry)> {
        self.iter()
            .filter(|(_, entry)| entry.origin != Origin::Tied && entry.spread != Spread::Exact)
    }

    /// The ties, each after those that it follows.
    pub fn ties(&self) -> &[Tie] {
        &self.ties
    }

    /// Takes over the ties, ordered so that each follows only numbers already known.
    ///
    /// # Errors
    /// The index of a tie that is part of a cycle.
    pub fn set_ties(&mut self, ties: Vec<Tie>) -> Result<(), usize> {
        let mut open: Vec<(usize, Tie)> = ties.into_iter().enumerate().collect();
        let mut ordered = Vec::with_capacity(open.len());
        while !open.is_empty() {
            let is_free = |tie: &Tie| {
                tie.terms
                    .iter()
                    .all(|(_, slot)| open.iter().all(|(_, other)| other.target != *slot))
            };
            let Some(position) = open.iter().position(|(_, tie)| is_free(tie)) else {
                return Err(open[0].0);
            };
            ordered.push(open.remove(position).1);
        }
        self.ties = ordered;
        let mut values = self.nominal();
        self.follow_ties(&mut values);
        for tie in &self.ties {
            let entry = &mut self.entries[tie.target.0];
            entry.value = values[tie.target.0];
            entry.origin = Origin::Tied;
            entry.spread = Spread::Exact;
        }
        Ok(())
    }

    /// The nominal values, one a slot.
    pub fn nominal(&self) -> Vec<f64> {
        self.entries.iter().map(|e| e.value).collect()
    }

    /// Recomputes every tied value from the others.
    pub fn follow_ties<T: Real>(&self, values: &mut [T]) {
        for tie in &self.ties {
            values[tie.target.0] = self.tied_value(tie, values);
        }
    }

    fn tied_value<T: Real>(&self, tie: &Tie, values: &[T]) -> T {
        let zero = T::constant(0.0);
        let mut direct = T::constant(tie.constant);
        let mut radius = None;
        for (factor, slot) in &tie.terms {
            let value = slot.of(values);
            if self.entry(*slot).is_reciprocal() {
                radius = Some((*factor, value));
            } else {
                direct = direct + value * *factor;
            }
        }
        if !self.entry(tie.target).is_reciprocal() {
            return direct;
        }
        match radius {
            Some((factor, curvature)) => curvature / (direct * curvature + factor),
            None => T::select(zero.less(direct.abs()), direct, T::constant(1.0)).recip(),
        }
    }
}

#[cfg(test)]
mod tests {
    use super::*;
    use approx::assert_relative_eq;

    /// A few roundings.
    const ROUNDING: f64 = 1e-15;

    fn entry(kind: Kind, value: f64, spread: Spread) -> Entry {
        Entry {
            address: "M1.roc".into(),
            part: Some(0),
            key: "roc",
            kind,
            value,
            spread,
            origin: Origin::Written,
        }
    }

    #[test]
    fn limits_of_a_radius_become_limits_of_its_curvature() {
        let limits = Spread::Limits {
            below: 0.002,
            above: 0.001,
        };
        let curvature = |radius: f64| 1.0 / radius;
        for (kind, value, low, high) in [
            (Kind::Length, 0.1, 0.098, 0.101),
            (Kind::Radius, 10.0, curvature(0.101), curvature(0.098)),
            (Kind::Radius, -10.0, curvature(-0.099), curvature(-0.102)),
            (Kind::Focal, -10.0, curvature(-0.099), curvature(-0.102)),
            (Kind::Face, 10.0, curvature(0.101), curvature(0.098)),
            // Concave: the radius without sense lies between 98 mm and 101 mm.
            (Kind::Face, -10.0, curvature(-0.098), curvature(-0.101)),
            (Kind::Radius, 0.0, -0.002, 0.001),
        ] {
            let (found_low, found_high) = entry(kind, value, limits).kept_limits().unwrap();
            assert_relative_eq!(found_low, low, max_relative = ROUNDING);
            assert_relative_eq!(found_high, high, max_relative = ROUNDING);
        }
        assert_eq!(entry(Kind::Length, 0.1, Spread::Exact).kept_limits(), None);
    }

    #[test]
    fn what_is_tied_or_exact_is_not_among_the_spreads() {
        let mut book = Book::default();
        let standard = Spread::Standard { uncertainty: 0.001 };
        book.enter(entry(Kind::Length, 0.1, Spread::Exact));
        let spread = book.enter(entry(Kind::Length, 0.1, standard));
        let tied = book.enter(entry(Kind::Length, 0.1, standard));
        let tie = Tie {
            target: tied,
            terms: vec![(1.0, spread)],
            constant: 0.0,
            text: String::new(),
        };
        book.set_ties(vec![tie]).unwrap();
        let found: Vec<Slot> = book.spread_slots().map(|(slot, _)| slot).collect();
        assert_eq!(found, [spread]);
    }
}
