//! The whole answer to "is it stable, and what is the beam everywhere": one plain result.

use serde::Serialize;

use super::clipping;
use super::eigenmode::{Eigenmode, Stability};
use super::envelope::{AtPart, Envelope};
use super::leaving;
use super::lengths::RoundTripLengths;
use super::measures::{Evaluator, Workspace};
use super::ranges::{End, QuantityRange, stable_ranges};
use crate::cavity::{
    Cavity, Element, Entry, Form, Index, Measure, Opening, Origin, Part, slab_crossing,
};
use crate::optics::beam::Beam;
use crate::optics::{PerPlane, Plane};
use crate::quantity::{Kind, Spread};

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

/// Why a value is missing where a mode is there.
const TOO_LARGE: &str = "this value is too large or too small to be computed";

const NO_MODE: &str = "this plane holds no mode";

/// Checks a cavity.
pub fn check(cavity: &Cavity) -> Check {
    let values = cavity.book().nominal();
    let mode = Eigenmode::of(cavity, &values);
    let envelope = Envelope::of(cavity, &values, mode.start());
    let lengths = RoundTripLengths::of(cavity, &values);
    let view = View {
        cavity,
        values: &values,
        mode: &mode,
        envelope: &envelope,
        wavelength: Cavity::WAVELENGTH.of(&values),
    };
    let mut cautions = cavity.cautions().to_vec();
    cautions.extend(mode_cautions(&view));
    cautions.extend(data_cautions(cavity));
    cautions.extend(square_on_folds(cavity, &values));
    let stations = view.stations();
    cautions.extend(clipping_caution(&stations));
    Check {
        title: cavity.title.clone(),
        form: cavity.form().name(),
        wavelength_m: view.wavelength,
        stable: mode.stability() == Stability::Stable,
        on_edge: mode.stability() == Stability::OnEdge,
        margin: mode.margin(),
        planes: PerPlane::from_fn(|plane| view.plane(plane)).into(),
        round_trip: RoundTrip {
            length_m: lengths.geometric,
            optical_m: lengths.optical,
            group_m: lengths.group,
            fsr_hz: lengths.free_spectral_range(),
            reflections: cavity.reflections(),
        },
        stations,
        waists: view.waists(),
        leaving: view.leaving(),
        ranges: stable_ranges(cavity)
            .into_iter()
            .map(|found| describe_range(cavity, found, mode.stability()))
            .collect(),
        limits: limits(cavity, &values),
        cautions,
        tangential_is_horizontal: cavity.tangential_is_horizontal(),
    }
}

struct View<'a> {
    cavity: &'a Cavity,
    values: &'a [f64],
    mode: &'a Eigenmode,
    envelope: &'a Envelope<f64>,
    wavelength: f64,
}

impl View<'_> {
    fn holds(&self, plane: Plane) -> bool {
        self.mode.planes[plane].beam.is_some()
    }

    /// Why some plane has no value, where one has none.
    fn why(&self) -> Option<String> {
        let missing: Vec<&str> = Plane::BOTH
            .into_iter()
            .filter(|plane| !self.holds(*plane))
            .map(Plane::name)
            .collect();
        (!missing.is_empty()).then(|| format!("no mode in the {} plane", missing.join(" and ")))
    }

    fn plane(&self, plane: Plane) -> PlaneCheck {
        let result = &self.mode.planes[plane];
        let m = result.matrix;
        let stable = result.stability == Stability::Stable;
        let gouy_rad = stable
            .then_some(self.envelope.gouy_phase[plane])
            .filter(|phase| phase.is_finite());
        let why = match result.stability {
            Stability::Stable => gouy_rad.is_none().then(|| TOO_LARGE.into()),
            Stability::OnEdge => Some(edge_reason(self.cavity, self.values, plane)),
            Stability::Unstable => Some(NO_MODE.into()),
        };
        PlaneCheck {
            stable,
            half_trace: result.half_trace,
            margin: result.margin,
            gouy_rad,
            gouy_folded_rad: result.gouy_folded,
            matrix: [[m.a, m.b], [m.c, m.d]],
            why,
        }
    }

    fn stations(&self) -> Vec<Station> {
        let parts = self.cavity.parts();
        let mut stations = Vec::with_capacity(4 * parts.len());
        for (index, part) in parts.iter().enumerate() {
            self.push_stations(&mut stations, index, part, 1);
        }
        if self.cavity.form() == Form::Standing {
            for (index, part) in parts.iter().enumerate().rev() {
                if index != 0 && index + 1 != parts.len() {
                    self.push_stations(&mut stations, index, part, 2);
                }
            }
        }
        stations
    }

    fn push_stations(&self, stations: &mut Vec<Station>, index: usize, part: &Part, pass: u32) {
        let at = &self.envelope.parts[index];
        let round_trip = 2.0 * self.envelope.length;
        let back = |beam: PerPlane<Beam<f64>>| beam.map(Beam::reversed);
        // On the way back the exit is met first, and every wavefront runs the other way.
        let (entry, exit, begins, ends, outside) = match pass {
            1 => (
                at.arriving,
                at.at_exit,
                at.at,
                at.at + at.length,
                part.before,
            ),
            _ => (
                back(at.left),
                back(at.entered),
                round_trip - at.at - at.length,
                round_trip - at.at,
                part.after,
            ),
        };
        stations.push(self.station(part, None, pass, begins, entry, outside));
        let inside = part.inside();
        let is_thin = at.length == 0.0 && matches!(part.element, Element::Matrix { .. });
        if let Some(inside) = inside
            && !is_thin
        {
            stations.push(self.station(part, Some("exit"), pass, ends, exit, inside));
        }
    }

    fn station(
        &self,
        part: &Part,
        face: Option<&'static str>,
        pass: u32,
        at_m: f64,
        beam: PerPlane<Beam<f64>>,
        medium: Index,
    ) -> Station {
        let index = medium.phase(self.values);
        let spot = |plane: Plane| {
            let spot = Spot {
                spot_m: beam[plane].radius(self.wavelength),
                curvature_per_m: beam[plane].wavefront_curvature(index),
            };
            let is_finite = spot.spot_m.is_finite() && spot.curvature_per_m.is_finite();
            (self.holds(plane) && is_finite).then_some(spot)
        };
        let (tangential, sagittal) = (spot(Plane::Tangential), spot(Plane::Sagittal));
        let cosine = self.surface_cosine(part, face);
        let footprint = tangential.zip(sagittal).map(|(t, s)| {
            let mut radii = [t.spot_m, s.spot_m];
            radii[usize::from(part.swapped)] /= cosine;
            radii
        });
        let footprint = footprint.filter(|radii| radii.iter().all(|radius| radius.is_finite()));
        let lacks = tangential.is_none() || sagittal.is_none() || footprint.is_none();
        let clip_loss = footprint
            .and_then(|radii| self.clip_loss(part, radii))
            .filter(|loss| loss.is_finite());
        let why = if lacks {
            Some(self.why().unwrap_or_else(|| TOO_LARGE.into()))
        } else if part.opening.is_none() {
            Some("no opening is given".into())
        } else {
            clip_loss.is_none().then(|| TOO_LARGE.into())
        };
        Station {
            part: part.name.clone(),
            kind: part.kind(),
            face,
            pass,
            at_m,
            tangential,
            sagittal,
            footprint_m: footprint,
            clip_loss,
            why,
        }
    }

    /// Cosine of the angle at which the beam meets the surface, on the side where it is.
    fn surface_cosine(&self, part: &Part, face: Option<&'static str>) -> f64 {
        match &part.element {
            Element::Mirror(mirror) => mirror.incidence.of(self.values).cos(),
            Element::Slab(slab) => {
                let outside = part.before.phase(self.values);
                let crossing = slab_crossing(slab, outside, self.values);
                if face.is_some() {
                    crossing.cos_to
                } else {
                    crossing.cos_from
                }
            }
            _ => 1.0,
        }
    }

    fn clip_loss(&self, part: &Part, [t, s]: [f64; 2]) -> Option<f64> {
        let values = self.values;
        let clear = part.clear;
        Some(match part.opening? {
            Opening::Round { diameter } => clipping::round(0.5 * clear * diameter.of(values), t, s),
            Opening::Hole { radius } => clipping::round(radius.of(values), t, s),
            Opening::Slit { half_width, plane } => clipping::slit(
                half_width.of(values),
                if plane == Plane::Tangential { t } else { s },
            ),
            Opening::Rectangle { width, height } => {
                let (across, up) = if self.cavity.tangential_is_horizontal() {
                    (t, s)
                } else {
                    (s, t)
                };
                clipping::rectangle(
                    0.5 * clear * width.of(values),
                    0.5 * clear * height.of(values),
                    across,
                    up,
                )
            }
        })
    }

    fn waists(&self) -> Vec<Waist> {
        let mut waists = Vec::new();
        for (index, part) in self.cavity.parts().iter().enumerate() {
            let at = &self.envelope.parts[index];
            let holds_waist = matches!(
                part.element,
                Element::Gap { .. } | Element::Slab(_) | Element::Duct { .. }
            );
            if !holds_waist {
                continue;
            }
            let bends = part.bends_inside();
            for plane in Plane::BOTH {
                waists.push(self.waist(part, at, plane, bends));
            }
        }
        waists
    }

    fn waist(&self, part: &Part, at: &AtPart<f64>, plane: Plane, bends: bool) -> Waist {
        let why = if !self.holds(plane) {
            Some(NO_MODE.to_string())
        } else if bends {
            Some("the beam inside is bent and has no single waist".into())
        } else {
            None
        };
        let index = part.inside().unwrap_or(Index::VACUUM).phase(self.values);
        let beam = at.entered[plane];
        let from_start = beam.distance_to_waist(index);
        let waist = beam.waist_radius(self.wavelength);
        let rayleigh = beam.rayleigh_length(index);
        let is_finite = [from_start, waist, rayleigh].iter().all(|x| x.is_finite());
        let why = why.or_else(|| (!is_finite).then(|| TOO_LARGE.into()));
        let known = why.is_none();
        Waist {
            part: part.name.clone(),
            plane: plane.name(),
            waist_m: known.then_some(waist),
            from_start_m: known.then_some(from_start),
            rayleigh_m: known.then_some(rayleigh),
            inside: known.then(|| (0.0..=at.length).contains(&from_start)),
            why,
        }
    }

    fn leaving(&self) -> Vec<Leaving> {
        let parts = self.cavity.parts();
        let standing = self.cavity.form() == Form::Standing;
        let inner = |index: usize| index != 0 && index + 1 != parts.len();
        let passes = [1, 2].into_iter().flat_map(|pass| {
            let indices: Vec<usize> = match pass {
                1 => (0..parts.len()).collect(),
                _ if standing => (0..parts.len()).rev().filter(|i| inner(*i)).collect(),
                _ => Vec::new(),
            };
            indices.into_iter().map(move |index| (index, pass))
        });
        passes
            .filter_map(|(index, pass)| self.leaving_through(index, pass))
            .collect()
    }

    fn leaving_through(&self, index: usize, pass: u32) -> Option<Leaving> {
        let part = &self.cavity.parts()[index];
        let Element::Mirror(mirror) = &part.element else {
            return None;
        };
        let opaque = |coating: &crate::cavity::Coating| {
            coating.transmission(self.values).is_some_and(|t| t <= 0.0)
        };
        if opaque(&mirror.coating_s) && opaque(&mirror.coating_p) {
            return None;
        }
        let at = &self.envelope.parts[index];
        let arriving = match pass {
            1 => at.arriving,
            _ => at.left.map(Beam::reversed),
        };
        let ambient = self.cavity.ambient();
        let beam = leaving::behind(part, mirror, ambient, self.values, arriving);
        let outside = ambient.phase(self.values);
        let plane = |plane: Plane| {
            let beam = beam?[plane];
            let leaving = LeavingPlane {
                waist_m: beam.waist_radius(self.wavelength),
                from_outer_face_m: beam.distance_to_waist(outside),
                divergence_rad: beam.divergence(self.wavelength, outside),
            };
            let is_finite = leaving.waist_m.is_finite()
                && leaving.from_outer_face_m.is_finite()
                && leaving.divergence_rad.is_finite();
            (self.holds(plane) && is_finite).then_some(leaving)
        };
        let (tangential, sagittal) = (plane(Plane::Tangential), plane(Plane::Sagittal));
        let lacks = tangential.is_none() || sagittal.is_none();
        let reason = match beam {
            None => "the beam is totally reflected on its way out",
            Some(_) => TOO_LARGE,
        };
        Some(Leaving {
            mirror: part.name.clone(),
            pass,
            tangential,
            sagittal,
            why: lacks.then(|| self.why().unwrap_or_else(|| reason.into())),
        })
    }
}

/// Entries of a matrix this small against the round trip are zero for the naming of an edge.
const VANISHES: f64 = 1e-9;

fn edge_reason(cavity: &Cavity, values: &[f64], plane: Plane) -> String {
    let way = cavity.one_way(values)[plane];
    let mode = super::eigenmode::PlaneMode::of(cavity.form(), way);
    let length = RoundTripLengths::of(cavity, values).geometric;
    let m = match cavity.form() {
        Form::Ring => way,
        Form::Standing => way.then(way.reversed()),
    };
    let everything_repeats = m.b.abs() <= VANISHES * length && m.c.abs() <= VANISHES / length;
    let sign = if mode.half_trace > 0.0 { "+1" } else { "−1" };
    if everything_repeats {
        let kind = if mode.half_trace < 0.0 {
            "confocal"
        } else {
            "every ray closes on itself"
        };
        format!(
            "the round trip is {sign} times the identity ({kind}): every beam repeats itself, and \
             the apertures alone set the mode"
        )
    } else {
        format!("the half-trace is {sign}: on the edge of stability no beam repeats itself")
    }
}

fn mode_cautions(view: &View<'_>) -> Vec<String> {
    let mut cautions = Vec::new();
    for plane in Plane::BOTH {
        let result = &view.mode.planes[plane];
        if result.stability != Stability::OnEdge || view.cavity.form() != Form::Standing {
            continue;
        }
        let way = view.cavity.one_way(view.values)[plane];
        let confocal = way.a.abs() < VANISHES && way.d.abs() < VANISHES;
        if confocal {
            let radius = Beam::new(way.b.abs(), 0.0).radius(view.wavelength);
            cautions.push(format!(
                "{} plane confocal: a cavity drawn into it symmetrically would have a radius of \
                 {:.1} µm on both ends",
                plane.name(),
                radius * 1e6
            ));
        }
    }
    cautions
}

/// A share of the power that no low-loss cavity can spare in one pass.
const MUCH_CLIPPED: f64 = 0.01;

fn clipping_caution(stations: &[Station]) -> Option<String> {
    let mut names: Vec<&str> = stations
        .iter()
        .filter(|station| station.clip_loss.is_some_and(|loss| loss > MUCH_CLIPPED))
        .map(|station| station.part.as_str())
        .collect();
    names.dedup();
    (!names.is_empty()).then(|| {
        format!(
            "more than 1 % of a centred beam misses the opening of {}; the mode is computed as if \
             nothing were clipped",
            list(&names)
        )
    })
}

/// Mirrors inside a path that send the beam straight back.
fn square_on_folds(cavity: &Cavity, values: &[f64]) -> Option<String> {
    let last = cavity.parts().len() - 1;
    let names: Vec<&str> = cavity
        .parts()
        .iter()
        .enumerate()
        .filter(|(index, part)| {
            let is_end = cavity.form() == Form::Standing && (*index == 0 || *index == last);
            match &part.element {
                Element::Mirror(mirror) => !is_end && mirror.incidence.of(values) == 0.0,
                _ => false,
            }
        })
        .map(|(_, part)| part.name.as_str())
        .collect();
    (!names.is_empty()).then(|| {
        format!(
            "no angle of incidence for {}, a mirror within the path: it counts as met square-on, \
             and would send the beam straight back; write its aoi",
            list(&names)
        )
    })
}

/// Doubts about the numbers themselves.
fn data_cautions(cavity: &Cavity) -> Vec<String> {
    let mut cautions = Vec::new();
    let without_group: Vec<&str> = cavity
        .parts()
        .iter()
        .filter(|part| {
            let medium = part
                .inside()
                .filter(|_| !matches!(part.element, Element::Matrix { .. }));
            medium.is_some_and(|medium| !medium.has_group())
        })
        .map(|part| part.name.as_str())
        .collect();
    if !without_group.is_empty() {
        cautions.push(format!(
            "no group index for {}: its phase index stands in, so the FSR is a little too large",
            list(&without_group)
        ));
    }
    let radii = |entry: &&Entry| entry.kind == Kind::Radius && entry.origin == Origin::Written;
    let has_spread = |entry: &Entry| entry.spread != Spread::Exact;
    let book = cavity.book();
    let some_toleranced = book
        .iter()
        .map(|(_, entry)| entry)
        .any(|entry| entry.kind == Kind::Radius && has_spread(entry));
    let perfect: Vec<&str> = book
        .iter()
        .map(|(_, entry)| entry)
        .filter(radii)
        .filter(|entry| entry.value == 0.0 && !has_spread(entry))
        .map(|entry| entry.address.as_str())
        .collect();
    if some_toleranced && !perfect.is_empty() {
        cautions.push(format!(
            "flat without a tolerance, and so counted as perfect, while other radii have one: {}; \
             a tolerance of a flat is written \"flat ± 0.003 1/m\"",
            list(&perfect)
        ));
    }
    let lens_in_medium: Vec<&str> = cavity
        .parts()
        .iter()
        .filter(|part| {
            let values = book.nominal();
            matches!(part.element, Element::Lens { .. })
                && [part.before, part.after]
                    .iter()
                    .any(|medium| medium.phase(&values) > 1.01)
        })
        .map(|part| part.name.as_str())
        .collect();
    if !lens_in_medium.is_empty() {
        cautions.push(format!(
            "{} stands in a medium; its focal length counts as it would be in vacuum",
            list(&lens_in_medium)
        ));
    }
    if cavity
        .parts()
        .iter()
        .any(has_tilted_curved_face(&book.nominal()))
    {
        cautions.push(
            "a tilted slab with a curved face counts as if the beam met each face at its vertex"
                .into(),
        );
    }
    cautions
}

fn has_tilted_curved_face(values: &[f64]) -> impl Fn(&Part) -> bool {
    move |part| match &part.element {
        Element::Slab(slab) => {
            slab.is_tilted(values)
                && (slab.entrance.of(values) != 0.0 || slab.exit.of(values) != 0.0)
        }
        _ => false,
    }
}

/// Names in a sentence, the first few of them.
fn list(names: &[&str]) -> String {
    const SHOWN: usize = 6;
    if names.len() > SHOWN {
        format!(
            "{} and {} more",
            names[..SHOWN].join(", "),
            names.len() - SHOWN
        )
    } else {
        names.join(", ")
    }
}

fn describe_range(cavity: &Cavity, found: QuantityRange, stability: Stability) -> Range {
    let entry = cavity.book().entry(found.slot);
    let ends = found.range.map(|range| (range.from, range.to));
    let value = |end: Option<End>| {
        end.and_then(End::value)
            .filter(|_| !matches!(end, Some(End::Zero { .. })))
    };
    let from = value(ends.map(|ends| ends.0));
    let to = value(ends.map(|ends| ends.1));
    let mut reasons = Vec::new();
    match ends {
        None => reasons.push("no value of this quantity alone makes the cavity stable".to_string()),
        Some((low, high)) => {
            for (name, end) in [("from", low), ("to", high)] {
                match end {
                    End::Edge { touch: true, .. } => reasons.push(format!(
                        "{name}: the half-trace touches ±1 there, and the cavity is stable again \
                         beyond"
                    )),
                    End::Edge { .. } => {}
                    End::Zero { at: 0.0 } => {
                        reasons.push(format!("{name}: stable all the way to zero"));
                    }
                    End::Zero { .. } => {
                        reasons.push(format!("{name}: stable until a tied length reaches zero"));
                    }
                    End::Open => reasons.push(format!("{name}: no edge in reach")),
                }
            }
        }
    }
    let reciprocal = entry.is_reciprocal();
    let plain = |end: Option<f64>| (!reciprocal).then_some(end);
    let per_m = |end: Option<f64>| reciprocal.then_some(end);
    Range {
        quantity: entry.address.clone(),
        from: plain(from),
        to: plain(to),
        from_per_m: per_m(from),
        to_per_m: per_m(to),
        holds_nominal: stability == Stability::Stable,
        why: (!reasons.is_empty()).then(|| reasons.join("; ")),
        found,
        tolerance: tolerance(entry),
        kind: entry.kind,
    }
}

/// Half the width of a quantity's tolerance as written: half of its limits, or twice the
/// standard uncertainty.
fn tolerance(entry: &Entry) -> Option<f64> {
    let half = match entry.spread {
        Spread::Exact => return None,
        Spread::Limits { below, above } => 0.5 * (below + above),
        Spread::Standard { uncertainty } => 2.0 * uncertainty,
    };
    Some(half)
}

fn no_value(measure: Measure) -> &'static str {
    match measure {
        Measure::Finesse | Measure::Linewidth => "nothing is written of any loss",
        Measure::ModeClearance { .. } => "the cavity holds no mode, or no loss is written",
        _ => "the cavity holds no mode",
    }
}

fn limits(cavity: &Cavity, values: &[f64]) -> Vec<LimitCheck> {
    let measures = cavity.limits.iter().map(|limit| limit.measure).collect();
    let mut found = Vec::new();
    Evaluator::new(cavity, measures).evaluate(
        values,
        &mut Workspace::default(),
        |_, value: f64, exists| found.push(exists.then_some(value)),
    );
    cavity
        .limits
        .iter()
        .zip(found)
        .map(|(limit, found)| {
            let value = found.filter(|value| value.is_finite());
            LimitCheck {
                of: limit.name.clone(),
                value,
                holds: value.is_some_and(|value| limit.bounds.hold(value)),
                wanted: limit.bounds.to_string(),
                why: value.is_none().then(|| match found {
                    Some(_) => TOO_LARGE.into(),
                    None => no_value(limit.measure).into(),
                }),
                limit: limit.clone(),
            }
        })
        .collect()
}
