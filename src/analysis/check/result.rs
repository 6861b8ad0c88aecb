//! The result of a check: plain, documented, serialisable; SI units, the unit in each name.

use serde::Serialize;

use crate::analysis::ranges::{End, QuantityRange};
use crate::optics::{PerPlane, Plane};
use crate::quantity::Kind;

/// Everything that `check` knows of a cavity, in SI units.
#[derive(Clone, Debug, Serialize)]
pub struct Check {
    /// The cavity's title; left out where it has none.
    #[serde(skip_serializing_if = "Option::is_none")]
    pub title: Option<String>,
    /// `standing` or `ring`.
    pub form: &'static str,
    /// Wavelength in vacuum.
    pub wavelength_m: f64,
    /// Whether both planes hold a mode.
    pub stable: bool,
    /// Whether the worse plane has a half-trace of ±1 within 1e-10.
    pub on_edge: bool,
    /// The lesser margin of the planes.
    pub margin: f64,
    /// Either plane.
    pub planes: Planes<PlaneCheck>,
    /// The round trip's lengths.
    pub round_trip: RoundTrip,
    /// The beam arriving at every part, over one round trip.
    pub stations: Vec<Station>,
    /// Waists in the media of the path.
    pub waists: Vec<Waist>,
    /// Beams leaving through the mirrors.
    pub leaving: Vec<Leaving>,
    /// How far each quantity may move.
    pub ranges: Vec<Range>,
    /// The file's limits.
    pub limits: Vec<LimitCheck>,
    /// Doubts that the reader should know.
    pub cautions: Vec<String>,
    /// Whether the file's tangential plane is the horizontal one.
    pub tangential_is_horizontal: bool,
}

/// A value in either plane.
#[derive(Clone, Copy, Debug, Serialize)]
pub struct Planes<X> {
    /// In the plane of incidence.
    pub tangential: X,
    /// Square to it.
    pub sagittal: X,
}

impl<X> From<PerPlane<X>> for Planes<X> {
    fn from(pair: PerPlane<X>) -> Self {
        Planes {
            tangential: pair.tangential,
            sagittal: pair.sagittal,
        }
    }
}

impl<X> Planes<X> {
    /// The value of one plane.
    pub fn get(&self, plane: Plane) -> &X {
        match plane {
            Plane::Tangential => &self.tangential,
            Plane::Sagittal => &self.sagittal,
        }
    }
}

/// One plane of the round trip.
#[derive(Clone, Debug, Serialize)]
pub struct PlaneCheck {
    /// Whether it holds a mode.
    pub stable: bool,
    /// Half-trace of `matrix`.
    pub half_trace: f64,
    /// 1 − |half-trace|.
    pub margin: f64,
    /// Gouy phase accumulated in a round trip, flips left out.
    pub gouy_rad: Option<f64>,
    /// The same modulo 2π with the flips counted.
    pub gouy_folded_rad: Option<f64>,
    /// The round trip that starts just behind the first part, flips included.
    pub matrix: [[f64; 2]; 2],
    /// Why a value is missing.
    #[serde(skip_serializing_if = "Option::is_none")]
    pub why: Option<String>,
}

/// Lengths of the round trip.
#[derive(Clone, Debug, Serialize)]
pub struct RoundTrip {
    /// Along the beam.
    pub length_m: f64,
    /// Weighted with the phase index.
    pub optical_m: f64,
    /// Weighted with the group index.
    pub group_m: f64,
    /// Free spectral range.
    pub fsr_hz: f64,
    /// Number of reflections.
    pub reflections: u32,
}

/// The beam arriving at a part, in one plane.
#[derive(Clone, Copy, Debug, Serialize)]
pub struct Spot {
    /// Beam radius.
    pub spot_m: f64,
    /// Wavefront curvature 1/R in the medium, diverging positive.
    pub curvature_per_m: f64,
}

/// A place along the round trip.
#[derive(Clone, Debug, Serialize)]
pub struct Station {
    /// Name of the part.
    pub part: String,
    /// Its kind.
    pub kind: &'static str,
    /// `exit` where the beam is about to leave a part with a length.
    #[serde(skip_serializing_if = "Option::is_none")]
    pub face: Option<&'static str>,
    /// 1 on the way out and in a ring, 2 on the way back.
    pub pass: u32,
    /// Geometric way from the first part.
    pub at_m: f64,
    /// In the tangential plane.
    pub tangential: Option<Spot>,
    /// In the sagittal plane.
    pub sagittal: Option<Spot>,
    /// Radii on the surface, tangential and sagittal.
    pub footprint_m: Option<[f64; 2]>,
    /// Share of a centred beam that misses the opening in this pass; left out where no opening is
    /// given.
    #[serde(skip_serializing_if = "Option::is_none")]
    pub clip_loss: Option<f64>,
    /// Why a value is missing.
    #[serde(skip_serializing_if = "Option::is_none")]
    pub why: Option<String>,
}

impl Station {
    /// The spot in one plane.
    pub fn spot(&self, plane: Plane) -> Option<Spot> {
        match plane {
            Plane::Tangential => self.tangential,
            Plane::Sagittal => self.sagittal,
        }
    }
}

/// The waist of the beam in one part and plane.
#[derive(Clone, Debug, Serialize)]
pub struct Waist {
    /// Name of the part.
    pub part: String,
    /// `tangential` or `sagittal`.
    pub plane: &'static str,
    /// Radius of the waist.
    pub waist_m: Option<f64>,
    /// Its distance from the part's start.
    pub from_start_m: Option<f64>,
    /// Rayleigh length in the part's medium.
    pub rayleigh_m: Option<f64>,
    /// Whether it lies inside the part.
    pub inside: Option<bool>,
    /// Why a value is missing.
    #[serde(skip_serializing_if = "Option::is_none")]
    pub why: Option<String>,
}

/// A beam that leaves, in one plane.
#[derive(Clone, Copy, Debug, Serialize)]
pub struct LeavingPlane {
    /// Radius of its waist.
    pub waist_m: f64,
    /// Distance of the waist from the outer face, downstream positive.
    pub from_outer_face_m: f64,
    /// Half-angle of its divergence.
    pub divergence_rad: f64,
}

/// The beam that leaves through a mirror.
#[derive(Clone, Debug, Serialize)]
pub struct Leaving {
    /// Name of the mirror.
    pub mirror: String,
    /// The pass in which the beam meets it.
    pub pass: u32,
    /// In the tangential plane.
    pub tangential: Option<LeavingPlane>,
    /// In the sagittal plane.
    pub sagittal: Option<LeavingPlane>,
    /// Why a value is missing.
    #[serde(skip_serializing_if = "Option::is_none")]
    pub why: Option<String>,
}

/// The range of one quantity over which the cavity is stable.
#[derive(Clone, Debug, Serialize)]
pub struct Range {
    /// Its address.
    pub quantity: String,
    /// Lower end; left out for radii and focal lengths.
    #[serde(skip_serializing_if = "Option::is_none")]
    pub from: Option<Option<f64>>,
    /// Upper end; left out for radii and focal lengths.
    #[serde(skip_serializing_if = "Option::is_none")]
    pub to: Option<Option<f64>>,
    /// Lower end of 1/R or 1/f.
    #[serde(skip_serializing_if = "Option::is_none")]
    pub from_per_m: Option<Option<f64>>,
    /// Upper end of 1/R or 1/f.
    #[serde(skip_serializing_if = "Option::is_none")]
    pub to_per_m: Option<Option<f64>>,
    /// Whether the nominal value lies within.
    pub holds_nominal: bool,
    /// What ends it, and why an end is missing.
    #[serde(skip_serializing_if = "Option::is_none")]
    pub why: Option<String>,
    /// The computed range, for readers of the library.
    #[serde(skip)]
    pub found: QuantityRange,
    /// Half the width of the quantity's tolerance as written: of a radius in metres, of a flat in
    /// 1/m.
    #[serde(skip)]
    pub tolerance: Option<f64>,
    /// How the quantity is written.
    #[serde(skip)]
    pub kind: Kind,
}

impl Range {
    /// Distance from the nominal value to the nearer edge, in tolerances; infinite where there is
    /// no edge that a tolerance could reach, none where there is no tolerance.
    pub fn room(&self) -> Option<f64> {
        let (tolerance, range) = (self.tolerance?, self.found.range?);
        let nominal = self.found.nominal;
        let is_radius = self.kind.is_reciprocal();
        let multiple = |end: End| match end {
            // A tolerance of a radius never leads past flat.
            End::Edge { at, .. } if is_radius && nominal != 0.0 => {
                (at * nominal > 0.0).then(|| (1.0 / at - 1.0 / nominal).abs() / tolerance)
            }
            End::Edge { at, .. } => Some((at - nominal).abs() / tolerance),
            _ => None,
        };
        let edges = [multiple(range.from), multiple(range.to)];
        Some(edges.into_iter().flatten().fold(f64::INFINITY, f64::min))
    }
}

/// A limit and whether it holds.
#[derive(Clone, Debug, Serialize)]
pub struct LimitCheck {
    /// The measure's name.
    pub of: String,
    /// Its value.
    pub value: Option<f64>,
    /// Whether it holds.
    pub holds: bool,
    /// What is wanted, in SI units.
    pub wanted: String,
    /// Why a value is missing.
    #[serde(skip_serializing_if = "Option::is_none")]
    pub why: Option<String>,
    /// The limit itself.
    #[serde(skip)]
    pub limit: crate::cavity::Limit,
}
