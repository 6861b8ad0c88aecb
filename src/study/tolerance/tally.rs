//! What is counted of the samples: fails, moments, histograms, modes that come near.

use pulp::{Arch, Simd, WithSimd};

use crate::analysis::spectrum::{self, Multiples};
use crate::cavity::Bounds;
use crate::numeric::{LANES, LaneMask, Lanes, Real};
use crate::study::batch::Chunk;

/// Bins of a histogram: quantiles are good to a part in a thousand of its range.
const BINS: usize = 2048;

/// What is to be counted.
#[derive(Clone, Debug)]
pub(super) struct Plan {
    /// For each measure, the range of its histogram.
    pub(super) ranges: Vec<[f64; 2]>,
    /// For each measure that is circular, the value from which it is counted and its period.
    pub(super) wraps: Vec<Option<[f64; 2]>>,
    /// For each limit, the measure and the least and greatest good value.
    pub(super) limits: Vec<(usize, [f64; 2])>,
    /// Which measure is the finesse, highest order, and how near in linewidths is too near.
    pub(super) near: Option<Near>,
    /// Number of measures of which histograms are kept; others serve.
    pub(super) measures: usize,
}

/// How modes near the fundamental are counted.
#[derive(Clone, Copy, Debug)]
pub(super) struct Near {
    pub(super) finesse: usize,
    pub(super) highest: usize,
    pub(super) apart: f64,
}

/// The least and the greatest value within bounds.
pub(super) fn ends(bounds: Bounds) -> [f64; 2] {
    match bounds {
        Bounds::Above(low) => [low, f64::INFINITY],
        Bounds::Below(high) => [f64::NEG_INFINITY, high],
        Bounds::Between(low, high) => [low, high],
    }
}

/// Moments and histogram of one measure over the samples that have it.
#[derive(Clone, Debug)]
pub(super) struct Spot {
    pub(super) count: u64,
    /// Sums of the difference from the middle of the range, and of its square.
    sum: f64,
    squares: f64,
    pub(super) least: f64,
    pub(super) greatest: f64,
    range: [f64; 2],
    bins: Vec<u64>,
}

/// What was counted.
#[derive(Clone, Debug)]
pub(super) struct Tally {
    pub(super) samples: u64,
    pub(super) unstable: u64,
    pub(super) passing: u64,
    pub(super) fails: Vec<u64>,
    pub(super) measures: Vec<Spot>,
    /// By mode, in the order of [`spectrum::each_nearness`].
    pub(super) culprits: Vec<[u64; LANES]>,
    multiples: Multiples<Lanes>,
}

impl Spot {
    fn new(range: [f64; 2]) -> Spot {
        Spot {
            count: 0,
            sum: 0.0,
            squares: 0.0,
            least: f64::INFINITY,
            greatest: f64::NEG_INFINITY,
            range,
            bins: vec![0; BINS],
        }
    }

    fn middle(&self) -> f64 {
        0.5 * (self.range[0] + self.range[1])
    }

    fn width(&self) -> f64 {
        (self.range[1] - self.range[0]) / BINS as f64
    }

    /// The mean.
    pub(super) fn mean(&self) -> Option<f64> {
        (self.count > 0).then(|| self.middle() + self.sum / self.count as f64)
    }

    /// The standard deviation: JCGM 101 calls it the standard uncertainty of the output.
    pub(super) fn standard_deviation(&self) -> Option<f64> {
        if self.count < 2 {
            return None;
        }
        let count = self.count as f64;
        let variance = (self.squares - self.sum * self.sum / count) / (count - 1.0);
        Some(variance.max(0.0).sqrt())
    }

    /// The value below which the given share of the samples lies, interpolated within a bin.
    pub(super) fn quantile(&self, share: f64) -> Option<f64> {
        if self.count == 0 {
            return None;
        }
        let wanted = share * self.count as f64;
        let mut below = 0.0;
        for (index, &count) in self.bins.iter().enumerate() {
            let count = count as f64;
            if count > 0.0 && below + count >= wanted {
                let within = (wanted - below) / count;
                let value = self.range[0] + self.width() * (index as f64 + within);
                return Some(value.clamp(self.least, self.greatest));
            }
            below += count;
        }
        Some(self.greatest)
    }

    /// The histogram in about the given number of bins between the least and the greatest value
    /// seen: edges, and the share of samples in each.
    pub(super) fn coarse(&self, bins: usize) -> Option<(Vec<f64>, Vec<f64>)> {
        let first = self.bins.iter().position(|count| *count > 0)?;
        let last = self.bins.iter().rposition(|count| *count > 0)?;
        let group = (last - first + 1).div_ceil(bins).max(1);
        let mut edges = vec![self.range[0] + self.width() * first as f64];
        let mut shares = Vec::new();
        for chunk in self.bins[first..=last].chunks(group) {
            let counted: u64 = chunk.iter().sum();
            shares.push(counted as f64 / self.count as f64);
            edges.push(edges[0] + self.width() * (shares.len() * group) as f64);
        }
        Some((edges, shares))
    }

    fn merge(&mut self, other: &Spot) {
        self.count += other.count;
        self.sum += other.sum;
        self.squares += other.squares;
        self.least = self.least.min(other.least);
        self.greatest = self.greatest.max(other.greatest);
        for (mine, theirs) in self.bins.iter_mut().zip(&other.bins) {
            *mine += theirs;
        }
    }

    #[inline(always)]
    fn take(&mut self, value: Lanes, counts: LaneMask) {
        let zero = Lanes::constant(0.0);
        let difference = Lanes::select(counts, value - self.middle(), zero);
        self.sum += difference.sum();
        self.squares += difference.squared().sum();
        let seen = |otherwise| Lanes::select(counts, value, Lanes::constant(otherwise));
        self.least = self.least.min(seen(f64::INFINITY).least());
        self.greatest = self.greatest.max(-(-seen(f64::NEG_INFINITY)).least());
        let bin = (value - self.range[0]) * (1.0 / self.width());
        let bin = bin.max(zero).min(Lanes::constant((BINS - 1) as f64));
        for lane in 0..LANES {
            if counts.holds(lane) {
                self.bins[bin.0[lane] as usize] += 1;
                self.count += 1;
            }
        }
    }
}

impl Tally {
    /// Nothing counted yet.
    pub(super) fn new(plan: &Plan) -> Tally {
        Tally {
            samples: 0,
            unstable: 0,
            passing: 0,
            fails: vec![0; plan.limits.len()],
            measures: plan.ranges.iter().map(|range| Spot::new(*range)).collect(),
            culprits: plan.near.map_or(Vec::new(), |near| {
                let mut modes = 0;
                let nowhere = crate::optics::PerPlane::both(0.0);
                let mut multiples = Multiples::default();
                spectrum::each_nearness(nowhere, near.highest, &mut multiples, |_, _, _| {
                    modes += 1
                });
                vec![[0; LANES]; modes]
            }),
            multiples: Multiples::default(),
        }
    }

    /// Adds what another one counted.
    pub(super) fn merge(&mut self, other: &Tally) {
        self.samples += other.samples;
        self.unstable += other.unstable;
        self.passing += other.passing;
        for (mine, theirs) in self.fails.iter_mut().zip(&other.fails) {
            *mine += theirs;
        }
        for (mine, theirs) in self.measures.iter_mut().zip(&other.measures) {
            mine.merge(theirs);
        }
        for (mine, theirs) in self.culprits.iter_mut().zip(&other.culprits) {
            for (mine, theirs) in mine.iter_mut().zip(theirs) {
                *mine += theirs;
            }
        }
    }

    /// Counts the first `samples` samples of an evaluated chunk.
    pub(super) fn take(&mut self, plan: &Plan, chunk: &Chunk, samples: usize) {
        Arch::new().dispatch(Take {
            tally: self,
            plan,
            chunk,
            samples,
        });
    }
}

/// Which samples of one block pass all limits; `fails` hears of each limit that does not hold.
#[inline(always)]
pub(super) fn passing(
    plan: &Plan,
    chunk: &Chunk,
    block: usize,
    mut fails: impl FnMut(usize, LaneMask),
) -> LaneMask {
    let outputs = chunk.values.len() / chunk.stable.len();
    let mut good = chunk.stable[block];
    for (index, (measure, [low, high])) in plan.limits.iter().enumerate() {
        let at = block * outputs + measure;
        let value = chunk.values[at];
        let within = !(value.less(Lanes::constant(*low)) | Lanes::constant(*high).less(value));
        let holds = within & chunk.exists[at];
        fails(index, !holds);
        good = good & holds;
    }
    good
}

struct Take<'a> {
    tally: &'a mut Tally,
    plan: &'a Plan,
    chunk: &'a Chunk,
    samples: usize,
}

impl WithSimd for Take<'_> {
    type Output = ();

    #[inline(always)]
    fn with_simd<S: Simd>(self, _: S) {
        let Take {
            tally,
            plan,
            chunk,
            samples,
        } = self;
        let outputs = chunk.values.len() / chunk.stable.len();
        for block in 0..samples.div_ceil(LANES) {
            let count = (samples - block * LANES).min(LANES);
            let asked = LaneMask::first(count);
            let stable = chunk.stable[block] & asked;
            tally.samples += count as u64;
            tally.unstable += (count - stable.count()) as u64;
            let failed = &mut tally.fails;
            let good = passing(plan, chunk, block, |limit, mask| {
                failed[limit] += (mask & asked).count() as u64;
            });
            tally.passing += (good & asked).count() as u64;
            for measure in 0..plan.measures {
                let at = block * outputs + measure;
                let counts = chunk.exists[at] & stable;
                let mut value = chunk.values[at];
                if let Some([origin, period]) = plan.wraps[measure] {
                    value = ((value - origin) / period).folded() * period + origin;
                }
                tally.measures[measure].take(value, counts);
            }
            let Some(near) = plan.near else {
                continue;
            };
            let at = block * outputs + near.finesse;
            let counts = stable & chunk.exists[at];
            let threshold = Lanes::constant(-near.apart) / chunk.values[at] + 0.5;
            let culprits = &mut tally.culprits;
            let mut index = 0;
            spectrum::each_nearness(
                chunk.spacings[block],
                near.highest,
                &mut tally.multiples,
                |_, _, nearness| {
                    let close = threshold.less(nearness) & counts;
                    for (count, flag) in culprits[index].iter_mut().zip(close.0) {
                        *count += flag & 1;
                    }
                    index += 1;
                },
            );
        }
    }
}
