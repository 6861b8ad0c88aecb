//! What a tolerance study found.

use std::collections::BTreeMap;

use serde::Serialize;

use crate::cavity::{Bounds, Measure};
use crate::quantity::{Kind, Spread};

/// Will the build meet its limits with real parts?
#[derive(Clone, Debug, Serialize)]
pub struct Tolerance {
    /// What the builder calls the cavity.
    #[serde(skip_serializing_if = "Option::is_none")]
    pub title: Option<String>,
    /// Number of samples.
    pub samples: u64,
    /// The seed they were drawn with.
    pub seed: u64,
    /// Whether the study was ended before it was complete.
    pub stopped: bool,
    /// Share of samples that are stable and meet all limits.
    #[serde(rename = "yield")]
    pub passing: f64,
    /// Its 95 % interval (Wilson).
    pub yield_interval: [f64; 2],
    /// The yield that is wanted, where one is.
    pub wanted_yield: Option<f64>,
    /// Share of unstable samples.
    pub unstable: f64,
    /// Quantities that vary.
    pub varied: Vec<Varied>,
    /// Quantities that shape the mode and have no spread: they count as perfect.
    pub perfect: Vec<String>,
    /// Quantities with a spread on which no measure depends.
    pub idle: Vec<String>,
    /// The measures, over the stable samples.
    pub measures: BTreeMap<String, Statistics>,
    /// For each limit, the share of all samples that fail it.
    pub fails: BTreeMap<String, f64>,
    /// The limits themselves, in the order of the file.
    pub limits: Vec<LimitTally>,
    /// Transverse modes that come near the fundamental; the most frequent first.
    pub culprits: Vec<Culprit>,
    /// How near counts as near, in linewidths.
    pub apart: f64,
    /// What each quantity contributes to the variance of each measure.
    pub contributions: Vec<Contribution>,
    /// How many samples the contributions rest on.
    pub contribution_samples: u64,
    /// What each quantity does to the yield.
    pub tightening: Vec<Tightening>,
    /// How many samples the last rest on.
    pub tightening_samples: u64,
    /// The worst value of each limited measure within the tolerances.
    pub worst: Vec<Worst>,
    /// The yield after adjustment, where the file adjusts anything.
    pub readjusted: Option<Readjusted>,
    /// The tolerances that reach the wanted yield, where one is wanted.
    pub budget: Option<Budget>,
    /// What is to be kept in mind.
    pub cautions: Vec<String>,
}

/// A quantity that varies.
#[derive(Clone, Debug, Serialize)]
pub struct Varied {
    /// Its address.
    pub quantity: String,
    /// How it lies: "rectangular" or "normal".
    pub shape: &'static str,
    /// Standard deviation of the number as written, SI.
    pub standard_uncertainty: f64,
    /// The spread as written, and what it is a spread of.
    #[serde(skip)]
    pub spread: (Spread, Kind),
    /// Others that it moves with.
    #[serde(skip_serializing_if = "Option::is_none")]
    pub moves_with: Option<String>,
}

/// Statistics of one measure, in SI units.
#[derive(Clone, Debug, Serialize)]
pub struct Statistics {
    /// Its value with every quantity at its nominal value.
    pub nominal: Option<f64>,
    /// Its mean.
    pub mean: Option<f64>,
    /// Its standard deviation over the samples.
    pub standard_uncertainty: Option<f64>,
    /// Values below which the named share of the samples lies.
    pub quantiles: BTreeMap<&'static str, Option<f64>>,
    /// The least and the greatest value seen.
    pub extremes: Option<[f64; 2]>,
    /// How often which values were seen.
    pub histogram: Option<Histogram>,
    /// Why there is no value, where there is none.
    #[serde(skip_serializing_if = "Option::is_none")]
    pub why: Option<String>,
    /// The measure.
    #[serde(skip)]
    pub measure: Measure,
}

/// A histogram.
#[derive(Clone, Debug, Serialize)]
pub struct Histogram {
    /// Edges of the bins, one more than bins.
    pub edges: Vec<f64>,
    /// Share of the samples in each bin.
    pub shares: Vec<f64>,
}

/// How a limit fared.
#[derive(Clone, Debug, Serialize)]
pub struct LimitTally {
    /// Its name: the measure's, numbered where there are several on one measure.
    pub of: String,
    /// Share of all samples that fail it.
    pub fails: f64,
    /// Where the measure must lie, in SI units.
    pub wanted: String,
    /// The same as data.
    #[serde(skip)]
    pub bounds: Bounds,
    /// The measure.
    #[serde(skip)]
    pub measure: Measure,
    /// The measure's name.
    #[serde(skip)]
    pub name: String,
}

/// A mode that comes near the fundamental.
#[derive(Clone, Copy, Debug, Serialize)]
pub struct Culprit {
    /// Order in the tangential plane.
    pub m: usize,
    /// Order in the sagittal plane.
    pub n: usize,
    /// Share of all samples in which it is near.
    pub share: f64,
}

/// Shares of a measure's variance (Sobol').
#[derive(Clone, Debug, Serialize)]
pub struct Contribution {
    /// The quantity, or several that move together.
    pub quantity: String,
    /// The measure.
    pub measure: String,
    /// Share of the variance that goes away when the quantity is known, alone.
    pub first_order: f64,
    /// Its standard uncertainty.
    pub first_order_u: f64,
    /// Share that remains when all others are known: with all interactions.
    pub total: f64,
    /// Its standard uncertainty.
    pub total_u: f64,
}

/// What a quantity's tolerance does to the yield, against the same samples.
#[derive(Clone, Debug, Serialize)]
pub struct Tightening {
    /// The quantity, or several that move together.
    pub quantity: String,
    /// Yield if it were perfect.
    pub yield_if_perfect: f64,
    /// Yield with half its tolerance.
    pub yield_if_halved: f64,
    /// Yield with twice its tolerance.
    pub yield_if_doubled: f64,
    /// Yield as it is, on these samples.
    pub yield_as_is: f64,
    /// Standard uncertainty of the gain by half the tolerance.
    pub gain_u: f64,
    /// Whether the tolerance may be doubled for less than 0.2 points of yield.
    pub may_be_doubled: bool,
}

/// The worst value of a limited measure with every quantity somewhere in its tolerance.
#[derive(Clone, Debug, Serialize)]
pub struct Worst {
    /// The limit's name.
    pub of: String,
    /// The value, SI.
    pub value: Option<f64>,
    /// Whether the limit holds even there.
    pub holds: bool,
    /// Why there is no value.
    #[serde(skip_serializing_if = "Option::is_none")]
    pub why: Option<String>,
    /// Where it was found: the quantities as kept (1/R for radii), SI.
    pub at: Vec<Place>,
    /// The measure.
    #[serde(skip)]
    pub measure: Measure,
}

/// A quantity's value.
#[derive(Clone, Debug, Serialize)]
pub struct Place {
    /// Its address.
    pub quantity: String,
    /// Its value in SI units; 1/R or 1/f for radii and focal lengths.
    pub value: f64,
    /// How much of its tolerance is used, from −1 to 1 at the limits.
    pub share: f64,
}

/// The yield after adjustment.
#[derive(Clone, Debug, Serialize)]
pub struct Readjusted {
    /// Number of samples.
    pub samples: u64,
    /// Share of samples that pass.
    #[serde(rename = "yield")]
    pub passing: f64,
    /// Its 95 % interval (Wilson).
    pub yield_interval: [f64; 2],
    /// Yield of the same samples without adjustment.
    pub yield_without: f64,
    /// What was adjusted.
    pub adjusted: Vec<Adjusted>,
}

/// How an adjustment fared.
#[derive(Clone, Debug, Serialize)]
pub struct Adjusted {
    /// The quantity.
    pub set: String,
    /// The measure held.
    pub hold: String,
    /// Where it was held, SI.
    pub to: Option<f64>,
    /// Share of samples in which the travel was enough.
    pub reached: f64,
    /// Travel used by 95 % of the samples, SI.
    pub travel_used: Option<f64>,
    /// Travel there is, SI.
    pub travel: f64,
}

/// Tolerances that reach the wanted yield at the least Σ cost/tolerance.
#[derive(Clone, Debug, Serialize)]
pub struct Budget {
    /// Yield with it, on samples it was not made for.
    #[serde(rename = "yield")]
    pub passing: Option<f64>,
    /// Its 95 % interval (Wilson).
    pub yield_interval: Option<[f64; 2]>,
    /// The tolerances.
    pub tolerances: Vec<Allowance>,
    /// Why there is none.
    #[serde(skip_serializing_if = "Option::is_none")]
    pub why: Option<String>,
}

/// A tolerance of a budget.
#[derive(Clone, Debug, Serialize)]
pub struct Allowance {
    /// The quantity, or several that move together.
    pub quantity: String,
    /// How many times the written tolerance it may have.
    pub scale: f64,
}
