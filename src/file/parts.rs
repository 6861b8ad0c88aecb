//! The parts of a path, each one table whose kind key holds its name.

use toml::Spanned;
use toml::de::{DeTable, DeValue};

use super::TOP;
use super::context::{Context, in_order, kind_of, nearest, shown, with_article};
use super::fields::Fields;
use super::keys::{KINDS, PROFILES, PartKind, SLIT_PLANES, holds};
use super::medium::{read_index, read_medium};
use super::mirror::read_mirror;
use super::slab::read_slab;
use crate::cavity::{Element, Index, Opening, Part, Slot};
use crate::optics::{PerPlane, Plane};

/// Whether a kind of part knows a key.
pub(super) fn knows(kind: &str, key: &str) -> bool {
    KINDS
        .iter()
        .any(|known| known.name == kind && holds(known.keys, key).is_some())
}

/// The kind that goes by another name in the trade.
fn kind_meant(word: &str) -> Option<&'static str> {
    Some(match word {
        "crystal" | "rod" | "plate" | "window" | "etalon" | "medium" | "block" | "glass" => "slab",
        "space" | "distance" | "air" | "propagation" => "gap",
        "coupler" | "reflector" | "flat" | "end" => "mirror",
        "iris" | "pinhole" | "slit" | "stop" => "aperture",
        "grin" | "fiber" | "fibre" => "duct",
        other => nearest(other, KINDS.map(|kind| kind.name))?,
    })
}

/// Names a part cannot have: they begin addresses and measures of the whole cavity.
const RESERVED: [&str; 19] = [
    "wavelength",
    "temperature",
    "pump",
    "source",
    "feed",
    "margin",
    "half_trace",
    "gouy",
    "distance",
    "round_trip_length",
    "fsr",
    "linewidth",
    "finesse",
    "lifetime",
    "buildup",
    "spacing",
    "mode_clearance",
    "parasitic",
    "suppression",
];

/// Longest name of a part, in characters: longer ones do not fit a table of results.
pub(super) const LONGEST_NAME: usize = 24;

/// What a practitioner may well write, and what to write instead.
fn advice(kind: &str, key: &str) -> Option<&'static str> {
    Some(match (kind, key) {
        ("slab", "length") => "a slab's size is `thickness`, square to its faces",
        ("slab", "roc") => {
            "a slab's faces are `entrance` and `exit`, convex or concave from outside"
        }
        ("slab", "n") | ("duct", "n") => "the refractive index is `index`",
        ("slab", "focal") => "a thermal lens is `thermal`, its dioptric power in 1/m",
        ("gap", "thickness") => "a gap's size is its `length` along the beam",
        ("gap", "index" | "n") => "what fills a gap is its `medium`: a number or a material",
        ("mirror", "radius") => "a mirror's radius of curvature is `roc`",
        ("mirror", "angle") => "the angle of incidence is `aoi`, half the angle between the beams",
        ("mirror", "focal") => {
            "a mirror is given by its radius of curvature `roc`, twice its focal length"
        }
        ("lens", "roc" | "thickness" | "index") => {
            "a thin lens has `focal`; a thick one is a slab with `entrance` and `exit`"
        }
        ("lens", "power") => "a thin lens is given by its focal length, `focal`",
        ("mirror", "coating" | "hr" | "ar") => {
            "a coating is given by `reflectance`, `transmission` and `loss`"
        }
        ("mirror", "tilt") => "a folding mirror's tilt is `aoi`, half the angle between the beams",
        (_, "name") => "the kind key holds the name, as in { mirror = \"M1\", … }",
        ("aperture", "diameter") => "an aperture is given by its `radius`, half the diameter",
        _ => return None,
    })
}

/// One part of a path; `index` is its number there, none for a part of the feed.
pub(super) fn read_part<'t>(
    context: &Context<'t>,
    value: &'t Spanned<DeValue<'t>>,
    index: Option<usize>,
    ambient: Index,
    defaults: Option<&'t DeTable<'t>>,
) -> Option<Part> {
    let place = context.place(value.span());
    let DeValue::Table(table) = value.get_ref() else {
        context.report(
            Some(place),
            format!(
                "a part is a table, and this is {}",
                kind_of(value.get_ref())
            ),
            "write it like { mirror = \"M1\", roc = \"100 mm\" }",
        );
        return None;
    };
    let kinds: Vec<&PartKind> = KINDS
        .iter()
        .filter(|kind| table.contains_key(kind.name))
        .collect();
    let [
        PartKind {
            name: kind, keys, ..
        },
    ] = kinds[..]
    else {
        let names = KINDS.map(|kind| kind.name);
        let first = in_order(table).into_iter().next();
        let help = format!(
            "one key tells the kind and holds the name, as in {{ mirror = \"M1\", … }}; kinds: {}",
            names.join(", ")
        );
        let (message, help) = match (&kinds[..], &first) {
            ([one, other, ..], _) => (
                format!(
                    "this part is {} and {} at once",
                    with_article(one.name),
                    with_article(other.name)
                ),
                help,
            ),
            (_, Some((word, _, _))) if !KINDS.iter().any(|kind| knows(kind.name, word)) => (
                format!("`{}` is no kind of part", shown(word)),
                kind_meant(word).map_or(help, |kind| format!("write `{kind}`")),
            ),
            _ => ("this part does not say what it is".to_string(), help),
        };
        let place = first.map_or(place, |(_, span, _)| context.place(span));
        context.report(Some(place), message, &help);
        return None;
    };

    let fields = Fields::new(context, table, value.span()).knowing(keys);
    let name = read_name(&fields, kind)?;
    let mut kinds = context.kinds.borrow_mut();
    kinds.entry(name.clone()).or_insert(kind);
    drop(kinds);
    let defaults = defaults
        .and_then(|all| all.get(*kind))
        .and_then(|value| value.get_ref().as_table());
    let fields = fields.owned_by(&name).for_part(index, defaults);
    fields.refuse_unknown(&with_article(kind), |key| {
        advice(kind, key).or_else(|| {
            let is_of_file = TOP.iter().any(|known| known.name == key);
            is_of_file.then_some(match index {
                Some(_) => "a key of the whole file stands above the first [[path]] block",
                None => "a key of the whole file stands above the first [[feed]] block",
            })
        })
    });
    fields.text("notes");

    let element = match *kind {
        "mirror" => read_mirror(&fields)?,
        "gap" => Element::Gap {
            length: required(&fields, "length", "a gap")?,
            medium: read_medium(&fields, "medium", ambient),
        },
        "lens" => Element::Lens {
            loss: fields.slot("loss"),
            power: read_pair(
                &fields,
                ["focal", "focal_tangential", "focal_sagittal"],
                "a lens",
            )?,
        },
        "slab" => read_slab(&fields)?,
        "duct" => read_duct(&fields)?,
        "aperture" => Element::Aperture,
        _ => read_matrix(&fields)?,
    };
    let opening = match *kind {
        "aperture" => Some(read_hole(&fields)?),
        "mirror" | "lens" | "slab" => read_opening(&fields),
        _ => None,
    };
    let clear = match *kind {
        "mirror" | "slab" => read_clear(&fields),
        _ => 1.0,
    };
    Some(Part {
        name,
        element,
        swapped: false,
        before: ambient,
        after: ambient,
        opening,
        clear,
    })
}

/// Share of an opening that may be used.
fn read_clear(fields: &Fields<'_, '_>) -> f64 {
    // Coatings and polish end before the rim: common practice, no source.
    const USUAL: f64 = 0.9;
    let Some(slot) = fields.slot("clear") else {
        return USUAL;
    };
    let clear = slot.of(&fields.context.book.borrow().nominal());
    if clear == 0.0 {
        fields.report(
            Some(fields.place_of("clear")),
            "an optic of which no share is clear lets no beam through",
            "write the usable share of its diameter, such as clear = 0.9",
        );
    }
    clear
}

fn read_name(fields: &Fields<'_, '_>, kind: &str) -> Option<String> {
    let (name, place) = fields.text(kind)?;
    let help = "a name is letters, digits, _ and -, begins with a letter or digit, and has at most \
                24 characters";
    let is_plain = |c: char| c.is_alphanumeric() || c == '_' || c == '-';
    if name.is_empty()
        || name.chars().count() > LONGEST_NAME
        || !name.chars().all(is_plain)
        || name.starts_with(['-', '_'])
    {
        let shown: String = name.chars().take(40).collect();
        fields.report(
            Some(place),
            format!("\"{}\" cannot be the name of a part", shown.escape_debug()),
            help,
        );
        return None;
    }
    if RESERVED.contains(&name.as_str()) || name == "coupling" {
        fields.report(
            Some(place),
            format!("\"{name}\" cannot be the name of a part: results use that word"),
            "choose another name, such as M1 or d1",
        );
        return None;
    }
    Some(name)
}

/// A number that must be there, entered into the address book.
pub(super) fn required(fields: &Fields<'_, '_>, key: &'static str, what: &str) -> Option<Slot> {
    if !fields.has(key) {
        fields.missing(key, what);
    }
    fields.slot(key)
}

/// One number for both planes, or one for each.
pub(super) fn read_pair(
    fields: &Fields<'_, '_>,
    [both, tangential, sagittal]: [&'static str; 3],
    what: &str,
) -> Option<PerPlane<Slot>> {
    let apart = fields.has(tangential) || fields.has(sagittal);
    if apart && fields.has(both) {
        fields.report(
            Some(fields.place_of(both)),
            format!("`{both}` and `{tangential}`, `{sagittal}` say the same thing twice"),
            &format!("keep either `{both}` or the pair"),
        );
        return None;
    }
    if apart {
        let pair = (
            required(fields, tangential, what),
            required(fields, sagittal, what),
        );
        return Some(PerPlane {
            tangential: pair.0?,
            sagittal: pair.1?,
        });
    }
    required(fields, both, what).map(PerPlane::both)
}

fn read_duct(fields: &Fields<'_, '_>) -> Option<Element> {
    let length = required(fields, "length", "a duct");
    let index = read_index(fields, "a duct");
    let strength = read_pair(
        fields,
        ["strength", "strength_tangential", "strength_sagittal"],
        "a duct",
    );
    let antiguiding = fields.word("profile", &PROFILES) == Some(1);
    Some(Element::Duct {
        length: length?,
        index: index?,
        strength: strength?,
        antiguiding,
    })
}

fn read_hole(fields: &Fields<'_, '_>) -> Option<Opening> {
    let round = fields.has("radius");
    let slit = fields.has("half_width") || fields.has("plane");
    if round == slit {
        fields.must_have(
            &["radius", "half_width"],
            Some(fields.place.clone()),
            "an aperture is either a round hole or a slit".into(),
            "write radius = \"1 mm\", or half_width = \"1 mm\" with plane = \"tangential\" or \
             \"sagittal\"",
        );
        return None;
    }
    if round {
        return Some(Opening::Hole {
            radius: fields.slot("radius")?,
        });
    }
    let half_width = required(fields, "half_width", "a slit");
    let plane = fields.word("plane", &SLIT_PLANES);
    if plane.is_none() && !fields.has("plane") {
        fields.report(
            Some(fields.place.clone()),
            "a slit needs `plane`, the plane that it limits",
            "add plane = \"tangential\" or plane = \"sagittal\"",
        );
    }
    Some(Opening::Slit {
        half_width: half_width?,
        plane: Plane::BOTH[plane?],
    })
}

fn read_opening(fields: &Fields<'_, '_>) -> Option<Opening> {
    let (width, height) = (fields.has("width"), fields.has("height"));
    if fields.has("diameter") {
        if width || height {
            fields.report(
                Some(fields.place_of("diameter")),
                "`diameter` and `width`, `height` say the same thing twice",
                "keep `diameter` for a round optic, `width` and `height` for a rectangular one",
            );
        }
        return fields
            .slot("diameter")
            .map(|diameter| Opening::Round { diameter });
    }
    if width || height {
        return Some(Opening::Rectangle {
            width: required(fields, "width", "a rectangular optic")?,
            height: required(fields, "height", "a rectangular optic")?,
        });
    }
    None
}

fn read_matrix(fields: &Fields<'_, '_>) -> Option<Element> {
    let entries = PerPlane::from_fn(|plane| read_entries(fields, plane.name()));
    let length = fields.slot_or("length", 0.0);
    Some(Element::Matrix {
        entries: PerPlane {
            tangential: entries.tangential?,
            sagittal: entries.sagittal?,
        },
        length,
    })
}

/// Greatest entry of a matrix, so that products of many stay finite.
const GREATEST_ENTRY: f64 = 1e12;

/// A determinant further from 1 than this is no rounding of written digits.
const DETERMINANT_WITHIN: f64 = 1e-6;

fn read_entries(fields: &Fields<'_, '_>, key: &'static str) -> Option<[f64; 4]> {
    let help = "write it like [[1, 0.1], [0, 1]]: A, B in metres, then C in 1/m, D, in reduced \
                coordinates";
    if !fields.has(key) {
        fields.report(
            Some(fields.place.clone()),
            format!("a matrix needs `{key}`"),
            help,
        );
        return None;
    }
    let rows = fields.list(key, help)?;
    let numbers: Option<Vec<f64>> = rows
        .iter()
        .map(|row| row.get_ref().as_array())
        .map(|row| {
            let row: Vec<_> = row?.iter().map(|x| fields.context.found(x)).collect();
            (row.len() == 2).then_some(row)
        })
        .flat_map(|row| match row {
            Some(row) => row.into_iter().map(Some).collect(),
            None => vec![None],
        })
        .map(|found| match found?.raw {
            super::context::Raw::Number(x) if x.abs() <= GREATEST_ENTRY => Some(x),
            _ => None,
        })
        .collect();
    let entries: Option<[f64; 4]> = numbers.and_then(|n| n.try_into().ok());
    let place = fields.place_of(key);
    let Some(m) = entries else {
        fields.report(
            Some(place),
            format!("`{key}` is two rows of two bare numbers of at most 1e12"),
            help,
        );
        return None;
    };
    let determinant = m[0] * m[3] - m[1] * m[2];
    if (determinant - 1.0).abs() > DETERMINANT_WITHIN {
        fields.report(
            Some(place),
            format!("the determinant of `{key}` is {determinant:.6}, and must be 1"),
            "in reduced coordinates (x, n·θ) every lossless element has determinant 1; multiply \
             angles by the index of the medium they are in",
        );
        return None;
    }
    Some(m)
}
