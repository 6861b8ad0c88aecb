//! Where, along the values of one quantity, every mode keeps its distance from the fundamental.
//!
//! TEM_mn comes too near where its offset lies within what is wanted of a whole number of free
//! spectral ranges. Over a short stretch the offset and what is wanted are enclosed from their ends
//! and their middle; a mode that is too near over the whole stretch decides it, one that is not
//! near anywhere is put aside, and where neither is sure the stretch is halved. What remains is
//! so short that the signs at its ends tell, and the boundary is found on the function itself by
//! Brent's method. Halving follows the modes that are near and not the one that happens to be
//! nearest, so that no kink of the clearance is stepped over.

use crate::analysis::measures::{Evaluator, Workspace};
use crate::analysis::spectrum::{self, Multiples};
use crate::cavity::{Cavity, Measure, Slot};
use crate::numeric::Real;
use crate::numeric::roots::bracketed;
use crate::optics::PerPlane;
use crate::quantity::Kind;

/// Stretches into which each piece of the range is cut to begin with.
const CELLS: usize = 64;
/// How often each may be halved: a window narrower than some 10⁻⁶ of its piece may be missed.
const HALVINGS: usize = 14;
/// Looks at a mode over a stretch that are spent on one quantity before the ends alone decide.
const BUDGET: usize = 20_000_000;
/// What an evaluation of the cavity costs, in such looks.
const SAMPLE: usize = 50;

/// The distance that is wanted.
#[derive(Clone, Copy, Debug, PartialEq)]
pub(super) enum Aim {
    /// In linewidths.
    Linewidths(f64),
    /// In free spectral ranges.
    Share(f64),
}

impl Aim {
    /// In free spectral ranges.
    pub(super) fn turns(self, finesse: Option<f64>) -> f64 {
        match (self, finesse) {
            (Aim::Linewidths(count), Some(finesse)) => count / finesse,
            // No line is wide.
            (Aim::Linewidths(_), None) => 0.0,
            (Aim::Share(share), _) => share,
        }
    }
}

/// What holds over a stretch of values.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub(super) enum State {
    /// Every mode keeps its distance.
    Clear,
    /// Some mode does not.
    Blocked,
    /// There is no mode.
    Empty,
}

/// A stretch of values.
#[derive(Clone, Copy, Debug, PartialEq)]
pub(super) struct Stretch {
    pub(super) from: f64,
    pub(super) to: f64,
    pub(super) state: State,
}

/// The cavity at one value of the quantity.
#[derive(Clone, Copy, Debug)]
pub(super) struct Sample {
    at: f64,
    stable: bool,
    /// The lesser margin.
    pub(super) margin: f64,
    /// Spacings of the orders, in free spectral ranges.
    pub(super) spacing: PerPlane<f64>,
    /// Finesse, where it exists.
    pub(super) finesse: Option<f64>,
    /// Free spectral range, in hertz.
    pub(super) fsr: f64,
    needed: f64,
}

/// A search along one quantity.
pub(super) struct Search<'a> {
    cavity: &'a Cavity,
    slot: Slot,
    walk: Evaluator<'a>,
    workspace: Workspace<f64>,
    values: Vec<f64>,
    multiples: Multiples<f64>,
    aim: Aim,
    highest: usize,
    found: Vec<Stretch>,
    /// Looks at a mode over a stretch, so far, and what evaluations cost in them.
    pub(super) spent: usize,
}

impl<'a> Search<'a> {
    pub(super) fn new(cavity: &'a Cavity, slot: Slot, aim: Aim) -> Self {
        let measures = vec![Measure::Finesse, Measure::Fsr];
        Search {
            cavity,
            slot,
            walk: Evaluator::new(cavity, measures).varying(&[slot]),
            workspace: Workspace::default(),
            values: cavity.book().nominal(),
            multiples: Multiples::default(),
            aim,
            highest: cavity.highest_order,
            found: Vec::new(),
            spent: 0,
        }
    }

    /// The states between the rising cuts, in order; neighbours differ.
    pub(super) fn between(&mut self, cuts: &[f64]) -> Vec<Stretch> {
        let all: Vec<(f64, f64)> = (1..=self.highest)
            .flat_map(|order| (0..=order).map(move |n| ((order - n) as f64, n as f64)))
            .collect();
        for pair in cuts.windows(2) {
            let [from, to] = [pair[0], pair[1]];
            let at = |k: usize| from + (to - from) * k as f64 / CELLS as f64;
            let mut left = self.sample(from);
            for k in 1..=CELLS {
                let right = self.sample(if k == CELLS { to } else { at(k) });
                self.settle(left, right, &all, HALVINGS);
                left = right;
            }
        }
        std::mem::take(&mut self.found)
    }

    /// The cavity with the quantity at a value.
    pub(super) fn sample(&mut self, at: f64) -> Sample {
        self.spent += SAMPLE;
        self.values[self.slot.index()] = at;
        let book = self.cavity.book();
        book.follow_ties(&mut self.values);
        let vanished = book.ties().iter().any(|tie| {
            book.entry(tie.target).kind == Kind::Length && tie.target.of(&self.values) < 0.0
        });
        let (mut finesse, mut fsr) = (None, 0.0);
        let modes =
            self.walk
                .evaluate(&self.values, &mut self.workspace, |index, value, exists| {
                    if index == 0 {
                        finesse = exists.then_some(value).filter(|value| value.is_finite());
                    } else {
                        fsr = value;
                    }
                });
        Sample {
            at,
            stable: modes.tangential.stable && modes.sagittal.stable && !vanished,
            margin: modes.tangential.margin.min(modes.sagittal.margin),
            spacing: spectrum::spacings(self.cavity, &modes),
            finesse,
            fsr,
            needed: self.aim.turns(finesse),
        }
    }

    /// The distance of the nearest mode less what is wanted, in free spectral ranges.
    pub(super) fn room(&mut self, sample: &Sample) -> f64 {
        let nearest = spectrum::least_offset(sample.spacing, self.highest, &mut self.multiples);
        nearest - sample.needed
    }

    fn settle(&mut self, left: Sample, right: Sample, near: &[(f64, f64)], halvings: usize) {
        let middle = self.sample(0.5 * (left.at + right.at));
        let none = !left.stable && !right.stable;
        if none && (!middle.stable || halvings == 0) {
            self.push(left.at, right.at, State::Empty);
            return;
        }
        let all_stable = left.stable && middle.stable && right.stable;
        let mut undecided = Vec::new();
        let near = if all_stable {
            self.spent += near.len();
            let samples = [left, middle, right];
            for (m, n) in near {
                match state_of(&samples, *m, *n) {
                    Some(State::Clear) => {}
                    Some(_) => {
                        self.push(left.at, right.at, State::Blocked);
                        return;
                    }
                    None => undecided.push((*m, *n)),
                }
            }
            if undecided.is_empty() {
                self.push(left.at, right.at, State::Clear);
                return;
            }
            &undecided
        } else {
            near
        };
        if halvings == 0 || self.spent > BUDGET {
            self.finish(left, right);
            return;
        }
        self.settle(left, middle, near, halvings - 1);
        self.settle(middle, right, near, halvings - 1);
    }

    /// Decides a stretch by its ends.
    fn finish(&mut self, left: Sample, right: Sample) {
        match (left.stable, right.stable) {
            (false, false) => self.push(left.at, right.at, State::Empty),
            (true, true) => {
                let (before, after) = (self.state(&left), self.state(&right));
                let boundary = if before == after {
                    right.at
                } else {
                    let room = |x: f64| {
                        let sample = self.sample(x);
                        self.room(&sample)
                    };
                    bracketed(room, left.at, right.at).unwrap_or(right.at)
                };
                self.push(left.at, boundary, before);
                self.push(boundary, right.at, after);
            }
            (true, false) => {
                let edge = self.edge(left.at, right.at);
                let state = self.state(&left);
                self.push(left.at, edge, state);
                self.push(edge, right.at, State::Empty);
            }
            (false, true) => {
                let edge = self.edge(right.at, left.at);
                let state = self.state(&right);
                self.push(left.at, edge, State::Empty);
                self.push(edge, right.at, state);
            }
        }
    }

    fn state(&mut self, sample: &Sample) -> State {
        if self.room(sample) >= 0.0 {
            State::Clear
        } else {
            State::Blocked
        }
    }

    /// The last stable value on the way to an unstable one.
    fn edge(&mut self, stable: f64, unstable: f64) -> f64 {
        let (mut inside, mut outside) = (stable, unstable);
        for _ in 0..40 {
            let middle = 0.5 * (inside + outside);
            if self.sample(middle).stable {
                inside = middle;
            } else {
                outside = middle;
            }
        }
        inside
    }

    fn push(&mut self, from: f64, to: f64, state: State) {
        if from == to {
            return;
        }
        match self.found.last_mut() {
            Some(last) if last.state == state => last.to = to,
            _ => self.found.push(Stretch { from, to, state }),
        }
    }
}

/// Least and greatest of a smooth function over a stretch, from its ends and its middle.
///
/// Between these it departs from straight lines by less than the middle does.
fn enclosed([left, middle, right]: [f64; 3]) -> [f64; 2] {
    let slack = (middle - 0.5 * (left + right)).abs();
    [
        left.min(middle).min(right) - slack,
        left.max(middle).max(right) + slack,
    ]
}

/// Whether a mode keeps its distance over a whole stretch; none where that is not sure.
fn state_of(samples: &[Sample; 3], m: f64, n: f64) -> Option<State> {
    let [low, high] =
        enclosed(samples.map(|sample| m * sample.spacing.tangential + n * sample.spacing.sagittal));
    let [least, most] = enclosed(samples.map(|sample| sample.needed));
    let whole = Real::round(0.5 * (low + high));
    if (low - whole).abs().max((high - whole).abs()) < least {
        return Some(State::Blocked);
    }
    let from_whole = if low <= whole && whole <= high {
        0.0
    } else {
        (low - whole).abs().min((high - whole).abs())
    };
    let from_next = (whole + 1.0 - high).min(low - whole + 1.0);
    (from_whole.min(from_next) > most).then_some(State::Clear)
}
