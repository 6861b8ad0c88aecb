//! Which quantity makes how much of a measure's variance.
//!
//! First-order and total shares by Sobol' (Math. Comput. Simul. 55, 271 (2001)), from two sets of
//! samples A and B and the sets in which one factor of A is taken from B:
//! V_i = ⟨f(B)(f(AB_i) − f(A))⟩ (Saltelli et al., Comput. Phys. Commun. 181, 259 (2010)) and
//! V_Ti = ⟨(f(A) − f(AB_i))²⟩/2 (Jansen, Comput. Phys. Commun. 117, 35 (1999)). Quantities that move
//! together count as one factor. The uncertainty is the scatter of the estimates of independent
//! batches of samples.

use rayon::prelude::*;

/// Sums of one batch for one measure and factor.
#[derive(Clone, Copy, Debug, Default)]
struct Sums {
    first: f64,
    total: f64,
}

/// What one batch of samples knows of one measure.
#[derive(Clone, Debug)]
pub(super) struct Batch {
    count: f64,
    sum: f64,
    squares: f64,
    factors: Vec<Sums>,
}

/// Shares of one factor in one output's variance, with their standard uncertainties.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Share {
    /// What goes away when the factor is known, alone.
    pub first_order: f64,
    /// Its standard uncertainty.
    pub first_order_u: f64,
    /// What remains when all others are known.
    pub total: f64,
    /// Its standard uncertainty.
    pub total_u: f64,
}

impl Batch {
    /// Nothing known of so many factors.
    pub(super) fn new(factors: usize) -> Batch {
        Batch {
            count: 0.0,
            sum: 0.0,
            squares: 0.0,
            factors: vec![Sums::default(); factors],
        }
    }

    /// Takes one sample: values at A and at B, and for each factor with that factor from B, all
    /// counted from about their middle. A sample in which one of them does not exist is not given.
    pub(super) fn take(&mut self, a: f64, b: f64, exchanged: &[f64]) {
        self.count += 1.0;
        self.sum += a + b;
        self.squares += a * a + b * b;
        for (sums, value) in self.factors.iter_mut().zip(exchanged) {
            sums.first += b * (value - a);
            sums.total += 0.5 * (a - value) * (a - value);
        }
    }

    fn variance(&self) -> f64 {
        let count = 2.0 * self.count;
        let mean = self.sum / count;
        self.squares / count - mean * mean
    }
}

/// The shares of all factors, from independent batches; none where the output does not vary.
pub(super) fn shares(batches: &[Batch]) -> Option<Vec<Share>> {
    let used: Vec<&Batch> = batches.iter().filter(|batch| batch.count > 1.0).collect();
    let factors = used.first()?.factors.len();
    let count: f64 = used.iter().map(|batch| batch.count).sum();
    let variance = used
        .iter()
        .map(|batch| batch.variance() * batch.count)
        .sum::<f64>()
        / count;
    if used.len() < 2 || !(variance > 0.0 && variance.is_finite()) {
        return None;
    }
    let of = |factor: usize, pick: fn(&Sums) -> f64| {
        let sum: f64 = used.iter().map(|batch| pick(&batch.factors[factor])).sum();
        let mean = sum / count / variance;
        let scatter: f64 = used
            .iter()
            .map(|batch| (pick(&batch.factors[factor]) / batch.count / variance - mean).powi(2))
            .sum();
        let batches = used.len() as f64;
        (mean, (scatter / (batches * (batches - 1.0))).sqrt())
    };
    Some(
        (0..factors)
            .map(|factor| {
                let (first_order, first_order_u) = of(factor, |sums| sums.first);
                let (total, total_u) = of(factor, |sums| sums.total);
                Share {
                    first_order,
                    first_order_u,
                    total,
                    total_u,
                }
            })
            .collect(),
    )
}

/// Number of independent batches from which uncertainties are known.
pub(super) const BATCHES: usize = 32;

/// Shares of the variance of any function of independent factors: `sample` is given the number of a
/// sample and must return its two independent sets of factors.
pub fn variance_shares(
    factors: usize,
    samples: usize,
    sample: impl Fn(u64) -> [Vec<f64>; 2] + Sync,
    output: impl Fn(&[f64]) -> f64 + Sync,
) -> Option<Vec<Share>> {
    let per_batch = samples.div_ceil(BATCHES);
    let centre = output(&sample(0)[0]);
    let batches: Vec<Batch> = (0..BATCHES)
        .into_par_iter()
        .map(|index| {
            let mut batch = Batch::new(factors);
            let mut exchanged = vec![0.0; factors];
            for number in index * per_batch..(index + 1) * per_batch {
                let [a, b] = sample(number as u64);
                for (factor, value) in exchanged.iter_mut().enumerate() {
                    let mut mixed = a.clone();
                    mixed[factor] = b[factor];
                    *value = output(&mixed) - centre;
                }
                batch.take(output(&a) - centre, output(&b) - centre, &exchanged);
            }
            batch
        })
        .collect();
    shares(&batches)
}
