//! The beam along the unfolded path as a picture: both planes, the optics, the waists.

use super::sections::{self, Section};
use super::{verdict, waists};
use crate::analysis::check::Check;
use crate::analysis::eigenmode::EDGE;
use crate::analysis::profile::{AlongPart, Bend, Profile, Shape};
use crate::optics::{PerPlane, Plane};
use crate::report::figure::{Axis, Curvature, Curve, Figure, Glyph, Panel, Stroke, Symbol, Ticks};
use crate::report::number::{LENGTHS, common, plain, significant};

/// Ratio of the widest to the narrowest beam from which radii are drawn by decades: on an even
/// axis the narrow part would lie on the ground line.
const DECADES_FROM: f64 = 30.0;
/// How much of an aperture's height an even axis may grow for, over the widest beam.
const ROOM_FOR_APERTURES: f64 = 2.0;

const STROKES: PerPlane<Stroke> = PerPlane {
    tangential: Stroke::Solid,
    sagittal: Stroke::Dashed,
};

/// The beam envelope of a checked cavity.
pub fn describe(check: &Check, profile: &Profile) -> Figure {
    let ring = check.form == "ring";
    let sections = sections::of(profile);
    let panels: Vec<Panel> = sections
        .iter()
        .enumerate()
        .map(|(index, section)| {
            let is_last = index + 1 == sections.len();
            panel(check, profile, section, is_last)
        })
        .collect();
    let horizontal = if check.tangential_is_horizontal {
        "tangential plane horizontal"
    } else {
        "tangential plane vertical"
    };
    let whole = common([check.round_trip.length_m], &LENGTHS, 1.0);
    let y = radius_axis(profile);
    let radii = match y {
        Some(_) => {
            "; radii at 1/e² of the intensity, in bodies at the middle, tangential / sagittal"
        }
        None => "",
    };
    let mut notes = Vec::new();
    if sections.len() > 1 {
        notes.push("each panel has its own scale of length".into());
    }
    if ring {
        notes.push(format!(
            "unfolded; the path ends where it began, at {}",
            profile.parts[0].name
        ));
    } else if y.is_some() {
        notes.push("unfolded; one way is shown, the beam is the same on its way back".into());
    }
    notes.extend(profile.parts.iter().filter_map(|part| match part.shape {
        Shape::Aperture {
            plane: Some(plane), ..
        } => Some(format!(
            "{} limits the {} plane only",
            part.name,
            plane.name()
        )),
        _ => None,
    }));
    let title = check.title.clone();
    Figure {
        title: title.unwrap_or_else(|| format!("{} cavity", capital(check.form))),
        verdict: verdict::line(check),
        particulars: format!(
            "{} cavity, {} nm, {} {} around; {horizontal}{radii}",
            check.form,
            plain(check.wavelength_m * 1e9, 6),
            plain(check.round_trip.length_m / whole.size, 6),
            whole.symbol,
        ),
        y,
        panels,
        missing: missing(check),
        notes,
    }
}

fn capital(word: &str) -> String {
    let mut letters = word.chars();
    letters
        .next()
        .map(|first| first.to_uppercase().chain(letters).collect())
        .unwrap_or_default()
}

/// Why a plane has no curve.
fn missing(check: &Check) -> Vec<String> {
    Plane::BOTH
        .into_iter()
        .filter_map(|plane| {
            let result = check.planes.get(plane);
            if result.stable {
                return None;
            }
            let name = plane.name();
            Some(if result.margin < -EDGE {
                let half_trace = significant(result.half_trace, 4);
                format!("no {name} beam: that plane is unstable, with a half-trace of {half_trace}")
            } else {
                format!("no {name} beam: that plane is on the edge of stability")
            })
        })
        .collect()
}

fn radius_axis(profile: &Profile) -> Option<Axis> {
    let radii = || {
        profile.parts.iter().flat_map(|part| {
            Plane::BOTH
                .into_iter()
                .flat_map(|plane| part.radii[plane].iter().map(|sample| sample.radius_m))
        })
    };
    let most = radii().fold(0.0, f64::max);
    let least = radii().fold(f64::INFINITY, f64::min);
    if !(most > 0.0 && most.is_finite() && least > 0.0) {
        return None;
    }
    if most > DECADES_FROM * least {
        return Some(Axis {
            title: "beam radius w".into(),
            from: least / 2.0,
            to: most * 1.6,
            origin: 0.0,
            ticks: Ticks::Decades(&LENGTHS),
        });
    }
    let openings = profile.parts.iter().filter_map(|part| match part.shape {
        Shape::Aperture { half_width_m, .. } if half_width_m <= ROOM_FOR_APERTURES * most => {
            Some(half_width_m)
        }
        _ => None,
    });
    let top = openings.fold(most, f64::max);
    let unit = common([top], &LENGTHS, 1.0);
    Some(Axis {
        title: format!("beam radius w, {}", unit.symbol),
        from: 0.0,
        to: top * 1.15,
        origin: 0.0,
        ticks: Ticks::Even(unit),
    })
}

fn panel(check: &Check, profile: &Profile, section: &Section, is_last: bool) -> Panel {
    let parts = &profile.parts[section.parts.clone()];
    let (from, to) = (section.from_m, section.to_m);
    let unit = common([to - from], &LENGTHS, 2.0);
    let start = &profile.parts[section.origin];
    let title = if section.origin == 0 {
        format!("path from {}, {}", start.name, unit.symbol)
    } else {
        format!("from {}, {}", start.name, unit.symbol)
    };
    let mut symbols: Vec<Symbol> = parts
        .iter()
        .enumerate()
        .filter_map(|(index, part)| symbol(part, section.parts.start + index == 0))
        .collect();
    if is_last && check.form == "ring" {
        symbols.extend(symbol(&profile.parts[0], false).map(|first| Symbol {
            from: profile.length_m,
            to: profile.length_m,
            ..first
        }));
    }
    Panel {
        x: Axis {
            title,
            from,
            to,
            origin: start.at_m,
            ticks: Ticks::Even(unit),
        },
        share: section.share,
        curves: Plane::BOTH
            .into_iter()
            .flat_map(|plane| curves(profile, plane, from, to))
            .collect(),
        marks: waists::marks(check, profile, section, is_last),
        symbols,
    }
}

/// The curve of one plane between two places, in one piece but for parts whose inside is unknown.
fn curves(profile: &Profile, plane: Plane, from: f64, to: f64) -> Vec<Curve> {
    let mut pieces = vec![Vec::new()];
    for part in &profile.parts {
        if part.radii[plane].is_empty() && part.length_m > 0.0 {
            pieces.push(Vec::new());
        }
        let points = part.radii[plane].iter().map(|s| [s.at_m, s.radius_m]);
        if let Some(piece) = pieces.last_mut() {
            piece.extend(points);
        }
    }
    pieces
        .into_iter()
        .map(|points| between(&points, from, to))
        .filter(|points| points.len() > 1)
        .map(|points| Curve {
            label: plane.name().into(),
            stroke: STROKES[plane],
            points,
        })
        .collect()
}

/// The part of a curve between two places, cut exactly there.
fn between(points: &[[f64; 2]], from: f64, to: f64) -> Vec<[f64; 2]> {
    let mut kept = Vec::new();
    for (index, point) in points.iter().enumerate() {
        if let Some(before) = index.checked_sub(1).map(|index| points[index]) {
            for cut in [from, to] {
                if before[0] < cut && cut < point[0] {
                    let share = (cut - before[0]) / (point[0] - before[0]);
                    kept.push([cut, before[1] + share * (point[1] - before[1])]);
                }
            }
        }
        if (from..=to).contains(&point[0]) {
            kept.push(*point);
        }
    }
    kept
}

fn symbol(part: &AlongPart, is_first: bool) -> Option<Symbol> {
    let curvature = |bend| match bend {
        Bend::Focusing => Curvature::Focusing,
        Bend::None => Curvature::Flat,
        Bend::Defocusing => Curvature::Defocusing,
    };
    let glyph = match part.shape {
        Shape::Gap => return None,
        Shape::EndMirror(bend) if is_first => Glyph::FirstMirror(curvature(bend)),
        Shape::EndMirror(bend) => Glyph::LastMirror(curvature(bend)),
        Shape::FoldMirror(bend) => Glyph::FoldMirror(curvature(bend)),
        Shape::Lens(bend) => Glyph::Lens(curvature(bend)),
        Shape::Slab { tilted } => Glyph::Slab { tilted },
        Shape::Duct => Glyph::Duct,
        Shape::Aperture { half_width_m, .. } => Glyph::Aperture(half_width_m),
        Shape::Matrix => Glyph::Unseen,
    };
    Some(Symbol {
        name: part.name.clone(),
        value: radii(part.spot_m),
        glyph,
        from: part.at_m,
        to: part.at_m + part.length_m,
    })
}

/// Radii of both planes in one unit, one number where they print alike.
pub(super) fn radii(radii: PerPlane<Option<f64>>) -> String {
    let Some(most) = [radii.tangential, radii.sagittal]
        .into_iter()
        .flatten()
        .reduce(f64::max)
    else {
        return String::new();
    };
    let unit = common([most], &LENGTHS, 1.0);
    let text = |radius: Option<f64>| {
        radius.map_or("–".into(), |radius| significant(radius / unit.size, 3))
    };
    let (t, s) = (text(radii.tangential), text(radii.sagittal));
    if t == s {
        format!("{t} {}", unit.symbol)
    } else {
        format!("{t} / {s} {}", unit.symbol)
    }
}
