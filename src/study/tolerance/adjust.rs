//! What adjusting saves: each sample is adjusted as one does at the bench, one knob after the other,
//! within its travel, until the measures that are held are where they should be.

use rayon::prelude::*;

use super::result::{Adjusted, Readjusted};
use super::sample::{MAIN, Sampler};
use super::{Stage, chunks, nominal_values};
use crate::analysis::measures::{Evaluator, Workspace};
use crate::cavity::{Adjust, Cavity, Measure};
use crate::numeric::LANES;
use crate::numeric::roots::bracketed;
use crate::numeric::statistics::wilson;
use crate::quantity::Kind;
use crate::study::batch::CHUNK;

/// Samples that are adjusted, one at a time.
const SAMPLES: u64 = 1 << 15;
/// Rounds over all knobs.
const ROUNDS: usize = 4;
/// Places along the travel that are tried for a change of sign.
const TRIES: usize = 16;
/// A measure this near to its aim, as a share of it, is there.
const THERE: f64 = 1e-6;

struct Knob<'a> {
    adjust: &'a Adjust,
    aim: f64,
    never_negative: bool,
    evaluator: Evaluator<'a>,
}

struct Bench<'a> {
    cavity: &'a Cavity,
    knobs: Vec<Knob<'a>>,
    limits: Evaluator<'a>,
    workspace: Workspace<f64>,
}

/// What became of one sample.
struct Outcome {
    before: bool,
    after: bool,
    /// For each knob, whether its measure is where it should be, and how far it was moved.
    knobs: Vec<(bool, f64)>,
}

impl Bench<'_> {
    fn passes(&mut self, values: &[f64]) -> bool {
        let mut good = true;
        let limits = &self.cavity.limits;
        let modes = self
            .limits
            .evaluate(values, &mut self.workspace, |index, value, exists| {
                good &= exists && limits[index].bounds.hold(value);
            });
        good && modes.tangential.stable && modes.sagittal.stable
    }

    /// How far a held measure is from its aim with its knob at `x`.
    fn off(&mut self, knob: usize, values: &mut [f64], x: f64) -> Option<f64> {
        let Knob {
            adjust,
            aim,
            evaluator,
            ..
        } = &self.knobs[knob];
        values[adjust.set.index()] = x;
        self.cavity.book().follow_ties(values);
        let mut found = None;
        evaluator.evaluate(values, &mut self.workspace, |_, value: f64, exists| {
            found = Some(value - aim).filter(|off| exists && off.is_finite());
        });
        found
    }

    /// Turns one knob between two ends, to the nearest place where its measure is right, else to the
    /// best place there is.
    fn turn(&mut self, knob: usize, values: &mut [f64], [low, high]: [f64; 2]) {
        let here = values[self.knobs[knob].adjust.set.index()];
        let place = |k: usize| low + (high - low) * k as f64 / TRIES as f64;
        let tried: Vec<(f64, Option<f64>)> = (0..=TRIES)
            .map(|k| (place(k), self.off(knob, values, place(k))))
            .collect();
        let crossing = tried
            .windows(2)
            .filter_map(|pair| match (pair[0], pair[1]) {
                ((a, Some(at_a)), (b, Some(at_b))) if at_a * at_b <= 0.0 => Some((a, b)),
                _ => None,
            })
            .min_by(|a, b| {
                let distance = |(from, to): &(f64, f64)| (0.5 * (from + to) - here).abs();
                distance(a).total_cmp(&distance(b))
            });
        let best = match crossing {
            Some((a, b)) => {
                let mut off = |x| self.off(knob, values, x).unwrap_or(f64::MAX);
                bracketed(&mut off, a, b)
            }
            None => tried
                .iter()
                .filter_map(|(x, off)| Some((*x, off.as_ref()?.abs())))
                .min_by(|a, b| a.1.total_cmp(&b.1))
                .map(|(x, _)| x),
        };
        // Where the measure exists nowhere, there is nothing to turn towards.
        values[self.knobs[knob].adjust.set.index()] = best.unwrap_or(here);
        self.cavity.book().follow_ties(values);
    }

    fn adjust(&mut self, values: &mut [f64]) -> Outcome {
        let before = self.passes(values);
        let found: Vec<f64> = (self.knobs.iter())
            .map(|knob| knob.adjust.set.of(values))
            .collect();
        let rounds = if self.knobs.len() > 1 { ROUNDS } else { 1 };
        for _ in 0..rounds {
            for (knob, x) in found.iter().enumerate() {
                let travel = self.knobs[knob].adjust.travel;
                let least = if self.knobs[knob].never_negative {
                    0.0
                } else {
                    f64::NEG_INFINITY
                };
                self.turn(knob, values, [(x - travel).max(least), x + travel]);
            }
        }
        let knobs = (0..self.knobs.len())
            .map(|knob| {
                let at = self.knobs[knob].adjust.set.of(values);
                let near = THERE * self.knobs[knob].aim.abs().max(1e-9);
                let off = self.off(knob, values, at);
                (
                    off.is_some_and(|off| off.abs() <= near),
                    (at - found[knob]).abs(),
                )
            })
            .collect();
        Outcome {
            before,
            after: self.passes(values),
            knobs,
        }
    }
}

/// The yield after adjustment; none where the study was ended.
pub(super) fn of(
    cavity: &Cavity,
    sampler: &Sampler<'_>,
    progress: &mut dyn FnMut(Stage, f64) -> bool,
) -> Option<Readjusted> {
    let adjusts = &cavity.tolerancing.adjust;
    let holds: Vec<Measure> = adjusts.iter().map(|adjust| adjust.hold).collect();
    let nominals = nominal_values(cavity, &holds);
    let mut slots = sampler.spreads.slots();
    slots.extend(adjusts.iter().map(|adjust| adjust.set));
    let bench = || Bench {
        cavity,
        knobs: adjusts
            .iter()
            .zip(&nominals)
            .filter_map(|(adjust, nominal)| {
                Some(Knob {
                    adjust,
                    aim: adjust.to.or(*nominal)?,
                    never_negative: cavity.book().entry(adjust.set).kind == Kind::Length,
                    evaluator: Evaluator::new(cavity, vec![adjust.hold]).varying(&slots),
                })
            })
            .collect(),
        limits: Evaluator::new(
            cavity,
            cavity.limits.iter().map(|limit| limit.measure).collect(),
        )
        .varying(&slots),
        workspace: Workspace::default(),
    };
    let mut outcomes: Vec<Outcome> = Vec::new();
    let all: Vec<u64> = (0..chunks(SAMPLES)).collect();
    // A few chunks at a time, so that the study can be ended in between.
    for part in all.chunks(8) {
        if !progress(Stage::Adjusting, part[0] as f64 / all.len() as f64) {
            return None;
        }
        let found: Vec<Vec<Outcome>> = part
            .par_iter()
            .map(|chunk| adjust_chunk(sampler, bench(), *chunk))
            .collect();
        outcomes.extend(found.into_iter().flatten());
    }
    let samples = outcomes.len() as u64;
    let count = |pick: &dyn Fn(&Outcome) -> bool| {
        outcomes.iter().filter(|outcome| pick(outcome)).count() as u64
    };
    let passing = count(&|outcome| outcome.after);
    let mut knob = 0;
    let adjusted = adjusts
        .iter()
        .zip(&nominals)
        .map(|(adjust, nominal)| {
            let aim = adjust.to.or(*nominal);
            let mut travels: Vec<f64> = Vec::new();
            let mut reached = 0;
            if aim.is_some() {
                travels.extend(outcomes.iter().map(|outcome| outcome.knobs[knob].1));
                reached = count(&|outcome| outcome.knobs[knob].0);
                knob += 1;
            }
            travels.sort_by(f64::total_cmp);
            Adjusted {
                set: cavity.book().entry(adjust.set).address.clone(),
                hold: adjust.hold_name.clone(),
                to: aim,
                reached: reached as f64 / samples as f64,
                travel_used: travels.get(travels.len() * 95 / 100).copied(),
                travel: adjust.travel,
            }
        })
        .collect();
    Some(Readjusted {
        samples,
        passing: passing as f64 / samples as f64,
        yield_interval: wilson(passing, samples),
        yield_without: count(&|outcome| outcome.before) as f64 / samples as f64,
        adjusted,
    })
}

fn adjust_chunk(sampler: &Sampler<'_>, mut bench: Bench<'_>, chunk: u64) -> Vec<Outcome> {
    let mut room = sampler.room();
    sampler.spreads.draw(MAIN, chunk, &mut room.draws);
    sampler.place(&mut room, None);
    let slots = sampler.batch.varied();
    let nominal = bench.cavity.book().nominal();
    (0..CHUNK)
        .map(|sample| {
            let (block, lane) = (sample / LANES, sample % LANES);
            let mut values = nominal.clone();
            let inputs = &room.chunk.inputs[block * slots.len()..];
            for (slot, input) in slots.iter().zip(inputs) {
                values[slot.index()] = input.0[lane];
            }
            bench.cavity.book().follow_ties(&mut values);
            bench.adjust(&mut values)
        })
        .collect()
}
