//! A tolerance study as a picture: how the measures lie, and what makes their variance.

use super::measured::{measured, scales_of, wanted};
use super::tolerance::judged;
use crate::cavity::Bounds;
use crate::report::chart::{Across, Bar, Chart, Histogram, Layer, Meaning, Panel, Reference};
use crate::report::figure::Axis;
use crate::report::number::{NOTHING, RATIOS, fixed, plain};
use crate::study::tolerance::{Statistics, Tolerance};

/// Quantities that are named in a panel of bars.
const MOST_BARS: usize = 8;

/// The result of a tolerance study as a picture.
pub fn describe(found: &Tolerance) -> Chart {
    let (word, rest, _) = judged(found);
    let mut panels = Vec::new();
    for (name, statistics) in &found.measures {
        panels.push(histogram(found, name, statistics));
        panels.push(bars(found, name));
    }
    Chart {
        title: found
            .title
            .clone()
            .unwrap_or_else(|| "Tolerance study".into()),
        verdict: word.to_lowercase(),
        particulars: format!(
            "{rest}; {} samples, seed {}, unstable {} %",
            found.samples,
            found.seed,
            plain(100.0 * found.unstable, 3)
        ),
        columns: 2,
        panels,
        missing: Vec::new(),
        notes: vec![
            "left: shares of the stable samples, limits hatched on the forbidden side".into(),
            "right: shares of the variance, alone (filled) and with interactions (outlined)".into(),
        ],
    }
}

fn histogram(found: &Tolerance, name: &str, statistics: &Statistics) -> Panel {
    let presence = statistics.measure.presence();
    let limits: Vec<_> = found
        .limits
        .iter()
        .filter(|limit| limit.name == name)
        .collect();
    let (edges, shares) = match &statistics.histogram {
        Some(histogram) => (histogram.edges.clone(), histogram.shares.clone()),
        None => (Vec::new(), Vec::new()),
    };
    let mut shown = edges.clone();
    shown.extend(statistics.nominal);
    // A limit belongs into the picture unless it would squeeze everything else.
    let span = edges
        .last()
        .zip(edges.first())
        .map_or(0.0, |(to, from)| to - from);
    let mut references = Vec::new();
    for limit in &limits {
        let ends = match limit.bounds {
            Bounds::Above(low) => vec![(low, Meaning::AtLeast)],
            Bounds::Below(high) => vec![(high, Meaning::AtMost)],
            Bounds::Between(low, high) => vec![(low, Meaning::AtLeast), (high, Meaning::AtMost)],
        };
        for (at, meaning) in ends {
            let is_near = edges
                .iter()
                .any(|edge| (edge - at).abs() <= 1.5 * span + NOTHING);
            if is_near {
                shown.push(at);
            }
            references.push(Layer::Reference(Reference {
                across: Across::X,
                at,
                meaning,
                label: "limit".into(),
            }));
        }
    }
    if let Some(nominal) = statistics.nominal {
        references.push(Layer::Reference(Reference {
            across: Across::X,
            at: nominal,
            meaning: Meaning::Nominal,
            label: "nominal".into(),
        }));
    }
    let wanted: Vec<String> = limits
        .iter()
        .map(|limit| {
            let share = plain(100.0 * limit.fails, 3);
            format!("{}: {share} % fail", wanted(limit.bounds, presence))
        })
        .collect();
    let heading = match statistics.mean {
        None => format!("{name}: no value"),
        Some(_) if !wanted.is_empty() => format!("{name}, {}", wanted.join(", ")),
        Some(mean) => format!("{name}, mean {}", measured(mean, presence, plain)),
    };
    let mut layers = vec![Layer::Histogram(Histogram {
        edges,
        heights: shares.clone(),
    })];
    layers.extend(references);
    Panel {
        heading,
        x: Axis::of(name, shown, scales_of(presence)),
        y: Some(Axis::from_zero("share of samples", shares, &RATIOS)),
        layers,
    }
}

fn bars(found: &Tolerance, name: &str) -> Panel {
    let bars: Vec<Bar> = found
        .contributions
        .iter()
        .filter(|share| share.measure == name)
        .take(MOST_BARS)
        .map(|share| Bar {
            name: share.quantity.clone(),
            value: share.first_order.max(0.0),
            total: Some(share.total),
            whisker: Some([
                (share.total - 2.0 * share.total_u).max(0.0),
                share.total + 2.0 * share.total_u,
            ]),
            label: format!("{} %", fixed(100.0 * share.total, 0)),
        })
        .collect();
    let totals: Vec<f64> = bars.iter().filter_map(|bar| bar.total).collect();
    Panel {
        heading: format!("{name}: what makes its variance"),
        x: Axis::for_bars("share of the variance", totals, &RATIOS),
        y: None,
        layers: vec![Layer::Bars(bars)],
    }
}
