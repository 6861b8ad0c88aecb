//! Kinds of parts and their keys.

use super::Holds::{Entries, Medium, Name, Text, Word};
use super::{Key, key, quantity};
use crate::quantity::Kind;

/// A kind of part.
#[derive(Clone, Copy, Debug)]
pub(in crate::file) struct PartKind {
    /// Its kind key, which is also the first of its keys.
    pub name: &'static str,
    pub says: &'static str,
    pub keys: &'static [Key],
    /// What it cannot do without: one of several ways of saying it, each by some keys.
    pub needs: &'static [&'static [&'static [&'static str]]],
}

/// To which side a beam turns or moves.
pub(in crate::file) const SIDES: [&str; 4] = ["left", "right", "up", "down"];
/// What a duct does to the beam.
pub(in crate::file) const PROFILES: [&str; 2] = ["guiding", "antiguiding"];
/// Planes that a slit may limit.
pub(in crate::file) const SLIT_PLANES: [&str; 2] = ["tangential", "sagittal"];
/// Where a thermal lens sits.
pub(in crate::file) const THERMAL_PLACES: [&str; 4] = ["spread", "entrance", "middle", "exit"];

const NOTES: Key = key("notes", Text, "Anything worth remembering");

/// Every kind of part.
pub(in crate::file) const KINDS: [PartKind; 7] = [
    PartKind {
        name: "mirror",
        says: "A mirror",
        keys: &MIRROR,
        needs: &[&[&["roc"], &["roc_tangential", "roc_sagittal"]]],
    },
    PartKind {
        name: "gap",
        says: "Free space, or a medium between two parts",
        keys: &GAP,
        needs: &[&[&["length"]]],
    },
    PartKind {
        name: "lens",
        says: "A thin lens",
        keys: &LENS,
        needs: &[&[&["focal"], &["focal_tangential", "focal_sagittal"]]],
    },
    PartKind {
        name: "slab",
        says: "A plate, rod or crystal",
        keys: &SLAB,
        needs: &[&[&["thickness"]], &[&["material"], &["index"]]],
    },
    PartKind {
        name: "duct",
        says: "A medium whose index falls or rises as the square of the distance from the axis",
        keys: &DUCT,
        needs: &[
            &[&["length"]],
            &[&["index"]],
            &[&["strength"], &["strength_tangential", "strength_sagittal"]],
        ],
    },
    PartKind {
        name: "aperture",
        says: "A round hole or a slit",
        keys: &APERTURE,
        needs: &[&[&["radius"], &["half_width", "plane"]]],
    },
    PartKind {
        name: "matrix",
        says: "Anything else, by its ray matrices",
        keys: &MATRIX,
        needs: &[&[&["tangential"]], &[&["sagittal"]]],
    },
];

const MIRROR: [Key; 26] = [
    key("mirror", Name, "Name of the mirror"),
    quantity(
        "roc",
        Kind::Radius,
        "Radius of curvature: concave positive, \"convex\" and \"concave\" may be written, or \"flat\"",
    ),
    quantity(
        "roc_tangential",
        Kind::Radius,
        "Radius of curvature of a toric mirror in the tangential plane",
    ),
    quantity(
        "roc_sagittal",
        Kind::Radius,
        "Radius of curvature of a toric mirror in the sagittal plane",
    ),
    quantity(
        "aoi",
        Kind::Angle,
        "Angle of incidence, half the angle between the beams; 0 by default",
    ),
    key(
        "fold",
        Word(&SIDES),
        "To which side the beam turns, as a pilot flying along it sees it",
    ),
    quantity(
        "fold_plane",
        Kind::Angle,
        "To which side the beam turns, as an angle from left through up",
    ),
    quantity("reflectance", Kind::Ratio, "Share of the power reflected"),
    quantity(
        "reflectance_s",
        Kind::Ratio,
        "Share of s-polarised power reflected",
    ),
    quantity(
        "reflectance_p",
        Kind::Ratio,
        "Share of p-polarised power reflected",
    ),
    quantity(
        "transmission",
        Kind::Ratio,
        "Share of the power let through",
    ),
    quantity(
        "transmission_s",
        Kind::Ratio,
        "Share of s-polarised power let through",
    ),
    quantity(
        "transmission_p",
        Kind::Ratio,
        "Share of p-polarised power let through",
    ),
    quantity(
        "loss",
        Kind::Ratio,
        "Share of the power lost in the coating",
    ),
    quantity("loss_s", Kind::Ratio, "Share of s-polarised power lost"),
    quantity("loss_p", Kind::Ratio, "Share of p-polarised power lost"),
    quantity("diameter", Kind::Length, "Diameter of a round mirror"),
    quantity(
        "width",
        Kind::Length,
        "Horizontal size of a rectangular mirror, in the carried frame",
    ),
    quantity(
        "height",
        Kind::Length,
        "Vertical size of a rectangular mirror, in the carried frame",
    ),
    quantity(
        "clear",
        Kind::Ratio,
        "Usable share of the size; 90 % by default",
    ),
    quantity("thickness", Kind::Length, "Thickness of the substrate"),
    key("substrate", Medium, "Material or index of the substrate"),
    quantity(
        "back",
        Kind::Face,
        "Radius of the outer face, as seen from outside; \"flat\" by default",
    ),
    quantity("damage", Kind::Damage, "What the coating endures"),
    quantity(
        "pointing",
        Kind::Angle,
        "How far the mount may tilt it about either axis",
    ),
    NOTES,
];

const GAP: [Key; 4] = [
    key("gap", Name, "Name of the gap"),
    quantity("length", Kind::Length, "Length along the beam"),
    key(
        "medium",
        Medium,
        "What fills it: a material or an index; the ambient by default",
    ),
    NOTES,
];

const LENS: [Key; 7] = [
    key("lens", Name, "Name of the lens"),
    quantity("focal", Kind::Focal, "Focal length in vacuum"),
    quantity(
        "focal_tangential",
        Kind::Focal,
        "Focal length in the tangential plane",
    ),
    quantity(
        "focal_sagittal",
        Kind::Focal,
        "Focal length in the sagittal plane",
    ),
    quantity("loss", Kind::Ratio, "Share of the power lost per pass"),
    quantity("diameter", Kind::Length, "Diameter"),
    NOTES,
];

const SLAB: [Key; 25] = [
    key("slab", Name, "Name of the slab"),
    quantity("thickness", Kind::Length, "Thickness, square to the faces"),
    key(
        "material",
        Text,
        "Material; `modewright materials` lists those known",
    ),
    key(
        "axis",
        Text,
        "Crystal axis along which the light is polarised, such as \"o\" or \"x\"",
    ),
    quantity(
        "index",
        Kind::Number,
        "Refractive index, instead of a material",
    ),
    quantity("group_index", Kind::Number, "Group index beside `index`"),
    quantity(
        "temperature",
        Kind::Temperature,
        "Temperature; that of the file by default",
    ),
    quantity(
        "aoi",
        Kind::SlabAngle,
        "Angle of incidence, or \"brewster\"; 0 by default",
    ),
    key(
        "shift",
        Word(&SIDES),
        "To which side a tilted slab displaces the beam; left by default",
    ),
    quantity(
        "entrance",
        Kind::Face,
        "Radius of the first face, as seen from outside; \"flat\" by default",
    ),
    quantity(
        "exit",
        Kind::Face,
        "Radius of the second face, as seen from outside; \"flat\" by default",
    ),
    quantity(
        "thermal",
        Kind::Curvature,
        "Dioptric power of the thermal lens inside, per pass",
    ),
    quantity(
        "thermal_tangential",
        Kind::Curvature,
        "Dioptric power of the thermal lens in the tangential plane",
    ),
    quantity(
        "thermal_sagittal",
        Kind::Curvature,
        "Dioptric power of the thermal lens in the sagittal plane",
    ),
    quantity(
        "thermal_per_watt",
        Kind::Curvature,
        "Dioptric power, in 1/m, per watt of the file's `pump`",
    ),
    quantity(
        "thermal_per_watt_tangential",
        Kind::Curvature,
        "Dioptric power per watt in the tangential plane",
    ),
    quantity(
        "thermal_per_watt_sagittal",
        Kind::Curvature,
        "Dioptric power per watt in the sagittal plane",
    ),
    key(
        "thermal_at",
        Word(&THERMAL_PLACES),
        "Where the thermal lens sits; \"spread\" along the path by default",
    ),
    quantity(
        "loss",
        Kind::Loss,
        "Loss per pass, or per length as in \"0.1 %/cm\"",
    ),
    quantity(
        "conversion",
        Kind::PerWatt,
        "Single-pass nonlinear loss per watt",
    ),
    quantity("diameter", Kind::Length, "Diameter of a rod"),
    quantity(
        "width",
        Kind::Length,
        "Horizontal size of a rectangular slab, in the carried frame",
    ),
    quantity(
        "height",
        Kind::Length,
        "Vertical size of a rectangular slab, in the carried frame",
    ),
    quantity(
        "clear",
        Kind::Ratio,
        "Usable share of the size; 90 % by default",
    ),
    NOTES,
];

const DUCT: [Key; 9] = [
    key("duct", Name, "Name of the duct"),
    quantity("length", Kind::Length, "Length along the beam"),
    quantity("index", Kind::Number, "Refractive index on the axis"),
    quantity("group_index", Kind::Number, "Group index on the axis"),
    quantity("strength", Kind::Strength, "Strength of the duct"),
    quantity(
        "strength_tangential",
        Kind::Strength,
        "Strength in the tangential plane",
    ),
    quantity(
        "strength_sagittal",
        Kind::Strength,
        "Strength in the sagittal plane",
    ),
    key(
        "profile",
        Word(&PROFILES),
        "Whether the index falls outward (guiding, the default) or rises",
    ),
    NOTES,
];

const APERTURE: [Key; 5] = [
    key("aperture", Name, "Name of the aperture"),
    quantity("radius", Kind::Length, "Radius of a round hole"),
    quantity("half_width", Kind::Length, "Half the width of a slit"),
    key(
        "plane",
        Word(&SLIT_PLANES),
        "The plane that the slit limits",
    ),
    NOTES,
];

const MATRIX: [Key; 5] = [
    key("matrix", Name, "Name of the element"),
    key(
        "tangential",
        Entries,
        "Ray matrix [[A, B], [C, D]] of the tangential plane: metres, reduced, determinant 1",
    ),
    key(
        "sagittal",
        Entries,
        "Ray matrix [[A, B], [C, D]] of the sagittal plane: metres, reduced, determinant 1",
    ),
    quantity(
        "length",
        Kind::Length,
        "Its length along the beam; 0 by default",
    ),
    NOTES,
];
