//! Charts of invented data, each hard to draw for a reason of its own.

mod areas;
mod curves;
mod hard;
mod studied;
mod swept;

use modewright::report::chart::{Across, Chart, Layer, Meaning, Panel, Range, Reference};
use modewright::report::figure::{Axis, Mark, Stroke};

/// A name for messages, and a chart.
pub type Case = (&'static str, Chart);

/// All of them.
pub fn all() -> Vec<Case> {
    vec![
        ("sweep", curves::sweep()),
        ("pole", curves::pole()),
        ("many curves", curves::many_curves()),
        ("fit", curves::fit()),
        ("histograms", areas::histograms(4)),
        ("twelve histograms", areas::histograms(12)),
        ("bars", areas::bars()),
        ("one bar of nothing", areas::no_bars()),
        ("map", areas::map(120, 90)),
        ("large noisy map", areas::noisy_map()),
        ("map of nothing", areas::map_of_nothing()),
        ("maps side by side", areas::two_maps()),
        ("spectrum", curves::spectrum()),
        ("airy", curves::airy()),
        ("tiny range", hard::tiny_range()),
        ("huge values", hard::huge_values()),
        ("empty", hard::empty()),
        ("swept gap", swept::gap()),
        ("swept pump", swept::pump()),
        ("swept through flat", swept::through_flat()),
        ("swept without a mode", swept::without_mode()),
        ("map of two", swept::two()),
        ("tolerances", studied::failing_limits()),
        ("tolerances of spacings", studied::spacings()),
        ("tolerances without a mode", studied::no_mode()),
        ("crowded", hard::crowded()),
    ]
}

fn chart(title: &str, verdict: &str, panels: Vec<Panel>) -> Chart {
    Chart {
        title: title.into(),
        verdict: verdict.into(),
        particulars: "invented data; 1064 nm".into(),
        columns: 1,
        panels,
        ..Chart::default()
    }
}

fn panel(x: Axis, y: Axis, layers: Vec<Layer>) -> Panel {
    Panel {
        heading: String::new(),
        x,
        y: Some(y),
        layers,
    }
}

fn line(across: Across, at: f64, meaning: Meaning, label: &str) -> Layer {
    Layer::Reference(Reference {
        across,
        at,
        meaning,
        label: label.into(),
    })
}

fn range(from: f64, to: f64, label: &str) -> Layer {
    Layer::Range(Range {
        from,
        to,
        label: label.into(),
    })
}

fn mark(stroke: Stroke, at: [f64; 2], label: &str) -> Layer {
    Layer::Mark(Mark {
        places: vec![(stroke, at)],
        label: label.into(),
    })
}

/// Evenly spaced numbers, the ends included.
fn even(from: f64, to: f64, count: usize) -> impl Iterator<Item = f64> + Clone {
    (0..count).map(move |i| from + (to - from) * i as f64 / (count - 1) as f64)
}

/// Numbers that look thrown but are the same every time.
fn thrown(seed: u64) -> impl Iterator<Item = f64> {
    let mut state = seed.wrapping_mul(0x9E37_79B9_7F4A_7C15) | 1;
    std::iter::repeat_with(move || {
        state ^= state << 13;
        state ^= state >> 7;
        state ^= state << 17;
        (state >> 11) as f64 / (1_u64 << 53) as f64
    })
}

/// A bell.
fn bell(x: f64) -> f64 {
    (-0.5 * x * x).exp()
}
