//! Which quantities matter to a list of measures.

use crate::analysis::measures::{Evaluator, Workspace};
use crate::cavity::{Cavity, Entry, Measure, Origin, Slot};
use crate::quantity::Spread;

/// The quantities of a cavity, sorted by what they do to a study.
pub(super) struct Influence {
    /// With a spread, and of influence; and whether on what is described, or only on how near modes
    /// count as near.
    pub(super) varied: Vec<(Slot, bool)>,
    /// Of influence but without a spread, of those that a builder makes.
    pub(super) perfect: Vec<String>,
    /// With a spread but of no influence.
    pub(super) idle: Vec<String>,
}

/// A change that shows an influence where there is no spread to try.
const TRIAL: f64 = 1e-3;

/// Sorts the quantities of a cavity; the first `described` measures are described.
pub(super) fn of(cavity: &Cavity, measures: &[Measure], described: usize) -> Influence {
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
    // Whether anything moves, and whether anything that is described does.
    let mut moves = |slot: Slot, to: [f64; 2]| {
        let (mut any, mut matters) = (false, false);
        for value in to {
            let mut values = nominal.clone();
            values[slot.index()] = value;
            cavity.book().follow_ties(&mut values);
            let pairs = at_nominal.iter().zip(look(&values)).enumerate();
            for (index, _) in pairs.filter(|(_, (before, after))| *before != after) {
                any = true;
                matters |= index < described || index >= measures.len();
            }
        }
        (any, matters)
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
                let trials = [entry.value * (1.0 + TRIAL), entry.value + 1e-9];
                if is_made && moves(slot, trials).1 {
                    found.perfect.push(entry.address.clone());
                }
                continue;
            }
            Spread::Limits { below, above } => [-below, above],
            Spread::Standard { uncertainty } => [-uncertainty, uncertainty],
        };
        match moves(slot, by.map(|by| entry.displaced(by))) {
            (true, matters) => found.varied.push((slot, matters)),
            (false, _) => found.idle.push(entry.address.clone()),
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
