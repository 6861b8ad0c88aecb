//! What a chart says is so: everything is named or its want is noted, nothing is drawn beyond
//! what was given, maps stay small.

use modewright::report::chart::{Chart, Layer};
use modewright::report::render::plot::{self, Ink, Item, LEVELS, Scene};
use resvg::usvg::roxmltree::Document;

use crate::charts;

/// Largest picture, in bytes.
const LARGEST: usize = 2_000_000;

fn chart(name: &str) -> Chart {
    let found = charts::all().into_iter().find(|case| case.0 == name);
    found.unwrap().1
}

fn page(name: &str) -> Scene {
    plot::scene(&chart(name)).unwrap()
}

fn lines(page: &Scene, wanted: Ink) -> impl Iterator<Item = &Vec<[f64; 2]>> {
    page.items.iter().filter_map(move |item| match item {
        Item::Line { points, ink, .. } if *ink == wanted => Some(points),
        _ => None,
    })
}

#[test]
fn the_verdict_stands_whole_in_the_title() {
    for (name, chart) in charts::all() {
        let page = plot::scene(&chart).unwrap();
        let texts = page.texts();
        let is_there = |index: usize| texts[index].0.ends_with(&chart.verdict);
        assert!(is_there(0) || is_there(1), "{name}: {}", texts[0].0);
    }
}

#[test]
fn every_label_is_written_or_missed_in_a_note() {
    // In a crowd notes count instead of naming.
    for (name, chart) in charts::all().into_iter().filter(|case| case.0 != "crowded") {
        let page = plot::scene(&chart).unwrap();
        let mut all = String::new();
        for (text, _) in page.texts() {
            all += text.trim_end_matches('…');
            all.push(' ');
        }
        let is_said = |label: &str| {
            // A label may be cut.
            let start: String = label.chars().take(20).collect();
            all.contains(&start)
        };
        for panel in &chart.panels {
            assert!(is_said(&panel.heading), "{name}: {}", panel.heading);
            for layer in &panel.layers {
                let label = match layer {
                    Layer::Range(range) => &range.label,
                    Layer::Reference(line) => &line.label,
                    Layer::Curve(curve) if !curve.pieces.is_empty() => &curve.label,
                    Layer::Band(band) => &band.label,
                    Layer::Points(points) => &points.label,
                    Layer::Mark(mark) => &mark.label,
                    _ => continue,
                };
                assert!(is_said(label), "{name}: {label}");
            }
        }
    }
}

#[test]
fn quantiles_of_twelve_histograms_all_have_their_labels() {
    let page = page("twelve histograms");
    let count = |label: &str| page.texts().iter().filter(|text| text.0 == label).count();
    for label in ["5 %", "median", "95 %", "as designed"] {
        assert_eq!(count(label), 12, "{label}");
    }
}

#[test]
fn most_lines_of_a_crowded_spectrum_are_named() {
    let chart = chart("spectrum");
    let page = plot::scene(&chart).unwrap();
    let Some(Layer::Sticks(sticks)) = chart.panels[0].layers.last() else {
        panic!("no sticks");
    };
    let texts: Vec<&str> = page.texts().into_iter().map(|text| text.0).collect();
    let named = sticks.iter().filter(|s| texts.contains(&s.label.as_str()));
    assert!(named.count() * 10 >= sticks.len() * 9);
}

/// A curve that leaves its frame ends there: it neither runs along the edge nor comes back
/// through the other side of a pole.
#[test]
fn a_curve_with_a_pole_is_cut_at_the_frame() {
    let page = page("pole");
    let frame = page.frames[0];
    let is_on_edge = |y: f64| (y - frame.top).abs() < 1e-6 || (y - frame.bottom).abs() < 1e-6;
    let mut pieces = 0;
    for points in lines(&page, Ink::Solid).filter(|points| points.len() > 2) {
        pieces += 1;
        for pair in points.windows(2) {
            let both = is_on_edge(pair[0][1]) && is_on_edge(pair[1][1]);
            assert!(!both, "{pair:?}");
        }
    }
    assert_eq!(pieces, 2);
}

#[test]
fn a_map_has_a_colour_for_every_value_and_none_where_there_is_none() {
    let chart = chart("map");
    let Layer::Map(map) = &chart.panels[0].layers[0] else {
        panic!("no map");
    };
    let page = plot::scene(&chart).unwrap();
    let levels = page.items.iter().find_map(|item| match item {
        Item::Cells { levels, .. } => Some(levels),
        _ => None,
    });
    let levels = levels.unwrap();
    assert_eq!(levels.len(), map.values.len());
    for (level, value) in levels.iter().zip(&map.values) {
        assert_eq!(level.is_some(), value.is_some());
        if let (Some(level), Some(value)) = (level, value) {
            let middle = (f64::from(*level) + 0.5) / f64::from(LEVELS);
            assert!((middle - value).abs() <= 0.51 / f64::from(LEVELS));
        }
    }
}

#[test]
fn charts_are_small_well_formed_and_reproducible() {
    for (name, chart) in charts::all() {
        let svg = plot::svg(&chart).unwrap();
        assert!(svg.len() < LARGEST, "{name}: {} bytes", svg.len());
        Document::parse(&svg).unwrap_or_else(|error| panic!("{name}: {error}"));
        assert_eq!(svg, plot::svg(&chart).unwrap(), "{name}");
    }
}

/// The same map in both formats: the colour of the greatest value is in the picture as pixels.
#[test]
fn a_map_is_in_the_png_too() {
    use resvg::tiny_skia::Pixmap;
    let chart = chart("map");
    let svg = plot::svg(&chart).unwrap();
    let image = Pixmap::decode_png(&plot::png(&chart).unwrap()).unwrap();
    let fills = svg.match_indices("<path fill=\"#").map(|(at, start)| {
        let code = &svg[at + start.len()..][..6];
        u32::from_str_radix(code, 16).unwrap()
    });
    let pixels: std::collections::BTreeSet<u32> = image
        .pixels()
        .iter()
        .map(|p| u32::from_be_bytes([0, p.red(), p.green(), p.blue()]))
        .collect();
    for fill in fills {
        assert!(pixels.contains(&fill), "{fill:06x}");
    }
}

/// What a sweep found is drawn where it was found.
#[test]
fn a_sweep_shows_its_ranges_stationary_spots_and_limits() {
    let chart = chart("swept pump");
    for panel in &chart.panels {
        let ranges = panel.layers.iter().filter(|l| matches!(l, Layer::Range(_)));
        assert_eq!(ranges.count(), 1, "{}", panel.heading);
    }
    let rod = chart
        .panels
        .iter()
        .find(|p| p.heading == "rod.spot")
        .unwrap();
    let marks: Vec<[f64; 2]> = (rod.layers.iter())
        .filter_map(|layer| match layer {
            Layer::Mark(mark) => Some(mark.places[0].1),
            _ => None,
        })
        .collect();
    assert_eq!(marks.len(), 1);
    // The text of the command says 499.5 µm at 227.78 W.
    assert!((marks[0][0] - 227.78).abs() < 0.01 && (marks[0][1] - 499.5e-6).abs() < 1e-7);
    let limits = (rod.layers.iter())
        .filter(|layer| matches!(layer, Layer::Reference(line) if line.label.starts_with("limit")));
    assert_eq!(limits.count(), 2);
}

/// The map of a measure that exists everywhere is empty too where there is no mode.
#[test]
fn a_map_of_a_sweep_is_empty_where_unstable() {
    let chart = chart("map of two");
    for panel in &chart.panels {
        let Layer::Map(map) = &panel.layers[0] else {
            panic!("no map");
        };
        let known = map.values.iter().flatten().count();
        assert!(
            known > 0 && known < map.values.len() / 2,
            "{}",
            panel.heading
        );
        assert!(map.nominal.is_some());
    }
}
