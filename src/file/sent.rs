//! What is sent into the cavity: the source, the optics on its way, its sidebands, and the mirror
//! by which it enters.

use std::collections::HashSet;

use super::MOST_PARTS;
use super::context::{Found, Raw, shown};
use super::fields::Fields;
use super::keys::SOURCE;
use super::parts::read_part;
use crate::cavity::{Cavity, Index, Part, Slot, Source, SourceBeam};
use crate::optics::PerPlane;
use crate::quantity::{self, Kind, Spread, human};

/// Most modulation frequencies of one source.
const MOST_SIDEBANDS: usize = 64;

/// What a file says of it.
pub(super) struct Sent {
    pub source: Option<Source>,
    pub feed: Vec<Part>,
    pub sidebands: Vec<f64>,
}

/// Reads what is sent into a cavity of this path.
pub(super) fn read_sent<'t>(fields: &Fields<'_, 't>, ambient: Index, path: &[Part]) -> Sent {
    let advice = "write it like source = { waist = \"350 um\", at = \"-600 mm\" }";
    let source = fields.table("source", advice).and_then(|(table, span)| {
        let source = Fields::new(fields.context, table, span)
            .owned_by("source")
            .knowing(&SOURCE);
        read_source(&source)
    });
    Sent {
        source,
        feed: read_feed(fields, ambient, path),
        sidebands: read_sidebands(fields),
    }
}

fn read_source(fields: &Fields<'_, '_>) -> Option<Source> {
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

fn read_feed<'t>(fields: &Fields<'_, 't>, ambient: Index, path: &[Part]) -> Vec<Part> {
    let advice = "write it like feed = [ { lens = \"L1\", focal = \"200 mm\" }, { gap = \"f1\", \
                  length = \"300 mm\" } ], the optics from the source to the input mirror";
    let items = fields.list("feed", advice).unwrap_or_default();
    if items.len() > MOST_PARTS {
        fields.report(
            Some(fields.context.place(items[MOST_PARTS].span())),
            format!(
                "the feed has {} parts; at most {MOST_PARTS} are read",
                items.len()
            ),
            "keep those between the source and the input mirror",
        );
        return Vec::new();
    }
    let mut taken: HashSet<String> = path.iter().map(|part| part.name.clone()).collect();
    let mut feed = Vec::new();
    for value in items {
        let Some(part) = read_part(fields.context, value, None, ambient, None) else {
            continue;
        };
        if !taken.insert(part.name.clone()) {
            let name = &part.name;
            fields.report(
                Some(fields.context.place(value.span())),
                format!("two parts are named \"{name}\""),
                "give every part a name of its own, in the feed and in the path; the feed ends \
                 before the input mirror",
            );
        }
        feed.push(part);
    }
    feed
}

fn read_sidebands(fields: &Fields<'_, '_>) -> Vec<f64> {
    let advice = "write it like sidebands = [\"12 MHz\"]";
    let items = fields.list("sidebands", advice).unwrap_or_default();
    if items.len() > MOST_SIDEBANDS {
        fields.report(
            Some(fields.context.place(items[MOST_SIDEBANDS].span())),
            format!(
                "`sidebands` has {} frequencies; at most {MOST_SIDEBANDS} are read",
                items.len()
            ),
            "keep those that matter",
        );
        return Vec::new();
    }
    let mut sidebands = Vec::new();
    for item in items {
        let found = fields.context.found(item);
        let Some(frequency) = fields
            .context
            .quantity("sidebands", &found, Kind::Frequency)
        else {
            continue;
        };
        match frequency.value.number() {
            _ if frequency.spread != Spread::Exact => fields.report(
                Some(found.place),
                "a modulation frequency has no spread",
                advice,
            ),
            Some(number) if number > 0.0 => sidebands.push(number),
            _ => fields.report(
                Some(found.place),
                format!(
                    "a modulation frequency lies above zero, and this is {}",
                    frequency.text
                ),
                "both signs are meant by one frequency",
            ),
        }
    }
    sidebands
}

/// The mirror by which the source enters.
pub(super) fn read_input(fields: &Fields<'_, '_>, cavity: &Cavity) -> Option<usize> {
    let (name, place) = fields.text("input")?;
    let found = cavity.part_named(&name);
    let mirror = found.filter(|part| cavity.parts()[*part].kind() == "mirror");
    if mirror.is_none() {
        fields.report(
            Some(place),
            format!("no mirror is named \"{}\"", shown(&name)),
            "`input` names the mirror of the path by which the source enters",
        );
    }
    mirror
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::cavity::Element;
    use crate::file::load;
    use crate::optics::Plane;

    /// A cavity that folds upwards, so that its tangential plane is the vertical one.
    fn read(rest: &str, set: &[&str]) -> Cavity {
        let file = format!(
            "wavelength = \"1064 nm\"\nform = \"standing\"\n{rest}\npath = [\n\
             {{ mirror = \"M1\", roc = \"flat\" }}, {{ gap = \"d1\", length = \"50 mm\" }},\n\
             {{ mirror = \"M2\", roc = \"200 mm\", aoi = \"10 deg\", fold = \"up\" }},\n\
             {{ gap = \"d2\", length = \"50 mm\" }}, {{ mirror = \"M3\", roc = \"flat\" }} ]"
        );
        let set: Vec<String> = set.iter().map(|set| set.to_string()).collect();
        match load("file", &file, &set) {
            Ok(loaded) => loaded.cavity,
            Err(refused) => panic!("{:?}", refused.diagnostics),
        }
    }

    #[test]
    fn nothing_is_sent_in_unless_it_is_written() {
        let cavity = read("", &[]);
        assert_eq!(cavity.source, None);
        assert_eq!(cavity.input, 0);
        assert!(cavity.feed.is_empty() && cavity.sidebands.is_empty());
        assert_eq!(read("input = \"M3\"", &[]).input, 4);
    }

    #[test]
    fn every_way_of_writing_a_beam_is_kept() {
        let kept = |beam: &str, set: &[&str]| {
            let cavity = read(&format!("source = {{ {beam} }}"), set);
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

    #[test]
    fn a_feed_is_settled_as_a_path_with_the_ambient_at_its_ends() {
        let cavity = read(
            "ambient = 1.1\nsidebands = [\"12 MHz\", \"80 MHz\"]\nfeed = [\n{ lens = \"L0\", focal = \
             \"200 mm\" },\n{ gap = \"f1\", length = \"100 mm\", medium = 1.5 },\n{ mirror = \"F1\", \
             roc = \"1 m\", aoi = \"45 deg\", fold = \"left\" },\n{ gap = \"f2\", length = \"100 mm\", \
             medium = 1.5 },\n{ aperture = \"A1\", radius = \"1 mm\" } ]",
            &["L0.focal=400 mm", "f2.length=250 mm"],
        );
        assert_eq!(cavity.sidebands, [12e6, 80e6]);
        let values = cavity.book().nominal();
        let media = |part: &Part| [part.before.phase(&values), part.after.phase(&values)];
        let [lens, _, mirror, gap, aperture] = &cavity.feed[..] else {
            panic!("{:?}", cavity.feed);
        };
        assert_eq!(media(lens), [1.1, 1.5]);
        assert_eq!(media(mirror), [1.5, 1.5]);
        assert_eq!(media(aperture), [1.5, 1.1]);
        // It folds sideways, and the tangential plane of the file is the vertical one.
        assert!(mirror.swapped && !cavity.tangential_is_horizontal());
        let Element::Gap { length, .. } = gap.element else {
            panic!("{gap:?}");
        };
        assert_eq!(length.of(&values), 0.25);
        let focal = cavity.book().find("L0.focal").unwrap();
        assert_eq!(focal.of(&values), 2.5);
        let mut legs = 0;
        cavity.walk_feed(&values, |leg| {
            assert_eq!(leg.part, legs);
            legs += 1;
        });
        assert_eq!(legs, 5);
        // In the horizontal plane, here the sagittal one, R·cos(aoi) bends the beam.
        let power = |cos: f64| 2.0 * 1.5 / cos;
        let m = cavity.feed_way(&values);
        let expected = |power: f64| {
            let (l1, l2) = (0.1 / 1.5, 0.25 / 1.5);
            let (a, c) = (1.0 - 2.5 * l1, -2.5);
            let c = c - power * a;
            [a + c * l2, c]
        };
        let cos = std::f64::consts::FRAC_PI_4.cos();
        for (plane, power) in [
            (Plane::Sagittal, power(cos)),
            (Plane::Tangential, power(cos.recip())),
        ] {
            let [a, c] = expected(power);
            approx::assert_relative_eq!(m[plane].a, a, max_relative = 1e-12);
            approx::assert_relative_eq!(m[plane].c, c, max_relative = 1e-12);
        }
    }
}
