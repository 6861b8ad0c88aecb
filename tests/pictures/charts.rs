//! Charts of invented data, each hard to draw for a reason of its own.

use std::f64::consts::TAU;

use modewright::report::chart::{
    Across, Band, Bar, Chart, Contour, Curve, Histogram, Layer, Map, Meaning, Panel, Point, Points,
    Range, Reference, Stick,
};
use modewright::report::figure::{Axis, Mark, Stroke};
use modewright::report::number::{
    CURVATURES, DECIBELS, FREQUENCIES, LENGTHS, NUMBERS, POWERS, RATIOS,
};

/// A name for messages, and a chart.
pub type Case = (&'static str, Chart);

/// All of them.
pub fn all() -> Vec<Case> {
    vec![
        ("sweep", sweep()),
        ("pole", pole()),
        ("many curves", many_curves()),
        ("fit", fit()),
        ("histograms", histograms(4)),
        ("twelve histograms", histograms(12)),
        ("bars", bars()),
        ("one bar of nothing", no_bars()),
        ("map", map(120, 90)),
        ("large noisy map", noisy_map()),
        ("map of nothing", map_of_nothing()),
        ("maps side by side", two_maps()),
        ("spectrum", spectrum()),
        ("airy", airy()),
        ("tiny range", tiny_range()),
        ("huge values", huge_values()),
        ("empty", empty()),
        ("crowded", crowded()),
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

/// A gap swept through two ranges of stability, three quantities over it.
fn sweep() -> Chart {
    let xs = even(0.100, 0.124, 601);
    let stable = |d: f64| (0.1024..0.1098).contains(&d) || (0.1142..0.1211).contains(&d);
    let margin = move |d: f64| {
        let [a, b] = if d < 0.112 {
            [0.1024, 0.1098]
        } else {
            [0.1142, 0.1211]
        };
        let middle = 0.5 * (a + b);
        1.0 - ((d - middle) / (0.5 * (b - a))).powi(2)
    };
    let waist =
        move |d: f64, scale: f64| stable(d).then(|| scale * margin(d).max(0.0).sqrt().sqrt());
    let curve = |label: &str, stroke, scale: f64| {
        let points = xs.clone().map(|d| (d, waist(d, scale)));
        Curve::through(label, stroke, points)
    };
    let (t, s) = (
        curve("tangential", Stroke::Solid, 28e-6),
        curve("sagittal", Stroke::Dashed, 21e-6),
    );
    let x = Axis::between("gap d2", 0.100, 0.124, &LENGTHS);
    let ranges = [
        range(0.1024, 0.1098, "stable"),
        range(0.1142, 0.1211, "stable"),
        line(Across::X, 0.1061, Meaning::Nominal, "as designed, 106.1 mm"),
    ];
    let with = |layers: Vec<Layer>| ranges.iter().cloned().chain(layers).collect::<Vec<_>>();
    let margins = Curve::through("", Stroke::Solid, xs.clone().map(|d| (d, Some(margin(d)))));
    let waists = [28e-6, 0.0, 21e-6];
    chart(
        "Z-fold, gap d2 from 100 mm to 124 mm",
        "stable from 102.4 mm to 109.8 mm and from 114.2 mm to 121.1 mm",
        vec![
            Panel {
                heading: "Stability margin, the lesser of both planes".into(),
                ..panel(
                    x.clone(),
                    Axis::between("margin", -1.0, 1.1, &NUMBERS),
                    with(vec![
                        Layer::Curve(margins),
                        line(
                            Across::Y,
                            0.2,
                            Meaning::AtLeast,
                            "limit: margin at least 0.2",
                        ),
                    ]),
                )
            },
            Panel {
                heading: "Waist in the crystal".into(),
                ..panel(
                    x.clone(),
                    Axis::from_zero("waist w₀", waists, &LENGTHS),
                    with(vec![
                        Layer::Curve(t),
                        Layer::Curve(s),
                        mark(Stroke::Solid, [0.1061, 28e-6], "28.0 µm"),
                        mark(Stroke::Dashed, [0.11765, 21e-6], "21.0 µm"),
                    ]),
                )
            },
            panel(
                x,
                Axis::decades("clipping loss per round trip", [1e-7, 0.4], &NUMBERS),
                with(vec![
                    Layer::Curve(Curve::through(
                        "aperture A1",
                        Stroke::DashDotted,
                        xs.map(|d| (d, waist(d, 1.0).map(|w| 1e-7 / (w * w * w * w + 1e-8)))),
                    )),
                    line(Across::Y, 1e-2, Meaning::AtMost, "limit: at most 1 %"),
                ]),
            ),
        ],
    )
}

/// A curve that leaves the frame at a pole and comes back from the other side.
fn pole() -> Chart {
    let at = 0.6283;
    let points =
        |side: f64| even(1e-6, 0.6, 300).map(move |d| (at + side * d, Some(0.05 / (side * d))));
    let mut curve = Curve::through("radius of the wavefront", Stroke::Solid, points(1.0));
    let mut below = Curve::through("", Stroke::Solid, points(-1.0));
    below.pieces[0].reverse();
    curve.pieces.append(&mut below.pieces);
    let wild = even(0.0, 1.2, 400).map(|x| (x, Some(40.0 * (9.0 * x).sin().powi(5))));
    chart(
        "Wavefront at the output coupler",
        "flat at 628 mm",
        vec![panel(
            Axis::between("distance", 0.0, 1.25, &LENGTHS),
            Axis::between("radius of curvature", -1.5, 1.5, &LENGTHS),
            vec![
                Layer::Curve(curve),
                Layer::Curve(Curve::through("far over the frame", Stroke::Dotted, wild)),
                line(Across::Y, 3.0, Meaning::AtMost, "a limit that lies outside"),
            ],
        )],
    )
}

/// As many curves as there are strokes, twice, with names of every length.
fn many_curves() -> Chart {
    let names = [
        "M1, tangential",
        "M1, sagittal",
        "a mirror with a name of some length, tangential",
        "a mirror with a name of some length, sagittal",
        "M3, tangential",
        "M3, sagittal",
        "OC, tangential",
        "OC, sagittal",
    ];
    let layers = names.iter().enumerate().map(|(k, name)| {
        let k = k as f64;
        let stroke = Stroke::ALL[k as usize % 4];
        let points = even(0.0, 10.0, 300).map(|p| {
            (
                p,
                Some(2e-4 + 4e-5 * k + 6e-5 * (0.5 * p + k).sin() * (1.0 + 0.2 * k)),
            )
        });
        Layer::Curve(Curve::through(*name, stroke, points))
    });
    chart(
        "Spots against pump power",
        "all below 1 mm up to 10 W",
        vec![panel(
            Axis::between("pump power", 0.0, 10.0, &POWERS),
            Axis::of("beam radius", [5e-5, 7e-4], &LENGTHS),
            layers.collect(),
        )],
    )
}

/// Measured radii of both planes with bars, the fitted beams, and their bands of confidence.
fn fit() -> Chart {
    let mut layers = Vec::new();
    for (stroke, name, at, waist, length) in [
        (Stroke::Solid, "horizontal", 0.31, 1.1e-4, 0.06),
        (Stroke::Dashed, "vertical", 0.36, 1.5e-4, 0.09),
    ] {
        let radius = move |z: f64| waist * ((z - at) / length).hypot(1.0);
        let band = even(0.15, 0.55, 80).map(|z| {
            let spread = 0.02 * waist + 0.05 * (radius(z) - waist);
            [z, radius(z) - spread, radius(z) + spread]
        });
        layers.push(Layer::Band(Band {
            label: "95 % confidence of the fitted beam".into(),
            stroke,
            pieces: vec![band.collect()],
        }));
        let fitted = even(0.15, 0.55, 200).map(|z| (z, Some(radius(z))));
        let name_of_fit = format!("{name}, fitted");
        layers.push(Layer::Curve(Curve::through(name_of_fit, stroke, fitted)));
        let points = even(0.17, 0.53, 13).zip(thrown(7)).map(|(z, t)| {
            let y = radius(z) * (1.0 + 0.1 * (t - 0.5));
            Point {
                x: z,
                y,
                x_range: Some([z - 2e-3, z + 2e-3]),
                y_range: Some([0.94 * y, 1.06 * y]),
            }
        });
        layers.push(Layer::Points(Points {
            label: format!("{name}, measured"),
            stroke,
            points: points.collect(),
        }));
    }
    let x = Axis::between("distance from the output coupler", 0.15, 0.55, &LENGTHS);
    let residuals = even(0.17, 0.53, 13).zip(thrown(7)).map(|(x, t)| Point {
        x,
        y: 0.1 * (t - 0.5),
        y_range: Some([0.1 * (t - 0.5) - 0.06, 0.1 * (t - 0.5) + 0.06]),
        ..Point::default()
    });
    chart(
        "Measured beam",
        "M² = 1.08 ± 0.03 horizontal, 1.12 ± 0.04 vertical",
        vec![
            panel(
                x.clone(),
                Axis::from_zero("beam radius", [5e-4], &LENGTHS),
                layers,
            ),
            panel(
                x,
                Axis::between("deviation", -0.15, 0.15, &RATIOS),
                vec![Layer::Points(Points {
                    label: String::new(),
                    stroke: Stroke::Solid,
                    points: residuals.collect(),
                })],
            ),
        ],
    )
}

fn histogram(from: f64, to: f64, seed: u64) -> Layer {
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
fn histograms(count: usize) -> Chart {
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
fn bars() -> Chart {
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

fn no_bars() -> Chart {
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
fn map_of(columns: usize, rows: usize, value: impl Fn(f64, f64) -> Option<f64>) -> Map {
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

fn hill(x: f64, y: f64) -> Option<f64> {
    let g = (2.2 * x - 0.3 + 0.5 * y) * (1.5 * y + 0.2 - 0.3 * x);
    (0.0..1.0).contains(&g).then(|| 4.0 * g * (1.0 - g))
}

fn map_panel(map: Map) -> Panel {
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

fn map(columns: usize, rows: usize) -> Chart {
    let panel = map_panel(map_of(columns, rows, hill));
    chart(
        "Both gaps of the Z-fold",
        "stable, margin 0.92",
        vec![panel],
    )
}

fn noisy_map() -> Chart {
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

fn map_of_nothing() -> Chart {
    let map = map_of(40, 30, |_, _| None);
    chart(
        "Nowhere stable",
        "unstable everywhere",
        vec![map_panel(map)],
    )
}

fn two_maps() -> Chart {
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

/// Transverse modes over one free spectral range.
fn spectrum() -> Chart {
    let sticks = (0..9).flat_map(|order: u32| {
        (0..=order).map(move |n| {
            let at = (f64::from(n) * 0.2741 + f64::from(order - n) * 0.2689).fract() * 1.5e9;
            Stick {
                at,
                height: 1.0 / f64::from(1 + order),
                stroke: if order % 2 == 0 {
                    Stroke::Solid
                } else {
                    Stroke::Dashed
                },
                label: format!("{n},{}", order - n),
            }
        })
    });
    chart(
        "Mode spectrum of the analyser",
        "nearest mode 3,1 at 12.3 MHz from 0,0",
        vec![panel(
            Axis::between(
                "offset from the fundamental mode",
                -2e7,
                1.5e9,
                &FREQUENCIES,
            ),
            Axis::between("relative height", 0.0, 1.15, &NUMBERS),
            vec![
                range(-1e7, 1e7, "linewidth"),
                Layer::Sticks(sticks.collect()),
            ],
        )],
    )
}

fn airy() -> Chart {
    let transmission = |f: f64, finesse: f64| {
        1.0 / (1.0 + (2.0 * finesse / std::f64::consts::PI * (TAU * f / 3e9).sin()).powi(2))
    };
    let curve = |label: &str, stroke, finesse: f64| {
        let points =
            even(-2e9, 2e9, 2001).map(|f| (f, Some(10.0 * transmission(f, finesse).log10())));
        Layer::Curve(Curve::through(label, stroke, points))
    };
    chart(
        "Transmission of the mode cleaner",
        "finesse 310, linewidth 4.84 MHz",
        vec![panel(
            Axis::between("detuning", -2e9, 2e9, &FREQUENCIES),
            Axis::between("transmission", -60.0, 4.0, &DECIBELS),
            vec![
                curve("p polarised", Stroke::Solid, 310.0),
                curve("s polarised", Stroke::Dashed, 30.0),
                line(Across::Y, -3.0, Meaning::Guide, "−3 dB"),
            ],
        )],
    )
}

/// Nanometres around a length, and ratios that differ in the eighth digit.
fn tiny_range() -> Chart {
    let (from, to) = (0.123_456_7 - 3e-9, 0.123_456_7 + 3e-9);
    let ys = |x: f64| 0.5 + 4e-9 * ((x - from) / 1e-9).sin();
    chart(
        "A piezo's reach",
        "locked",
        vec![panel(
            Axis::between("gap d", from, to, &LENGTHS),
            Axis::of("margin", even(from, to, 50).map(ys), &NUMBERS),
            vec![
                Layer::Curve(Curve::through(
                    "margin",
                    Stroke::Solid,
                    even(from, to, 200).map(|x| (x, Some(ys(x)))),
                )),
                line(Across::X, 0.123_456_7, Meaning::Nominal, "as designed"),
            ],
        )],
    )
}

/// Over twenty decades, and beyond every unit.
fn huge_values() -> Chart {
    let points =
        |power: f64| even(1.0, 40.0, 40).map(move |x| (x * 1e16, Some(x.powf(power) * 1e-4)));
    let y = Axis::decades("power density", [1e-6, 1e16], &NUMBERS);
    let curves = Stroke::ALL.into_iter().enumerate().map(|(k, stroke)| {
        let power = [1.0, 4.0, 9.0, 12.0][k];
        Layer::Curve(Curve::through(
            format!("power {power}"),
            stroke,
            points(power),
        ))
    });
    let strength = even(0.0, 10.0, 30).map(|x| (x * 4e16, Some(3e4 * x)));
    chart(
        "Huge",
        "absurd",
        vec![
            panel(
                Axis::of("number of photons", [1e16, 4e17], &NUMBERS),
                y,
                curves.collect(),
            ),
            panel(
                Axis::of("number of photons", [1e16, 4e17], &NUMBERS),
                Axis::of("strength", [0.0, 3e5], &CURVATURES),
                vec![Layer::Curve(Curve::through(
                    "strength",
                    Stroke::Solid,
                    strength,
                ))],
            ),
        ],
    )
}

/// Nothing at all, and nothing within axes.
fn empty() -> Chart {
    Chart {
        missing: vec!["no cavity of the sweep is stable".into()],
        ..chart(
            "Empty",
            "unstable everywhere",
            vec![
                panel(
                    Axis::of("gap", [], &LENGTHS),
                    Axis::of("waist", [f64::NAN, f64::INFINITY], &LENGTHS),
                    vec![],
                ),
                panel(
                    Axis::between("gap", 0.1, 0.1, &LENGTHS),
                    Axis::between("waist", 0.0, 0.0, &LENGTHS),
                    vec![
                        Layer::Curve(Curve::through(
                            "never",
                            Stroke::Solid,
                            [(0.1, None), (0.2, Some(f64::NAN))],
                        )),
                        Layer::Histogram(Histogram {
                            edges: vec![0.1],
                            heights: vec![],
                        }),
                    ],
                ),
            ],
        )
    }
}

/// Labels for which there is no room.
fn crowded() -> Chart {
    let mut layers: Vec<Layer> = (0..30)
        .map(|k| {
            let label = format!("quantile {k} of thirty");
            line(
                Across::X,
                0.05 + 0.003 * f64::from(k),
                Meaning::Guide,
                &label,
            )
        })
        .collect();
    layers.extend((0..12).map(|k| {
        let at = 0.4 + 0.01 * f64::from(k);
        line(
            Across::Y,
            at,
            Meaning::AtMost,
            "a limit among many of its kind",
        )
    }));
    layers.extend((0..40).map(|k| {
        let at = [0.02 + 0.004 * f64::from(k), 0.5 + 0.001 * f64::from(k)];
        mark(Stroke::Dashed, at, "a marked place")
    }));
    layers.push(range(0.0, 0.002, "a range narrower than its label"));
    layers.extend((0..20).map(|k| {
        let rise = 0.2 + 0.03 * f64::from(k);
        let points = [(0.0, Some(rise)), (0.2, Some(1.0 - rise))];
        Layer::Curve(Curve::through(
            format!("line {k}"),
            Stroke::ALL[k as usize % 4],
            points,
        ))
    }));
    Chart {
        title: "A title so long that no picture can show it whole, whatever its size, and which goes on and on for the sake of it".into(),
        ..chart(
            "",
            "a verdict that is never shortened, long as it may be",
            vec![Panel {
                heading: "A heading that is also far longer than it need be, and longer than the frame is wide, so that it must be cut somewhere near its end, here".into(),
                ..panel(
                    Axis::between("a horizontal axis with a title of some length", 0.0, 0.2, &LENGTHS),
                    Axis::between("a vertical axis with a title that is far longer than the frame is high, so that it takes more than one line and even then", 0.0, 1.0, &NUMBERS),
                    layers,
                )
            }],
        )
    }
}
