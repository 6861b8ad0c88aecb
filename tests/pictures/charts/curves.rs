//! Curves, points and sticks.

use std::f64::consts::TAU;

use modewright::report::chart::{
    Across, Band, Chart, Curve, Layer, Meaning, Panel, Point, Points, Stick,
};
use modewright::report::figure::{Axis, Stroke};
use modewright::report::number::{DECIBELS, FREQUENCIES, LENGTHS, NUMBERS, POWERS, RATIOS};

use super::{chart, even, line, mark, panel, range, thrown};

/// A gap swept through two ranges of stability, three quantities over it.
pub fn sweep() -> Chart {
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
pub fn pole() -> Chart {
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
pub fn many_curves() -> Chart {
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
pub fn fit() -> Chart {
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

/// Transverse modes over one free spectral range.
pub fn spectrum() -> Chart {
    let sticks = (0..9).flat_map(|order: u32| {
        (0..=order).map(move |n| {
            let at = (f64::from(n) * 0.2741 + f64::from(order - n) * 0.2689).fract() * 1.5e9;
            Stick {
                at,
                height: 1.0 / f64::from(1 + order),
                stroke: if order.is_multiple_of(2) {
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

pub fn airy() -> Chart {
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
