//! From single parts to a cavity: what only their order can tell.

use std::collections::HashSet;
use std::f64::consts::{FRAC_PI_2, PI};

use super::book::Book;
use super::frame;
use super::part::{Element, Incidence, Index, Part, Side, Slab};
use super::settle::{has_horizontal_tangential, settle_media, settle_planes};
use super::{Cavity, Form};
use crate::optics::ray::RayMatrix;
use crate::optics::{PerPlane, Plane};

/// A ring whose last direction misses its first by more than this (radians) is doubted: common
/// practice for hand-aligned layouts, no source.
const CLOSES_WITHIN: f64 = 1e-3;

/// A roll this near (radians) to a multiple of half a turn counts as that multiple: it mixes the
/// planes' modes by its square, 1e-8, and angles in files are rarely written more exactly.
const ROLL_WITHIN: f64 = 1e-4;

/// Highest transverse order that counts where nothing is said.
const DEFAULT_ORDER: usize = 12;

/// The makings of a cavity.
#[derive(Clone, Debug)]
pub struct Draft {
    /// How the path closes.
    pub form: Form,
    /// The medium of whatever names none.
    pub ambient: Index,
    /// The parts; `swapped`, `before` and `after` are settled here.
    pub parts: Vec<Part>,
    /// The optics between source and input mirror; likewise.
    pub feed: Vec<Part>,
    /// The numbers; the first three are wavelength, temperature and pump.
    pub book: Book,
}

/// Something that keeps parts from being a cavity.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct Fault {
    /// Index of the part at fault, if one is.
    pub part: Option<usize>,
    /// Whether that part is one of the feed.
    pub in_feed: bool,
    /// The key at fault, if one is.
    pub key: Option<&'static str>,
    /// What is wrong.
    pub message: String,
    /// What to write instead.
    pub help: String,
}

impl Cavity {
    /// Puts a cavity together.
    ///
    /// # Errors
    /// Everything that keeps the parts from being a cavity that can be computed, all at once.
    pub fn assemble(draft: Draft) -> Result<Cavity, Vec<Fault>> {
        let Draft {
            form,
            ambient,
            mut parts,
            mut feed,
            book,
        } = draft;
        let mut faults = Vec::new();
        let values = book.nominal();

        check_ends(form, &parts, &mut faults);
        if !faults.is_empty() {
            return Err(faults);
        }
        settle_media(Some(form), ambient, &mut parts);
        for (index, part) in parts.iter().enumerate() {
            check_part(index, part, &values, &mut faults);
        }
        if form == Form::Standing {
            check_end_angles(&parts, &values, &mut faults);
        }
        let tangential_is_horizontal = has_horizontal_tangential(&parts, &values);
        settle_planes(&mut parts, tangential_is_horizontal, &values);
        settle_media(None, ambient, &mut feed);
        settle_planes(&mut feed, tangential_is_horizontal, &values);
        check_feed(&feed, &values, &mut faults);
        let mut cautions = Vec::new();
        let flips = count_flips(form, &parts, &values, &mut cautions, &mut faults);
        if !faults.is_empty() {
            return Err(faults);
        }
        let cavity = Cavity {
            title: None,
            limits: Vec::new(),
            polarisation: super::Polarisation::S,
            highest_order: DEFAULT_ORDER,
            tolerancing: super::Tolerancing::default(),
            input: 0,
            source: None,
            feed,
            sidebands: Vec::new(),
            form,
            parts,
            book,
            ambient,
            flips,
            tangential_is_horizontal,
            cautions,
        };
        let mut length = 0.0;
        cavity.walk(&values, |leg| length += leg.length());
        let given = cavity.parts.iter().any(
            |part| matches!(part.element, Element::Matrix { length, .. } if length.of(&values) > 0.0),
        );
        if length <= 0.0 && !given {
            return Err(vec![Fault {
                part: None,
                in_feed: false,
                key: None,
                message: "the path has no length".into(),
                help: "put a gap between the mirrors: { gap = \"d1\", length = \"100 mm\" }".into(),
            }]);
        }
        let ways = [cavity.one_way(&values), cavity.feed_way(&values)];
        for (list, way) in ["path", "feed"].into_iter().zip(ways) {
            if !fits(way) {
                return Err(vec![Fault {
                    part: None,
                    in_feed: list == "feed",
                    key: None,
                    message: format!("a ray through this {list} grows beyond all numbers"),
                    help: format!(
                        "check the digits and units of the lengths, radii and powers; an entry of \
                         the {list}'s ray matrix exceeds 1e60"
                    ),
                }]);
            }
        }
        Ok(cavity)
    }
}

/// Greatest entry of a path's ray matrix: its fourth power, which the mode is made of, must still
/// be a number.
const GREATEST_ENTRY: f64 = 1e60;

fn fits(way: PerPlane<RayMatrix<f64>>) -> bool {
    Plane::BOTH.into_iter().all(|plane| {
        let m = way[plane];
        [m.a, m.b, m.c, m.d]
            .iter()
            .all(|entry| entry.abs() <= GREATEST_ENTRY)
    })
}

fn check_ends(form: Form, parts: &[Part], faults: &mut Vec<Fault>) {
    let mut fault = |part, message: &str, help: &str| {
        faults.push(Fault {
            part,
            in_feed: false,
            key: None,
            message: message.into(),
            help: help.into(),
        });
    };
    let is_mirror = |part: &Part| matches!(part.element, Element::Mirror(_));
    let (Some(first), Some(last)) = (parts.first(), parts.last()) else {
        return fault(
            None,
            "the path has no parts",
            "list the parts as the beam meets them, starting with a mirror",
        );
    };
    if !is_mirror(first) {
        fault(
            Some(0),
            match form {
                Form::Ring => "a ring starts with a mirror",
                Form::Standing => "a standing cavity starts with an end mirror",
            },
            "begin the path with { mirror = \"M1\", roc = … }; on a crystal's face, write the \
             mirror beside the slab",
        );
    }
    if form == Form::Standing {
        if parts.len() < 2 {
            fault(
                Some(0),
                "a standing cavity needs two end mirrors",
                "add a gap and a second mirror",
            );
        } else if !is_mirror(last) {
            fault(
                Some(parts.len() - 1),
                "a standing cavity ends with an end mirror",
                "end the path with a mirror, or write form = \"ring\" if the last part returns to \
                 the first",
            );
        }
    }
    let mut names = HashSet::new();
    for (index, part) in parts.iter().enumerate() {
        if !names.insert(part.name.as_str()) {
            fault(
                Some(index),
                &format!("two parts are named \"{}\"", part.name),
                "give every part a name of its own; results and tolerances refer to it",
            );
        }
    }
}

fn check_part(index: usize, part: &Part, values: &[f64], faults: &mut Vec<Fault>) {
    let mut fault = |key, message: String, help: &str| {
        faults.push(Fault {
            part: Some(index),
            in_feed: false,
            key,
            message,
            help: help.into(),
        });
    };
    let name = &part.name;
    match &part.element {
        Element::Mirror(mirror) => {
            if !part.before.bends_like(part.after, values) {
                fault(
                    None,
                    format!("mirror {name} stands between two different media"),
                    "give the gaps on both sides the same medium, or put the second medium into a \
                     slab",
                );
            }
            check_angle(mirror.incidence.of(values), name, &mut fault);
        }
        Element::Slab(slab) => check_slab(slab, part, values, &mut fault),
        _ => {}
    }
}

/// Judges the optics before the input mirror: as those of a path, and none of them an end.
fn check_feed(feed: &[Part], values: &[f64], faults: &mut Vec<Fault>) {
    let mut found = Vec::new();
    for (index, part) in feed.iter().enumerate() {
        check_part(index, part, values, &mut found);
        if let Element::Mirror(mirror) = &part.element
            && mirror.incidence.of(values) == 0.0
        {
            found.push(Fault {
                part: Some(index),
                in_feed: false,
                key: Some("aoi"),
                message: format!(
                    "mirror {} of the feed sends the beam straight back",
                    part.name
                ),
                help: "a mirror of the feed folds the beam: write its aoi, half the angle between \
                       the beams; the input mirror stands in the path only"
                    .into(),
            });
        }
    }
    faults.extend(found.into_iter().map(|fault| Fault {
        in_feed: true,
        ..fault
    }));
}

fn check_angle(
    incidence: f64,
    name: &str,
    fault: &mut impl FnMut(Option<&'static str>, String, &str),
) {
    if !(0.0..FRAC_PI_2).contains(&incidence) {
        fault(
            Some("aoi"),
            format!("the angle of incidence on {name} must be from 0 to less than 90°"),
            "aoi is counted from the surface's normal: half the angle between the two beams",
        );
    }
}

fn check_slab(
    slab: &Slab,
    part: &Part,
    values: &[f64],
    fault: &mut impl FnMut(Option<&'static str>, String, &str),
) {
    let name = &part.name;
    let outside = part.before.phase(values);
    let inside = slab.index.phase(values);
    if let Incidence::Angle(slot) = slab.incidence {
        let angle = slot.of(values);
        check_angle(angle, name, fault);
        if (outside * angle.sin() / inside).abs() >= 1.0 {
            fault(
                Some("aoi"),
                format!("the beam cannot enter {name}: it is totally reflected at its face"),
                "make the angle of incidence smaller, or check the indices on both sides",
            );
        }
    }
    if slab.is_tilted(values) && !part.before.bends_like(part.after, values) {
        fault(
            None,
            format!("{name} is tilted and stands between two different media"),
            "a tilted slab must have the same medium on both sides, else it turns the beam",
        );
    }
}

fn check_end_angles(parts: &[Part], values: &[f64], faults: &mut Vec<Fault>) {
    for index in [0, parts.len() - 1] {
        if let Element::Mirror(mirror) = &parts[index].element
            && mirror.incidence.of(values) != 0.0
        {
            faults.push(Fault {
                part: Some(index),
                in_feed: false,
                key: Some("aoi"),
                message: format!(
                    "{} ends the cavity and must send the beam back on itself",
                    parts[index].name
                ),
                help: "leave out its aoi; a tilted mirror in the path is a fold, with a gap and \
                       an end mirror after it"
                    .into(),
            });
        }
    }
}

/// Counts the flips of each axis in one round trip, roll included.
fn count_flips(
    form: Form,
    parts: &[Part],
    values: &[f64],
    cautions: &mut Vec<String>,
    faults: &mut Vec<Fault>,
) -> PerPlane<u32> {
    let mut flips = PerPlane::both(0);
    let mirrors = || {
        parts.iter().enumerate().filter_map(|(index, part)| {
            let Element::Mirror(mirror) = &part.element else {
                return None;
            };
            Some((index, part, mirror))
        })
    };
    for (index, part, _) in mirrors() {
        let is_end = form == Form::Standing && (index == 0 || index + 1 == parts.len());
        let plane = if part.swapped && !is_end {
            Plane::Sagittal
        } else {
            Plane::Tangential
        };
        flips[plane] += match form {
            Form::Standing if !is_end => 2,
            _ => 1,
        };
    }
    if form == Form::Standing {
        return flips;
    }

    let leaves_the_plane = mirrors().any(|(_, part, _)| part.swapped);
    let unnamed: Vec<_> = mirrors()
        .filter(|(_, _, mirror)| mirror.fold.is_none())
        .collect();
    if !unnamed.is_empty() {
        if leaves_the_plane {
            for (index, part, _) in unnamed {
                faults.push(Fault {
                    part: Some(index),
                    in_feed: false,
                    key: None,
                    message: format!(
                        "this ring leaves the plane, and {} does not say to which side it turns \
                         the beam",
                        part.name
                    ),
                    help: "name the side: fold = \"left\", \"right\", \"up\" or \"down\"".into(),
                });
            }
        }
        return flips;
    }
    let back = frame::carry(mirrors().map(|(_, _, mirror)| frame::Fold {
        side: mirror.fold.unwrap_or(Side::Left),
        incidence: mirror.incidence.of(values),
    }));
    if back.opening > CLOSES_WITHIN {
        cautions.push(format!(
            "the ring does not close: its last beam misses the first direction by {:.3}°; check \
             the angles of incidence and the folds",
            back.opening.to_degrees()
        ));
    }
    if !leaves_the_plane {
        return flips;
    }
    let half_turns = (back.roll / PI).round();
    let off = (back.roll - half_turns * PI).abs();
    if off > ROLL_WITHIN {
        faults.push(Fault {
            part: None,
            in_feed: false,
            key: None,
            message: format!(
                "this ring is non-planar and turns the beam about itself by {:.3}° in one round \
                 trip, which couples the two planes",
                back.roll.to_degrees()
            ),
            help: "not available yet: only rings whose roll is a multiple of 180° are computed, \
                   which every flat ring is"
                .into(),
        });
    } else if half_turns != 0.0 {
        flips = flips.map(|count| count + 1);
    }
    if off > 1e-9 && off <= ROLL_WITHIN {
        cautions.push(format!(
            "the ring turns the beam about itself by {:.1} µrad beyond a multiple of 180°, counted \
             as none",
            off * 1e6
        ));
    }
    flips
}
