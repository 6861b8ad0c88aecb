//! How the quantities of a cavity lie within their spreads, which of them move together, and what
//! is adjusted once the parts are there.

use super::book::Slot;
use super::measure::Measure;

/// Most groups and most adjustments of one cavity.
pub const MOST_TOLERANCED: usize = 64;

/// How a quantity lies between its limits.
///
/// A standard uncertainty is normal by definition, whatever is said here.
#[derive(Clone, Copy, Debug, Default, PartialEq, Eq)]
pub enum Shape {
    /// Anywhere between them alike (JCGM 100:2008, 4.3.7).
    #[default]
    Rectangular,
    /// Normal about their middle, the limits two standard deviations to either side.
    Normal,
}

/// Quantities that move together.
#[derive(Clone, Debug, PartialEq)]
pub struct Group {
    /// The quantities, two or more; each stands in one group only and has a spread of its own.
    pub of: Vec<Slot>,
    /// Coefficient between any two of them, above 0 and at most 1: at 1 they move as one, below
    /// it is that of a Gaussian copula.
    pub correlation: f64,
}

/// A quantity that is adjusted until a measure is what it should be.
#[derive(Clone, Debug, PartialEq)]
pub struct Adjust {
    /// The quantity; it is kept as written, is not tied, and is adjusted by this alone.
    pub set: Slot,
    /// How far it can be moved to either side, in its SI unit, above zero.
    pub travel: f64,
    /// The measure to hold; no other adjustment holds it.
    pub hold: Measure,
    /// The measure's name as written.
    pub hold_name: String,
    /// Where to hold it, in its SI unit; none: at its nominal value.
    pub to: Option<f64>,
}

/// What is said of a cavity's tolerances beside the spreads themselves.
#[derive(Clone, Debug, Default, PartialEq)]
pub struct Tolerancing {
    /// How quantities lie between their limits.
    pub shape: Shape,
    /// The same for single quantities that lie otherwise.
    pub shapes: Vec<(Slot, Shape)>,
    /// Quantities that move together.
    pub groups: Vec<Group>,
    /// What is adjusted once the parts are there.
    pub adjust: Vec<Adjust>,
    /// Relative cost of tightening a quantity's tolerance, above zero; 1 where none is named.
    pub cost: Vec<(Slot, f64)>,
}

impl Tolerancing {
    /// How a quantity lies between its limits.
    pub fn shape_of(&self, slot: Slot) -> Shape {
        named(&self.shapes, slot).unwrap_or(self.shape)
    }

    /// What it costs to tighten a quantity's tolerance, relative to others.
    pub fn cost_of(&self, slot: Slot) -> f64 {
        named(&self.cost, slot).unwrap_or(1.0)
    }

    /// The group that a quantity moves with.
    pub fn group_of(&self, slot: Slot) -> Option<&Group> {
        self.groups.iter().find(|group| group.of.contains(&slot))
    }
}

fn named<X: Copy>(list: &[(Slot, X)], slot: Slot) -> Option<X> {
    list.iter()
        .find(|(of, _)| *of == slot)
        .map(|(_, what)| *what)
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn a_quantity_lies_as_all_do_unless_it_is_named() {
        let (one, other) = (Slot(4), Slot(5));
        let tolerancing = Tolerancing {
            shapes: vec![(one, Shape::Normal)],
            cost: vec![(other, 3.0)],
            groups: vec![Group {
                of: vec![one, other],
                correlation: 0.5,
            }],
            ..Tolerancing::default()
        };
        assert_eq!(tolerancing.shape_of(one), Shape::Normal);
        assert_eq!(tolerancing.shape_of(other), Shape::Rectangular);
        assert_eq!(tolerancing.cost_of(one), 1.0);
        assert_eq!(tolerancing.cost_of(other), 3.0);
        assert_eq!(tolerancing.group_of(one).unwrap().correlation, 0.5);
        assert!(tolerancing.group_of(Slot(6)).is_none());
    }
}
