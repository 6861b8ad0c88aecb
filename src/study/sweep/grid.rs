//! All points of a sweep, a chunk at a time on every core.

use rayon::prelude::*;

use crate::cavity::{Cavity, Measure, Slot};
use crate::numeric::LANES;
use crate::study::batch::{Batch, CHUNK};

/// What was found at every point, the second quantity running first.
pub(super) struct Found {
    /// Values of each measure.
    pub(super) values: Vec<Vec<Option<f64>>>,
    /// Whether both planes hold a mode.
    pub(super) stable: Vec<bool>,
}

/// What one chunk writes into.
struct Part<'a> {
    values: Vec<&'a mut [Option<f64>]>,
    stable: &'a mut [bool],
}

/// Evaluates measures over the values of one or two quantities.
pub(super) fn evaluate(cavity: &Cavity, measures: &[Measure], varied: &[(Slot, &[f64])]) -> Found {
    let slots: Vec<Slot> = varied.iter().map(|(slot, _)| *slot).collect();
    let batch = Batch::new(cavity, measures.to_vec(), slots);
    let counts: Vec<usize> = varied.iter().map(|(_, kept)| kept.len()).collect();
    let points: usize = counts.iter().product();
    let mut found = Found {
        values: vec![vec![None; points]; measures.len()],
        stable: vec![false; points],
    };
    let mut parts: Vec<Part<'_>> = found
        .stable
        .chunks_mut(CHUNK)
        .map(|stable| Part {
            values: Vec::with_capacity(measures.len()),
            stable,
        })
        .collect();
    for column in &mut found.values {
        for (part, values) in parts.iter_mut().zip(column.chunks_mut(CHUNK)) {
            part.values.push(values);
        }
    }
    let inputs = varied.len();
    parts.into_par_iter().enumerate().for_each_init(
        || batch.chunk(),
        |chunk, (index, part)| {
            let filled = part.stable.len();
            let blocks = filled.div_ceil(LANES);
            for place in 0..blocks * LANES {
                // The last block is filled up with its last point.
                let point = index * CHUNK + place.min(filled - 1);
                let (block, lane) = (place / LANES, place % LANES);
                let [outer, inner] = match counts[..] {
                    [_, inner] => [point / inner, point % inner],
                    _ => [point, 0],
                };
                chunk.inputs[block * inputs].0[lane] = varied[0].1[outer];
                if let Some((_, second)) = varied.get(1) {
                    chunk.inputs[block * inputs + 1].0[lane] = second[inner];
                }
            }
            batch.evaluate(chunk, blocks);
            for place in 0..filled {
                let (block, lane) = (place / LANES, place % LANES);
                part.stable[place] = chunk.stable[block].holds(lane);
            }
            let outputs = part.values.len();
            for (output, values) in part.values.into_iter().enumerate() {
                for (place, value) in values.iter_mut().enumerate() {
                    let (block, lane) = (place / LANES, place % LANES);
                    let at = block * outputs + output;
                    let found = chunk.values[at].0[lane];
                    *value = (chunk.exists[at].holds(lane) && found.is_finite()).then_some(found);
                }
            }
        },
    );
    found
}
