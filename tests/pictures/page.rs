//! The page: no text over another, no curve out of its frame.

use modewright::report::render::plot::{Ink, Item, Rect, Scene, scene};

use crate::{cavities, charts, drawn};

/// Text may stand this much over the edge of what is measured, in pixels.
const ROUNDING: f64 = 1e-6;

fn pages() -> Vec<(&'static str, Scene)> {
    let beams = cavities::all()
        .into_iter()
        .map(|(name, text)| (name, scene(&drawn(&text).figure).unwrap()));
    let charts = charts::all()
        .into_iter()
        .map(|(name, chart)| (name, scene(&chart).unwrap()));
    beams.chain(charts).collect()
}

#[test]
fn no_text_hides_another_or_leaves_the_page() {
    for (name, page) in pages() {
        let texts = page.texts();
        let whole = Rect {
            left: 0.0,
            top: 0.0,
            right: page.width,
            bottom: page.height,
        };
        for (index, (text, area)) in texts.iter().enumerate() {
            assert!(whole.contains(*area), "{name}: {text:?} leaves the page");
            for (other, taken) in &texts[index + 1..] {
                assert!(
                    !area.grown(-ROUNDING).overlaps(*taken),
                    "{name}: {text:?} lies over {other:?}"
                );
            }
        }
    }
}

#[test]
fn curves_stay_inside_their_frames() {
    for (name, page) in pages() {
        let curves = page.items.iter().filter_map(|item| match item {
            Item::Line {
                points,
                ink: Ink::Solid | Ink::Dashed | Ink::Dotted | Ink::DashDotted,
                ..
            } => Some(points),
            _ => None,
        });
        for points in curves {
            let inside = page.frames.iter().any(|frame| {
                let frame = frame.grown(ROUNDING);
                points.iter().all(|[x, y]| {
                    (frame.left..=frame.right).contains(x) && (frame.top..=frame.bottom).contains(y)
                })
            });
            assert!(inside, "{name}: a curve leaves its frame");
        }
    }
}

#[test]
fn every_optic_is_named_and_every_curve_too() {
    for (name, text) in cavities::all() {
        let drawn = drawn(&text);
        let page = scene(&drawn.figure).unwrap();
        let texts: Vec<&str> = page.texts().into_iter().map(|text| text.0).collect();
        let optics = drawn
            .check
            .stations
            .iter()
            .filter(|station| station.kind != "gap");
        for station in optics {
            assert!(
                texts.contains(&station.part.as_str()),
                "{name}: {} has no name",
                station.part
            );
        }
        for curve in drawn.figure.panels.iter().flat_map(|panel| &panel.curves) {
            let is_named = texts.iter().any(|text| text.contains(&curve.label));
            assert!(is_named, "{name}: no name at {}", curve.label);
        }
    }
}

/// In a picture of a bench, not of a test of endurance, every waist has its radius beside it.
#[test]
fn marked_waists_have_their_radius_written() {
    for (name, text) in cavities::all() {
        if name == "three hundred lenses" {
            continue;
        }
        let figure = drawn(&text).figure;
        let page = scene(&figure).unwrap();
        let mut texts: Vec<&str> = page.texts().into_iter().map(|text| text.0).collect();
        for mark in figure.panels.iter().flat_map(|panel| &panel.marks) {
            let found = texts.iter().position(|text| *text == mark.label);
            texts.remove(found.unwrap_or_else(|| panic!("{name}: {} is not written", mark.label)));
        }
    }
}
