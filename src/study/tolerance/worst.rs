//! The worst value of each limited measure with every quantity somewhere in its tolerance: all
//! corners, or as many as can be tried, and from the worst of them a search of the inside.

use super::Stage;
use super::result::{LimitTally, Place, Worst};
use super::sample::Sampler;
use super::tally::ends;
use crate::analysis::measures::{Evaluator, Workspace};
use crate::cavity::{Cavity, Measure};

/// Quantities of which all corners are tried; of more, as many corners taken at random.
const ALL_CORNERS: usize = 12;
/// Corners from which a search goes on.
const STARTS: usize = 4;
/// Step at which a search ends, as a share of the tolerance.
const FINEST: f64 = 1e-4;

struct Search<'a> {
    cavity: &'a Cavity,
    sampler: &'a Sampler<'a>,
    /// Quantities that can only move together.
    movers: Vec<Vec<usize>>,
    evaluator: Evaluator<'a>,
    workspace: Workspace<f64>,
    values: Vec<f64>,
    ends: [f64; 2],
}

impl Search<'_> {
    /// How far the measure lies beyond its limit; infinitely where it does not exist.
    fn excess(&mut self, at: &[f64]) -> (f64, Option<f64>) {
        for (mover, share) in self.movers.iter().zip(at) {
            for &quantity in mover {
                let draw = share * self.sampler.spreads.reach(quantity);
                let slot = self.sampler.spreads.quantities[quantity].slot;
                self.values[slot.index()] = self.sampler.spreads.value(quantity, draw, 1.0);
            }
        }
        self.cavity.book().follow_ties(&mut self.values);
        let mut found = None;
        let modes =
            self.evaluator
                .evaluate(&self.values, &mut self.workspace, |_, value, exists| {
                    found = Some(value).filter(|value: &f64| exists && value.is_finite());
                });
        let is_stable = modes.tangential.stable && modes.sagittal.stable;
        if !(is_stable || self.is_margin()) {
            found = None;
        }
        let [low, high] = self.ends;
        (
            found.map_or(f64::INFINITY, |value| (low - value).max(value - high)),
            found,
        )
    }

    fn is_margin(&self) -> bool {
        matches!(
            self.evaluator.measures()[0],
            Measure::Margin(_) | Measure::HalfTrace(_)
        )
    }

    /// Climbs from a place by steps along one quantity at a time, each half as long as the last when
    /// nothing more is found.
    fn climb(&mut self, mut at: Vec<f64>) -> (f64, Vec<f64>) {
        let mut best = self.excess(&at).0;
        let mut step = 1.0;
        while step > FINEST && best < f64::INFINITY {
            let mut better = false;
            for mover in 0..at.len() {
                for direction in [-step, step] {
                    let before = at[mover];
                    at[mover] = (before + direction).clamp(-1.0, 1.0);
                    let excess = self.excess(&at).0;
                    if excess > best {
                        best = excess;
                        better = true;
                    } else {
                        at[mover] = before;
                    }
                }
            }
            if !better {
                step *= 0.5;
            }
        }
        (best, at)
    }
}

/// The worst of every limit; none where the study was ended.
pub(super) fn of(
    cavity: &Cavity,
    sampler: &Sampler<'_>,
    limits: &[LimitTally],
    progress: &mut dyn FnMut(Stage, f64) -> bool,
) -> Option<Vec<Worst>> {
    let mut found = Vec::with_capacity(limits.len());
    for (index, limit) in limits.iter().enumerate() {
        if !progress(Stage::Worst, index as f64 / limits.len() as f64) {
            return None;
        }
        found.push(worst(cavity, sampler, limit));
    }
    Some(found)
}

fn worst(cavity: &Cavity, sampler: &Sampler<'_>, limit: &LimitTally) -> Worst {
    let spreads = sampler.spreads;
    let evaluator = Evaluator::new(cavity, vec![limit.measure]).varying(&spreads.slots());
    let mut search = Search {
        cavity,
        sampler,
        movers: spreads.movers(),
        evaluator,
        workspace: Workspace::default(),
        values: cavity.book().nominal(),
        ends: ends(limit.bounds),
    };
    let movers = search.movers.len();
    let mut corners: Vec<(f64, Vec<f64>)> = corners(movers)
        .map(|corner| (search.excess(&corner).0, corner))
        .collect();
    corners.sort_by(|a, b| b.0.total_cmp(&a.0));
    corners.truncate(STARTS);
    let middle = vec![0.0; movers];
    let starts = corners
        .into_iter()
        .map(|(_, corner)| corner)
        .chain([middle]);
    let (_, at) = starts
        .map(|start| search.climb(start))
        .max_by(|a, b| a.0.total_cmp(&b.0))
        .unwrap_or_default();
    let (_, value) = search.excess(&at);
    let places = search
        .movers
        .iter()
        .zip(&at)
        .flat_map(|(mover, share)| mover.iter().map(move |quantity| (*quantity, *share)))
        .map(|(quantity, share)| {
            let slot = spreads.quantities[quantity].slot;
            Place {
                quantity: cavity.book().entry(slot).address.clone(),
                value: slot.of(&search.values),
                share,
            }
        })
        .collect();
    Worst {
        of: limit.of.clone(),
        value,
        holds: value.is_some_and(|value| limit.bounds.hold(value)),
        why: value
            .is_none()
            .then(|| "the cavity holds no mode there".into()),
        at: places,
        measure: limit.measure,
    }
}

/// Corners of a box: all of them, or a scattered choice.
fn corners(sides: usize) -> impl Iterator<Item = Vec<f64>> {
    let count = 1_u64 << sides.min(ALL_CORNERS);
    (0..count).map(move |corner| {
        let bits = if sides <= ALL_CORNERS {
            vec![corner]
        } else {
            // Weyl's sequence scatters the bits of more sides than can be counted through.
            let words = sides.div_ceil(64) as u64;
            (0..words)
                .map(|word| {
                    let x = (corner * words + word + 1).wrapping_mul(0x9e37_79b9_7f4a_7c15);
                    x ^ (x >> 29)
                })
                .collect()
        };
        (0..sides)
            .map(|side| {
                if bits[side / 64] >> (side % 64) & 1 == 0 {
                    -1.0
                } else {
                    1.0
                }
            })
            .collect()
    })
}
