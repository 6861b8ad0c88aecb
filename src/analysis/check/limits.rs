//! Limits and ranges of a check, told as results.

use super::TOO_LARGE;
use super::result::{LimitCheck, Range};
use crate::analysis::eigenmode::Stability;
use crate::analysis::measures::{Evaluator, Workspace};
use crate::analysis::ranges::{End, QuantityRange};
use crate::cavity::{Cavity, Entry, Measure};
use crate::quantity::Spread;

pub(super) fn describe_range(cavity: &Cavity, found: QuantityRange, stability: Stability) -> Range {
    let entry = cavity.book().entry(found.slot);
    let ends = found.range.map(|range| (range.from, range.to));
    let value = |end: Option<End>| {
        end.and_then(End::value)
            .filter(|_| !matches!(end, Some(End::Zero { .. })))
    };
    let from = value(ends.map(|ends| ends.0));
    let to = value(ends.map(|ends| ends.1));
    let mut reasons = Vec::new();
    match ends {
        None => reasons.push("no value of this quantity alone makes the cavity stable".to_string()),
        Some((low, high)) => {
            for (name, end) in [("from", low), ("to", high)] {
                match end {
                    End::Edge { touch: true, .. } => reasons.push(format!(
                        "{name}: the half-trace touches ±1 there, and the cavity is stable again \
                         beyond"
                    )),
                    End::Edge { .. } => {}
                    End::Zero { at: 0.0 } => {
                        reasons.push(format!("{name}: stable all the way to zero"));
                    }
                    End::Zero { .. } => {
                        reasons.push(format!("{name}: stable until a tied length reaches zero"));
                    }
                    End::Open => reasons.push(format!("{name}: no edge in reach")),
                }
            }
        }
    }
    let reciprocal = entry.is_reciprocal();
    let plain = |end: Option<f64>| (!reciprocal).then_some(end);
    let per_m = |end: Option<f64>| reciprocal.then_some(end);
    Range {
        quantity: entry.address.clone(),
        from: plain(from),
        to: plain(to),
        from_per_m: per_m(from),
        to_per_m: per_m(to),
        holds_nominal: stability == Stability::Stable,
        why: (!reasons.is_empty()).then(|| reasons.join("; ")),
        found,
        tolerance: tolerance(entry),
        kind: entry.kind,
    }
}

/// Half the width of a quantity's tolerance as written: half of its limits, or twice the
/// standard uncertainty.
fn tolerance(entry: &Entry) -> Option<f64> {
    let half = match entry.spread {
        Spread::Exact => return None,
        Spread::Limits { below, above } => 0.5 * (below + above),
        Spread::Standard { uncertainty } => 2.0 * uncertainty,
    };
    Some(half)
}

fn no_value(measure: Measure) -> &'static str {
    match measure {
        Measure::Finesse | Measure::Linewidth | Measure::Lifetime => {
            "nothing is written of any loss"
        }
        Measure::ModeClearance { .. } | Measure::Suppression { .. } => {
            "the cavity holds no mode, or no loss is written"
        }
        _ => "the cavity holds no mode",
    }
}

pub(super) fn limits(cavity: &Cavity, values: &[f64]) -> Vec<LimitCheck> {
    let measures = cavity.limits.iter().map(|limit| limit.measure).collect();
    let mut found = Vec::new();
    Evaluator::new(cavity, measures).evaluate(
        values,
        &mut Workspace::default(),
        |_, value: f64, exists| found.push(exists.then_some(value)),
    );
    cavity
        .limits
        .iter()
        .zip(found)
        .map(|(limit, found)| {
            let value = found.filter(|value| value.is_finite());
            LimitCheck {
                of: limit.name.clone(),
                value,
                holds: value.is_some_and(|value| limit.bounds.hold(value)),
                wanted: limit.bounds.to_string(),
                why: value.is_none().then(|| match found {
                    Some(_) => TOO_LARGE.into(),
                    None => no_value(limit.measure).into(),
                }),
                limit: limit.clone(),
            }
        })
        .collect()
}
