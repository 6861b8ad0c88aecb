//! Keys of a whole file, and of its tables that are not parts.

use super::Holds::{
    Bound, Bounds, Count, Defaults, General, Medium, Numbers, Parts, Quantities, Table, Tables,
    Text, Texts, Word, Words,
};
use super::{Key, key, quantity};
use crate::quantity::Kind;

/// Forms of a cavity.
pub(in crate::file) const FORMS: [&str; 2] = ["standing", "ring"];
/// Polarisations against a mirror's plane of incidence.
pub(in crate::file) const POLARISATIONS: [&str; 2] = ["s", "p"];
/// How a quantity may lie within its limits.
pub(in crate::file) const SHAPES: [&str; 2] = ["rectangular", "normal"];

/// Keys of the whole file.
pub(in crate::file) const TOP: [Key; 19] = [
    key("title", Text, "What the cavity is"),
    key("notes", Text, "Anything worth remembering"),
    quantity("wavelength", Kind::Length, "Wavelength in vacuum"),
    key(
        "form",
        Word(&FORMS),
        "\"standing\": the path goes from end mirror to end mirror; \"ring\": its last part returns \
         to the first",
    ),
    key(
        "ambient",
        Medium,
        "Medium of every gap that names none: \"vacuum\" (the default), \"air\", a material or an \
         index",
    ),
    quantity(
        "temperature",
        Kind::Temperature,
        "Temperature of everything; 20 °C by default",
    ),
    key(
        "polarisation",
        Word(&POLARISATIONS),
        "Against each mirror's own plane of incidence; \"s\" by default",
    ),
    key("path", Parts, "The parts, in the order the beam meets them"),
    key(
        "feed",
        Parts,
        "The optics between source and input mirror, in the order the beam meets them",
    ),
    key("source", Table(&SOURCE), "The beam that is sent in"),
    key(
        "sidebands",
        Quantities(Kind::Frequency),
        "Modulation frequencies of the source; both signs are meant",
    ),
    quantity("pump", Kind::Power, "Pump power, which heats slabs"),
    key("limits", Tables(&LIMIT), "What must hold for a good build"),
    key(
        "ties",
        Texts,
        "Quantities that follow others, as in \"d4.length = d3.length\"",
    ),
    key(
        "general",
        General,
        "Tolerances of what is written without one, by key",
    ),
    key(
        "defaults",
        Defaults,
        "What parts of a kind are unless they say otherwise",
    ),
    key(
        "tolerance",
        Table(&TOLERANCE),
        "How quantities lie within their tolerances",
    ),
    key(
        "input",
        Text,
        "Mirror by which the source enters; the first by default",
    ),
    key(
        "highest_order",
        Count(100),
        "Highest order m + n of transverse modes that is looked at; 12 by default",
    ),
];

/// Keys of a source.
pub(in crate::file) const SOURCE: [Key; 19] = [
    quantity("waist", Kind::Length, "Radius of the waist"),
    quantity(
        "at",
        Kind::Position,
        "Where the waist lies, from the input mirror's outer face, upstream negative",
    ),
    quantity(
        "waist_tangential",
        Kind::Length,
        "Radius of the tangential waist",
    ),
    quantity(
        "at_tangential",
        Kind::Position,
        "Place of the tangential waist",
    ),
    quantity(
        "waist_sagittal",
        Kind::Length,
        "Radius of the sagittal waist",
    ),
    quantity("at_sagittal", Kind::Position, "Place of the sagittal waist"),
    quantity("spot", Kind::Length, "Radius of the beam at the place `at`"),
    quantity(
        "wavefront",
        Kind::Curvature,
        "Curvature of its wavefront there, diverging positive",
    ),
    quantity("mode_field", Kind::Length, "Mode-field diameter of a fibre"),
    quantity("m2", Kind::Number, "Beam quality M²"),
    quantity("power", Kind::Power, "Power"),
    quantity("energy", Kind::Energy, "Pulse energy"),
    quantity(
        "offset_tangential",
        Kind::Position,
        "Offset at the input mirror in the tangential plane",
    ),
    quantity(
        "offset_sagittal",
        Kind::Position,
        "Offset at the input mirror in the sagittal plane",
    ),
    quantity(
        "tilt_tangential",
        Kind::Angle,
        "Tilt at the input mirror in the tangential plane",
    ),
    quantity(
        "tilt_sagittal",
        Kind::Angle,
        "Tilt at the input mirror in the sagittal plane",
    ),
    key("cavity", Text, "File of a cavity whose beam is sent in"),
    key(
        "mirror",
        Text,
        "Mirror by which the beam leaves that cavity",
    ),
    key("notes", Text, "Anything worth remembering"),
];

/// Keys of a limit.
pub(in crate::file) const LIMIT: [Key; 5] = [
    key("of", Text, "The measure, such as \"M1.spot\" or \"margin\""),
    key("above", Bound, "What it must exceed"),
    key("below", Bound, "What it must stay below"),
    key("between", Bounds, "The lower and the upper bound"),
    key(
        "up_to",
        Count(100),
        "Highest order of the modes that mode_clearance counts",
    ),
];

/// Keys of `tolerance`.
pub(in crate::file) const TOLERANCE: [Key; 5] = [
    key(
        "shape",
        Word(&SHAPES),
        "How quantities lie within their limits; rectangular by default",
    ),
    key("shapes", Words(&SHAPES), "The same for single addresses"),
    key("groups", Tables(&GROUP), "Quantities that move together"),
    key(
        "adjust",
        Tables(&ADJUST),
        "What is adjusted once the parts are there",
    ),
    key(
        "cost",
        Numbers,
        "Relative cost of tightening a tolerance, by address; 1 where none is named",
    ),
];

/// Keys of a group of `tolerance`.
pub(in crate::file) const GROUP: [Key; 2] = [
    key("of", Texts, "Addresses of the quantities, two or more"),
    quantity(
        "correlation",
        Kind::Number,
        "Coefficient above 0 and not above 1; by default 1, where they move as one",
    ),
];

/// Keys of an adjustment of `tolerance`.
pub(in crate::file) const ADJUST: [Key; 4] = [
    key("set", Text, "Address of the quantity that is moved"),
    key(
        "travel",
        Bound,
        "How far it moves to either side, in its own unit",
    ),
    key(
        "hold",
        Text,
        "The measure that is held by it, such as \"margin.tangential\"",
    ),
    key(
        "to",
        Bound,
        "Where the measure is held; at its nominal value by default",
    ),
];

/// Keys that can have a general tolerance, with the kind of what they tolerate.
pub(in crate::file) const GENERAL: [(&str, Kind); 16] = [
    ("length", Kind::Length),
    ("thickness", Kind::Length),
    ("roc", Kind::Radius),
    ("entrance", Kind::Face),
    ("exit", Kind::Face),
    ("back", Kind::Face),
    ("focal", Kind::Focal),
    ("diameter", Kind::Length),
    ("aoi", Kind::Angle),
    ("pointing", Kind::Angle),
    ("thermal", Kind::Curvature),
    ("strength", Kind::Strength),
    ("index", Kind::Number),
    ("reflectance", Kind::Ratio),
    ("transmission", Kind::Ratio),
    ("loss", Kind::Ratio),
];
