//! Places of interest between the points: extremes, and where a spot is stationary.
//!
//! Dual numbers give the derivative of a measure with respect to the quantity. Each stable range is
//! sampled more densely towards its ends, where everything varies fast; every change of sign of
//! the derivative is a root for Brent's method.

use std::f64::consts::PI;

use super::Where;
use crate::analysis::measures::{Evaluator, Workspace};
use crate::analysis::ranges::{End, Range};
use crate::cavity::{Cavity, Measure, Slot};
use crate::numeric::Dual;
use crate::numeric::roots::bracketed;

/// Samples over all ranges, and the fewest and the most in one.
const SAMPLES: usize = 20_000;
const FEWEST: usize = 24;
const MOST: usize = 400;

/// A measure that varies by less than this share is constant to rounding.
const ROUNDING: f64 = 1e-11;

/// A place where the derivative vanishes.
#[derive(Clone, Copy, Debug)]
pub(super) struct Point {
    pub(super) at: f64,
    pub(super) value: f64,
    pub(super) is_minimum: bool,
}

/// A value, none where it is approached only; where; and what kind of place that is.
pub(super) type Candidate = (Option<f64>, f64, Where);

/// What was found of one measure.
pub(super) struct Found {
    /// Of beam radii only.
    pub(super) stationary: Vec<Point>,
    /// Least and greatest, where there is any value.
    pub(super) extremes: Option<[Candidate; 2]>,
}

/// A measure and its derivative along one quantity.
struct Slope<'c> {
    cavity: &'c Cavity,
    slot: Slot,
    evaluator: Evaluator<'c>,
    workspace: Workspace<Dual<f64>>,
    values: Vec<Dual<f64>>,
}

impl Slope<'_> {
    /// Value and derivative, if both exist.
    fn at(&mut self, x: f64) -> Option<[f64; 2]> {
        self.values[self.slot.index()] = Dual::variable(x);
        self.cavity.book().follow_ties(&mut self.values);
        let mut found = None;
        self.evaluator
            .evaluate(&self.values, &mut self.workspace, |_, dual, exists| {
                let is_finite = dual.value.is_finite() && dual.slope.is_finite();
                found = (exists && is_finite).then_some([dual.value, dual.slope]);
            });
        found
    }
}

/// What is kept while the ranges are gone through: the value that decides, and what is told.
type Best = Option<(f64, Candidate)>;

/// Finds the extremes of a measure over some stable ranges, and the places where it is stationary.
pub(super) fn find(
    cavity: &Cavity,
    slot: Slot,
    measure: Measure,
    ranges: &[Range],
    searched: (f64, f64),
) -> Found {
    let nominal = cavity.book().nominal();
    let mut slope = Slope {
        cavity,
        slot,
        evaluator: Evaluator::new(cavity, vec![measure]).varying(&[slot]),
        workspace: Workspace::default(),
        values: nominal.into_iter().map(Dual::fixed).collect(),
    };
    let samples = (SAMPLES / ranges.len().max(1)).clamp(FEWEST, MOST);
    let mut stationary = Vec::new();
    let (mut least, mut greatest): (Best, Best) = (None, None);
    let mut middle = None;
    for range in ranges {
        let a = range.from.value().unwrap_or(searched.0);
        let b = range.to.value().unwrap_or(searched.1);
        let known: Vec<(f64, [f64; 2])> = (0..samples)
            .filter_map(|k| {
                let share = 0.5 - 0.5 * (PI * (k as f64 + 0.5) / samples as f64).cos();
                let x = a + (b - a) * share;
                Some((x, slope.at(x)?))
            })
            .collect();
        let (Some(first), Some(last)) = (known.first(), known.last()) else {
            continue;
        };
        middle = middle.or_else(|| known.get(known.len() / 2).copied());
        let mut consider = |decides: f64, candidate: Candidate| {
            if least.is_none_or(|(best, _)| decides < best) {
                least = Some((decides, candidate));
            }
            if greatest.is_none_or(|(best, _)| decides > best) {
                greatest = Some((decides, candidate));
            }
        };
        let inner = known.len().saturating_sub(2);
        for (x, [value, _]) in known.iter().skip(1).take(inner) {
            consider(*value, (Some(*value), *x, Where::Inside));
        }
        for (end, at, near) in [(range.from, a, first), (range.to, b, last)] {
            let location = match end {
                End::Edge { .. } => Where::Edge,
                _ => Where::End,
            };
            // What does not exist at the edge itself is approached, as the nearest sample tells.
            let value = slope.at(at).map(|[value, _]| value);
            consider(value.unwrap_or(near.1[0]), (value, at, location));
        }
        for point in turns(&mut slope, &known) {
            let candidate = (Some(point.value), point.at, Where::Inside);
            consider(point.value, candidate);
            stationary.push(point);
        }
    }
    let is_radius = matches!(
        measure,
        Measure::Spot(..) | Measure::Least(..) | Measure::Waist(..)
    );
    let extremes = least.zip(greatest).map(|(least, greatest)| {
        let is_constant = greatest.0 - least.0 <= ROUNDING * greatest.0.abs();
        match middle.filter(|_| is_constant) {
            Some((x, [value, _])) => [(Some(value), x, Where::Inside); 2],
            None => [least.1, greatest.1],
        }
    });
    if !is_radius {
        stationary.clear();
    }
    Found {
        stationary,
        extremes,
    }
}

/// The places between samples where the derivative changes its sign.
fn turns(slope: &mut Slope<'_>, known: &[(f64, [f64; 2])]) -> Vec<Point> {
    let values = || known.iter().map(|(_, [value, _])| *value);
    let most = values().fold(f64::NEG_INFINITY, f64::max);
    let least = values().fold(f64::INFINITY, f64::min);
    if most - least <= ROUNDING * most.abs() {
        return Vec::new();
    }
    // Where the derivative is exactly zero, its neighbours tell whether it changes its sign.
    let moving: Vec<&(f64, [f64; 2])> = known
        .iter()
        .filter(|(_, [_, derivative])| *derivative != 0.0)
        .collect();
    moving
        .windows(2)
        .filter_map(|pair| {
            let [(a, [_, before]), (b, [_, after])] = [pair[0], pair[1]];
            if before * after > 0.0 {
                return None;
            }
            let derivative = |x| slope.at(x).map_or(f64::NAN, |[_, derivative]| derivative);
            let at = bracketed(derivative, *a, *b)?;
            let [value, _] = slope.at(at)?;
            Some(Point {
                at,
                value,
                is_minimum: *before < 0.0,
            })
        })
        .collect()
}
