//! All ranges of stability of one quantity between two values.

use super::probe::{Event, Probe};
use super::{End, Range};
use crate::cavity::{Cavity, Slot};

/// Evaluations spent on one interval before the search gives up.
const BUDGET: usize = 200_000;

/// What was found between two values.
#[derive(Clone, Debug, PartialEq)]
pub struct Within {
    /// The ranges from the lower to the upper value. An end that is [`End::Open`] lies at the end
    /// of the interval; a touch parts two ranges.
    pub ranges: Vec<Range>,
    /// How far up the search has come: the upper value, but for functions that vary too fast to be
    /// followed all the way.
    pub searched_to: f64,
}

/// All ranges of one quantity between two values, tied numbers moving along and all others at
/// their nominal values; in SI units (1/R for a radius, 1/f for a focal length).
///
/// Nothing is stepped over, however narrow: the edges are roots of interpolants that stand for
/// the functions themselves. Both values must be such as the quantity can have.
pub fn stable_within(cavity: &Cavity, slot: Slot, from: f64, to: f64) -> Within {
    let (from, to) = (from.min(to), from.max(to));
    let mut probe = Probe::unbounded(cavity, slot);
    probe.budget = BUDGET;
    let mut events: Vec<Event> = Vec::new();
    let mut start = from;
    let mut width = to - from;
    while start < to {
        let (found, next) = probe.events_between(start, (start + width).min(to), to);
        if next <= start {
            break;
        }
        events.extend(found);
        // Where the functions vary fast, the next step is about as short as this one had to be.
        width = 4.0 * (next - start);
        start = next;
    }
    probe.merge(&mut events);
    let mut ends = vec![probe.edge_at(from, 1.0)];
    ends.extend(events.iter().map(|event| End::Edge {
        at: event.at,
        plane: event.plane,
        touch: false,
    }));
    // An edge at the very end has been found among the others.
    if events.last().is_none_or(|last| last.at < start) {
        ends.push(probe.edge_at(start, -1.0));
    }
    let place = |end: End, open: f64| end.value().unwrap_or(open);
    let mut ranges: Vec<Range> = Vec::new();
    let mut before_is_stable = false;
    for pair in ends.windows(2) {
        let [mut low, high] = [pair[0], pair[1]];
        let stable = probe.is_stable_between(place(low, from), place(high, start));
        if stable && before_is_stable {
            // The edge between two ranges is a touch of both.
            if let End::Edge { touch, .. } = &mut low {
                *touch = true;
            }
            if let Some(last) = ranges.last_mut() {
                last.to = low;
            }
        }
        if stable {
            ranges.push(Range {
                from: low,
                to: high,
            });
        }
        before_is_stable = stable;
    }
    Within {
        ranges,
        searched_to: start,
    }
}
