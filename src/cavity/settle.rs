//! What the order of the parts settles for each of them: the media around it, and whether it turns
//! the beam in the file's tangential plane.

use super::Form;
use super::part::{Element, Index, Mirror, Part, Side};

/// Media at the junctions: that of the nearest gap on either side, seen through whatever is thin;
/// else the ambient. A way without a form, a feed, is open at both ends.
pub(super) fn settle_media(form: Option<Form>, ambient: Index, parts: &mut [Part]) {
    let count = parts.len();
    let media: Vec<Option<Index>> = parts
        .iter()
        .map(|part| match part.element {
            Element::Gap { medium, .. } => Some(medium),
            _ => None,
        })
        .collect();
    let is_thin: Vec<bool> = parts
        .iter()
        .map(|part| {
            matches!(
                part.element,
                Element::Aperture | Element::Lens { .. } | Element::Matrix { .. }
            )
        })
        .collect();
    // The parts met from one on, forwards or backwards, once around a ring or to an end.
    let nearest = |from: usize, forwards: bool| {
        for step in 1..count {
            let at = match (form, forwards) {
                (Some(Form::Ring), true) => (from + step) % count,
                (Some(Form::Ring), false) => (from + count - step) % count,
                (_, true) if from + step < count => from + step,
                (_, false) if step <= from => from - step,
                _ => return None,
            };
            if media[at].is_some() || !is_thin[at] {
                return media[at];
            }
        }
        None
    };
    for index in 0..count {
        let before = media[index]
            .or_else(|| nearest(index, false))
            .unwrap_or(ambient);
        let after = media[index]
            .or_else(|| nearest(index, true))
            .unwrap_or(ambient);
        let (before, after) = match (form, index) {
            // An end mirror sends the beam back into the medium it came from.
            (Some(Form::Standing), 0) => (after, after),
            (Some(Form::Standing), i) if i + 1 == count => (before, before),
            _ => (before, after),
        };
        parts[index].before = before;
        parts[index].after = after;
    }
}

/// The plane of incidence of a part that has one, and the side to which it acts.
fn tilt(part: &Part, values: &[f64]) -> Option<(bool, Side)> {
    match &part.element {
        Element::Mirror(Mirror {
            incidence, fold, ..
        }) if incidence.of(values) != 0.0 => Some((true, fold.unwrap_or(Side::Left))),
        Element::Slab(slab) => slab.is_tilted(values).then_some((false, slab.shift)),
        _ => None,
    }
}

/// Whether the file's tangential plane is the horizontal one.
pub(super) fn has_horizontal_tangential(parts: &[Part], values: &[f64]) -> bool {
    let first = |mirrors: bool| {
        parts
            .iter()
            .filter_map(|part| tilt(part, values))
            .find(|(is_mirror, _)| *is_mirror == mirrors)
            .map(|(_, side)| side.is_horizontal())
    };
    first(true).or_else(|| first(false)).unwrap_or(true)
}

/// Tells each part whether its own plane of incidence is the other one than the tangential.
pub(super) fn settle_planes(parts: &mut [Part], tangential_is_horizontal: bool, values: &[f64]) {
    for part in parts {
        let own_is_horizontal = match &part.element {
            Element::Mirror(mirror) => match mirror.fold {
                Some(side) => side.is_horizontal(),
                // Unnamed, a tilted mirror turns the beam in the horizontal plane; a mirror met
                // square-on has no plane of its own.
                None => mirror.incidence.of(values) != 0.0 || tangential_is_horizontal,
            },
            Element::Slab(slab) => slab.shift.is_horizontal(),
            _ => tangential_is_horizontal,
        };
        part.swapped = own_is_horizontal != tangential_is_horizontal;
    }
}
