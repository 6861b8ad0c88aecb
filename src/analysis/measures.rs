//! The value of any measure, over any number type.
//!
//! An [`Evaluator`] is prepared once for a cavity and a list of measures. It walks the path, keeps
//! the ray matrices from the start to the parts that are asked about, finds the mode, and reads
//! every measure off the beam there. With f64 that is the nominal analysis; with lanes, many
//! cavities at a time; with dual numbers, derivatives. Nothing is allocated per evaluation.

use super::airy;
use super::eigenmode::PlaneMode;
use super::lengths::RoundTripLengths;
use super::spectrum;
use crate::cavity::{Cavity, Form, Leg, Measure, Piece, Slot};
use crate::numeric::Real;
use crate::optics::beam::Beam;
use crate::optics::element::duct::Stretch;
use crate::optics::ray::RayMatrix;
use crate::optics::{PerPlane, Plane};

/// What is needed of the path to evaluate a list of measures.
#[derive(Clone, Debug)]
pub struct Evaluator<'c> {
    cavity: &'c Cavity,
    measures: Vec<Measure>,
    /// For each part, the record it is kept in, if it is asked about.
    watched: Vec<Option<usize>>,
    records: usize,
    segments: Vec<Segment>,
    /// −ln of the power left by a round trip, where nothing of it varies.
    attenuation: Option<f64>,
}

/// A piece of the walk.
#[derive(Clone, Copy, Debug)]
enum Segment {
    /// Parts that nothing varies and nobody asks about, as one matrix.
    Fixed(PerPlane<RayMatrix<f64>>),
    /// A part that is walked anew each time; of an end mirror, half.
    Part { index: usize, share: f64 },
}

/// A stretch and the ray matrices from the start of the walk to where it begins.
type Reached<T> = (PerPlane<Stretch<T>>, PerPlane<RayMatrix<T>>);

/// Ray matrices from the start of the walk to and into one part.
#[derive(Clone, Copy, Debug)]
struct Record<T> {
    arriving: PerPlane<RayMatrix<T>>,
    entered: PerPlane<RayMatrix<T>>,
    /// One, or two around a lumped lens.
    stretches: [Option<Reached<T>>; 2],
}

/// Memory for one evaluation at a time.
#[derive(Clone, Debug)]
pub struct Workspace<T> {
    records: Vec<Record<T>>,
}

impl<T> Default for Workspace<T> {
    fn default() -> Self {
        Workspace {
            records: Vec::new(),
        }
    }
}

impl<'c> Evaluator<'c> {
    /// Prepares the evaluation of some measures.
    pub fn new(cavity: &'c Cavity, measures: Vec<Measure>) -> Self {
        let mut watched = vec![None; cavity.parts().len()];
        let mut records = 0;
        for part in measures.iter().filter_map(|measure| part_of(*measure)) {
            watched[part].get_or_insert_with(|| {
                records += 1;
                records - 1
            });
        }
        let segments = cavity
            .walk_order()
            .map(|(index, share)| Segment::Part { index, share })
            .collect();
        Evaluator {
            cavity,
            measures,
            watched,
            records,
            segments,
            attenuation: None,
        }
    }

    /// The same, when only the given numbers (and what is tied to them) will differ from the
    /// nominal ones: what they leave alone is multiplied out once and for all.
    pub fn varying(mut self, varied: &[Slot]) -> Self {
        let book = self.cavity.book();
        let nominal = book.nominal();
        let mut moves = varied.to_vec();
        for tie in book.ties() {
            if tie.terms.iter().any(|(_, slot)| moves.contains(slot)) {
                moves.push(tie.target);
            }
        }
        let loses_otherwise = airy::loss_slots(self.cavity)
            .iter()
            .any(|slot| moves.contains(slot));
        self.attenuation =
            (!loses_otherwise).then(|| airy::round_trip_attenuation(self.cavity, &nominal));
        let keeps_phase = self.measures.iter().any(|m| matches!(m, Measure::Gouy(_)));
        let mut segments: Vec<Segment> = Vec::new();
        for segment in std::mem::take(&mut self.segments) {
            let Segment::Part { index, share } = segment else {
                continue;
            };
            let part = &self.cavity.parts()[index];
            let varies = part.ray_slots().iter().any(|slot| moves.contains(slot));
            if varies || self.watched[index].is_some() || keeps_phase {
                segments.push(segment);
                continue;
            }
            if !matches!(segments.last(), Some(Segment::Fixed(_))) {
                segments.push(Segment::Fixed(PerPlane::both(RayMatrix::identity())));
            }
            if let Some(Segment::Fixed(product)) = segments.last_mut() {
                self.cavity.walk_part(index, share, &nominal, &mut |leg| {
                    *product = leg.after(*product);
                });
            }
        }
        self.segments = segments;
        self
    }

    /// The measures, in the order of the values.
    pub fn measures(&self) -> &[Measure] {
        &self.measures
    }

    /// The mode with the given values in the address book's slots, and each measure in SI units
    /// with whether it exists, handed to `take` in order.
    #[inline(always)]
    pub fn evaluate<T: Real>(
        &self,
        values: &[T],
        workspace: &mut Workspace<T>,
        mut take: impl FnMut(usize, T, T::Mask),
    ) -> PerPlane<PlaneMode<T>> {
        let way = self.one_way(values, workspace);
        let form = self.cavity.form();
        let modes = way.map(|way| PlaneMode::of(form, way));
        let evaluation = Evaluation {
            cavity: self.cavity,
            values,
            wavelength: Cavity::WAVELENGTH.of(values),
            watched: &self.watched,
            records: &workspace.records,
            attenuation: self.attenuation,
            modes: &modes,
        };
        for (index, measure) in self.measures.iter().enumerate() {
            let (value, exists) = evaluation.measure(*measure);
            take(index, value, exists);
        }
        modes
    }

    /// The product of all ray matrices of one walk along the path.
    #[inline(always)]
    pub fn one_way<T: Real>(
        &self,
        values: &[T],
        workspace: &mut Workspace<T>,
    ) -> PerPlane<RayMatrix<T>> {
        let mut product = PerPlane::both(RayMatrix::identity());
        workspace.records.resize(
            self.records,
            Record {
                arriving: product,
                entered: product,
                stretches: [None; 2],
            },
        );
        for segment in &self.segments {
            match segment {
                Segment::Fixed(fixed) => {
                    product = product.zip(*fixed, |m, fixed| m.then_fixed(fixed));
                }
                Segment::Part { index, share } => match self.watched[*index] {
                    None => self.cavity.walk_part(*index, *share, values, &mut |leg| {
                        product = leg.after(product);
                    }),
                    Some(record) => {
                        let record = &mut workspace.records[record];
                        *record = Record {
                            arriving: product,
                            entered: product,
                            stretches: [None; 2],
                        };
                        self.cavity.walk_part(*index, *share, values, &mut |leg| {
                            record.note(&leg, product);
                            product = leg.after(product);
                        });
                    }
                },
            }
        }
        product
    }
}

impl<T: Real> Record<T> {
    #[inline(always)]
    fn note(&mut self, leg: &Leg<T>, before: PerPlane<RayMatrix<T>>) {
        match &leg.piece {
            Piece::Face(crate::cavity::End::Entrance, _) => self.entered = leg.after(before),
            Piece::Stretch(stretch) => {
                let free = usize::from(self.stretches[0].is_some());
                self.stretches[free] = Some((*stretch, before));
            }
            _ => {}
        }
    }
}

/// The part a measure is about.
fn part_of(measure: Measure) -> Option<usize> {
    match measure {
        Measure::Spot(part, _)
        | Measure::Least(part, _)
        | Measure::Waist(part, _)
        | Measure::WaistAt(part, _)
        | Measure::Aspect(part) => Some(part),
        _ => None,
    }
}

struct Evaluation<'a, T: Real> {
    cavity: &'a Cavity,
    values: &'a [T],
    wavelength: T,
    watched: &'a [Option<usize>],
    records: &'a [Record<T>],
    attenuation: Option<f64>,
    modes: &'a PerPlane<PlaneMode<T>>,
}

impl<T: Real> Evaluation<'_, T> {
    #[inline(always)]
    fn measure(&self, measure: Measure) -> (T, T::Mask) {
        let always = T::constant(0.0).less(T::constant(1.0));
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
            Measure::Spot(part, plane) => self.radius(plane, |p| self.middle(part, p).beta),
            Measure::Least(part, plane) => self.radius(plane, |p| self.least(part, p)),
            Measure::Waist(part, plane) => {
                self.radius(plane, |p| self.entered(part, p).gamma.recip())
            }
            Measure::WaistAt(part, plane) => match plane {
                Some(p) => (self.waist_at(part, p), self.modes[p].stable),
                None => {
                    let [t, s] = Plane::BOTH.map(|p| self.waist_at(part, p));
                    ((t + s) * 0.5, self.both_stable())
                }
            },
            Measure::Aspect(part) => {
                let [t, s] = Plane::BOTH.map(|p| self.middle(part, p).beta);
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
            Measure::ModeClearance { up_to } => {
                let (finesse, exists) = self.finesse();
                let spacings = spectrum::spacings(self.cavity, self.modes);
                let offset = spectrum::least_offset(spacings, up_to);
                (offset * finesse, exists & self.both_stable())
            }
        }
    }

    #[inline(always)]
    fn record(&self, part: usize) -> &Record<T> {
        // Every part that a measure is about is watched from the start.
        &self.records[self.watched[part].unwrap_or_default()]
    }

    #[inline(always)]
    fn beam(&self, plane: Plane, way: PerPlane<RayMatrix<T>>) -> Beam<T> {
        self.modes[plane].beam.after(way[plane])
    }

    /// The beam at a part's middle, or at the part itself where it has no inside. A part is one
    /// stretch, or two equal ones around a lumped lens.
    #[inline(always)]
    fn middle(&self, part: usize, plane: Plane) -> Beam<T> {
        let record = self.record(part);
        match record.stretches {
            [None, _] => self.beam(plane, record.arriving),
            [Some((stretch, way)), None] => {
                let half = stretch.zip(way, |stretch, way| stretch.part(0.5).after(way));
                self.beam(plane, half)
            }
            [_, Some((_, way))] => self.beam(plane, way),
        }
    }

    #[inline(always)]
    fn least(&self, part: usize, plane: Plane) -> T {
        let record = self.record(part);
        let least = |(stretch, way): &Reached<T>| stretch[plane].least_beta(self.beam(plane, *way));
        match &record.stretches {
            [Some(only), None] => least(only),
            [Some(first), Some(second)] => least(first).min(least(second)),
            [None, _] => self.beam(plane, record.arriving).beta,
        }
    }

    #[inline(always)]
    fn entered(&self, part: usize, plane: Plane) -> Beam<T> {
        self.beam(plane, self.record(part).entered)
    }

    /// Distance of the waist from a part's start, in its medium.
    #[inline(always)]
    fn waist_at(&self, part: usize, plane: Plane) -> T {
        let index = match &self.record(part).stretches[0] {
            Some((stretch, _)) => stretch[plane].index,
            None => T::constant(1.0),
        };
        self.entered(part, plane).distance_to_waist(index)
    }

    /// A radius √(λβ/π) in one plane, or the geometric mean of both.
    #[inline(always)]
    fn radius(&self, plane: Option<Plane>, beta: impl Fn(Plane) -> T) -> (T, T::Mask) {
        match plane {
            Some(plane) => {
                let beam = Beam::new(beta(plane), T::constant(0.0));
                (beam.radius(self.wavelength), self.modes[plane].stable)
            }
            None => {
                let mean = (beta(Plane::Tangential) * beta(Plane::Sagittal)).sqrt();
                let beam = Beam::new(mean, T::constant(0.0));
                (beam.radius(self.wavelength), self.both_stable())
            }
        }
    }

    /// The Gouy phase gathered along the whole way.
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

    fn lengths(&self) -> RoundTripLengths<T> {
        RoundTripLengths::of(self.cavity, self.values)
    }

    fn finesse(&self) -> (T, T::Mask) {
        airy::finesse(match self.attenuation {
            Some(fixed) => T::constant(fixed),
            None => airy::round_trip_attenuation(self.cavity, self.values),
        })
    }

    #[inline(always)]
    fn both_stable(&self) -> T::Mask {
        self.modes.tangential.stable & self.modes.sagittal.stable
    }
}

/// The value of one measure in SI units with the given values in the address book's slots; none
/// where it does not exist.
pub fn value(cavity: &Cavity, values: &[f64], measure: Measure) -> Option<f64> {
    let mut found = None;
    Evaluator::new(cavity, vec![measure]).evaluate(
        values,
        &mut Workspace::default(),
        |_, value, exists| found = exists.then_some(value),
    );
    found
}
