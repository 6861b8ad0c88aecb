//! Which waists are marked in a picture, and what is written at them.

use super::envelope::radii;
use super::sections::Section;
use crate::analysis::check::Check;
use crate::analysis::profile::{AlongPart, Profile};
use crate::optics::{PerPlane, Plane};
use crate::report::figure::{Mark, Stroke};
use crate::report::number::{LENGTHS, common, significant};

/// Waists of the planes this close, as a share of the panel, are named together.
const TOGETHER: f64 = 0.03;
/// Places this close, as a share of the path, are one place but for rounding.
const SAME_PLACE: f64 = 1e-11;

/// The waists that lie in one section.
pub(super) fn marks(
    check: &Check,
    profile: &Profile,
    section: &Section,
    is_last: bool,
) -> Vec<Mark> {
    let width = section.to_m - section.from_m;
    let slack = SAME_PLACE * profile.length_m;
    let is_here =
        |at: f64| section.from_m <= at && (at < section.to_m || is_last && at <= section.to_m);
    let found = in_parts(check, &profile.parts, slack)
        .into_iter()
        .filter(|(_, at, _)| is_here(*at));
    paired(found, TOGETHER * width)
}

type Found = (Plane, f64, f64);

/// Every waist inside a part, each once: plane, place and radius.
fn in_parts(check: &Check, parts: &[AlongPart], slack: f64) -> Vec<Found> {
    let mut found: Vec<Found> = Vec::new();
    for part in parts {
        for plane in Plane::BOTH {
            let waist = check
                .waists
                .iter()
                .find(|waist| waist.part == part.name && waist.plane == plane.name());
            let Some((radius, from_start)) =
                waist.and_then(|waist| waist.waist_m.zip(waist.from_start_m))
            else {
                continue;
            };
            // A waist on a flat mirror lies at a part's very end, give or take a rounding.
            if from_start < -slack || from_start > part.length_m + slack {
                continue;
            }
            let at = part.at_m + from_start.clamp(0.0, part.length_m);
            let is_known = found.iter().any(|(p, x, w)| {
                *p == plane && (x - at).abs() <= 2.0 * slack && (w / radius - 1.0).abs() < 1e-6
            });
            if !is_known {
                found.push((plane, at, radius));
            }
        }
    }
    found
}

/// Waists of both planes that stand close together under one label.
fn paired(found: impl Iterator<Item = Found>, close: f64) -> Vec<Mark> {
    let (t, s): (Vec<_>, Vec<_>) = found.partition(|(plane, _, _)| *plane == Plane::Tangential);
    let mut alone: Vec<_> = s.into_iter().map(Some).collect();
    let mut marks = Vec::new();
    for (_, at, radius) in t {
        let partner = alone
            .iter_mut()
            .filter(|other| other.is_some_and(|(_, x, _)| (x - at).abs() <= close))
            .min_by(|a, b| {
                let distance =
                    |other: &Option<Found>| other.map_or(f64::INFINITY, |(_, x, _)| (x - at).abs());
                distance(a).total_cmp(&distance(b))
            })
            .and_then(Option::take);
        let mut places = vec![(Stroke::Solid, [at, radius])];
        let label = match partner {
            Some((_, x, other)) => {
                places.push((Stroke::Dashed, [x, other]));
                radii(PerPlane {
                    tangential: Some(radius),
                    sagittal: Some(other),
                })
            }
            None => alone_label("t", radius),
        };
        marks.push(Mark { places, label });
    }
    for (_, at, radius) in alone.into_iter().flatten() {
        marks.push(Mark {
            places: vec![(Stroke::Dashed, [at, radius])],
            label: alone_label("s", radius),
        });
    }
    marks.sort_by(|a, b| a.places[0].1[0].total_cmp(&b.places[0].1[0]));
    marks
}

fn alone_label(plane: &str, radius: f64) -> String {
    let unit = common([radius], &LENGTHS, 1.0);
    format!(
        "{plane} {} {}",
        significant(radius / unit.size, 3),
        unit.symbol
    )
}
