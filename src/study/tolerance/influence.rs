//! Which quantities matter to a list of measures.

use crate::analysis::measures::{Evaluator, Workspace};
use crate::cavity::{Cavity, Entry, Measure, Origin, Slot};
use crate::quantity::Spread;

/// The quantities of a cavity, sorted by what they do to a study.
pub(super) struct Influence {
    /// With a spread, and of influence.
    pub(super) varied: Vec<Slot>,
    /// Of influence but without a spread, of those that a builder makes.
    pub(super) perfect: Vec<String>,
    /// With a spread but of no influence.
    pub(super) idle: Vec<String>,
}

/// A change that shows an influence where there is no spread to try.
const TRIAL: f64 = 1e-3;

pub(super) fn of(cavity: &Cavity, measures: &[Measure]) -> Influence {
    let evaluator = Evaluator::new(cavity, measures.to_vec());
    let nominal = cavity.book().nominal();
    let mut workspace = Workspace::default();
    let mut look = |values: &[f64]| {
        let mut seen = Vec::new();
        let modes = evaluator.evaluate(values, &mut workspace, |_, value: f64, exists| {
            seen.push(exists.then_some(value));
        });
        // Stability counts in any case.
        seen.extend([Some(modes.tangential.margin), Some(modes.sagittal.margin)]);
        seen
    };
    let at_nominal = look(&nominal);
    let mut moves = |slot: Slot, to: [f64; 2]| {
        to.into_iter().any(|value| {
            let mut values = nominal.clone();
            values[slot.index()] = value;
            cavity.book().follow_ties(&mut values);
            look(&values) != at_nominal
        })
    };
    let mut found = Influence {
        varied: Vec::new(),
        perfect: Vec::new(),
        idle: Vec::new(),
    };
    for (slot, entry) in cavity.book().iter() {
        if entry.origin == Origin::Tied {
            continue;
        }
        let by = match entry.spread {
            Spread::Exact => {
                let is_made = entry.origin == Origin::Written && is_made(entry);
                if is_made && moves(slot, [entry.value * (1.0 + TRIAL), entry.value + 1e-9]) {
                    found.perfect.push(entry.address.clone());
                }
                continue;
            }
            Spread::Limits { below, above } => [-below, above],
            Spread::Standard { uncertainty } => [-uncertainty, uncertainty],
        };
        if moves(slot, by.map(|by| entry.displaced(by))) {
            found.varied.push(slot);
        } else {
            found.idle.push(entry.address.clone());
        }
    }
    found
}

/// Whether a quantity is made by a workshop, a coater or whoever mounts the part.
fn is_made(entry: &Entry) -> bool {
    entry.part.is_some()
        && (entry.shapes_the_mode()
            || matches!(
                entry.key,
                "aoi" | "index" | "strength" | "reflectance" | "loss"
            ))
}
