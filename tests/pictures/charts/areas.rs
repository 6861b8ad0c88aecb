//! Histograms, bars and maps.

use modewright::report::chart::{
    Across, Bar, Chart, Contour, Histogram, Layer, Map, Meaning, Panel,
};
use modewright::report::figure::{Axis, Stroke};
use modewright::report::number::{LENGTHS, NUMBERS, RATIOS};

use super::{bell, chart, even, line, mark, thrown};

pub fn histogram(from: f64, to: f64, seed: u64) -> Layer {
    let bins = 40;
    let heights = even(-3.0, 3.0, bins)
        .zip(thrown(seed))
        .map(|(x, t)| (0.08 * bell(x) * (0.8 + 0.4 * t) * 1e3).round() / 1e3);
    Layer::Histogram(Histogram {
        edges: even(from, to, bins + 1).collect(),
        heights: heights.collect(),
    })
}

/// A histogram for each measure, with quantiles and limits.
pub fn histograms(count: usize) -> Chart {
    let panels = (0..count).map(|index| {
        let scale = [3e-5, 2e-3, 0.2, 4e-4][index % 4];
        let (from, to) = (0.7 * scale, 1.3 * scale);
        let at = |share: f64| from + share * (to - from);
        let x = if index % 4 == 2 {
            Axis::of("margin", [from, to], &NUMBERS)
        } else {
            Axis::of("waist", [from, to], &LENGTHS)
        };
        let label = [
            "limit: at most 36 µm",
            "limit",
            "a limit whose label is longer than it need be",
            "",
        ][index % 4];
        let mut layers = vec![
            histogram(from, to, index as u64 + 1),
            line(Across::X, at(0.23), Meaning::Guide, "5 %"),
            line(Across::X, at(0.5), Meaning::Guide, "median"),
            line(Across::X, at(0.77), Meaning::Guide, "95 %"),
            line(Across::X, at(0.53), Meaning::Nominal, "as designed"),
        ];
        if !label.is_empty() {
            layers.push(line(Across::X, at(0.8), Meaning::AtMost, label));
        }
        if index % 4 == 2 {
            layers.push(line(Across::X, at(0.1), Meaning::AtLeast, "at least 0.15"));
        }
        Panel {
            heading: format!("measure {}: a waist, a margin or a spot", index + 1),
            x,
            y: Some(Axis::from_zero("share of cavities", [0.1], &RATIOS)),
            layers,
        }
    });
    Chart {
        columns: 2,
        ..chart(
            "Tolerances of the Z-fold",
            "94.2 % of 10 000 cavities keep all limits",
            panels.collect(),
        )
    }
}

/// Contributions of each tolerance: first order filled, in total outlined.
pub fn bars() -> Chart {
    let bars = [
        ("M3.roc", 0.41, 0.46, "46 %"),
        ("a2.length", 0.27, 0.33, "33 %"),
        ("X1.thickness", 0.08, 0.10, ""),
        (
            "a crystal with a name far too long to be written at the left.index",
            0.05,
            0.06,
            "6 %",
        ),
        ("M4.roc", 0.031, 0.03, "3 %"),
        ("M4.aoi", -0.02, 0.0, "nothing"),
    ];
    let bars = bars.map(|(name, value, total, label)| Bar {
        name: name.into(),
        value,
        total: Some(total),
        whisker: (value > 0.0).then_some([total - 0.02, total + 0.02]),
        label: label.into(),
    });
    let signed = ["d1", "d2", "d3"]
        .into_iter()
        .enumerate()
        .map(|(k, name)| Bar {
            name: name.into(),
            value: [3.0e-4, -4.5e-4, 1e-6][k],
            label: ["+0.30 mm per mm", "−0.45 mm per mm", "none"][k].into(),
            ..Bar::default()
        });
    chart(
        "What moves the waist in the crystal",
        "M3.roc and a2.length make up 79 % of its variance",
        vec![
            Panel {
                heading: "Share of the variance".into(),
                x: Axis::between("share", -0.05, 0.55, &RATIOS),
                y: None,
                layers: vec![
                    Layer::Bars(bars.into()),
                    line(Across::X, 0.1, Meaning::Guide, "a tenth"),
                ],
            },
            Panel {
                heading: "First derivatives".into(),
                x: Axis::for_bars("change of the waist", [3e-4, -4.5e-4], &LENGTHS),
                y: None,
                layers: vec![Layer::Bars(signed.collect())],
            },
        ],
    )
}

pub fn no_bars() -> Chart {
    let panel = |bars| Panel {
        heading: "Share of the variance".into(),
        x: Axis::from_zero("share", [], &RATIOS),
        y: None,
        layers: vec![Layer::Bars(bars)],
    };
    let one = Bar {
        name: "d".into(),
        label: "none".into(),
        ..Bar::default()
    };
    chart(
        "Nothing varies",
        "no spread",
        vec![panel(vec![one]), panel(vec![])],
    )
}

/// A hill that ends at an edge of stability.
pub fn map_of(columns: usize, rows: usize, value: impl Fn(f64, f64) -> Option<f64>) -> Map {
    let values = even(0.0, 1.0, rows).flat_map(|y| {
        even(0.0, 1.0, columns)
            .map(|x| value(x, y))
            .collect::<Vec<_>>()
    });
    Map {
        columns,
        values: values.collect(),
        scale: Axis::between("stability margin", 0.0, 1.0, &NUMBERS),
        absent: "unstable".into(),
        contours: vec![
            Contour {
                level: 0.3,
                meaning: Meaning::AtLeast,
                label: "at least 0.3".into(),
            },
            Contour {
                level: 0.7,
                meaning: Meaning::Guide,
                label: "0.7".into(),
            },
        ],
        nominal: Some([0.106, 0.052]),
    }
}

pub fn hill(x: f64, y: f64) -> Option<f64> {
    let g = (2.2 * x - 0.3 + 0.5 * y) * (1.5 * y + 0.2 - 0.3 * x);
    (0.0..1.0).contains(&g).then_some(4.0 * g * (1.0 - g))
}

pub fn map_panel(map: Map) -> Panel {
    Panel {
        heading: "Stability margin".into(),
        x: Axis::between("gap d2", 0.100, 0.112, &LENGTHS),
        y: Some(Axis::between("gap d3", 0.045, 0.060, &LENGTHS)),
        layers: vec![
            Layer::Map(map),
            mark(Stroke::Solid, [0.1035, 0.0555], "greatest margin, 0.998"),
        ],
    }
}

pub fn map(columns: usize, rows: usize) -> Chart {
    let panel = map_panel(map_of(columns, rows, hill));
    chart(
        "Both gaps of the Z-fold",
        "stable, margin 0.92",
        vec![panel],
    )
}

pub fn noisy_map() -> Chart {
    let noise: Vec<f64> = thrown(3).take(1_000_000).collect();
    let value = |x: f64, y: f64| {
        let at = (y * 999.0).round() as usize * 1000 + (x * 999.0).round() as usize;
        hill(x, y).map(|h| (0.6 * h + 0.4 * noise[at]).min(1.0))
    };
    let map = Map {
        contours: vec![],
        ..map_of(1000, 1000, value)
    };
    chart("A million cells", "noisy", vec![map_panel(map)])
}

pub fn map_of_nothing() -> Chart {
    let map = map_of(40, 30, |_, _| None);
    chart(
        "Nowhere stable",
        "unstable everywhere",
        vec![map_panel(map)],
    )
}

pub fn two_maps() -> Chart {
    let waist = Map {
        scale: Axis::decades("waist in the crystal", [2e-5, 4e-4], &LENGTHS),
        contours: vec![Contour {
            level: 1e-4,
            meaning: Meaning::AtMost,
            label: "at most 100 µm".into(),
        }],
        ..map_of(60, 60, |x, y| hill(x, y).map(|h| 2e-5 * (20_f64).powf(h)))
    };
    let waist = Panel {
        heading: "Waist".into(),
        ..map_panel(waist)
    };
    Chart {
        columns: 2,
        ..chart(
            "Both gaps of the Z-fold",
            "stable, margin 0.92",
            vec![map_panel(map_of(30, 30, hill)), waist],
        )
    }
}
