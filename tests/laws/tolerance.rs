//! Tolerance studies against second roads: linear propagation with derivatives, plain sampling one
//! cavity at a time, dense scans; and the same bytes however they are computed.

use modewright::analysis::measures::{Evaluator, Workspace};
use modewright::cavity::{Cavity, Measure, Slot};
use modewright::file;
use modewright::numeric::{Dual, Lanes};
use modewright::quantity::Spread;
use modewright::study::batch::{BLOCKS, Batch, Instructions};
use modewright::study::tolerance::{Options, Tolerance, tolerance};

const RING: &str = include_str!("../../cavities/bow-tie-doubling-ring.toml");

fn load(text: &str, set: &[&str]) -> Cavity {
    let set: Vec<String> = set.iter().map(|set| set.to_string()).collect();
    match file::load("ring.toml", text, &set) {
        Ok(loaded) => loaded.cavity,
        Err(refused) => panic!("{:?}", refused.diagnostics),
    }
}

fn measures(cavity: &Cavity, names: &[&str]) -> Vec<(String, Measure)> {
    names
        .iter()
        .map(|name| (name.to_string(), Measure::parse(name, cavity).unwrap()))
        .collect()
}

fn study(cavity: &Cavity, options: &Options) -> Tolerance {
    tolerance(cavity, options, &mut |_, _| true).unwrap()
}

/// Relative uncertainty of a standard deviation from N samples is 1/√(2N); five of them, and what the
/// second derivatives add at tolerances a thousand times smaller than a workshop's.
const FIVE_SIGMA: f64 = 5.0;

#[test]
fn small_tolerances_propagate_linearly() {
    let small = [
        "d1.length=80 mm ± 0.3 um",
        "d2.length=73.34 mm ± 0.3 um",
        "d3.length=23 mm ± 0.2 um",
        "d4.length=23 mm ± 0.2 um",
        "d5.length=73.34 mm ± 0.3 um",
        "M3.roc=50 mm ± 0.001 %",
        "M4.roc=50.00000(25) mm",
    ];
    let cavity = load(RING, &small);
    let names = [
        "margin.tangential",
        "M1.spot",
        "X1.least.sagittal",
        "fsr",
        "gouy.tangential",
    ];
    let measures = measures(&cavity, &names);
    const SAMPLES: u64 = 100_000;
    let found = study(
        &cavity,
        &Options {
            measures: measures.clone(),
            samples: Some(SAMPLES),
            ..Options::default()
        },
    );
    let nominal = cavity.book().nominal();
    let evaluator = Evaluator::new(&cavity, measures.iter().map(|(_, m)| *m).collect());
    let mut variances = vec![0.0; names.len()];
    for (slot, entry) in cavity.book().spread_slots() {
        let deviation = match entry.spread {
            Spread::Limits { below, above } => 0.5 * (below + above) / 3_f64.sqrt(),
            Spread::Standard { uncertainty } => uncertainty,
            Spread::Exact => continue,
        };
        let mut values: Vec<Dual<f64>> = nominal.iter().map(|&x| Dual::fixed(x)).collect();
        // The derivative by the number as written, which for a radius is not the one kept.
        values[slot.index()] = entry.displaced(Dual::variable(0.0));
        evaluator.evaluate(&values, &mut Workspace::default(), |index, value, _| {
            variances[index] += (value.slope * deviation).powi(2);
        });
    }
    for ((name, _), variance) in measures.iter().zip(variances) {
        let sampled = found.measures[name].standard_uncertainty.unwrap();
        let ratio = sampled / variance.sqrt();
        let allowed = FIVE_SIGMA / (2.0 * SAMPLES as f64).sqrt();
        assert!((ratio - 1.0).abs() < allowed, "{name}: {ratio}");
        // First-order shares are then all there is, and sum to one.
        let sum: f64 = found.first_order(name).values().sum();
        assert!((sum - 1.0).abs() < 0.05, "{name}: shares sum to {sum}");
    }
}

#[test]
fn the_number_of_threads_does_not_change_a_byte() {
    let cavity = load(RING, &[]);
    let options = Options {
        measures: measures(&cavity, &["margin", "mode_clearance"]),
        samples: Some(50_000),
        ..Options::default()
    };
    let [one, three] = [1, 3].map(|threads| {
        let pool = rayon::ThreadPoolBuilder::new()
            .num_threads(threads)
            .build()
            .unwrap();
        let found = pool.install(|| study(&cavity, &options));
        serde_json::to_string(&found).unwrap()
    });
    assert!(one == three);
    let other = study(&cavity, &Options { seed: 2, ..options });
    assert!(one != serde_json::to_string(&other).unwrap());
}

#[test]
fn wide_instructions_give_the_bytes_of_plain_ones() {
    for set in [vec![], vec!["X1.aoi=12 deg", "X1.thermal=3 1/m"]] {
        let cavity = load(RING, &set);
        let names = [
            "margin",
            "M1.spot",
            "X1.least",
            "M4.aspect",
            "mode_clearance",
            "linewidth",
        ];
        let measures: Vec<Measure> = measures(&cavity, &names).iter().map(|(_, m)| *m).collect();
        let mut addresses = vec!["d1.length", "M3.roc"];
        if !set.is_empty() {
            addresses.extend(["X1.aoi", "X1.thermal"]);
        }
        let varied: Vec<Slot> = addresses
            .iter()
            .map(|address| cavity.book().find(address).unwrap())
            .collect();
        let [wide, plain] = [Instructions::Widest, Instructions::Plain].map(|instructions| {
            let batch = Batch::new(&cavity, measures.clone(), varied.clone()).with(instructions);
            let mut chunk = batch.chunk();
            let nominal = cavity.book().nominal();
            for (k, input) in chunk.inputs.iter_mut().enumerate() {
                let at = nominal[varied[k % varied.len()].index()];
                *input = Lanes(std::array::from_fn(|lane| {
                    at * (0.9 + 0.01 * ((k * 13 + lane * 5) % 23) as f64)
                }));
            }
            batch.evaluate(&mut chunk, BLOCKS);
            let bits: Vec<u64> = chunk
                .values
                .iter()
                .flat_map(|lanes| lanes.0.map(f64::to_bits))
                .collect();
            (bits, chunk.exists)
        });
        assert!(wide == plain);
    }
}

/// Limits that a good part of the samples fails.
const TIGHT: &str = "limits = [ { of = \"M1.spot.tangential\", between = [\"190 um\", \"211 um\"] }, \
                     { of = \"X1.least\", below = \"34.1 um\" }, \
                     { of = \"mode_clearance\", up_to = 3, above = 9 } ]";

fn tight() -> Cavity {
    let start = RING.find("limits = [").unwrap();
    let end = start + RING[start..].find("\n]").unwrap() + 2;
    load(&format!("{}{TIGHT}{}", &RING[..start], &RING[end..]), &[])
}

/// The yield by drawing and judging one cavity at a time with another generator.
#[test]
fn the_yield_is_that_of_plain_sampling() {
    use rand::{RngExt, SeedableRng};
    let cavity = tight();
    const SAMPLES: u64 = 200_000;
    let found = study(
        &cavity,
        &Options {
            samples: Some(SAMPLES),
            ..Options::default()
        },
    );
    let evaluator = Evaluator::new(
        &cavity,
        cavity.limits.iter().map(|limit| limit.measure).collect(),
    );
    let mut chance = rand_chacha::ChaCha8Rng::seed_from_u64(99);
    let nominal = cavity.book().nominal();
    const PLAIN: usize = 20_000;
    let mut passing = 0;
    let mut workspace = Workspace::default();
    for _ in 0..PLAIN {
        let mut values = nominal.clone();
        for (slot, entry) in cavity.book().spread_slots() {
            let Spread::Limits { below, above } = entry.spread else {
                unreachable!()
            };
            values[slot.index()] = entry.displaced(chance.random_range(-below..above));
        }
        let mut good = true;
        evaluator.evaluate(&values, &mut workspace, |index, value: f64, exists| {
            good &= exists && cavity.limits[index].bounds.hold(value);
        });
        passing += usize::from(good);
    }
    let plain = passing as f64 / PLAIN as f64;
    let deviation = (plain * (1.0 - plain) / PLAIN as f64).sqrt();
    assert!(
        (0.05..0.95).contains(&plain),
        "the limits test nothing: {plain}"
    );
    assert!(
        (found.passing - plain).abs() < 5.0 * deviation,
        "{} {plain}",
        found.passing
    );
    // What fails nothing and what fails something add up.
    let most = found.fails.values().fold(0.0, |a: f64, b| a.max(*b));
    let sum: f64 = found.fails.values().sum();
    assert!(1.0 - found.passing >= most && 1.0 - found.passing <= sum + found.unstable);
    // A mode clearance below its limit is a culprit's doing.
    assert!(!found.culprits.is_empty());
}

#[test]
fn no_sample_is_worse_than_the_worst() {
    let cavity = tight();
    let options = Options {
        samples: Some(200_000),
        ..Options::default()
    };
    let found = study(&cavity, &options);
    for worst in &found.worst {
        let name = &found
            .limits
            .iter()
            .find(|limit| limit.of == worst.of)
            .unwrap()
            .name;
        let [least, greatest] = found.measures[name].extremes.unwrap();
        let value = worst.value.unwrap();
        let bounds = found
            .limits
            .iter()
            .find(|limit| limit.of == worst.of)
            .unwrap()
            .bounds;
        let excess = |x: f64| match bounds {
            modewright::cavity::Bounds::Above(low) => low - x,
            modewright::cavity::Bounds::Below(high) => x - high,
            modewright::cavity::Bounds::Between(low, high) => (low - x).max(x - high),
        };
        let seen = excess(least).max(excess(greatest));
        assert!(
            excess(value) >= seen - 1e-9 * value.abs(),
            "{name}: {value} {least} {greatest}"
        );
        // And where it is found, it is.
        let mut values = cavity.book().nominal();
        for place in &worst.at {
            values[cavity.book().find(&place.quantity).unwrap().index()] = place.value;
            assert!(place.share.abs() <= 1.0);
        }
        let again = modewright::analysis::measures::value(&cavity, &values, worst.measure).unwrap();
        assert!((again - value).abs() < 1e-9 * value.abs());
    }
}

#[test]
fn a_budget_reaches_what_is_wanted_and_tightening_helps() {
    let cavity = tight();
    let options = Options {
        samples: Some(100_000),
        wanted: Some(0.9),
        ..Options::default()
    };
    let found = study(&cavity, &options);
    assert!(found.passing < 0.9);
    let budget = found.budget.unwrap();
    assert!(budget.passing.unwrap() >= 0.9, "{budget:?}");
    // The same tolerances written into the file give that yield.
    let set: Vec<String> = cavity
        .book()
        .spread_slots()
        .map(|(_, entry)| {
            let Spread::Limits { below, .. } = entry.spread else {
                unreachable!()
            };
            let scale = budget
                .tolerances
                .iter()
                .find(|one| one.quantity == entry.address)
                .unwrap()
                .scale;
            let at = if entry.is_reciprocal() {
                1.0 / entry.value
            } else {
                entry.value
            };
            format!("{}={at:?} m ± {:?} m", entry.address, below * scale)
        })
        .collect();
    let set: Vec<&str> = set.iter().map(String::as_str).collect();
    let start = RING.find("limits = [").unwrap();
    let end = start + RING[start..].find("\n]").unwrap() + 2;
    let text = format!("{}{TIGHT}{}", &RING[..start], &RING[end..]);
    let rewritten = study(
        &load(&text, &set),
        &Options {
            wanted: None,
            ..options
        },
    );
    assert!(
        (rewritten.passing - 0.9).abs() < 0.01,
        "{}",
        rewritten.passing
    );
    assert!(found.tightening[0].yield_if_perfect > found.tightening[0].yield_as_is);
}

#[test]
fn adjusting_a_length_holds_the_margin() {
    let cavity = load(
        &format!(
            "{RING}\n[tolerance]\nadjust = [ {{ set = \"d3.length\", travel = \"1 mm\", hold = \
             \"margin.tangential\" }} ]\n"
        )
        .replace("above = \"150 um\"", "above = \"277 um\""),
        &[],
    );
    let found = study(
        &cavity,
        &Options {
            samples: Some(50_000),
            ..Options::default()
        },
    );
    let readjusted = found.readjusted.unwrap();
    assert_eq!(readjusted.adjusted[0].set, "d3.length");
    assert!(readjusted.adjusted[0].reached > 0.999, "{readjusted:?}");
    // Without adjustment the same samples are part of the main ones.
    assert!((readjusted.yield_without - found.passing).abs() < 0.02);
}

#[test]
fn a_study_that_is_stopped_tells_what_it_knows() {
    let cavity = load(RING, &[]);
    let options = Options {
        precision: 1e-4,
        ..Options::default()
    };
    let found = tolerance(&cavity, &options, &mut |_, _| false).unwrap();
    assert!(found.stopped && found.samples > 0 && found.contributions.is_empty());
}
