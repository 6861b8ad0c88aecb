//! Doubts that the reader of a check should know, and why a mode does not exist.

use super::result::Station;
use super::view::View;
use crate::analysis::eigenmode::{PlaneMode, Stability};
use crate::analysis::lengths::RoundTripLengths;
use crate::cavity::{Cavity, Element, Entry, Form, Origin, Part};
use crate::optics::Plane;
use crate::optics::beam::Beam;
use crate::quantity::{Kind, Spread};

/// Entries of a matrix this small against the round trip are zero for the naming of an edge.
const VANISHES: f64 = 1e-9;

/// Whether the round trip of a plane is ±1 times the identity: then every beam repeats itself.
pub(in crate::analysis) fn everything_repeats(
    cavity: &Cavity,
    values: &[f64],
    plane: Plane,
) -> bool {
    let way = cavity.one_way(values)[plane];
    let length = RoundTripLengths::of(cavity, values).geometric;
    let m = match cavity.form() {
        Form::Ring => way,
        Form::Standing => way.then(way.reversed()),
    };
    m.b.abs() <= VANISHES * length && m.c.abs() <= VANISHES / length
}

pub(in crate::analysis) fn edge_reason(cavity: &Cavity, values: &[f64], plane: Plane) -> String {
    let way = cavity.one_way(values)[plane];
    let mode = PlaneMode::of(cavity.form(), way);
    let sign = if mode.half_trace > 0.0 { "+1" } else { "−1" };
    if everything_repeats(cavity, values, plane) {
        let kind = if mode.half_trace < 0.0 {
            "confocal"
        } else {
            "every ray closes on itself"
        };
        format!(
            "the round trip is {sign} times the identity ({kind}): every beam repeats itself, and \
             the apertures alone set the mode"
        )
    } else {
        format!("the half-trace is {sign}: on the edge of stability no beam repeats itself")
    }
}

pub(super) fn mode_cautions(view: &View<'_>) -> Vec<String> {
    let mut cautions = Vec::new();
    for plane in Plane::BOTH {
        let result = &view.mode.planes[plane];
        if result.stability != Stability::OnEdge || view.cavity.form() != Form::Standing {
            continue;
        }
        let way = view.cavity.one_way(view.values)[plane];
        let confocal = way.a.abs() < VANISHES && way.d.abs() < VANISHES;
        if confocal {
            let radius = Beam::new(way.b.abs(), 0.0).radius(view.wavelength);
            cautions.push(format!(
                "{} plane confocal: a cavity drawn into it symmetrically would have a radius of \
                 {:.1} µm on both ends",
                plane.name(),
                radius * 1e6
            ));
        }
    }
    cautions
}

/// A share of the power that no low-loss cavity can spare in one pass.
const MUCH_CLIPPED: f64 = 0.01;

pub(super) fn clipping_caution(stations: &[Station]) -> Option<String> {
    let mut names: Vec<&str> = stations
        .iter()
        .filter(|station| station.clip_loss.is_some_and(|loss| loss > MUCH_CLIPPED))
        .map(|station| station.part.as_str())
        .collect();
    names.dedup();
    (!names.is_empty()).then(|| {
        format!(
            "more than 1 % of a centred beam misses the opening of {}; the mode is computed as if \
             nothing were clipped",
            list(&names)
        )
    })
}

/// Mirrors inside a path that send the beam straight back.
pub(super) fn square_on_folds(cavity: &Cavity, values: &[f64]) -> Option<String> {
    let last = cavity.parts().len() - 1;
    let names: Vec<&str> = cavity
        .parts()
        .iter()
        .enumerate()
        .filter(|(index, part)| {
            let is_end = cavity.form() == Form::Standing && (*index == 0 || *index == last);
            match &part.element {
                Element::Mirror(mirror) => !is_end && mirror.incidence.of(values) == 0.0,
                _ => false,
            }
        })
        .map(|(_, part)| part.name.as_str())
        .collect();
    (!names.is_empty()).then(|| {
        format!(
            "no angle of incidence for {}, a mirror within the path: it counts as met square-on, \
             and would send the beam straight back; write its aoi",
            list(&names)
        )
    })
}

/// Whether some phase index stands in for a group index.
pub(in crate::analysis) fn without_group_index(cavity: &Cavity) -> Option<String> {
    let without_group: Vec<&str> = cavity
        .parts()
        .iter()
        .filter(|part| {
            let medium = part
                .inside()
                .filter(|_| !matches!(part.element, Element::Matrix { .. }));
            medium.is_some_and(|medium| !medium.has_group())
        })
        .map(|part| part.name.as_str())
        .collect();
    (!without_group.is_empty()).then(|| {
        format!(
            "no group index for {}: its phase index stands in, so the FSR is a little too large",
            list(&without_group)
        )
    })
}

/// Doubts about the numbers themselves.
pub(super) fn data_cautions(cavity: &Cavity) -> Vec<String> {
    let mut cautions: Vec<String> = without_group_index(cavity).into_iter().collect();
    let radii = |entry: &&Entry| entry.kind == Kind::Radius && entry.origin == Origin::Written;
    let has_spread = |entry: &Entry| entry.spread != Spread::Exact;
    let book = cavity.book();
    let some_toleranced = book
        .iter()
        .map(|(_, entry)| entry)
        .any(|entry| entry.kind == Kind::Radius && has_spread(entry));
    let perfect: Vec<&str> = book
        .iter()
        .map(|(_, entry)| entry)
        .filter(radii)
        .filter(|entry| entry.value == 0.0 && !has_spread(entry))
        .map(|entry| entry.address.as_str())
        .collect();
    if some_toleranced && !perfect.is_empty() {
        cautions.push(format!(
            "flat without a tolerance, and so counted as perfect, while other radii have one: {}; \
             a tolerance of a flat is written \"flat ± 0.003 1/m\"",
            list(&perfect)
        ));
    }
    let lens_in_medium: Vec<&str> = cavity
        .parts()
        .iter()
        .filter(|part| {
            let values = book.nominal();
            matches!(part.element, Element::Lens { .. })
                && [part.before, part.after]
                    .iter()
                    .any(|medium| medium.phase(&values) > 1.01)
        })
        .map(|part| part.name.as_str())
        .collect();
    if !lens_in_medium.is_empty() {
        cautions.push(format!(
            "{} stands in a medium; its focal length counts as it would be in vacuum",
            list(&lens_in_medium)
        ));
    }
    if cavity
        .parts()
        .iter()
        .any(has_tilted_curved_face(&book.nominal()))
    {
        cautions.push(
            "a tilted slab with a curved face counts as if the beam met each face at its vertex"
                .into(),
        );
    }
    cautions
}

fn has_tilted_curved_face(values: &[f64]) -> impl Fn(&Part) -> bool {
    move |part| match &part.element {
        Element::Slab(slab) => {
            slab.is_tilted(values)
                && (slab.entrance.of(values) != 0.0 || slab.exit.of(values) != 0.0)
        }
        _ => false,
    }
}

/// Names in a sentence, the first few of them.
fn list(names: &[&str]) -> String {
    const SHOWN: usize = 6;
    if names.len() > SHOWN {
        format!(
            "{} and {} more",
            names[..SHOWN].join(", "),
            names.len() - SHOWN
        )
    } else {
        names.join(", ")
    }
}
