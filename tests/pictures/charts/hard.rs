//! What hardly fits an axis or a page.

use modewright::report::chart::{Across, Chart, Curve, Histogram, Layer, Meaning, Panel};
use modewright::report::figure::{Axis, Stroke};
use modewright::report::number::{CURVATURES, LENGTHS, NUMBERS};

use super::{chart, even, line, mark, panel, range};

/// Nanometres around a length, and ratios that differ in the eighth digit.
pub fn tiny_range() -> Chart {
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
pub fn huge_values() -> Chart {
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
pub fn empty() -> Chart {
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
pub fn crowded() -> Chart {
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
