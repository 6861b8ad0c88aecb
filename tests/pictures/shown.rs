//! What a picture says is so.

use approx::assert_relative_eq;
use modewright::optics::Plane;
use modewright::report::figure::{Stroke, Ticks};
use modewright::report::render::plot::scene;

use crate::{cavities, drawn};

#[test]
fn every_waist_in_the_path_is_marked_where_it_is() {
    for (name, text) in cavities::all() {
        let drawn = drawn(&text);
        for waist in &drawn.check.waists {
            let (Some(radius), Some(true)) = (waist.waist_m, waist.inside) else {
                continue;
            };
            let part = drawn
                .profile
                .parts
                .iter()
                .find(|part| part.name == waist.part)
                .unwrap();
            let at = part.at_m + waist.from_start_m.unwrap();
            let stroke = match waist.plane {
                "tangential" => Stroke::Solid,
                _ => Stroke::Dashed,
            };
            let is_marked = drawn
                .figure
                .panels
                .iter()
                .flat_map(|panel| &panel.marks)
                .flat_map(|mark| &mark.places)
                .any(|(s, [x, y])| {
                    // Rounding of a sum of many lengths.
                    let near = (x - at).abs() <= 1e-10 * drawn.profile.length_m;
                    *s == stroke && near && (y / radius - 1.0).abs() < 1e-6
                });
            assert!(is_marked, "{name}: no mark at the waist in {}", waist.part);
        }
    }
}

/// Between two samples the drawn line is straight; the beam itself is known in closed form from
/// its waist.
#[test]
fn straight_lines_between_samples_are_as_good_as_the_beam() {
    // Twice the deviation at which the sampling stops.
    const DEVIATION: f64 = 6e-4;
    for text in [cavities::kilometre(), cavities::two(), cavities::twelve()] {
        let drawn = drawn(&text);
        for waist in &drawn.check.waists {
            let plane = match waist.plane {
                "tangential" => Plane::Tangential,
                _ => Plane::Sagittal,
            };
            let mut parts = drawn.profile.parts.iter();
            let part = parts.find(|part| part.name == waist.part).unwrap();
            let at = part.at_m + waist.from_start_m.unwrap();
            for pair in part.radii[plane].windows(2) {
                let middle = 0.5 * (pair[0].at_m + pair[1].at_m);
                let from_waist = (middle - at) / waist.rayleigh_m.unwrap();
                let beam = waist.waist_m.unwrap() * from_waist.hypot(1.0);
                let line = 0.5 * (pair[0].radius_m + pair[1].radius_m);
                assert_relative_eq!(line, beam, max_relative = DEVIATION);
            }
        }
    }
}

#[test]
fn a_focus_of_nanometres_at_the_end_of_a_kilometre_is_seen() {
    let drawn = drawn(&cavities::kilometre());
    let least = drawn
        .figure
        .panels
        .iter()
        .flat_map(|panel| &panel.curves)
        .flat_map(|curve| &curve.points)
        .map(|point| point[1])
        .fold(f64::INFINITY, f64::min);
    let waist = drawn.check.waists.iter().filter_map(|waist| waist.waist_m);
    assert_relative_eq!(
        least,
        waist.fold(f64::INFINITY, f64::min),
        max_relative = 1e-6
    );
    // Both the kilometre and the millimetres are wide enough to read.
    assert_eq!(drawn.figure.panels.len(), 2);
    assert!(drawn.figure.panels.iter().all(|panel| panel.share > 0.3));
    let y = drawn.figure.y.unwrap();
    assert!(matches!(y.ticks, Ticks::Decades(_)));
}

#[test]
fn the_verdict_stands_in_the_title_however_long() {
    for (name, text) in cavities::all() {
        let figure = drawn(&text).figure;
        let page = scene(&figure).unwrap();
        let title = page.texts()[0].0;
        assert!(title.ends_with(&figure.verdict), "{name}: {title}");
    }
    let verdict = |text: &str| drawn(text).figure.verdict;
    assert_eq!(verdict(&cavities::two()), "stable, margin 1.00");
    assert_eq!(
        verdict(&cavities::one_plane()),
        "unstable in the tangential plane"
    );
    assert_eq!(verdict(&cavities::no_plane()), "unstable in both planes");
}

#[test]
fn a_plane_without_a_beam_has_no_curve_and_the_picture_says_so() {
    let figure = drawn(&cavities::one_plane()).figure;
    let mut curves = figure.panels.iter().flat_map(|panel| &panel.curves);
    assert!(curves.all(|curve| curve.label == "sagittal"));
    assert_eq!(figure.missing.len(), 1);
    let page = scene(&figure).unwrap();
    let says_so = |text: &&str| text.contains("no tangential beam");
    assert!(page.texts().iter().any(|(text, _)| says_so(text)));
}

#[test]
fn without_any_beam_there_is_no_axis_to_read() {
    let figure = drawn(&cavities::no_plane()).figure;
    assert!(figure.y.is_none());
    assert!(figure.panels.iter().all(|panel| panel.curves.is_empty()));
    let page = scene(&figure).unwrap();
    assert!(
        page.texts()
            .iter()
            .any(|(text, _)| *text == "no beam to draw")
    );
}
