//! Drawing and evaluating samples on all cores.
//!
//! Work is cut into tasks of fixed size whose results are merged in order, so that the number of
//! threads does not change a byte.

use rayon::prelude::*;

use super::spread::Spreads;
use super::tally::{Plan, Tally, passing};
use crate::numeric::{LANES, LaneMask, Lanes, Real};
use crate::study::batch::{BLOCKS, Batch, CHUNK, Chunk};

/// Chunks in a task.
const TASK: u64 = 32;
/// Samples in a task.
pub(super) const TASK_SAMPLES: u64 = TASK * CHUNK as u64;

/// Streams of chance that do not know each other.
pub(super) const MAIN: u64 = 0;
/// The second set of samples of a variance study.
pub(super) const SECOND: u64 = 1;
/// Samples that judge a budget they were not used for.
pub(super) const JUDGE: u64 = 2;

/// A prepared cavity with its spreads.
#[derive(Clone, Copy)]
pub(super) struct Sampler<'a> {
    pub(super) batch: &'a Batch<'a>,
    pub(super) spreads: &'a Spreads,
    pub(super) plan: &'a Plan,
}

/// Memory of one task.
pub(super) struct Room {
    pub(super) chunk: Chunk,
    pub(super) draws: Vec<Lanes>,
}

impl Sampler<'_> {
    pub(super) fn room(&self) -> Room {
        let draws = BLOCKS * self.spreads.quantities.len();
        Room {
            chunk: self.batch.chunk(),
            draws: vec![Lanes::constant(0.0); draws],
        }
    }

    /// Turns a chunk's draws into values, the spread of each factor so many times as wide.
    pub(super) fn place(&self, room: &mut Room, scales: Option<&[f64]>) {
        let count = self.spreads.quantities.len();
        let inputs = room.chunk.inputs.chunks_exact_mut(count);
        for (inputs, draws) in inputs.zip(room.draws.chunks_exact(count)) {
            for (index, (input, draw)) in inputs.iter_mut().zip(draws).enumerate() {
                let factor = self.spreads.quantities[index].factor;
                let scale = scales.map_or(1.0, |scales| scales[factor]);
                *input = self.spreads.value(index, *draw, scale);
            }
        }
    }

    /// Counts the samples from `from` to `to`, a whole number of tasks but at the end.
    pub(super) fn tally(&self, from: u64, to: u64) -> Tally {
        let tasks: Vec<u64> = (from..to).step_by(TASK_SAMPLES as usize).collect();
        let tallies: Vec<Tally> = tasks
            .into_par_iter()
            .map(|start| {
                let mut tally = Tally::new(self.plan);
                let end = (start + TASK_SAMPLES).min(to);
                let mut room = self.room();
                for first in (start..end).step_by(CHUNK) {
                    self.spreads
                        .draw(MAIN, first / CHUNK as u64, &mut room.draws);
                    self.place(&mut room, None);
                    let samples = (end - first).min(CHUNK as u64) as usize;
                    self.batch
                        .evaluate(&mut room.chunk, samples.div_ceil(LANES));
                    tally.take(self.plan, &room.chunk, samples);
                }
                tally
            })
            .collect();
        let mut sum = Tally::new(self.plan);
        tallies.iter().for_each(|tally| sum.merge(tally));
        sum
    }

    /// For each block of eight of the first samples, which of them pass with the spreads so many
    /// times as wide. The same draws whatever the widths.
    pub(super) fn verdicts(&self, stream: u64, chunks: u64, scales: &[f64]) -> Vec<u8> {
        let chunks: Vec<u64> = (0..chunks).collect();
        let verdicts: Vec<Vec<u8>> = chunks
            .par_chunks(TASK as usize)
            .map(|chunks| {
                let mut room = self.room();
                let mut verdicts = Vec::with_capacity(chunks.len() * BLOCKS);
                for &chunk in chunks {
                    self.spreads.draw(stream, chunk, &mut room.draws);
                    self.place(&mut room, Some(scales));
                    self.batch.evaluate(&mut room.chunk, BLOCKS);
                    for block in 0..BLOCKS {
                        verdicts.push(bits(passing(self.plan, &room.chunk, block, |_, _| {})));
                    }
                }
                verdicts
            })
            .collect();
        verdicts.concat()
    }

    /// Share of the first samples that pass with the spreads so many times as wide.
    pub(super) fn yield_of(&self, stream: u64, chunks: u64, scales: &[f64]) -> f64 {
        let passing = count(&self.verdicts(stream, chunks, scales));
        passing as f64 / (chunks * CHUNK as u64) as f64
    }
}

fn bits(mask: LaneMask) -> u8 {
    (0..LANES).fold(0, |bits, lane| bits | (u8::from(mask.holds(lane)) << lane))
}

/// How many samples pass.
pub(super) fn count(verdicts: &[u8]) -> u64 {
    verdicts
        .iter()
        .map(|bits| u64::from(bits.count_ones()))
        .sum()
}

/// How many pass only in the second list, and only in the first.
pub(super) fn gained_and_lost(first: &[u8], second: &[u8]) -> (u64, u64) {
    let pairs = || first.iter().zip(second);
    let ones = |bits: u8| u64::from(bits.count_ones());
    (
        pairs().map(|(a, b)| ones(!a & b)).sum(),
        pairs().map(|(a, b)| ones(a & !b)).sum(),
    )
}
