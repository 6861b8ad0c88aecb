//! Will the build still meet its limits with real parts? Monte Carlo over every quantity that has a
//! spread (JCGM 101:2008), what spoils the yield, and what to do about it.
//!
//! A sample whose geometry is unstable, or that fails a limit, counts as a fail and is never
//! dropped; measures are described over the stable samples.

mod adjust;
mod budget;
mod contributions;
mod influence;
mod result;
mod sample;
mod shares;
mod spread;
mod tally;
mod tighten;
mod worst;

pub use result::{
    Adjusted, Allowance, Budget, Contribution, Culprit, Histogram, LimitTally, Place, Readjusted,
    Statistics, Tightening, Tolerance, Varied, Worst,
};
pub use shares::{Share, variance_shares};

use std::collections::BTreeMap;

use self::sample::{Sampler, TASK_SAMPLES};
use self::spread::Spreads;
use self::tally::{Near, Plan, Spot, Tally, ends};
use super::batch::{Batch, CHUNK};
use crate::analysis::measures::{Evaluator, Workspace};
use crate::analysis::spectrum::{self, Multiples};
use crate::cavity::{Cavity, Measure, Shape};
use crate::numeric::statistics::wilson;
use crate::optics::PerPlane;
use crate::quantity::Spread;

/// What a tolerance study is asked.
#[derive(Clone, Debug)]
pub struct Options {
    /// Measures beside those that are limited, with their names.
    pub measures: Vec<(String, Measure)>,
    /// Number of samples; none: until the yield is known to `precision`.
    pub samples: Option<u64>,
    /// Half the width of the yield's 95 % interval that is good enough.
    pub precision: f64,
    /// Where chance starts from.
    pub seed: u64,
    /// How near to the fundamental a mode must be to count, in linewidths.
    pub apart: f64,
    /// The yield that is wanted.
    pub wanted: Option<f64>,
}

impl Default for Options {
    fn default() -> Self {
        Options {
            measures: Vec::new(),
            samples: None,
            precision: 0.001,
            seed: 1,
            apart: 5.0,
            wanted: None,
        }
    }
}

/// Most samples of one study: a yield is then known to 0.01 points.
pub const MOST_SAMPLES: u64 = 100_000_000;

/// What a study is doing.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Stage {
    /// Drawing samples.
    Sampling,
    /// Changing one tolerance at a time.
    Tightening,
    /// Sharing out the variance.
    Contributions,
    /// Looking for the worst corner.
    Worst,
    /// Adjusting each sample.
    Adjusting,
    /// Making a budget.
    Budget,
}

/// Why there is nothing to study.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Nothing {
    /// No quantity has a spread on which any of the measures depends.
    NoSpread,
}

/// Samples drawn before histograms are begun: they tell the range.
const PILOT: u64 = TASK_SAMPLES;
/// Samples drawn between two looks at the yield.
const ROUND: u64 = 32 * TASK_SAMPLES;
/// Samples before which no yield counts as known.
const LEAST: u64 = 100_000;
/// How much wider than the pilot's values a histogram is, to either side.
const MARGIN: f64 = 0.5;
/// Bins of the histograms that are handed out.
const SHOWN_BINS: usize = 40;

/// Studies a cavity. `progress` hears what is being done and how much of it, from 0 to 1, and ends
/// the study by answering no; what is known then is returned.
///
/// # Errors
/// Where no quantity with a spread matters.
pub fn tolerance(
    cavity: &Cavity,
    options: &Options,
    progress: &mut dyn FnMut(Stage, f64) -> bool,
) -> Result<Tolerance, Nothing> {
    let named = named_measures(cavity, options);
    let mut measures: Vec<Measure> = named.iter().map(|(_, measure)| *measure).collect();
    // The finesse tells how near a mode is; it is last and not described unless asked for.
    let nominal = nominal_values(cavity, &[Measure::Finesse])[0];
    measures.push(Measure::Finesse);

    let influence = influence::of(cavity, &measures, named.len());
    if influence.varied.is_empty() {
        return Err(Nothing::NoSpread);
    }
    let spreads = Spreads::new(cavity, &influence.varied, options.seed);
    let batch = Batch::new(cavity, measures.clone(), spreads.slots());
    let nominals = nominal_values(cavity, &measures);
    let mut plan = Plan {
        ranges: vec![[0.0, 1.0]; named.len()],
        wraps: wraps(cavity, &named, &nominals),
        limits: limits_of(cavity, &named),
        near: nominal.map(|_| Near {
            finesse: measures.len() - 1,
            highest: cavity.highest_order,
            apart: options.apart,
        }),
        measures: named.len(),
    };
    plan.ranges = ranges(
        &Sampler {
            batch: &batch,
            spreads: &spreads,
            plan: &plan,
        },
        &nominals,
    );
    let sampler = Sampler {
        batch: &batch,
        spreads: &spreads,
        plan: &plan,
    };
    let (tally, complete) = draw(&sampler, options, progress);
    let mut found = describe(cavity, options, &named, &nominals, &plan, &tally);
    found.stopped = !complete;
    found.varied = varied(cavity, &spreads);
    found.perfect = influence.perfect;
    found.idle = influence.idle;
    found.cautions = cautions(cavity, &found);
    if !complete {
        return Ok(found);
    }
    let followed = follow(&sampler, options, &named, &nominals, &mut found, progress);
    found.stopped = followed.is_none();
    Ok(found)
}

/// What follows from the samples; none where the study was ended.
fn follow(
    sampler: &Sampler<'_>,
    options: &Options,
    named: &[(String, Measure)],
    nominals: &[Option<f64>],
    found: &mut Tolerance,
    progress: &mut dyn FnMut(Stage, f64) -> bool,
) -> Option<()> {
    let cavity = sampler.batch.cavity();
    (found.contributions, found.contribution_samples) =
        contributions::of(sampler, named, nominals, progress)?;
    if !sampler.plan.limits.is_empty() || found.unstable > 0.0 {
        (found.tightening, found.tightening_samples) = tighten::of(sampler, progress)?;
    }
    found.worst = worst::of(cavity, sampler, &found.limits, progress)?;
    if !cavity.tolerancing.adjust.is_empty() {
        found.readjusted = Some(adjust::of(cavity, sampler, progress)?);
    }
    if let Some(wanted) = options.wanted {
        found.budget = Some(budget::of(cavity, sampler, wanted, progress)?);
    }
    Some(())
}

/// The measures of the limits and those asked for, each once; the margin where there is none.
fn named_measures(cavity: &Cavity, options: &Options) -> Vec<(String, Measure)> {
    let limited = cavity
        .limits
        .iter()
        .map(|limit| (limit.name.clone(), limit.measure));
    let mut named: Vec<(String, Measure)> = Vec::new();
    for (name, measure) in limited.chain(options.measures.iter().cloned()) {
        if named.iter().any(|(_, known)| *known == measure) {
            continue;
        }
        // Two measures of one name differ in the orders that they count.
        let name = match (measure, named.iter().any(|(known, _)| *known == name)) {
            (Measure::ModeClearance { up_to }, true) => format!("{name} (up to {up_to})"),
            _ => name,
        };
        named.push((name, measure));
    }
    if named.is_empty() {
        named.push(("margin".into(), Measure::Margin(None)));
    }
    named
}

/// Spacings are folded into half a free spectral range to either side: they are counted from their
/// nominal value, so that samples on both sides of the fold lie together.
fn wraps(
    cavity: &Cavity,
    named: &[(String, Measure)],
    nominals: &[Option<f64>],
) -> Vec<Option<[f64; 2]>> {
    let period = nominal_values(cavity, &[Measure::Fsr])[0];
    named
        .iter()
        .zip(nominals)
        .map(|((_, measure), nominal)| match measure {
            Measure::Spacing(_) => Some([(*nominal)?, period?]),
            _ => None,
        })
        .collect()
}

fn limits_of(cavity: &Cavity, named: &[(String, Measure)]) -> Vec<(usize, [f64; 2])> {
    cavity
        .limits
        .iter()
        .filter_map(|limit| {
            let at = named
                .iter()
                .position(|(_, measure)| *measure == limit.measure)?;
            Some((at, ends(limit.bounds)))
        })
        .collect()
}

fn nominal_values(cavity: &Cavity, measures: &[Measure]) -> Vec<Option<f64>> {
    let mut found = Vec::new();
    Evaluator::new(cavity, measures.to_vec()).evaluate(
        &cavity.book().nominal(),
        &mut Workspace::default(),
        |_, value: f64, exists| found.push(Some(value).filter(|x| exists && x.is_finite())),
    );
    found
}

/// Ranges of the histograms, from a few samples and the nominal values.
fn ranges(sampler: &Sampler<'_>, nominals: &[Option<f64>]) -> Vec<[f64; 2]> {
    let pilot = sampler.tally(0, PILOT);
    pilot
        .measures
        .iter()
        .zip(nominals)
        .map(|(spot, nominal)| {
            let nominal = nominal.filter(|_| spot.count == 0);
            let (low, high) = match nominal {
                Some(nominal) => (nominal, nominal),
                None if spot.count == 0 => (0.0, 1.0),
                None => (spot.least, spot.greatest),
            };
            let width = high - low;
            let room = if width > 0.0 {
                MARGIN * width
            } else {
                1e-6 * low.abs().max(1e-12)
            };
            // A few samples far out must not make all others fall into one bin.
            let spread = spot.standard_deviation().unwrap_or(0.0);
            let mean = spot.mean().unwrap_or(low);
            let reach = if spread > 0.0 {
                12.0 * spread
            } else {
                f64::INFINITY
            };
            [
                (low - room).max(mean - reach),
                (high + room).min(mean + reach),
            ]
        })
        .collect()
}

/// Draws until the yield is known well enough; and whether it was not stopped before.
fn draw(
    sampler: &Sampler<'_>,
    options: &Options,
    progress: &mut dyn FnMut(Stage, f64) -> bool,
) -> (Tally, bool) {
    let most = options.samples.unwrap_or(MOST_SAMPLES).min(MOST_SAMPLES);
    let mut tally = Tally::new(sampler.plan);
    let mut done = 0;
    while done < most {
        let next = (done + ROUND).min(most);
        tally.merge(&sampler.tally(done, next));
        done = next;
        let [low, high] = wilson(tally.passing, tally.samples);
        let half = 0.5 * (high - low);
        let share = match options.samples {
            Some(samples) => done as f64 / samples as f64,
            None => (options.precision / half).powi(2).min(1.0),
        };
        if options.samples.is_none() && done >= LEAST && half <= options.precision {
            break;
        }
        if !progress(Stage::Sampling, share) {
            return (tally, false);
        }
    }
    (tally, true)
}

fn describe(
    cavity: &Cavity,
    options: &Options,
    named: &[(String, Measure)],
    nominals: &[Option<f64>],
    plan: &Plan,
    tally: &Tally,
) -> Tolerance {
    let share = |count: u64| count as f64 / tally.samples.max(1) as f64;
    let mut limits: Vec<LimitTally> = Vec::new();
    for (limit, count) in cavity.limits.iter().zip(&tally.fails) {
        let before = limits
            .iter()
            .filter(|known| known.name == limit.name)
            .count();
        limits.push(LimitTally {
            of: match before {
                0 => limit.name.clone(),
                more => format!("{} ({})", limit.name, more + 1),
            },
            fails: share(*count),
            wanted: limit.bounds.to_string(),
            bounds: limit.bounds,
            measure: limit.measure,
            name: limit.name.clone(),
        });
    }
    let measures = named
        .iter()
        .zip(nominals)
        .zip(&tally.measures)
        .map(|(((name, measure), nominal), spot)| {
            (name.clone(), statistics(*measure, *nominal, spot))
        })
        .collect();
    Tolerance {
        title: cavity.title.clone(),
        samples: tally.samples,
        seed: options.seed,
        stopped: false,
        passing: share(tally.passing),
        yield_interval: wilson(tally.passing, tally.samples),
        wanted_yield: options.wanted,
        unstable: share(tally.unstable),
        varied: Vec::new(),
        perfect: Vec::new(),
        idle: Vec::new(),
        measures,
        fails: limits
            .iter()
            .map(|limit| (limit.of.clone(), limit.fails))
            .collect(),
        limits,
        culprits: culprits(plan, tally),
        apart: options.apart,
        contributions: Vec::new(),
        contribution_samples: 0,
        tightening: Vec::new(),
        tightening_samples: 0,
        worst: Vec::new(),
        readjusted: None,
        budget: None,
        cautions: Vec::new(),
    }
}

const QUANTILES: [(&str, f64); 5] = [
    ("0.025", 0.025),
    ("0.16", 0.16),
    ("0.5", 0.5),
    ("0.84", 0.84),
    ("0.975", 0.975),
];

fn statistics(measure: Measure, nominal: Option<f64>, spot: &Spot) -> Statistics {
    Statistics {
        nominal,
        mean: spot.mean(),
        standard_uncertainty: spot.standard_deviation(),
        quantiles: QUANTILES
            .map(|(name, share)| (name, spot.quantile(share)))
            .into(),
        extremes: (spot.count > 0).then_some([spot.least, spot.greatest]),
        histogram: spot
            .coarse(SHOWN_BINS)
            .map(|(edges, shares)| Histogram { edges, shares }),
        why: (spot.count == 0).then(|| match measure {
            Measure::Finesse | Measure::Linewidth | Measure::ModeClearance { .. } => {
                "no stable sample has it; is a loss written?".into()
            }
            _ => "no sample is stable".into(),
        }),
        measure,
    }
}

fn culprits(plan: &Plan, tally: &Tally) -> Vec<Culprit> {
    let Some(near) = plan.near else {
        return Vec::new();
    };
    let mut modes = Vec::new();
    let mut multiples = Multiples::default();
    spectrum::each_nearness(
        PerPlane::both(0.0),
        near.highest,
        &mut multiples,
        |m, n, _| modes.push((m, n)),
    );
    let mut culprits: Vec<Culprit> = modes
        .into_iter()
        .zip(&tally.culprits)
        .map(|((m, n), counts)| Culprit {
            m,
            n,
            share: counts.iter().sum::<u64>() as f64 / tally.samples.max(1) as f64,
        })
        .filter(|culprit| culprit.share > 0.0)
        .collect();
    culprits.sort_by(|a, b| {
        b.share
            .total_cmp(&a.share)
            .then((a.m + a.n).cmp(&(b.m + b.n)))
    });
    culprits
}

fn varied(cavity: &Cavity, spreads: &Spreads) -> Vec<Varied> {
    spreads
        .quantities
        .iter()
        .enumerate()
        .map(|(index, one)| {
            let entry = cavity.book().entry(one.slot);
            let is_normal = matches!(entry.spread, Spread::Standard { .. })
                || cavity.tolerancing.shape_of(one.slot) == Shape::Normal;
            let together = &spreads.factors[one.factor].name;
            Varied {
                quantity: entry.address.clone(),
                shape: if is_normal { "normal" } else { "rectangular" },
                standard_uncertainty: spreads.standard_deviation(index),
                spread: (entry.spread, entry.spread_kind()),
                moves_with: (*together != entry.address).then(|| together.clone()),
            }
        })
        .collect()
}

fn cautions(cavity: &Cavity, found: &Tolerance) -> Vec<String> {
    let mut cautions = cavity.cautions().to_vec();
    let is_length = |one: &Varied| one.quantity.ends_with(".length");
    if cavity.is_ring() && found.varied.iter().any(is_length) {
        cautions.push(
            "lengths in a ring imply small changes of the angles of incidence, which are neglected"
                .into(),
        );
    }
    if cavity.limits.is_empty() {
        cautions.push("the file sets no limits: the yield is the share of stable samples".into());
    }
    cautions
}

/// Numbers by name, for tests and for callers that want one thing only.
impl Tolerance {
    /// The share by quantity of one measure's variance, first order.
    pub fn first_order(&self, measure: &str) -> BTreeMap<&str, f64> {
        self.contributions
            .iter()
            .filter(|share| share.measure == measure)
            .map(|share| (share.quantity.as_str(), share.first_order))
            .collect()
    }
}

/// Evaluations that each part of a study may spend, a few seconds' worth.
const EVALUATIONS: u64 = 1 << 22;

/// Samples that can be afforded when each takes so many evaluations: at most `most`, in whole tasks.
fn affordable(evaluations: usize, most: u64) -> u64 {
    let tasks = (EVALUATIONS / evaluations as u64).min(most) / TASK_SAMPLES;
    tasks.max(1) * TASK_SAMPLES
}

/// Chunks that hold so many samples.
const fn chunks(samples: u64) -> u64 {
    samples / CHUNK as u64
}
