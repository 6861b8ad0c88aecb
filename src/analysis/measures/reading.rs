//! Measures read off the beam once the mode is found.

use super::Evaluator;
use super::route::{Inside, Within};
use crate::analysis::airy;
use crate::analysis::eigenmode::PlaneMode;
use crate::analysis::lengths::RoundTripLengths;
use crate::analysis::spectrum::{self, Multiples};
use crate::cavity::{Cavity, Form, Measure, Piece};
use crate::numeric::Real;
use crate::optics::beam::{Beam, ComplexRay};
use crate::optics::element::duct::Stretch;
use crate::optics::ray::RayMatrix;
use crate::optics::{PerPlane, Plane};

/// All that measures are read off.
pub(super) struct Reading<'a, T: Real> {
    evaluator: &'a Evaluator<'a>,
    cavity: &'a Cavity,
    values: &'a [T],
    wavelength: T,
    /// Ray matrices from the start to the parts that are asked about, and what those have inside.
    kept: &'a [PerPlane<RayMatrix<T>>],
    inside: &'a [Inside<T>],
    modes: &'a PerPlane<PlaneMode<T>>,
    start: PerPlane<ComplexRay<T>>,
}

impl<'a, T: Real> Reading<'a, T> {
    #[inline(always)]
    pub(super) fn new(
        evaluator: &'a Evaluator<'a>,
        values: &'a [T],
        kept: &'a [PerPlane<RayMatrix<T>>],
        inside: &'a [Inside<T>],
        modes: &'a PerPlane<PlaneMode<T>>,
    ) -> Self {
        Reading {
            evaluator,
            cavity: evaluator.cavity,
            values,
            wavelength: Cavity::WAVELENGTH.of(values),
            kept,
            inside,
            modes,
            start: PerPlane {
                tangential: modes.tangential.beam.ray(),
                sagittal: modes.sagittal.beam.ray(),
            },
        }
    }

    #[inline(always)]
    pub(super) fn measure(&self, measure: Measure, multiples: &mut Multiples<T>) -> (T, T::Mask) {
        let always = T::always(true);
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
            Measure::Gouy(plane) => (self.gouy(plane), self.modes[plane].stable),
            Measure::Spot(part, plane)
            | Measure::Least(part, plane)
            | Measure::Waist(part, plane) => self.radius(measure, part, plane),
            Measure::WaistAt(part, Some(plane)) => {
                (self.waist_at(part, plane), self.modes[plane].stable)
            }
            Measure::WaistAt(part, None) => {
                let [t, s] = Plane::BOTH.map(|plane| self.waist_at(part, plane));
                ((t + s) * 0.5, self.both_stable())
            }
            Measure::Aspect(part) => {
                let [t, s] = Plane::BOTH.map(|plane| self.middle(part, plane));
                ((t / s).sqrt(), self.both_stable())
            }
            Measure::Distance(from, to) => (self.distance(from, to), always),
            Measure::RoundTripLength => (self.lengths().geometric, always),
            Measure::Fsr => (self.lengths().free_spectral_range(), always),
            Measure::Finesse => self.finesse(),
            Measure::Linewidth => {
                let (finesse, exists) = self.finesse();
                (self.lengths().free_spectral_range() / finesse, exists)
            }
            Measure::Lifetime => {
                let attenuation = self.attenuation();
                let exists = T::constant(0.0).less(attenuation);
                let lost = T::select(exists, attenuation, T::constant(1.0));
                (
                    (self.lengths().free_spectral_range() * lost).recip(),
                    exists,
                )
            }
            Measure::Spacing(plane) => {
                let spacing = spectrum::spacings(self.cavity, self.modes)[plane].folded();
                let fsr = self.lengths().free_spectral_range();
                (spacing * fsr, self.modes[plane].stable)
            }
            Measure::ModeClearance { up_to } => {
                let (finesse, exists) = self.finesse();
                let offset = self.least_offset(up_to, multiples);
                (offset * finesse, exists & self.both_stable())
            }
            Measure::Suppression { up_to } => {
                let (finesse, exists) = self.finesse();
                let offset = self.least_offset(up_to, multiples);
                let suppression = spectrum::suppression(offset, finesse);
                (suppression, exists & self.both_stable())
            }
        }
    }

    /// What a part that is asked about has inside.
    #[inline(always)]
    fn within(&self, part: usize) -> &'a Within {
        &self.evaluator.route.watched[self.evaluator.route.places[part]]
    }

    /// The beam arriving at a part that is asked about.
    #[inline(always)]
    fn arriving(&self, part: usize, plane: Plane) -> ComplexRay<T> {
        let way = &self.kept[self.evaluator.route.places[part]][plane];
        self.start[plane].after(*way)
    }

    /// The beam just behind a part's entrance.
    #[inline(always)]
    fn entered(&self, part: usize, plane: Plane) -> Beam<T> {
        match self.within(part) {
            Within::Nothing => self.arriving(part, plane),
            Within::Fixed(inside) => {
                let ray = self.arriving(part, plane);
                ray.after_fixed(inside.entered[plane])
            }
            Within::Walked(number) => self.start[plane].after(self.inside[*number].entered[plane]),
        }
        .beam()
    }

    /// A part is one stretch, or two equal ones around a lumped lens: the first or the second, and
    /// the beam where it begins.
    #[inline(always)]
    fn stretch(
        &self,
        part: usize,
        which: usize,
        plane: Plane,
    ) -> Option<(Stretch<T>, ComplexRay<T>)> {
        match self.within(part) {
            Within::Nothing => None,
            Within::Fixed(inside) => {
                let (stretch, way) = inside.stretches[which].as_ref()?;
                let ray = self.arriving(part, plane);
                Some((stretch[plane].constant(), ray.after_fixed(way[plane])))
            }
            Within::Walked(number) => {
                let (stretch, way) = self.inside[*number].stretches[which].as_ref()?;
                Some((stretch[plane], self.start[plane].after(way[plane])))
            }
        }
    }

    /// β at a part's middle, or at the part itself where it has no inside.
    #[inline(always)]
    fn middle(&self, part: usize, plane: Plane) -> T {
        // The middle is where a second stretch begins, or half-way along the only one.
        match (self.stretch(part, 0, plane), self.stretch(part, 1, plane)) {
            (_, Some((_, ray))) => ray.beta(),
            (Some((stretch, ray)), None) => ray.after(stretch.part(0.5).matrix()).beta(),
            _ => self.arriving(part, plane).beta(),
        }
    }

    #[inline(always)]
    fn least(&self, part: usize, plane: Plane) -> T {
        // Just inside: at a tilted face the beam outside is narrower.
        let mut least = self.entered(part, plane).beta;
        for which in [0, 1] {
            if let Some((stretch, ray)) = self.stretch(part, which, plane) {
                least = least.min(stretch.least_beta(ray.beam()));
            }
        }
        least
    }

    /// Distance of the waist from a part's start, in its medium.
    #[inline(never)]
    fn waist_at(&self, part: usize, plane: Plane) -> T {
        let index = match self.stretch(part, 0, plane) {
            Some((stretch, _)) => stretch.index,
            None => T::constant(1.0),
        };
        self.entered(part, plane).distance_to_waist(index)
    }

    /// A radius √(λβ/π) in one plane, or the geometric mean of both.
    #[inline(always)]
    fn radius(&self, measure: Measure, part: usize, plane: Option<Plane>) -> (T, T::Mask) {
        let (planes, exists) = match plane {
            Some(Plane::Tangential) => (&Plane::BOTH[..1], self.modes.tangential.stable),
            Some(Plane::Sagittal) => (&Plane::BOTH[1..], self.modes.sagittal.stable),
            None => (&Plane::BOTH[..], self.both_stable()),
        };
        let mut product = T::constant(1.0);
        for plane in planes {
            let beta = match measure {
                Measure::Least(..) => self.least(part, *plane),
                Measure::Waist(..) => self.entered(part, *plane).gamma.recip(),
                _ => self.middle(part, *plane),
            };
            product = product * beta;
        }
        if plane.is_none() {
            product = product.sqrt();
        }
        let beam = Beam::new(product, T::constant(0.0));
        (beam.radius(self.wavelength), exists)
    }

    /// The Gouy phase gathered along the whole way.
    #[inline(never)]
    fn gouy(&self, plane: Plane) -> T {
        let mut beam = self.modes[plane].beam;
        let mut sum = T::constant(0.0);
        self.cavity.walk(self.values, |leg| {
            let matrix = leg.matrix()[plane];
            sum = sum
                + match leg.piece {
                    Piece::Stretch(stretch) => stretch[plane].gouy_phase(beam),
                    Piece::Given(_) => beam.gouy_phase(matrix),
                    _ => T::constant(0.0),
                };
            beam = beam.after(matrix);
        });
        match self.cavity.form() {
            Form::Ring => sum,
            Form::Standing => sum * 2.0,
        }
    }

    /// Way from one part's start to another's. In a ring the way to an earlier part leads on past
    /// the first one; a standing cavity is walked back along the same way.
    #[inline(never)]
    fn distance(&self, from: usize, to: usize) -> T {
        let at = |part: usize| self.cavity.way_to(part, self.values);
        let way = at(to) - at(from);
        let backward = way.less(T::constant(0.0));
        let around = match self.cavity.form() {
            Form::Ring => way + self.lengths().geometric,
            Form::Standing => -way,
        };
        T::select(backward, around, way)
    }

    #[inline(never)]
    fn lengths(&self) -> RoundTripLengths<T> {
        RoundTripLengths::of(self.cavity, self.values)
    }

    #[inline(always)]
    fn least_offset(&self, up_to: usize, multiples: &mut Multiples<T>) -> T {
        let spacings = spectrum::spacings(self.cavity, self.modes);
        spectrum::least_offset(spacings, up_to, multiples)
    }

    #[inline(always)]
    fn attenuation(&self) -> T {
        match self.evaluator.attenuation {
            Some(attenuation) => T::constant(attenuation),
            None => self.varied_attenuation(),
        }
    }

    #[inline(never)]
    fn varied_attenuation(&self) -> T {
        let polarisation = self.cavity.polarisation;
        airy::round_trip_attenuation(self.cavity, self.values, polarisation)
    }

    #[inline(always)]
    fn finesse(&self) -> (T, T::Mask) {
        match self.evaluator.finesse {
            Some((finesse, exists)) => (T::constant(finesse), T::always(exists)),
            None => airy::finesse(self.attenuation()),
        }
    }

    #[inline(always)]
    fn both_stable(&self) -> T::Mask {
        self.modes.tangential.stable & self.modes.sagittal.stable
    }
}
