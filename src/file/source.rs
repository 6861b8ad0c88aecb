//! `source`: the beam that is sent in, which can be written in several ways, and in one at a time.

use super::context::{Found, Raw};
use super::fields::Fields;
use crate::cavity::{Slot, Source, SourceBeam};
use crate::optics::PerPlane;
use crate::quantity::{self, Kind, human};

/// Reads the source; none where a mistake keeps it from being known.
pub(super) fn read_source(fields: &Fields<'_, '_>) -> Option<Source> {
    fields.refuse_unknown("a source", |key| match key {
        "radius" | "w0" | "beam" | "waist_radius" => Some("the radius of its waist is `waist`"),
        "diameter" | "mfd" => Some(
            "a beam has the radius of its `waist`; the diameter of a fibre's mode is `mode_field`",
        ),
        "position" | "distance" | "place" | "z" | "waist_at" => {
            Some("where its waist lies is `at`, upstream negative")
        }
        "curvature" | "roc" => Some("its wavefront's curvature is `wavefront`, in 1/m"),
        "file" => Some("the file of the cavity whose beam is sent in is `cavity`"),
        _ => None,
    });
    fields.text("notes");
    let pair = |tangential, sagittal| PerPlane {
        tangential: fields.slot_or(tangential, 0.0),
        sagittal: fields.slot_or(sagittal, 0.0),
    };
    let beam = read_beam(fields);
    Some(Source {
        m2: fields.slot_or("m2", 1.0),
        power: fields.slot("power"),
        energy: fields.slot("energy"),
        offset: pair("offset_tangential", "offset_sagittal"),
        tilt: pair("tilt_tangential", "tilt_sagittal"),
        beam: beam?,
    })
}

/// A way of writing the beam's shape: the keys that belong to it alone, and whether the plain `at`
/// is one of it too.
struct Way {
    keys: &'static [&'static str],
    at: bool,
}

const WAYS: [Way; 5] = [
    Way {
        keys: &["waist"],
        at: true,
    },
    Way {
        keys: &[
            "waist_tangential",
            "at_tangential",
            "waist_sagittal",
            "at_sagittal",
        ],
        at: false,
    },
    Way {
        keys: &["spot", "wavefront"],
        at: true,
    },
    Way {
        keys: &["mode_field"],
        at: true,
    },
    Way {
        keys: &["cavity", "mirror"],
        at: false,
    },
];

const FORMS: &str = "a beam is written as `waist` and `at`; or both for either plane, such as \
                     `waist_tangential`; or `spot`, `wavefront` and `at`; or `mode_field` and `at`; \
                     or `cavity` and `mirror`";

/// The beam's shape: none where a mistake keeps it from being known, `Some(None)` where nothing is
/// written of it.
fn read_beam(fields: &Fields<'_, '_>) -> Option<Option<SourceBeam>> {
    let first_key = |way: &Way| way.keys.iter().copied().find(|key| fields.has(key));
    let named: Vec<(usize, &str)> = WAYS
        .iter()
        .enumerate()
        .filter_map(|(number, way)| Some((number, first_key(way)?)))
        .collect();
    // Whatever is written is read, so that no wrong value hides behind a wrong choice of keys.
    let has = |key: &'static str| fields.has(key);
    let slot = |key: &'static str| has(key).then(|| fields.slot(key)).flatten();
    let [waist, at, spot, mode_field] = ["waist", "at", "spot", "mode_field"].map(slot);
    let wavefront = read_wavefront(fields);
    let radius = ["waist_tangential", "waist_sagittal"].map(slot);
    let places = ["at_tangential", "at_sagittal"].map(slot);
    let (way, key) = match named[..] {
        [] if has("at") => {
            fields.must_have(
                &["waist", "spot", "mode_field"],
                Some(fields.place_of("at")),
                "`at` says where the beam is met, and nothing says what it is there".into(),
                FORMS,
            );
            return None;
        }
        [] => return Some(None),
        [one] => one,
        [(_, one), (_, other), ..] => {
            fields.report(
                Some(fields.place_of(other)),
                format!("`{one}` and `{other}` say in two ways what the beam is"),
                &format!("keep one of them: {FORMS}"),
            );
            return None;
        }
    };
    if has("at") && !WAYS[way].at {
        let help = match way {
            1 => "either plane has a place of its own: `at_tangential` and `at_sagittal`",
            _ => "the way from that mirror to this cavity is a gap in `feed`",
        };
        fields.report(
            Some(fields.place_of("at")),
            format!("`at` does not go with `{key}`"),
            help,
        );
        return None;
    }
    let mut whole = true;
    let at_key: &[&'static str] = if WAYS[way].at { &["at"] } else { &[] };
    for needed in WAYS[way].keys.iter().chain(at_key) {
        if !has(needed) {
            fields.missing(needed, &format!("a source with `{key}`"));
            whole = false;
        }
    }
    if !whole {
        return None;
    }
    let beam = match way {
        0 => SourceBeam::Waists {
            radius: PerPlane::both(waist?),
            at: PerPlane::both(at?),
        },
        1 => {
            let pair = |[tangential, sagittal]: [Option<Slot>; 2]| {
                Some(PerPlane {
                    tangential: tangential?,
                    sagittal: sagittal?,
                })
            };
            SourceBeam::Waists {
                radius: pair(radius)?,
                at: pair(places)?,
            }
        }
        2 => SourceBeam::Spot {
            radius: spot?,
            wavefront: wavefront?,
            at: at?,
        },
        3 => SourceBeam::Fibre {
            mode_field: mode_field?,
            at: at?,
        },
        _ => {
            let (file, mirror) = (fields.text("cavity"), fields.text("mirror"));
            SourceBeam::Cavity {
                file: file?.0,
                mirror: mirror?.0,
            }
        }
    };
    Some(Some(beam))
}

/// The curvature of the wavefront, which is known by its radius elsewhere.
fn read_wavefront(fields: &Fields<'_, '_>) -> Option<Slot> {
    let found = fields.find("wavefront");
    if let Some(Found {
        raw: Raw::Text(text, _),
        place,
    }) = found
        && let Ok(radius) = quantity::parse(&text, Kind::Position)
        && let Some(radius) = radius.value.number().filter(|radius| *radius != 0.0)
    {
        fields.report(
            Some(place),
            "`wavefront` is a curvature, and this is a length",
            &format!(
                "a radius of {text} is \"{}\"; diverging is positive, flat is \"0 1/m\"",
                human(radius.recip(), Kind::Curvature, 4)
            ),
        );
        return None;
    }
    if fields.has("wavefront") {
        fields.slot("wavefront")
    } else {
        None
    }
}

/// Judges the numbers of a source once the ties have settled them.
pub(super) fn check_source(top: &Fields<'_, '_>, source: &Source) {
    let book = top.context.book.borrow();
    let check = |slot: Slot, least: f64, message: &str, help: &str| {
        let entry = book.entry(slot);
        let fits = if least == 0.0 {
            entry.value > 0.0
        } else {
            entry.value >= least
        };
        if !fits {
            let places = top.context.places.borrow();
            let place = places.get(&entry.address).cloned();
            top.report(
                Some(place.unwrap_or_else(|| top.place_of("source"))),
                message,
                help,
            );
        }
    };
    check(
        source.m2,
        1.0,
        "M² is at least 1",
        "1 is the beam quality of a Gaussian beam; no beam has a smaller one",
    );
    let no_beam = "write its 1/e² radius, as in waist = \"350 um\"; a fibre's `mode_field` is a \
                   diameter";
    let radii = match &source.beam {
        Some(SourceBeam::Waists { radius, .. }) => vec![radius.tangential, radius.sagittal],
        Some(SourceBeam::Spot { radius, .. }) => vec![*radius],
        Some(SourceBeam::Fibre { mode_field, .. }) => vec![*mode_field],
        Some(SourceBeam::Cavity { .. }) | None => vec![],
    };
    for radius in radii {
        check(radius, 0.0, "a beam is wider than zero", no_beam);
    }
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::file::load;
    use crate::optics::Plane;

    #[test]
    fn every_way_of_writing_a_beam_is_kept() {
        let kept = |beam: &str, set: &[&str]| {
            let file = format!(
                "wavelength = \"1064 nm\"\nform = \"standing\"\nsource = {{ {beam} }}\npath = [\n\
                 {{ mirror = \"M1\", roc = \"flat\" }}, {{ gap = \"d1\", length = \"50 mm\" }},\n\
                 {{ mirror = \"M2\", roc = \"200 mm\" }} ]"
            );
            let set: Vec<String> = set.iter().map(|set: &&str| set.to_string()).collect();
            let cavity = load("file", &file, &set).unwrap().cavity;
            let source = cavity.source.clone().unwrap();
            (source, cavity.book().nominal())
        };
        let (source, values) = kept(
            "waist = \"350 um\", at = \"-600 mm\", m2 = 1.1, power = \"10 W\", tilt_sagittal = \
             \"1 mrad\"",
            &["source.waist=300 um"],
        );
        let Some(SourceBeam::Waists { radius, at }) = source.beam else {
            panic!("{source:?}");
        };
        for plane in Plane::BOTH {
            assert_eq!(radius[plane].of(&values), 300e-6);
            assert_eq!(at[plane].of(&values), -0.6);
        }
        assert_eq!(source.m2.of(&values), 1.1);
        assert_eq!(source.power.unwrap().of(&values), 10.0);
        assert_eq!(source.tilt.sagittal.of(&values), 1e-3);
        assert_eq!(source.offset.tangential.of(&values), 0.0);

        let (source, values) = kept(
            "waist_tangential = \"1 mm\", at_tangential = \"1 m\", waist_sagittal = \"2 mm\", \
             at_sagittal = \"2 m\"",
            &[],
        );
        let Some(SourceBeam::Waists { radius, at }) = source.beam else {
            panic!("{source:?}");
        };
        assert_eq!(radius.sagittal.of(&values), 2e-3);
        assert_eq!(at.tangential.of(&values), 1.0);
        assert_eq!(source.m2.of(&values), 1.0);

        let (source, values) = kept(
            "spot = \"1 mm\", wavefront = \"-2 1/m\", at = \"0 mm\"",
            &[],
        );
        let Some(SourceBeam::Spot { wavefront, .. }) = source.beam else {
            panic!("{source:?}");
        };
        assert_eq!(wavefront.of(&values), -2.0);

        let (source, values) = kept("mode_field = \"10.4 um\", at = \"-3 mm\"", &[]);
        let Some(SourceBeam::Fibre { mode_field, .. }) = source.beam else {
            panic!("{source:?}");
        };
        assert_eq!(mode_field.of(&values), 10.4e-6);

        let (source, _) = kept("cavity = \"laser.toml\", mirror = \"OC\"", &[]);
        let expected = SourceBeam::Cavity {
            file: "laser.toml".into(),
            mirror: "OC".into(),
        };
        assert_eq!(source.beam, Some(expected));

        assert_eq!(kept("power = \"10 W\"", &[]).0.beam, None);
    }
}
