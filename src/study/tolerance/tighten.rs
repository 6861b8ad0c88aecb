//! What each tolerance does to the yield: the same draws with one spread narrower, wider or gone.

use super::result::Tightening;
use super::sample::{MAIN, Sampler, count, gained_and_lost};
use super::{Stage, affordable, chunks};
use crate::numeric::statistics::paired_uncertainty;

/// Samples that are judged again and again, at most.
const MOST: u64 = 1 << 17;

/// A loss of yield that nobody minds.
const NEGLIGIBLE: f64 = 0.002;

/// The effect of every factor, the one with the most to gain first, and on how many samples; none
/// where the study was ended.
pub(super) fn of(
    sampler: &Sampler<'_>,
    progress: &mut dyn FnMut(Stage, f64) -> bool,
) -> Option<(Vec<Tightening>, u64)> {
    let factors = &sampler.spreads.factors;
    let samples = affordable(3 * factors.len() + 1, MOST);
    let chunks = chunks(samples);
    let share = |verdicts: &[u8]| count(verdicts) as f64 / samples as f64;
    let as_is = sampler.verdicts(MAIN, chunks, &vec![1.0; factors.len()]);
    let mut rows = Vec::with_capacity(factors.len());
    for (index, factor) in factors.iter().enumerate() {
        if !factor.matters {
            continue;
        }
        if !progress(Stage::Tightening, index as f64 / factors.len() as f64) {
            return None;
        }
        let scaled = |scale: f64| {
            let mut scales = vec![1.0; factors.len()];
            scales[index] = scale;
            sampler.verdicts(MAIN, chunks, &scales)
        };
        let halved = scaled(0.5);
        let (gained, lost) = gained_and_lost(&as_is, &halved);
        let doubled = share(&scaled(2.0));
        rows.push(Tightening {
            quantity: factor.name.clone(),
            yield_if_perfect: share(&scaled(0.0)),
            yield_if_halved: share(&halved),
            yield_if_doubled: doubled,
            yield_as_is: share(&as_is),
            gain_u: paired_uncertainty(gained, lost, samples),
            may_be_doubled: doubled > 0.0 && share(&as_is) - doubled < NEGLIGIBLE,
        });
    }
    rows.sort_by(|a, b| b.yield_if_perfect.total_cmp(&a.yield_if_perfect));
    Some((rows, samples))
}
