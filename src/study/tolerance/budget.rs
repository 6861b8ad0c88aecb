//! Tolerances that reach a wanted yield at the least Σ cost/tolerance.
//!
//! The yield is judged on the same draws throughout, which makes it a fixed function of the widths.
//! A choice of relative widths is made as wide as the wanted yield allows by halving an interval;
//! the relative widths are improved one at a time, by steps that become finer.

use super::result::{Allowance, Budget};
use super::sample::{JUDGE, MAIN, Sampler};
use super::{Stage, chunks};
use crate::cavity::Cavity;
use crate::numeric::statistics::wilson;

/// Samples by which widths are compared.
const SEARCH: u64 = 1 << 14;
/// Samples by which the result is judged.
const JUDGING: u64 = 1 << 18;
/// Widths are sought between these, relative to what is written.
const NARROWEST: f64 = 1e-3;
const WIDEST: f64 = 10.0;
/// Steps of a relative width, as factors.
const STEPS: [f64; 4] = [2.0, 1.4, 1.18, 1.08];

struct Search<'a> {
    sampler: &'a Sampler<'a>,
    costs: Vec<f64>,
    wanted: f64,
}

impl Search<'_> {
    /// The widths in the given proportions that just reach the wanted yield.
    fn widest(&self, stream: u64, samples: u64, proportions: &[f64], halvings: usize) -> Vec<f64> {
        let scaled = |common: f64| -> Vec<f64> {
            proportions
                .iter()
                .map(|own| (own * common).clamp(NARROWEST, WIDEST))
                .collect()
        };
        let (mut low, mut high) = (NARROWEST.ln(), WIDEST.ln());
        for _ in 0..halvings {
            let middle = 0.5 * (low + high);
            let widths = scaled(middle.exp());
            if self.sampler.yield_of(stream, chunks(samples), &widths) >= self.wanted {
                low = middle;
            } else {
                high = middle;
            }
        }
        scaled(low.exp())
    }

    fn cost(&self, widths: &[f64]) -> f64 {
        let terms = self.costs.iter().zip(widths);
        terms.map(|(cost, width)| cost / width).sum()
    }
}

/// The budget; none where the study was ended.
pub(super) fn of(
    cavity: &Cavity,
    sampler: &Sampler<'_>,
    wanted: f64,
    progress: &mut dyn FnMut(Stage, f64) -> bool,
) -> Option<Budget> {
    let factors = &sampler.spreads.factors;
    let nothing = |why: String| Budget {
        passing: None,
        yield_interval: None,
        tolerances: Vec::new(),
        why: Some(why),
    };
    let perfect = vec![NARROWEST; factors.len()];
    if sampler.yield_of(MAIN, chunks(SEARCH), &perfect) < wanted {
        return Some(nothing(
            "even parts a thousand times better do not reach it: the design itself must change"
                .into(),
        ));
    }
    // Tightening any member of a group tightens all of them.
    let mut costs = vec![0.0; factors.len()];
    for one in &sampler.spreads.quantities {
        costs[one.factor] += cavity.tolerancing.cost_of(one.slot);
    }
    let search = Search {
        sampler,
        costs,
        wanted,
    };
    let mut proportions = vec![1.0; factors.len()];
    let mut best = search.cost(&search.widest(MAIN, SEARCH, &proportions, 9));
    let rounds = STEPS.len() * factors.len();
    for (round, step) in STEPS.iter().enumerate() {
        for factor in 0..factors.len() {
            let done = (round * factors.len() + factor) as f64 / rounds as f64;
            if !progress(Stage::Budget, done) {
                return None;
            }
            for factor_by in [*step, 1.0 / step] {
                // As long as it helps, but not for ever.
                for _ in 0..3 {
                    let before = proportions[factor];
                    proportions[factor] = (before * factor_by).clamp(NARROWEST, 1e3);
                    let cost = search.cost(&search.widest(MAIN, SEARCH, &proportions, 9));
                    if cost < best {
                        best = cost;
                    } else {
                        proportions[factor] = before;
                        break;
                    }
                }
            }
        }
    }
    // The last word has a larger set of samples, which the proportions do not know.
    let widths = search.widest(JUDGE, JUDGING, &proportions, 14);
    let passing = sampler.yield_of(JUDGE, chunks(JUDGING), &widths);
    Some(Budget {
        passing: Some(passing),
        yield_interval: Some(wilson((passing * JUDGING as f64).round() as u64, JUDGING)),
        tolerances: factors
            .iter()
            .zip(widths)
            .map(|(factor, scale)| Allowance {
                quantity: factor.name.clone(),
                scale,
            })
            .collect(),
        why: None,
    })
}
