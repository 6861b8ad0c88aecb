//! The value of any measure, over any number type.
//!
//! An [`Evaluator`] is prepared once for a cavity and a list of measures. It walks the path, keeps
//! the ray matrices from the start to the parts that are asked about, finds the mode, and reads
//! every measure off the beam there. With f64 that is the nominal analysis; with lanes, many
//! cavities at a time; with dual numbers, derivatives. Nothing is allocated per evaluation.

mod reading;
mod route;

use self::reading::Reading;
use self::route::{Inside, Route};
use super::airy;
use super::eigenmode::PlaneMode;
use super::spectrum::Multiples;
use crate::cavity::{Cavity, Measure, Slot};
use crate::numeric::Real;
use crate::optics::PerPlane;
use crate::optics::ray::RayMatrix;

/// What is needed of the path to evaluate a list of measures.
#[derive(Clone, Debug)]
pub struct Evaluator<'c> {
    cavity: &'c Cavity,
    measures: Vec<Measure>,
    route: Route,
    /// −ln ρ² of a round trip, where no loss varies.
    attenuation: Option<f64>,
    /// The finesse and whether it exists, likewise.
    finesse: Option<(f64, bool)>,
}

/// Memory for one evaluation at a time.
#[derive(Clone, Debug)]
pub struct Workspace<T> {
    kept: Vec<PerPlane<RayMatrix<T>>>,
    inside: Vec<Inside<T>>,
    multiples: Multiples<T>,
}

impl<T> Default for Workspace<T> {
    fn default() -> Self {
        Workspace {
            kept: Vec::new(),
            inside: Vec::new(),
            multiples: Multiples::default(),
        }
    }
}

impl<'c> Evaluator<'c> {
    /// Prepares the evaluation of some measures.
    pub fn new(cavity: &'c Cavity, measures: Vec<Measure>) -> Self {
        let route = Route::new(cavity, None, |part| is_watched(&measures, part));
        Evaluator {
            cavity,
            measures,
            route,
            attenuation: None,
            finesse: None,
        }
    }

    /// The same, when only the given numbers (and what is tied to them) will differ from the
    /// nominal ones: what they leave alone is multiplied out once and for all.
    pub fn varying(mut self, varied: &[Slot]) -> Self {
        let book = self.cavity.book();
        let mut moves = varied.to_vec();
        for tie in book.ties() {
            if tie.terms.iter().any(|(_, slot)| moves.contains(slot)) {
                moves.push(tie.target);
            }
        }
        let is_lossy = |slot: &Slot| moves.contains(slot);
        let polarisation = self.cavity.polarisation;
        self.attenuation = (!airy::loss_slots(self.cavity).iter().any(is_lossy))
            .then(|| airy::round_trip_attenuation(self.cavity, &book.nominal(), polarisation));
        self.finesse = self.attenuation.map(airy::finesse);
        let measures = &self.measures;
        self.route = Route::new(self.cavity, Some(&moves), |part| is_watched(measures, part));
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
        let modes = PerPlane {
            tangential: PlaneMode::of(form, way.tangential),
            sagittal: PlaneMode::of(form, way.sagittal),
        };
        let reading = Reading::new(self, values, &workspace.kept, &workspace.inside, &modes);
        for (index, measure) in self.measures.iter().enumerate() {
            let (value, exists) = reading.measure(*measure, &mut workspace.multiples);
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
        self.route.walk(self.cavity, values, workspace)
    }
}

fn is_watched(measures: &[Measure], part: usize) -> bool {
    measures
        .iter()
        .any(|measure| part_of(*measure) == Some(part))
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

/// Why a measure has no value where it has none.
pub fn why_none(measure: Measure) -> &'static str {
    match measure {
        Measure::Finesse | Measure::Linewidth | Measure::Lifetime => {
            "nothing is written of any loss"
        }
        Measure::ModeClearance { .. } | Measure::Suppression { .. } => {
            "the cavity holds no mode, or no loss is written"
        }
        _ => "the cavity holds no mode",
    }
}
