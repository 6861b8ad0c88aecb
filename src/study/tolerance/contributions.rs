//! Shares of every measure's variance, by the samples of the study.

use rayon::prelude::*;

use super::result::Contribution;
use super::sample::{MAIN, SECOND, Sampler};
use super::shares::{self, BATCHES, Share};
use super::{Stage, chunks};
use crate::cavity::Measure;
use crate::numeric::{LANES, LaneMask, Lanes};
use crate::study::batch::BLOCKS;

/// Samples of each of the two sets.
pub(super) const SAMPLES: u64 = 1 << 16;

/// The contributions of all factors to all measures, the largest first for each; none where the study
/// was ended.
pub(super) fn of(
    sampler: &Sampler<'_>,
    named: &[(String, Measure)],
    nominals: &[Option<f64>],
    progress: &mut dyn FnMut(Stage, f64) -> bool,
) -> Option<Vec<Contribution>> {
    if !progress(Stage::Contributions, 0.0) {
        return None;
    }
    let batches: Vec<Vec<shares::Batch>> = (0..BATCHES as u64)
        .into_par_iter()
        .map(|index| batch(sampler, named.len(), nominals, index))
        .collect();
    let mut found = Vec::new();
    for (measure, (name, _)) in named.iter().enumerate() {
        let of_measure: Vec<shares::Batch> =
            batches.iter().map(|all| all[measure].clone()).collect();
        let Some(shares) = shares::shares(&of_measure) else {
            continue;
        };
        let mut rows: Vec<(&str, Share)> = sampler
            .spreads
            .factors
            .iter()
            .map(|factor| factor.name.as_str())
            .zip(shares)
            .collect();
        rows.sort_by(|a, b| b.1.total.total_cmp(&a.1.total));
        found.extend(rows.into_iter().map(|(quantity, share)| Contribution {
            quantity: quantity.into(),
            measure: name.clone(),
            first_order: share.first_order,
            first_order_u: share.first_order_u,
            total: share.total,
            total_u: share.total_u,
        }));
    }
    progress(Stage::Contributions, 1.0).then_some(found)
}

/// The values of one set of draws, and where they count.
struct Seen {
    values: Vec<Lanes>,
    counts: Vec<LaneMask>,
}

fn batch(
    sampler: &Sampler<'_>,
    measures: usize,
    nominals: &[Option<f64>],
    index: u64,
) -> Vec<shares::Batch> {
    let factors = sampler.spreads.factors.len();
    let quantities = sampler.spreads.quantities.len();
    let mut batches = vec![shares::Batch::new(factors); measures];
    let mut room = sampler.room();
    let (mut a, mut b) = (room.draws.clone(), room.draws.clone());
    let per_batch = chunks(SAMPLES) / BATCHES as u64;
    let mut exchanged = vec![0.0; factors];
    for chunk in index * per_batch..(index + 1) * per_batch {
        sampler.spreads.draw(MAIN, chunk, &mut a);
        sampler.spreads.draw(SECOND, chunk, &mut b);
        let mut look = |draws: &[Lanes]| {
            room.draws.copy_from_slice(draws);
            sampler.place(&mut room, None);
            sampler.batch.evaluate(&mut room.chunk, BLOCKS);
            let outputs = room.chunk.values.len() / BLOCKS;
            let counts = (room.chunk.exists.iter().enumerate())
                .map(|(at, exists)| *exists & room.chunk.stable[at / outputs])
                .collect();
            Seen {
                values: room.chunk.values.clone(),
                counts,
            }
        };
        let (seen_a, seen_b) = (look(&a), look(&b));
        let mixed: Vec<Seen> = (0..factors)
            .map(|factor| {
                let mut draws = a.clone();
                for (at, draw) in draws.iter_mut().enumerate() {
                    if sampler.spreads.quantities[at % quantities].factor == factor {
                        *draw = b[at];
                    }
                }
                look(&draws)
            })
            .collect();
        let outputs = seen_a.values.len() / BLOCKS;
        for block in 0..BLOCKS {
            for (measure, batch) in batches.iter_mut().enumerate() {
                let at = block * outputs + measure;
                let mut counts = seen_a.counts[at] & seen_b.counts[at];
                for one in &mixed {
                    counts = counts & one.counts[at];
                }
                let centre = nominals[measure].unwrap_or(0.0);
                for lane in (0..LANES).filter(|lane| counts.holds(*lane)) {
                    for (value, one) in exchanged.iter_mut().zip(&mixed) {
                        *value = one.values[at].0[lane] - centre;
                    }
                    let a = seen_a.values[at].0[lane] - centre;
                    let b = seen_b.values[at].0[lane] - centre;
                    batch.take(a, b, &exchanged);
                }
            }
        }
    }
    batches
}
