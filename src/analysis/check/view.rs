//! The beam of a check: planes, stations, waists and the beams that leave.

use super::cautions::edge_reason;
use super::result::{Leaving, LeavingPlane, PlaneCheck, Spot, Station, Waist};
use super::{NO_MODE, TOO_LARGE};
use crate::analysis::clipping::{self, Rim};
use crate::analysis::eigenmode::{Eigenmode, Stability};
use crate::analysis::envelope::{AtPart, Envelope};
use crate::analysis::leaving;
use crate::cavity::{Cavity, Element, Form, Index, Part};
use crate::optics::beam::Beam;
use crate::optics::{PerPlane, Plane};

pub(super) struct View<'a> {
    pub(super) cavity: &'a Cavity,
    pub(super) values: &'a [f64],
    pub(super) mode: &'a Eigenmode,
    pub(super) envelope: &'a Envelope<f64>,
    pub(super) wavelength: f64,
}

impl View<'_> {
    pub(super) fn holds(&self, plane: Plane) -> bool {
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

    pub(super) fn plane(&self, plane: Plane) -> PlaneCheck {
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

    pub(super) fn stations(&self) -> Vec<Station> {
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
        let footprint = tangential.zip(sagittal).map(|(t, s)| {
            clipping::footprint(part, face.is_some(), self.values, [t.spot_m, s.spot_m])
        });
        let footprint = footprint.filter(|radii| radii.iter().all(|radius| radius.is_finite()));
        let lacks = tangential.is_none() || sagittal.is_none() || footprint.is_none();
        let clip_loss = footprint
            .zip(Rim::of(self.cavity, part, self.values))
            .map(|(radii, rim)| rim.loss(radii))
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

    pub(super) fn waists(&self) -> Vec<Waist> {
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

    pub(super) fn leaving(&self) -> Vec<Leaving> {
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
