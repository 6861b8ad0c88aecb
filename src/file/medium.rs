//! What light travels through: a number, or a material of the catalogue.

use super::context::{Raw, nearest, shown};
use super::fields::Fields;
use super::parts::required;
use super::reach::GREATEST_INDEX;
use crate::cavity::{Cavity, Index, Slot};
use crate::diagnostic::Place;
use crate::optics::material::{self, AxisError};
use crate::quantity::{Kind, Spread};

/// The medium of a gap, of a substrate or of the surroundings.
pub(super) fn read_medium(fields: &Fields<'_, '_>, key: &'static str, ambient: Index) -> Index {
    let Some(found) = fields.find(key) else {
        return ambient;
    };
    if let Raw::Text(text, _) = &found.raw {
        if text == "vacuum" {
            return Index::VACUUM;
        }
        if text.starts_with(|c: char| c.is_alphabetic()) {
            let (name, axis) = with_axis(text);
            let axis = axis.map(|axis| (axis.to_string(), found.place.clone()));
            let temperature = Cavity::TEMPERATURE;
            return find_material(fields, name, axis, temperature, found.place).unwrap_or(ambient);
        }
    }
    let Some(quantity) = fields.context.quantity(key, &found, Kind::Number) else {
        return ambient;
    };
    if quantity.spread != Spread::Exact {
        fields.report(
            Some(found.place),
            format!("a spread of `{key}` is not available yet"),
            "write the index alone; a slab's `index` may have a spread",
        );
        return ambient;
    }
    match quantity.value.number() {
        Some(index) if (1.0..=GREATEST_INDEX).contains(&index) => Index::Fixed {
            phase: index,
            group: None,
        },
        _ => {
            fields.report(
                Some(found.place),
                format!("`{key}` cannot be {}", quantity.text),
                "a refractive index lies between 1 and 100",
            );
            ambient
        }
    }
}

/// `material` with its `axis`, or `index` with its `group_index`.
pub(super) fn read_slab_medium(fields: &Fields<'_, '_>) -> Option<Index> {
    let own_temperature = fields.slot("temperature");
    let Some((name, place)) = fields.text("material") else {
        if fields.has("material") {
            return None;
        }
        if fields.has("axis") {
            fields.report(
                Some(fields.place_of("axis")),
                "`axis` belongs to a `material`, and none is named",
                "add material = \"…\", or leave out the axis beside an index",
            );
            return None;
        }
        return read_index(fields, "a slab");
    };
    for key in ["index", "group_index"] {
        if fields.has(key) {
            fields.report(
                Some(fields.place_of(key)),
                format!("`{key}` and `material` say the same thing twice"),
                "keep one of them",
            );
            return None;
        }
    }
    let axis = fields.text("axis");
    let temperature = own_temperature.unwrap_or(Cavity::TEMPERATURE);
    find_material(fields, &name, axis, temperature, place)
}

/// A material and, behind it, the axis of a birefringent one: "sapphire o".
fn with_axis(text: &str) -> (&str, Option<&str>) {
    match text.rsplit_once(' ') {
        Some((name, axis)) if material::find(text).is_err() && material::find(name).is_ok() => {
            (name, Some(axis))
        }
        _ => (text, None),
    }
}

fn find_material(
    fields: &Fields<'_, '_>,
    name: &str,
    axis: Option<(String, Place)>,
    temperature: Slot,
    place: Place,
) -> Option<Index> {
    let material = match material::find(name) {
        Ok(material) => material,
        Err(error) => {
            let vacuum = nearest(name, ["vacuum"]);
            let help = match error.nearest.first().copied().or(vacuum) {
                Some(near) => format!("did you mean \"{near}\"?"),
                None => {
                    "write its refractive index as a number; known materials: ".to_string()
                        + &material::all()
                            .map(|material| material.name)
                            .collect::<Vec<_>>()
                            .join(", ")
                }
            };
            fields.report(
                Some(place),
                format!("no material is known as \"{}\"", shown(name)),
                &help,
            );
            return None;
        }
    };
    let axis_place = axis.as_ref().map_or(&place, |(_, place)| place).clone();
    let axis = match material.axis(axis.as_ref().map(|(name, _)| name.as_str())) {
        Ok(axis) => axis,
        Err(error) => {
            let help = match error {
                AxisError::Isotropic { .. } => "leave out `axis`",
                AxisError::Missing { .. } | AxisError::Unknown { .. } => {
                    "the axis is the crystal direction along which the light is polarised: axis = \
                     \"e\" in a slab, and behind the name of a medium or substrate, \"sapphire o\""
                }
            };
            fields.report(Some(axis_place), error.to_string(), help);
            return None;
        }
    };
    let nominal = fields.context.book.borrow().nominal();
    let wavelength = Cavity::WAVELENGTH.of(&nominal);
    if wavelength > 0.0
        && let Err(error) = axis.check(wavelength, temperature.of(&nominal))
    {
        fields.report(
            Some(place),
            format!("{}: {error}", material.name),
            "write the index itself in place of the material's name",
        );
        return None;
    }
    Some(Index::Material { axis, temperature })
}

/// `index` and `group_index`.
pub(super) fn read_index(fields: &Fields<'_, '_>, what: &str) -> Option<Index> {
    let phase = required(fields, "index", what)?;
    let group = fields.slot("group_index");
    let nominal = fields.context.book.borrow().nominal();
    let mut good = true;
    for (key, slot) in [("index", Some(phase)), ("group_index", group)] {
        if let Some(slot) = slot
            && !(1.0..=GREATEST_INDEX).contains(&slot.of(&nominal))
            && !fields.context.is_tied(&fields.address(key))
        {
            good = false;
            fields.report(
                Some(fields.place_of(key)),
                format!("`{key}` lies between 1 and 100"),
                "a transparent medium slows light down; check the digits",
            );
        }
    }
    good.then_some(Index::Slots { phase, group })
}
