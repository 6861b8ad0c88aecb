//! The value of any measure, over any number type.

use super::eigenmode::{PlaneMode, modes};
use super::envelope::Envelope;
use super::lengths::RoundTripLengths;
use crate::cavity::{Cavity, Form, Measure};
use crate::numeric::Real;
use crate::optics::beam::Beam;
use crate::optics::{PerPlane, Plane};

/// A cavity with everything that measures are read from.
#[derive(Clone, Debug)]
pub struct Figures<'a, T: Real> {
    cavity: &'a Cavity,
    values: &'a [T],
    modes: PerPlane<PlaneMode<T>>,
    envelope: Envelope<T>,
}

impl<'a, T: Real> Figures<'a, T> {
    /// Computes the mode with the given values in the address book's slots.
    pub fn of(cavity: &'a Cavity, values: &'a [T]) -> Self {
        let modes = modes(cavity, values);
        let envelope = Envelope::of(cavity, values, modes.map(|mode| mode.beam));
        Figures {
            cavity,
            values,
            modes,
            envelope,
        }
    }

    /// The modes of both planes.
    pub fn modes(&self) -> &PerPlane<PlaneMode<T>> {
        &self.modes
    }

    /// The beam along the path.
    pub fn envelope(&self) -> &Envelope<T> {
        &self.envelope
    }

    /// The value of a measure in SI units, and whether it exists.
    pub fn measure(&self, measure: Measure) -> (T, T::Mask) {
        let always = T::constant(0.0).less(T::constant(1.0));
        let wavelength = Cavity::WAVELENGTH.of(self.values);
        match measure {
            Measure::Margin(None) => {
                let margins = self.modes.map(|mode| mode.margin);
                (margins.tangential.min(margins.sagittal), always)
            }
            Measure::Margin(Some(plane)) => (self.modes[plane].margin, always),
            Measure::HalfTrace(plane) => {
                let half_trace = self.modes[plane].half_trace;
                let odd = self.cavity.flips()[plane] % 2 == 1;
                (if odd { -half_trace } else { half_trace }, always)
            }
            Measure::Gouy(plane) => (self.envelope.gouy_phase[plane], self.modes[plane].stable),
            Measure::Spot(part, plane) => {
                let beam = self.envelope.at_middle(part);
                self.radius(plane, |p| beam[p].radius(wavelength))
            }
            Measure::Least(part, plane) => self.radius(plane, |p| {
                let least = self
                    .envelope
                    .inside(part)
                    .map(|inside| inside.stretch[p].least_beta(inside.entering[p]))
                    .reduce(T::min)
                    .unwrap_or(self.envelope.parts[part].arriving[p].beta);
                Beam::new(least, T::constant(0.0)).radius(wavelength)
            }),
            Measure::Waist(part, plane) => self.radius(plane, |p| {
                self.envelope.parts[part].entered[p].waist_radius(wavelength)
            }),
            Measure::WaistAt(part, plane) => {
                let at = |p: Plane| self.waist_at(part, p);
                match plane {
                    Some(p) => (at(p), self.modes[p].stable),
                    None => (
                        (at(Plane::Tangential) + at(Plane::Sagittal)) * 0.5,
                        self.both_stable(),
                    ),
                }
            }
            Measure::Aspect(part) => {
                let radius = self
                    .envelope
                    .at_middle(part)
                    .map(|beam| beam.radius(wavelength));
                (radius.tangential / radius.sagittal, self.both_stable())
            }
            Measure::Distance(from, to) => {
                let (from, to) = (&self.envelope.parts[from], &self.envelope.parts[to]);
                let way = to.at - from.at;
                // In a ring the way to an earlier part leads on past the first one; a standing
                // cavity is walked back along the same way.
                let backward = way.less(T::constant(0.0));
                let around = match self.cavity.form() {
                    Form::Ring => way + self.envelope.length,
                    Form::Standing => -way,
                };
                (T::select(backward, around, way), always)
            }
            Measure::RoundTripLength => (self.lengths().geometric, always),
            Measure::Fsr => (self.lengths().free_spectral_range(), always),
        }
    }

    /// Distance of the waist from a part's start, inside its medium.
    fn waist_at(&self, part: usize, plane: Plane) -> T {
        let entered = self.envelope.parts[part].entered[plane];
        match self.envelope.inside(part).next() {
            Some(inside) => entered.distance_to_waist(inside.stretch[plane].index),
            None => entered.distance_to_waist(T::constant(1.0)),
        }
    }

    fn lengths(&self) -> RoundTripLengths<T> {
        RoundTripLengths::of(self.cavity, self.values)
    }

    fn both_stable(&self) -> T::Mask {
        self.modes.tangential.stable & self.modes.sagittal.stable
    }

    /// A radius in one plane, or the geometric mean of both.
    fn radius(&self, plane: Option<Plane>, radius: impl Fn(Plane) -> T) -> (T, T::Mask) {
        match plane {
            Some(plane) => (radius(plane), self.modes[plane].stable),
            None => (
                (radius(Plane::Tangential) * radius(Plane::Sagittal)).sqrt(),
                self.both_stable(),
            ),
        }
    }
}

impl Figures<'_, f64> {
    /// The value of a measure in SI units; none where it does not exist.
    pub fn value(&self, measure: Measure) -> Option<f64> {
        let (value, exists) = self.measure(measure);
        exists.then_some(value)
    }
}
