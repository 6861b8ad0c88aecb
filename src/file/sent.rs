//! What is sent into the cavity: the optics on the source's way, its sidebands, and the mirror by
//! which it enters.

use std::collections::HashSet;

use super::MOST_PARTS;
use super::context::shown;
use super::fields::Fields;
use super::keys::SOURCE;
use super::parts::read_part;
use super::source::read_source;
use crate::cavity::{Cavity, Index, Part, Source};
use crate::quantity::{Kind, Spread};

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
